import type { Finding } from '../../server/src/findings/finding';
import { Lines } from '../../server/src/report/position';

/**
 * Findings as one would pencil them into the text: the line, carets under the place, severity and code behind them.
 * To compare with what is wanted, so that a missing finding fails and an unexpected one too.
 */
export function annotated(text: string, findings: readonly Finding[]): string {
  const lines = new Lines(text);
  return findings
    .map(({ span, severity, code, subject }) => {
      const { line, character } = lines.position(span.start);
      const carets = '^'.repeat(Math.max(1, span.end - span.start));
      return `${lines.line(line)}\n${' '.repeat(character)}${carets} ${severity} ${code}${subject === undefined ? '' : ` ${subject}`}`;
    })
    .join('\n');
}

/** The text with the edits of a quick fix made. */
export function edited(
  text: string,
  edits: readonly { readonly span: { readonly start: number; readonly end: number }; readonly text: string }[],
): string {
  return [...edits]
    .sort((a, b) => b.span.start - a.span.start)
    .reduce((left, { span, text: put }) => left.slice(0, span.start) + put + left.slice(span.end), text);
}
