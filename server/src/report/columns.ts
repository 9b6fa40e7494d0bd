/** Columns that a terminal gives to `text`: none for combining marks, two for the wide scripts of East Asia. */
export function widthOf(text: string): number {
  const visible = text.replace(/[\p{M}\p{Cf}]/gu, '');
  const wide =
    visible.match(/[\p{Script=Han}\p{Script=Hiragana}\p{Script=Katakana}\p{Script=Hangul}\uFF01-\uFF60\p{Extended_Pictographic}]/gu)
      ?.length ?? 0;
  return [...visible].length + wide;
}

/** `text` in at most `width` columns, `…` in place of what is cut. */
export function fitted(text: string, width: number): string {
  if (widthOf(text) <= width) return text;
  let kept = '';
  for (const sign of text) {
    if (widthOf(kept + sign) > width - 1) break;
    kept += sign;
  }
  return `${kept}…`;
}

/** Text that cannot steer a terminal: control and direction characters are shown as `·`, tabs as two blanks. */
export const harmless = (text: string): string =>
  text.replace(/\t/g, '  ').replace(/[\p{Cc}\p{Cs}\u200E\u200F\u202A-\u202E\u2066-\u2069]/gu, '·');

/** The words of `text` in lines of at most `width` columns; a longer word is cut. */
export function wrapped(text: string, width: number): string[] {
  const lines: string[] = [];
  for (const word of text.split(/ +/)) {
    const last = lines[lines.length - 1];
    if (last !== undefined && widthOf(last) + 1 + widthOf(word) <= width) lines[lines.length - 1] = `${last} ${word}`;
    else lines.push(fitted(word, width));
  }
  return lines;
}

/** A cell: what it says and how it is painted, which takes no room. */
export interface Cell {
  readonly text: string;
  readonly paint?: (text: string) => string;
}

/**
 * Rows with their columns aligned, `gap` blanks apart, within `width`: the widest column gives way first. `right` names the
 * columns that are set to the right.
 */
export function aligned(rows: readonly (readonly Cell[])[], width: number, right: ReadonlySet<number>, gap = 3): string[] {
  const widths = (rows[0] ?? []).map((_, column) => Math.max(...rows.map(row => widthOf(row[column].text))));
  const room = Math.max(width - gap * (widths.length - 1), 4 * widths.length);
  while (widths.reduce((sum, one) => sum + one, 0) > room) widths[widths.indexOf(Math.max(...widths))] -= 1;
  return rows.map(row =>
    row
      .map((cell, column) => {
        const text = fitted(cell.text, widths[column]);
        const blanks = ' '.repeat(widths[column] - widthOf(text));
        const painted = (cell.paint ?? (same => same))(text);
        return right.has(column) ? blanks + painted : column === row.length - 1 ? painted : painted + blanks;
      })
      .join(' '.repeat(gap))
      .trimEnd(),
  );
}
