import type { QuickFix } from '../finding';
import type { Evaluated } from '../rule';

/**
 * The edit that adds statements to a model: below its last counterterm, or before its closing brace, indented as its
 * interactions are and with the file's line ends. A model on one line stays on one line.
 */
export function insertion({ text, source: { places } }: Evaluated, statements: readonly string[]): QuickFix['edits'] {
  const newline = /\r\n|\n|\r/.exec(text)?.[0] ?? '\n';
  const indent = indentation(text, places.interactions[0]?.statement.start ?? places.insertAt, places.model.start);
  const last = Math.max(-1, ...places.counterterms.map(({ statement }) => statement.end));
  if (last >= 0) {
    const rest = /^[^\r\n]*/.exec(text.slice(last))![0];
    const at = /^\s*(#.*)?$/.test(rest) ? last + rest.length : last;
    return [{ span: { start: at, end: at }, text: statements.map(statement => `${newline}${indent}${statement}`).join('') }];
  }
  const lineStart = startOfLine(text, places.insertAt);
  const before = text.slice(lineStart, places.insertAt);
  if (/\S/.test(before)) return [{ span: { start: places.insertAt, end: places.insertAt }, text: onOneLine(before, statements) }];
  return [{ span: { start: lineStart, end: lineStart }, text: statements.map(statement => `${indent}${statement}${newline}`).join('') }];
}

const onOneLine = (before: string, statements: readonly string[]): string => `${/\s$/.test(before) ? '' : ' '}${statements.join(' ')} `;

const startOfLine = (text: string, offset: number): number =>
  Math.max(text.lastIndexOf('\n', offset - 1), text.lastIndexOf('\r', offset - 1)) + 1;

function indentation(text: string, statement: number, model: number): string {
  const own = /^\s*/.exec(text.slice(startOfLine(text, statement), statement))![0];
  return startOfLine(text, statement) === startOfLine(text, model) ? `${own}  ` : own;
}
