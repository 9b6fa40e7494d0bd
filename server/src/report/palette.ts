/** The few styles of the text report; each is the identity where there is no colour. */
export interface Palette {
  readonly bold: (text: string) => string;
  readonly faint: (text: string) => string;
  readonly good: (text: string) => string;
  readonly bad: (text: string) => string;
  readonly warn: (text: string) => string;
  readonly note: (text: string) => string;
}

const same = (text: string): string => text;
const style =
  (on: number, off: number) =>
  (text: string): string =>
    text === '' ? '' : `\u001b[${on}m${text}\u001b[${off}m`;

export const plainPalette: Palette = { bold: same, faint: same, good: same, bad: same, warn: same, note: same };

export const colourPalette: Palette = {
  bold: style(1, 22),
  faint: style(2, 22),
  good: style(32, 39),
  bad: style(31, 39),
  warn: style(33, 39),
  note: style(36, 39),
};
