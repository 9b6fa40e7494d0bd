import { describe, expect, it } from 'vitest';
import { fullAmplitude, convergenceAt, potentialParts } from '../../../server/src/core/scattering/solution';
import { CutoffGrid, seriesAtCutoff } from '../../../server/src/core/series/amplitudes';
import { setUp } from '../../../server/src/core/series/setup';
import type { InteractionSpec, KernelArguments } from '../../../server/src/core/model/spec';
import { expr } from '../../support/expr';
import { modelIn } from '../model/potentials';

type Wave = 'full' | 'even' | 'odd' | number;
const cases: readonly (readonly [string, 1 | 2 | 3, Wave, readonly (readonly [KernelArguments, string])[]])[] = [
  [
    'dimension 3, Yukawa and contact',
    3,
    0,
    [
      ['r', '-0.6*exp(-r)/r'],
      ['pk', '0.2'],
    ],
  ],
  [
    'dimension 3, l = 2',
    3,
    2,
    [
      ['r', '-2*exp(-r^2)'],
      ['pk', '2e-4*p^2*k^2'],
    ],
  ],
  [
    'dimension 2, m = 0',
    2,
    0,
    [
      ['r', '-0.4*exp(-r^2)'],
      ['pk', '0.1'],
    ],
  ],
  [
    'dimension 1, even',
    1,
    'even',
    [
      ['x', '0.3*exp(-abs(x))'],
      ['pk', '0.1'],
    ],
  ],
  [
    'dimension 1, full, no parity',
    1,
    'full',
    [
      ['x', '0.3*exp(-x^2)'],
      ['pk', 'i*0.05*(p - k)'],
    ],
  ],
  [
    'dimension 1, two deltas',
    1,
    'full',
    [
      ['x', '0.2*delta(x - 1)'],
      ['x', '-0.3*delta(x + 0.7)'],
    ],
  ],
];

function gridOf(dimension: 1 | 2 | 3, wave: Wave, kernels: readonly (readonly [KernelArguments, string])[], p: number) {
  const interactions = kernels.map(([args, kernel], j): InteractionSpec => ({
    name: `v${j}`,
    arguments: args,
    kernel: expr(kernel),
    order: 1,
  }));
  const base = modelIn(dimension, wave);
  const { setup } = setUp({ ...base, interactions, series: { order: 6, declared: true, points: [{ p, E: null }] } });
  return new CutoffGrid(setup!, 10, [p], 16);
}

describe.each(cases)('%s', (_, dimension, wave, kernels) => {
  const p = 0.8;
  const grid = gridOf(dimension, wave, kernels, p);
  const { kinematics, list } = grid.setup;
  const point = { p, E: kinematics.energy(p) };
  const amplitudes = seriesAtCutoff(grid, [point], []).bare[0];
  const byOrder = (n: number) =>
    list.terms.reduce(
      (sum, t, j) => (t.order === n ? { re: sum.re + amplitudes[j].forward.re, im: sum.im + amplitudes[j].forward.im } : sum),
      { re: 0, im: 0 },
    );
  const backward = (n: number) =>
    list.terms.reduce(
      (sum, t, j) => {
        const T = amplitudes[j].backward;
        return t.order === n && T ? { re: sum.re + T.re, im: sum.im + T.im } : sum;
      },
      { re: 0, im: 0 },
    );

  // Im T_n = -ρ Σ_m T_m* T_(n-m), the optical theorem order by order; both directions on a line. Common practice.
  it('is unitary in each order', () => {
    const density = kinematics.norm * Math.PI * p ** (dimension - 1) * (0.5 / p);
    for (let n = 2; n <= 4; n++) {
      let sum = 0;
      for (let m = 1; m < n; m++) {
        for (const T of [byOrder, backward]) sum += T(m).re * T(n - m).re + T(m).im * T(n - m).im;
      }
      expect(byOrder(n).im).toBeCloseTo(-density * sum, 12);
    }
  });

  // The Born series converges as the powers of the largest eigenvalue (Weinberg, Phys. Rev. 131 (1963) 440).
  it('sums up to the full solution, as fast as its largest eigenvalue says', () => {
    const { largestEigenvalue } = convergenceAt(grid, point);
    const ratio = Math.hypot(largestEigenvalue!.re, largestEigenvalue!.im);
    expect(ratio).toBeLessThan(0.6);
    const exact = fullAmplitude(grid, potentialParts(grid, []), point).forward;
    const sum = { re: 0, im: 0 };
    const misses = [1, 2, 3, 4, 5, 6].map(n => {
      sum.re += byOrder(n).re;
      sum.im += byOrder(n).im;
      return Math.hypot(sum.re - exact.re, sum.im - exact.im);
    });
    const size = Math.hypot(exact.re, exact.im);
    expect(misses[5]).toBeLessThan(3 * size * ratio ** 6);
  });
});
