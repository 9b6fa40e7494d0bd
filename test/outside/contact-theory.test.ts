import { describe, expect, it } from 'vitest';
import { lowEnergy } from '../../server/src/core/scattering/low-energy';
import { fullAmplitude, potentialParts } from '../../server/src/core/scattering/solution';
import { CutoffGrid } from '../../server/src/core/series/amplitudes';
import { setupOf, type Kernel } from '../support/spec';

/** p cot δ at some momenta, with the constants of low energies. */
function scattering(kernels: Record<string, Kernel>, cutoff: number, momenta: readonly number[]) {
  const setup = setupOf(kernels, { cutoff, momenta, shape: { kind: 'gaussian', n: 2 } });
  const grid = new CutoffGrid(setup, cutoff, momenta, 16);
  const parts = potentialParts(grid, []);
  const { scatteringLength, effectiveRange } = lowEnergy(setup, cutoff, parts, 0.02)!;
  const values = momenta.map(p => p / fullAmplitude(grid, parts, { p, E: setup.kinematics.energy(p) }).tangent);
  return { constants: [1 / scatteringLength, effectiveRange!], values };
}

/** Strengths that give these constants: as many of them as there are operators, by Newton's method. */
function fitted(operators: readonly string[], cutoff: number, wanted: readonly number[], start: readonly number[]) {
  const kernels = (x: readonly number[]) => Object.fromEntries(operators.map((form, j) => [`c${j}`, `${x[j]}*(${form})`]));
  const miss = (x: readonly number[]) =>
    scattering(kernels(x), cutoff, [0.1])
      .constants.slice(0, x.length)
      .map((v, j) => v - wanted[j]);
  let x = [...start];
  for (let round = 0; round < 12; round++) {
    const at = miss(x);
    if (Math.hypot(...at) < 1e-10) break;
    const slopes = x.map((v, j) => {
      const h = 1e-5 * (Math.abs(v) + 0.01);
      return miss(x.map((u, i) => (i === j ? u + h : u))).map((m, row) => (m - at[row]) / h);
    });
    if (x.length === 1) x = [x[0] - at[0] / slopes[0][0]];
    else {
      const [[a, c], [b, d]] = slopes;
      const determinant = a * d - b * c;
      x = [x[0] - (d * at[0] - b * at[1]) / determinant, x[1] - (a * at[1] - c * at[0]) / determinant];
    }
  }
  return kernels(x);
}

// Lepage, nucl-th/9706029: with one operator more the error of an effective theory falls two powers of momentum faster.
describe('contacts instead of a potential of range 1', () => {
  const momenta = [0.08, 0.16, 0.32];
  const exact = scattering({ v: ['r', '-1.2/cosh(r)^2'] }, 60, momenta);
  const slopes = (kernels: Record<string, Kernel>, cutoff: number) => {
    const off = scattering(kernels, cutoff, momenta).values.map((v, j) => Math.abs(v - exact.values[j]));
    return off.slice(1).map((v, j) => Math.log2(v / off[j]));
  };

  it.each([1.2, 1.7])('one operator leaves p², two leave p⁴, at cutoff %f', cutoff => {
    const one = fitted(['1'], cutoff, exact.constants, [-4]);
    for (const slope of slopes(one, cutoff)) expect(Math.abs(slope - 2)).toBeLessThan(0.3);
    const two = fitted(['1', 'p^2 + k^2'], cutoff, exact.constants, [Number(one['c0'].split('*')[0]), 0]);
    for (const slope of slopes(two, cutoff)) expect(Math.abs(slope - 4)).toBeLessThan(0.3);
  });
});
