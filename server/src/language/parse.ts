import { EOF, type IToken } from 'chevrotain';
import { explain, decimalComma } from './explain';
import { deepest, spanOf, TooDeep } from './expression-grammar';
import { StatementGrammar } from './grammar';
import type { ParsedStatement, Remark, StatementBody, Word } from './syntax';
import * as t from './tokens';
import { isReserved, type ReservedWord } from './words';

/** Longer statements are refused: everything below may then walk an expression by recursion. */
const longest = 4000;

const kept = new Map<string, ParsedStatement>();
const mostKept = 4000;
const longestKept = 5000;

let grammar: StatementGrammar | null = null;

/**
 * The statement that starts with the reserved word `word` and has the text `text`. The result is kept by its text, so that a
 * keystroke parses one statement again. Never throws.
 */
export function parseStatement(word: ReservedWord, text: string): ParsedStatement {
  const known = kept.get(text);
  if (known !== undefined) {
    kept.delete(text);
    kept.set(text, known);
    return known;
  }
  const parsed = parseAfresh(word, text);
  if (text.length <= longestKept) {
    kept.set(text, parsed);
    if (kept.size > mostKept) kept.delete(kept.keys().next().value!);
  }
  return parsed;
}

function parseAfresh(word: ReservedWord, text: string): ParsedStatement {
  const { tokens, mistakes } = t.tokenize(text);
  const name = declaredName(word, tokens);
  if (mistakes.length > 0)
    return { body: null, name, endsEarly: false, remarks: mistakes.map(mistake => ({ code: 'syntax', ...mistake })) };
  if (tokens.length > longest) {
    const remark: Remark = {
      code: 'syntax',
      message: `A statement has at most ${longest} words and signs; cut this one into several.`,
      span: spanOf(tokens[longest]),
    };
    return { body: null, name, endsEarly: false, remarks: [remark] };
  }
  grammar ??= new StatementGrammar();
  grammar.begin(tokens);
  try {
    const body: StatementBody = grammar[word]();
    const error = grammar.errors[0];
    if (error === undefined) return { body, name, endsEarly: false, remarks: commaHints(tokens, text) };
    const remark = explain(word, error, tokens, text, grammar.expressionEnd);
    return { body: null, name, endsEarly: remark.span.start >= text.length, remarks: [remark] };
  } catch (problem) {
    if (!(problem instanceof TooDeep)) throw problem;
    const message = `Parentheses, calls, signs and powers may stand ${deepest} deep; name a part of this as a \`const\`.`;
    const span = problem.token.tokenType === EOF ? { start: text.length, end: text.length } : spanOf(problem.token);
    return { body: null, name, endsEarly: false, remarks: [{ code: 'syntax', message, span }] };
  }
}

const declaring: readonly ReservedWord[] = ['const', 'model', 'coupling', 'interaction', 'cutoff', 'counterterm', 'data'];

function declaredName(word: ReservedWord, tokens: readonly IToken[]): Word | null {
  const second = tokens[1];
  if (!declaring.includes(word) || second?.payload === undefined || isReserved(second.payload as string)) return null;
  return { name: second.payload as string, span: spanOf(second) };
}

/** `1,5` where a list may stand is two numbers: correct, but hardly what was meant. */
function commaHints(tokens: readonly IToken[], text: string): Remark[] {
  const hints: Remark[] = [];
  tokens.forEach((token, i) => {
    if (token.tokenType !== t.Comma || tokens[i - 1].tokenType !== t.Int || tokens[i + 1]?.tokenType !== t.Int) return;
    const decimal = decimalComma(text, token.startOffset);
    if (decimal === null) return;
    const [first, second] = [tokens[i - 1].image, tokens[i + 1].image];
    const message = `This is read as two numbers, ${first} and ${second}; a decimal point is written \`.\`, as in \`${decimal.text}\`.`;
    hints.push({ code: 'reading', message, span: decimal.span });
  });
  return hints;
}
