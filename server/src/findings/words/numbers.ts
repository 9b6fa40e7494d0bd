import type { Complex } from '../../core/algebra/expression';

/** What is shown in place of a number that the tool does not have. */
export const unknown = 'undetermined';

const shown = (text: string): string => text.replace(/e\+?(-?)/, 'e$1').replace(/^-/, '−');

/** `digits` significant digits without trailing zeros; powers of ten below 1e-4 and from 1e6 on. */
function rounded(value: number, digits: number): string {
  const size = Math.abs(value);
  if (value === 0) return '0';
  if (size < 1e-4 || size >= 1e6) {
    return value.toExponential(digits - 1).replace(/\.?0+e/, 'e');
  }
  return String(Number(value.toPrecision(digits)));
}

/** One significant digit, rounded up, since an uncertainty is a bound: 5.2e-5 -> [6, -5]. */
function boundDigit(uncertainty: number): [digit: number, exponent: number] {
  const exponent = Math.floor(Math.log10(uncertainty));
  const digit = Math.ceil(Number((uncertainty / 10 ** exponent).toPrecision(12)));
  return digit === 10 ? [1, exponent + 1] : [digit, exponent];
}

/**
 * A real number for people: `1.2345(6)` where the uncertainty reaches the digits one reads, `−3.1194 ± 2e-9` where it
 * lies far below or above them, five digits where there is none. A word where there is no number.
 */
export function formatNumber(value: number | null | undefined, uncertainty?: number | null): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return unknown;
  if (!uncertainty || !Number.isFinite(uncertainty)) return shown(rounded(value, 5));
  const [digit, exponent] = boundDigit(uncertainty);
  const leading = value === 0 ? exponent : Math.floor(Math.log10(Math.abs(value)));
  const digits = leading - exponent + 1;
  if (digits < 2 || digits > 7 || exponent > 0) return `${shown(rounded(value, 5))} ± ${digit}e${exponent}`.replace(/e0$/, '');
  if (leading >= -4) return shown(`${value.toFixed(-exponent)}(${digit})`);
  const [mantissa, power] = value.toExponential(digits - 1).split('e') as [string, string];
  return shown(`${mantissa}(${digit})e${power}`);
}

/** A complex number for people; a part that is zero, or lost beside the other one, is left out. */
export function formatComplex(value: Complex | null | undefined, uncertainty?: number | null): string {
  if (!value || !Number.isFinite(value.re) || !Number.isFinite(value.im)) return unknown;
  const { re, im } = value;
  const lost = 1e-13 * Math.hypot(re, im);
  if (Math.abs(im) <= lost) return formatNumber(re, uncertainty);
  const imaginary = Math.abs(im) === 1 ? 'i' : `${shown(rounded(Math.abs(im), 5))}i`;
  const sign = im < 0 ? '−' : '';
  const both = Math.abs(re) <= lost ? `${sign}${imaginary}` : `${shown(rounded(re, 5))} ${im < 0 ? '−' : '+'} ${imaginary}`;
  if (!uncertainty || !Number.isFinite(uncertainty)) return both;
  const [digit, exponent] = boundDigit(uncertainty);
  return `${both} ± ${digit}e${exponent}`.replace(/e0$/, '');
}

/** `a`, `a and b`, `a, b and c`; after `most` of them `and 9 more`. */
export function listed(items: readonly string[], most = items.length): string {
  if (items.length > most) return `${items.slice(0, most).join(', ')} and ${items.length - most} more`;
  if (items.length <= 1) return items.join('');
  return `${items.slice(0, -1).join(', ')} and ${items[items.length - 1]}`;
}

/** `1 error`, `2 errors`. */
export const counted = (count: number, thing: string): string => `${count} ${thing}${count === 1 ? '' : 's'}`;
