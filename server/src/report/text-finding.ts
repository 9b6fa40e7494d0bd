import type { Finding, Severity } from '../findings/finding';
import type { CheckedFile } from './checked-file';
import { fitted, harmless, widthOf, wrapped } from './columns';
import type { Palette } from './palette';
import type { Lines } from './position';

export const severityWord: Readonly<Record<Severity, string>> = { error: 'error', warning: 'warning', information: 'note', hint: 'hint' };

/** The style of a severity. */
export const styleOf = (severity: Severity, { bad, warn, note, faint }: Palette): ((text: string) => string) =>
  ({ error: bad, warning: warn, information: note, hint: faint })[severity];

const indent = '  ';
/** Further places and fixes shown of one finding; the editor and the JSON have all. */
const most = 3;

/** A finding for a person: where, what, the line with the place underlined, and the first fix. A note is told without its line. */
export function findingText(file: CheckedFile, lines: Lines, finding: Finding, width: number, palette: Palette): string[] {
  const { severity, code, message, span, related, fixes } = finding;
  const paint = styleOf(severity, palette);
  const { line, character } = lines.position(span.start);
  const where = file.sha256 === null ? file.path : `${file.path}:${line + 1}:${character + 1}`;
  const head = `${paint(severityWord[severity])}  ${palette.bold(harmless(where))}  ${palette.faint(code)}`;
  const words = wrapped(harmless(message), width - indent.length).map(one => indent + one);
  if (severity === 'information' || file.sha256 === null) return [head, ...words];
  const further = related.slice(0, most).map(other => {
    const at = lines.position(other.span.start);
    return [`${at.line + 1}:${at.character + 1}`, other.message] as const;
  });
  const help = fixes.slice(0, 1).map(({ title }) => ['fix', title] as const);
  const aside = [...further, ...help].flatMap(([label, words]) =>
    hanging(label, harmless(words), width - indent.length).map(one => indent + palette.faint(one)),
  );
  return [head, ...words, ...excerpt(file, lines, finding, width, paint, palette), ...aside];
}

/** `words` behind `label`, further lines indented to where the words begin. */
const hanging = (label: string, words: string, width: number): string[] =>
  wrapped(words, width - 8).map((line, index) => (index === 0 ? label : '').padEnd(6) + '  ' + line);

/** The line with the place underlined; of a long line the part around the place. */
function excerpt(
  file: CheckedFile,
  lines: Lines,
  { span }: Finding,
  width: number,
  paint: (text: string) => string,
  palette: Palette,
): string[] {
  const start = lines.position(span.start);
  const line = lines.line(start.line);
  const number = String(start.line + 1).padStart(4);
  const room = Math.max(10, width - number.length - 4);
  const from = start.character > room / 2 && line.length > room ? sliceStart(line, start.character - Math.floor(room / 3)) : 0;
  const before = harmless((from > 0 ? '…' : '') + line.slice(from, start.character));
  const length = Math.max(1, Math.min(span.end - span.start, line.length - start.character));
  const marked = harmless(line.slice(start.character, start.character + Math.min(length, room)));
  const shown = fitted(before + marked + harmless(line.slice(start.character + length, start.character + length + room)), room);
  const carets = '^'.repeat(Math.max(1, Math.min(widthOf(marked), room - widthOf(before))));
  if (file.text.length === 0) return [];
  return [`${palette.faint(number)}  ${shown}`, `${' '.repeat(number.length + 2 + widthOf(before))}${paint(carets)}`];
}

/** Not between the halves of a surrogate pair. */
const sliceStart = (line: string, at: number): number => (/[\uDC00-\uDFFF]/.test(line[at] ?? '') ? at - 1 : at);
