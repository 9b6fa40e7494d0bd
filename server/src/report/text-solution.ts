import type { ModelSpec } from '../core/model/spec';
import type { ModelResults, ObservablesResult, SumResult } from '../core/results';
import { energyUnit, pointInWords } from '../findings/words/momenta';
import { formatComplex, formatNumber } from '../findings/words/numbers';
import { aligned, type Cell } from './columns';
import type { Palette } from './palette';

/** What does not come from the expansion, where it was asked for: the solution at each momentum, and what follows from it at low energy. */
export function solutionRows(spec: ModelSpec, { sum, observables }: ModelResults, width: number, palette: Palette): string[] {
  const solved = sum.filter(({ full }) => full !== undefined);
  const rows = solved.map((one): Cell[] => [
    { text: `solved at ${pointInWords(one, spec)}` },
    { text: `T = ${formatComplex(one.full)}` },
    { text: consequences(one), paint: palette.faint },
  ]);
  return [...aligned(rows, width, new Set()), ...aligned(observables ? lowEnergyRows(spec, observables, palette) : [], width, new Set())];
}

function consequences({ phaseShift, transmission, reflection }: SumResult): string {
  if (phaseShift !== undefined) return `phase shift ${formatNumber(phaseShift)}°`;
  return transmission === undefined ? '' : `transmitted ${formatNumber(transmission)}, reflected ${formatNumber(reflection)}`;
}

function lowEnergyRows(spec: ModelSpec, observables: ObservablesResult, palette: Palette): Cell[][] {
  const { scattering_length: a, effective_range: r, binding_energies: bound, definition, uncertainties } = observables;
  const row = (name: string, value: string): Cell[] => [{ text: name }, { text: value }, { text: definition, paint: palette.faint }];
  const errorOf = (name: string, at = 0): number | undefined => [uncertainties[name]].flat()[at];
  const length = (power: number): string => (spec.units && power !== 0 ? ` ${spec.units.length}${power === 1 ? '' : `^${power}`}` : '');
  const { a: powerOfA, r: powerOfR } = powersOfLength(spec);
  return [
    ...(a === undefined ? [] : [row('scattering length', `${formatNumber(a, errorOf('scattering_length'))}${length(powerOfA)}`)]),
    ...(r === undefined ? [] : [row('effective range', `${formatNumber(r, errorOf('effective_range'))}${length(powerOfR)}`)]),
    ...(bound ?? []).map((energy, at): Cell[] => [
      { text: 'bound state' },
      { text: `${formatNumber(energy, errorOf('binding_energies', at))}${energyUnit(spec)} below threshold` },
      { text: '' },
    ]),
  ];
}

/** F = p^(2l+1) cot δ = -1/a + r p²/2 in dimension 3; lengths elsewhere. */
function powersOfLength({ dimension, wave }: ModelSpec): { a: number; r: number } {
  const l = dimension === 3 && wave.kind === 'angular' ? wave.number : 0;
  return { a: 2 * l + 1, r: 1 - 2 * l };
}
