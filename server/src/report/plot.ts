import { scaleLinear, scaleLog } from 'd3-scale';
import { line } from 'd3-shape';
import { formatNumber } from '../findings/words/numbers';
import { logTicks, padded, tickLabel } from './axes';

export interface Curve {
  readonly name: string;
  /** Runs parallel to the plot's `x`; what is not finite leaves a gap. */
  readonly y: readonly number[];
}

export interface Plot {
  readonly title: string;
  /** One sentence for those who cannot see the plot. */
  readonly description: string;
  readonly x: readonly number[];
  readonly xLabel: string;
  readonly yLabel: string;
  readonly curves: readonly Curve[];
  /** A vertical line, such as the model's own cutoff. */
  readonly mark?: { readonly x: number; readonly label: string };
}

/** Told apart by dash as well as colour; every tone keeps its contrast on a light and on a dark ground. */
const strokes = [
  { colour: '#d9662b', dash: '', width: 2 },
  { colour: '#3d86d6', dash: '7 4', width: 2.2 },
  { colour: '#2f9e77', dash: '2 3', width: 2.2 },
  { colour: '#a06cd5', dash: '9 3 2 3', width: 2 },
] as const;
const ink = '#82878f';

const size = { width: 440, height: 236 };
const frame = { left: 62, right: size.width - 14, top: 40, bottom: size.height - 40 };

/** Beyond this the arithmetic of an axis overflows. */
const largest = 1e300;
const drawable = (value: number): boolean => Math.abs(value) < largest;
const drawableX = (x: number): boolean => x > 1 / largest && x < largest;

/** The plot as SVG text: x logarithmic, y linear, transparent ground. Empty where fewer than two points can be drawn. */
export function plotSvg(plot: Plot): string {
  const usable = plot.x.filter((x, index) => drawableX(x) && plot.curves.some(({ y }) => drawable(y[index])));
  const values = plot.curves.flatMap(({ y }) => y.filter((value, index) => drawable(value) && drawableX(plot.x[index])));
  if (new Set(usable).size < 2 || values.length === 0) return '';
  const x = scaleLog([Math.min(...usable), Math.max(...usable)], [frame.left, frame.right]);
  const y = scaleLinear(padded(values), [frame.bottom, frame.top]);
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${size.width}" height="${size.height}" viewBox="0 0 ${size.width} ${size.height}" role="img" aria-labelledby="t d" font-family="system-ui, -apple-system, 'Segoe UI', sans-serif" font-size="11" fill="${ink}">`,
    `<title id="t">${escaped(plot.title)}</title><desc id="d">${escaped(plot.description)}</desc>`,
    ...y.ticks(5).map(value => horizontal(y(value), tickLabel(value))),
    ...logTicks(x.domain() as [number, number]).map(value => vertical(x(value), tickLabel(value))),
    `<path d="M${frame.left} ${frame.bottom}H${frame.right}" stroke="${ink}" fill="none"/>`,
    text((frame.left + frame.right) / 2, size.height - 8, 'middle', plot.xLabel),
    text(8, frame.top - 24, 'start', plot.yLabel),
    ...(plot.mark && plot.mark.x >= x.domain()[0] && plot.mark.x <= x.domain()[1] ? [marker(x(plot.mark.x), plot.mark.label)] : []),
    ...plot.curves.map((curve, index) => curvePath(curve, plot.x, x, y, index)),
    legend(plot.curves),
    '</svg>',
  ].join('');
}

/** The plot as the address of an image, for a page or a hover. Empty where `plotSvg` is. */
export function plotAddress(plot: Plot): string {
  const svg = plotSvg(plot);
  return svg && `data:image/svg+xml;base64,${Buffer.from(svg, 'utf8').toString('base64')}`;
}

function curvePath({ y: values }: Curve, at: readonly number[], x: (v: number) => number, y: (v: number) => number, index: number): string {
  const { colour, dash, width } = strokes[index % strokes.length];
  const drawn = line<number>()
    .defined((value, i) => drawable(value) && drawableX(at[i]))
    .x((_, i) => x(at[i]))
    .y(value => y(value))
    .digits(2);
  return `<path d="${drawn(values) ?? ''}" fill="none" stroke="${colour}" stroke-width="${width}" stroke-linejoin="round" stroke-linecap="round"${dash && ` stroke-dasharray="${dash}"`}/>`;
}

function legend(curves: readonly Curve[]): string {
  let right = frame.right;
  return [...curves.keys()]
    .reverse()
    .map(index => {
      const { colour, dash, width } = strokes[index % strokes.length];
      const name = curves[index].name;
      const left = right - 6.2 * name.length - 34;
      right = left - 8;
      const top = frame.top - 28;
      return `<path d="M${fixed(left)} ${top}h26" stroke="${colour}" stroke-width="${width}"${dash && ` stroke-dasharray="${dash}"`} fill="none"/>${text(left + 32, top + 4, 'start', name)}`;
    })
    .join('');
}

const horizontal = (y: number, label: string): string =>
  `<path d="M${frame.left} ${fixed(y)}H${frame.right}" stroke="${ink}" stroke-opacity=".28" fill="none"/>${text(frame.left - 7, y + 4, 'end', label)}`;

const vertical = (x: number, label: string): string =>
  `<path d="M${fixed(x)} ${frame.bottom}v4" stroke="${ink}" fill="none"/>${text(x, frame.bottom + 16, 'middle', label)}`;

const marker = (x: number, label: string): string =>
  `<path d="M${fixed(x)} ${frame.bottom}V${frame.top}" stroke="${ink}" stroke-dasharray="1 3" stroke-linecap="round" fill="none"/>${text(x, frame.top - 5, 'middle', label)}`;

const text = (x: number, y: number, anchor: string, content: string): string =>
  `<text x="${fixed(x)}" y="${fixed(y)}" text-anchor="${anchor}">${escaped(content)}</text>`;

const fixed = (value: number): string => String(Number(value.toFixed(2)));

const escaped = (content: string): string =>
  content.replace(/[\p{Cc}\p{Cs}]/gu, ' ').replace(/[&<>"]/g, sign => `&#${sign.charCodeAt(0)};`);

/** `0.031 to 12.4`, for descriptions. */
export const rangeInWords = (values: readonly number[]): string => {
  const finite = values.filter(Number.isFinite);
  return finite.length === 0 ? 'nothing' : `${formatNumber(finite[0])} to ${formatNumber(finite[finite.length - 1])}`;
};
