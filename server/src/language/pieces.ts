import { canonical } from './names';
import { isReserved, type ReservedWord } from './words';

/**
 * A stretch of the text between two reserved words or braces: a statement, or what stands where no statement can.
 * `start` and `end` leave out the white space and comments around it.
 */
export type Piece =
  | { readonly kind: 'statement'; readonly word: ReservedWord; readonly start: number; readonly end: number }
  | { readonly kind: 'stray'; readonly start: number; readonly end: number }
  | { readonly kind: 'close'; readonly start: number; readonly end: number };

/** Letters, digits (subscript ones too) and `_`; marks so that a decomposed letter stays one word. */
export const wordPattern = /[\p{L}_][\p{L}\p{M}\p{Nd}₀-₉_]*/uy;

const scan = /#[^\r\n]*|"[^"\r\n]*"?|([\p{L}_][\p{L}\p{M}\p{Nd}₀-₉_]*)|[{}]|[^ \t\u00a0\r\n#"{}\p{L}_]+/gu;

/**
 * Cuts a text into its statements at the reserved words and braces, before anything is parsed, so that a mistake stays in its own
 * statement. A `{` ends the piece of its `model`; elsewhere it stays inside the piece, where it is a mistake.
 */
export function cut(text: string): Piece[] {
  const pieces: Piece[] = [];
  let word: ReservedWord | null = null;
  let start = -1;
  let end = -1;
  const finish = () => {
    if (word !== null) pieces.push({ kind: 'statement', word, start, end });
    else if (start >= 0) pieces.push({ kind: 'stray', start, end });
    word = null;
    start = -1;
  };
  scan.lastIndex = text.charCodeAt(0) === 0xfeff ? 1 : 0;
  for (let match = scan.exec(text); match !== null; match = scan.exec(text)) {
    const at = match.index;
    const first = match[0];
    if (first[0] === '#') continue;
    const name = match[1] === undefined ? '' : canonical(first);
    if (first === '}') {
      finish();
      pieces.push({ kind: 'close', start: at, end: at + 1 });
      continue;
    }
    if (isReserved(name)) {
      finish();
      word = name;
      start = at;
    }
    if (start < 0) start = at;
    end = at + first.length;
    if (first === '{' && word === 'model') finish();
  }
  finish();
  return pieces;
}
