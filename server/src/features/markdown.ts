import { formatNumber } from '../findings/words/numbers';
import { plotAddress, type Plot } from '../report/plot';

/** A table; the first column is set left, the others right. */
export function table(head: readonly string[], rows: readonly (readonly string[])[]): string {
  const line = (cells: readonly string[]): string => `| ${cells.map(cell => cell.replace(/\|/g, '\\|')).join(' | ')} |`;
  return [line(head), line(head.map((_, index) => (index === 0 ? ':--' : '--:'))), ...rows.map(line)].join('\n');
}

/** A name or a formula as it is: `*` and `_` mean themselves. */
export const code = (text: string): string => `\`${text.replace(/`/g, '')}\``;

/** Rows shown of a plot where it cannot be drawn. */
const shownRows = 8;

/** A plot as an image, or as a small table where the client shows no images. Empty where there is nothing to draw. */
export function plotMarkdown(plot: Plot | null, images: boolean): string {
  if (!plot) return '';
  if (images) {
    const address = plotAddress(plot);
    return address && `![${plot.description.replace(/[[\]\\]/g, ' ')}](${address})`;
  }
  const count = Math.min(shownRows, plot.x.length);
  const picked = [...new Set(Array.from({ length: count }, (_, n) => Math.round((n * (plot.x.length - 1)) / Math.max(1, count - 1))))];
  const rows = picked.map(index => [formatNumber(plot.x[index]), ...plot.curves.map(({ y }) => formatNumber(y[index]))]);
  return `${plot.yLabel.replace(/\*/g, '\\*')}:\n\n${table([plot.xLabel, ...plot.curves.map(({ name }) => name)], rows)}`;
}
