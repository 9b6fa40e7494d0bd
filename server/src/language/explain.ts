import { EOF, tokenMatcher, type IRecognitionException, type IToken } from 'chevrotain';
import { expected } from './expected';
import { endOf, spanOf } from './expression-grammar';
import { nearest, shown, suggestion } from './names';
import type { Remark } from './syntax';
import * as t from './tokens';
import { unitWords } from './units';
import { placeWords, reservedWords, type ReservedWord } from './words';

/** The place words that may follow an expression in each statement: what a misspelt word there was meant to be. */
const following: Partial<Record<ReservedWord, readonly string[]>> = {
  interaction: ['order'],
  coupling: ['free'],
  cutoff: ['sharp', 'gaussian', 'pole', 'scan'],
  series: ['at', 'to'],
  counterterm: ['cancels', 'subtract'],
  fix: ['at', 'order', 'with', 'by'],
  data: ['columns'],
  expect: ['within', 'at'],
};

/** A sentence for the first mistake that the grammar met in a statement. */
export function explain(
  word: ReservedWord,
  error: IRecognitionException,
  tokens: readonly IToken[],
  text: string,
  expressionEnd: number,
): Remark {
  const wanted = error.message;
  const token = error.token;
  const before = token.tokenType === EOF ? tokens[tokens.length - 1] : tokens[tokens.indexOf(token) - 1];
  if (token.tokenType === EOF) {
    const place = { start: text.length, end: text.length };
    const what = wanted === '' ? 'Something' : sentence(wanted);
    return { code: 'syntax', message: `${what} is missing here, at the end of \`${word}\`.`, span: place };
  }
  const span = spanOf(token);
  const image = `\`${shown(token.image)}\``;
  const afterExpression = before !== undefined && endOf(before) === expressionEnd;
  if (wanted === expected.unitPower) {
    return {
      code: 'syntax',
      span,
      message: 'The power of a unit is a whole number; a power of the quantity needs parentheses, as in `(3 MeV)^n`.',
    };
  }
  if (token.tokenType === t.OpenBrace) {
    return { code: 'syntax', span, message: 'A `{` stands only behind the name of a model; take it out.' };
  }
  if (tokenMatcher(token, t.Comma) && afterExpression) {
    const decimal = decimalComma(text, token.startOffset);
    if (decimal !== null) {
      const mend = { title: `Write \`${decimal.text}\``, span: decimal.span, text: decimal.text };
      return { code: 'syntax', span, message: `A decimal point is written \`.\`: write \`${decimal.text}\`.`, mend };
    }
  }
  if (tokenMatcher(token, t.Name) && opensLine(text, token.startOffset)) {
    const meant = misspelt(token.payload as string);
    if (meant !== null) return misspeltStatement(meant, token.image, tokens[tokens.indexOf(token) + 1], span);
  }
  if (tokenMatcher(token, t.Name)) {
    const meant = nearest(token.payload as string, following[word] ?? []);
    if (meant !== null) {
      const mend = { title: `Write \`${meant}\``, span, text: meant };
      return { code: 'syntax', span, message: `${image} has no meaning here; did you mean \`${meant}\`?`, mend };
    }
    if (word === 'units') {
      return {
        code: 'syntax',
        span,
        message: `${image} is no unit${suggestion(token.image, [...unitWords, 'natural'])}${wantedUnits(token)}`,
      };
    }
  }
  if (
    afterExpression &&
    before !== undefined &&
    (tokenMatcher(token, t.Name) || tokenMatcher(token, t.NumberWord) || tokenMatcher(token, t.Open))
  ) {
    return missingProduct(token, before, text, span);
  }
  if (token.tokenType === t.Caret && before !== undefined && tokenMatcher(before, t.UnitWord)) {
    return { code: 'syntax', span, message: 'A power of the quantity needs parentheses, as in `(3 MeV)^n`.' };
  }
  if (wanted === '') return { code: 'syntax', span, message: `Nothing can follow here any more; take ${image} out.` };
  return { code: 'syntax', span, message: `${sentence(wanted)} must stand here, not ${image}.` };
}

/** The reserved word that `word` was most likely meant to be. */
export const misspelt = (word: string): ReservedWord | null =>
  word.length < 3 ? null : (nearest(word, reservedWords) as ReservedWord | null);

/** `image` stands where a statement begins and is none, but nearly the word `meant`; `next` is the word behind it. */
export function misspeltStatement(meant: ReservedWord, image: string, next: IToken | undefined, span: Remark['span']): Remark {
  return {
    code: 'syntax',
    span,
    message: `No statement begins with \`${shown(image)}\`; did you mean \`${meant}\`?`,
    mend: { title: `Write \`${meant}\``, span, text: meant },
    misspelt: { meant, name: next?.payload === undefined ? null : { name: next.payload as string, span: spanOf(next) } },
  };
}

const opensLine = (text: string, offset: number): boolean =>
  /(?:^|[\r\n])[ \t\u00a0]*$/.test(text.slice(Math.max(0, offset - 200), offset));

function missingProduct(token: IToken, before: IToken, text: string, span: Remark['span']): Remark {
  const number = before.tokenType === t.Int || before.tokenType === t.NumberWord;
  const name = String(token.payload ?? token.image);
  if (number && tokenMatcher(token, t.Name) && name.length > 1 && !placeWords.includes(name as never)) {
    const unit = unitWords.find(known => known.toLowerCase() === name.toLowerCase()) ?? null;
    if (unit !== null) {
      const others = unitWords.filter(u => u.toLowerCase() === name.toLowerCase());
      const meant = others.length > 1 ? others.map(u => `\`${u}\``).join(' or ') : `\`${unit}\``;
      return { code: 'syntax', span, message: `\`${shown(name)}\` is no unit; did you mean ${meant}?` };
    }
  }
  const left = text.slice(before.startOffset, endOf(before));
  const right = token.tokenType === t.Open ? '(…)' : token.image;
  const place = { start: endOf(before), end: token.startOffset };
  return {
    code: 'syntax',
    span,
    message: `A product needs its sign: write \`${shown(left === ')' ? '(…)' : left)}*${shown(right)}\`.`,
    mend: { title: 'Insert `*`', span: place, text: '*' },
  };
}

/** The number meant by `1,5` with its comma at `comma`, if digits stand directly on both sides. */
export function decimalComma(text: string, comma: number): { text: string; span: Remark['span'] } | null {
  const before = /\d+$/.exec(text.slice(Math.max(0, comma - 30), comma));
  const after = /^\d+/.exec(text.slice(comma + 1, comma + 31));
  if (before === null || after === null) return null;
  return { text: `${before[0]}.${after[0]}`, span: { start: comma - before[0].length, end: comma + 1 + after[0].length } };
}

const wantedUnits = (token: IToken): string =>
  nearest(token.image, [...unitWords, 'natural']) === null ? '; write `natural`, or an energy and a length unit such as `MeV, fm`.' : '';

const sentence = (words: string): string => words[0].toUpperCase() + words.slice(1);
