import type { ModelSpec } from '../../core/model/spec';
import { formatNumber } from './numbers';

/** The model's unit of momentum as it is written behind a number: ` fm^-1`; empty in natural units. */
export const momentumUnit = (spec: ModelSpec): string => (spec.units ? ` ${spec.units.length}^-1` : '');

/** The model's unit of energy as it is written behind a number; empty in natural units. */
export const energyUnit = (spec: ModelSpec): string => (spec.units ? ` ${spec.units.energy}` : '');

/** `p = 0.05 fm^-1`, or `E = −2 MeV` below threshold. */
export function pointInWords(point: { readonly p?: number | null; readonly E?: number | null }, spec: ModelSpec): string {
  if (point.p !== undefined && point.p !== null) return `p = ${formatNumber(point.p)}${momentumUnit(spec)}`;
  return `E = ${formatNumber(point.E)}${energyUnit(spec)}`;
}
