import { createToken, Lexer, type IToken, type TokenType } from 'chevrotain';
import type { Span } from './document';
import { canonical, shown } from './names';
import { wordPattern } from './pieces';
import { isUnitWord } from './units';
import { isObservable, isReserved, placeWords, type PlaceWord } from './words';

const matchWord = (text: string, offset: number): RegExpExecArray | null => {
  wordPattern.lastIndex = offset;
  return wordPattern.exec(text);
};

export const Name = createToken({ name: 'Name', label: 'a name', pattern: matchWord, line_breaks: false });
export const UnitWord = createToken({ name: 'UnitWord', label: 'a unit', pattern: Lexer.NA, categories: Name });
export const ObservableWord = createToken({ name: 'ObservableWord', label: 'an observable', pattern: Lexer.NA, categories: Name });
/** A reserved word: the first of its statement. */
export const Reserved = createToken({ name: 'Reserved', label: 'a statement', pattern: Lexer.NA });
export const NumberWord = createToken({ name: 'NumberWord', label: 'a number', pattern: /(?:\d+(?:\.(?!\.)\d*)?|\.\d+)(?:[eE][+-]?\d+)?/ });
export const Int = createToken({ name: 'Int', label: 'a whole number', pattern: Lexer.NA, categories: NumberWord });
export const Text = createToken({ name: 'Text', label: 'a path in quotes', pattern: /"[^"\r\n]*"/ });

/** `+` or `-`, `*` or `/`. */
export const Additive = createToken({ name: 'Additive', label: '`+` or `-`', pattern: Lexer.NA });
export const Multiplicative = createToken({ name: 'Multiplicative', label: '`*` or `/`', pattern: Lexer.NA });

const sign = (name: string, image: string, categories: TokenType[] = []): TokenType =>
  createToken({ name, label: `\`${image}\``, pattern: new RegExp(image.replace(/[.*+^$()[\]{}/|?\\]/g, '\\$&')), categories });
export const DotDot = sign('DotDot', '..');
export const Plus = sign('Plus', '+', [Additive]);
export const Minus = sign('Minus', '-', [Additive]);
export const Star = sign('Star', '*', [Multiplicative]);
export const Slash = sign('Slash', '/', [Multiplicative]);
export const Caret = sign('Caret', '^');
export const Open = sign('Open', '(');
export const Close = sign('Close', ')');
export const OpenBracket = sign('OpenBracket', '[');
export const CloseBracket = sign('CloseBracket', ']');
export const OpenBrace = sign('OpenBrace', '{');
export const Comma = sign('Comma', ',');
export const Equals = sign('Equals', '=');
export const Less = sign('Less', '<');
export const Percent = sign('Percent', '%');
export const Prime = sign('Prime', "'");

/** The words of the grammar's places. Each is a name too. */
export const words = Object.fromEntries(
  placeWords.map(word => [word, createToken({ name: `Word_${word}`, label: `\`${word}\``, pattern: Lexer.NA, categories: Name })]),
) as Readonly<Record<PlaceWord, TokenType>>;

const Blank = createToken({ name: 'Blank', pattern: /[ \t\u00a0\r\n]+/, group: Lexer.SKIPPED, line_breaks: true });
const Comment = createToken({ name: 'Comment', pattern: /#[^\r\n]*/, group: Lexer.SKIPPED });

export const allTokens: TokenType[] = [
  Blank,
  Comment,
  Name,
  DotDot,
  NumberWord,
  Text,
  Plus,
  Minus,
  Star,
  Slash,
  Caret,
  Open,
  Close,
  OpenBracket,
  CloseBracket,
  OpenBrace,
  Comma,
  Equals,
  Less,
  Percent,
  Prime,
  Additive,
  Multiplicative,
  Reserved,
  Int,
  UnitWord,
  ObservableWord,
  ...Object.values(words),
];

const lexer = new Lexer(allTokens, { positionTracking: 'onlyOffset', ensureOptimizations: false });

export interface LexicalMistake {
  readonly span: Span;
  readonly message: string;
  readonly mend?: { readonly title: string; readonly span: Span; readonly text: string };
}

/** The words of one statement; a name's token carries the name in its NFKC form as `payload`. */
export function tokenize(text: string): { tokens: IToken[]; mistakes: LexicalMistake[] } {
  const { tokens, errors } = lexer.tokenize(text);
  const mistakes = errors.map(error => explainCharacters(text, error.offset, error.length));
  for (const token of tokens) {
    if (token.tokenType === NumberWord) {
      if (/^\d+$/.test(token.image)) retype(token, Int);
    } else if (token.tokenType === Name) {
      const name = canonical(token.image);
      token.payload = name;
      const mark = /\p{M}/u.exec(name);
      if (mark !== null) mistakes.push(explainCharacters(token.image, token.startOffset, token.image.length));
      if (isReserved(name)) retype(token, Reserved);
      else if (isUnitWord(name)) retype(token, UnitWord);
      else if (isObservable(name)) retype(token, ObservableWord);
      else if (Object.hasOwn(words, name)) retype(token, words[name as PlaceWord]);
    }
  }
  return { tokens, mistakes };
}

function retype(token: IToken, type: TokenType): void {
  token.tokenType = type;
  token.tokenTypeIdx = type.tokenTypeIdx!;
}

const replacements: Readonly<Record<string, string>> = { '−': '-', '–': '-', '×': '*', '·': '*', '⋅': '*', '÷': '/', '…': '..', '′': "'" };
const raisedDigits = '⁰¹²³⁴⁵⁶⁷⁸⁹';

function explainCharacters(text: string, start: number, length: number): LexicalMistake {
  const span = { start, end: start + length };
  const wrong = text.slice(start, start + length);
  if (wrong[0] === '"') {
    const end = text.slice(start).search(/[\r\n]/);
    return {
      span: { start, end: end < 0 ? text.length : start + end },
      message: 'This path has no closing `"`; a path ends on its own line.',
    };
  }
  const mended = [...wrong].every(c => raisedDigits.includes(c))
    ? `^${[...wrong].map(c => raisedDigits.indexOf(c)).join('')}`
    : replacements[wrong];
  if (mended === undefined) return { span, message: `\`${shown(wrong)}\` has no meaning here; take it out.` };
  return {
    span,
    message: `\`${shown(wrong)}\` has no meaning here; write \`${mended}\`.`,
    mend: { title: `Write \`${mended}\``, span, text: mended },
  };
}
