import type { Complex } from '../../server/src/core/algebra/expression';

/** A number as a golden file holds it: rounded to its tolerance, which bounds the modulus of the error. */
export interface Quantity {
  readonly re: number;
  readonly im: number;
  readonly tolerance: number;
}

/** Rounds to a tenth of the tolerance, so that the last digits, which mean nothing, do not stand in the file. */
export function quantity(value: Complex | number, tolerance: number): Quantity {
  const { re, im } = typeof value === 'number' ? { re: value, im: 0 } : value;
  const step = tolerance > 0 ? 10 ** Math.floor(Math.log10(tolerance) - 1) : 0;
  const rounded = (x: number): number => (step > 0 ? Number((Math.round(x / step) * step).toPrecision(15)) : x);
  return { re: rounded(re) + 0, im: rounded(im) + 0, tolerance: Number(tolerance.toPrecision(1)) };
}

/** `found` with every quantity that agrees with `wanted` replaced by that one: what differs then is what does not agree. */
export function agreeing(wanted: unknown, found: unknown): unknown {
  if (isQuantity(wanted) && isQuantity(found)) {
    const gap = Math.hypot(wanted.re - found.re, wanted.im - found.im);
    return gap <= 2 * (wanted.tolerance + found.tolerance) ? wanted : found;
  }
  if (Array.isArray(wanted) && Array.isArray(found)) return found.map((item, at) => agreeing(wanted[at], item));
  if (isRecord(wanted) && isRecord(found))
    return Object.fromEntries(Object.entries(found).map(([key, value]) => [key, agreeing(wanted[key], value)]));
  return found;
}

const isRecord = (value: unknown): value is Record<string, unknown> => typeof value === 'object' && value !== null && !Array.isArray(value);
const isQuantity = (value: unknown): value is Quantity => isRecord(value) && typeof value['tolerance'] === 'number';
