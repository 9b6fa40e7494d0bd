import { describe, expect, it } from 'vitest';
import { boundStates } from '../../server/src/core/scattering/bound-states';
import { lowEnergy } from '../../server/src/core/scattering/low-energy';
import { convergenceAt, fullAmplitude, potentialParts } from '../../server/src/core/scattering/solution';
import { CutoffGrid, seriesAtCutoff } from '../../server/src/core/series/amplitudes';
import { setUp } from '../../server/src/core/series/setup';
import type { KernelArguments, ModelSpec } from '../../server/src/core/model/spec';
import { modelIn } from '../core/model/potentials';
import { expr } from '../support/expr';
import amplitudes from './data/amplitudes.json';
import potentials from './data/potentials.json';

/** A model with one interaction, 2 mu = 1 unless said, at a sharp cutoff. */
function at(
  kernel: string,
  args: KernelArguments,
  p: number,
  cutoff: number,
  more: Partial<ModelSpec> = {},
  dimension: 1 | 2 | 3 = 3,
): CutoffGrid {
  const base = modelIn(dimension, dimension === 1 ? 'full' : 0);
  const spec: ModelSpec = {
    ...base,
    interactions: [{ name: 'v', arguments: args, kernel: expr(kernel), order: 1 }],
    cutoff: { ...base.cutoff, value: cutoff },
    series: { order: 4, declared: true, points: [{ p, E: null }] },
    ...more,
  };
  const { setup } = setUp(spec);
  if (!setup) throw new Error(kernel);
  return new CutoffGrid(setup, cutoff, [p], 16);
}
const full = (grid: CutoffGrid, p: number) => fullAmplitude(grid, potentialParts(grid, []), { p, E: grid.setup.kinematics.energy(p) });
const orders = (grid: CutoffGrid, p: number) => seriesAtCutoff(grid, [{ p, E: grid.setup.kinematics.energy(p) }], []);
const off = (x: { re: number; im: number }, y: { re: number; im: number }) => Math.hypot(x.re - y.re, x.im - y.im) / Math.hypot(y.re, y.im);

describe('closed amplitudes from the literature', () => {
  // Phillips, Beane, Cohen, Ann. Phys. 263 (1998) 255: exact at the cutoff, so to the digits of the linear solver.
  it.each(amplitudes.contactWithRange.values)('contact with range, C0 = $C0, p = $p', ({ M, cutoff, C0, C2, p, T }) => {
    const grid = at(`${C0} + ${C2}*(p^2 + k^2)`, 'pk', p, cutoff, { mu: M / 2 });
    expect(off(full(grid, p).forward, T)).toBeLessThan(1e-10);
  });
  // Yamaguchi, Phys. Rev. 95 (1954) 1628: no cutoff; at 3000 b what is cut off is below (b/Λ)^3.
  it.each(amplitudes.separable.values)('separable, c = $c, p = $p', ({ c, b, p, T }) => {
    const grid = at(`${c}/((p^2 + ${b}^2)*(k^2 + ${b}^2))`, 'pk', p, 3000 * b);
    expect(off(full(grid, p).forward, T)).toBeLessThan(1e-8);
  });
  // Dalitz, Proc. R. Soc. A 206 (1951) 509, projected on l = 0; the tail beyond Λ is (p/Λ)^3 of it.
  it.each(amplitudes.secondBornYukawa.values as [number, { re: number; im: number }][])(
    'second Born term of a Yukawa potential at p = %d',
    (p, expected) => {
      const result = orders(at('exp(-r)/r', 'r', p, 3000), p);
      expect(off(result.bare[0][1].forward, expected)).toBeLessThan(1e-8);
    },
  );
});

// Common practice: the bubble of a contact in closed form.
describe('second order of a contact', () => {
  const bubble = (dimension: 2 | 3, p: number, cutoff: number) => orders(at('1', 'pk', p, cutoff, {}, dimension), p).bare[0][1].forward;
  it.each(amplitudes.contactSecondOrder.values as [number, number, { re: number; im: number }][])(
    'dimension 3, p = %f, cutoff %f',
    (p, cutoff, T) => expect(off(bubble(3, p, cutoff), T)).toBeLessThan(1e-12),
  );
  it.each(amplitudes.planeContactSecondOrder.values as [number, number, { re: number; im: number }][])(
    'dimension 2, p = %f, cutoff %f',
    (p, cutoff, T) => expect(off(bubble(2, p, cutoff), T)).toBeLessThan(1e-12),
  );
});

// 1/(1 + (μc/p)²): any text on quantum mechanics. A sharp cutoff leaves 2μ²c/(πΛ) beside μc.
it('a delta on a line lets through what it should', () => {
  const [c, p, cutoff] = [0.7, 0.9, 4e4];
  const { transmission, reflection } = full(at(`${c}*delta(x)`, 'x', p, cutoff, { mu: 1 }, 1), p);
  expect(transmission).toBeCloseTo(1 / (1 + (c / p) ** 2), 4);
  expect(transmission! + reflection!).toBeCloseTo(1, 13);
});

describe('potentials', () => {
  // An edge in position leaves errors of order 1/Λ behind a sharp cutoff.
  it.each([
    ...potentials.squareWell.map(
      ({ depth, scatteringLength }) => ['square well', depth, `${-depth}*step(1 - r)`, 60, scatteringLength, 1e-3] as const,
    ),
    ...potentials.exponential.map(
      ({ depth, scatteringLength }) => ['exponential', depth, `${-depth}*exp(-r)`, 300, scatteringLength, 1e-7] as const,
    ),
  ])('scattering length of the %s of depth %f', (_, __, kernel, cutoff, exact, tolerance) => {
    const { setup } = at(kernel, 'r', 0.2, cutoff);
    const found = lowEnergy(setup, cutoff, potentialParts(at(kernel, 'r', 0.2, cutoff), []), 0.02)!;
    expect(Math.abs(found.scatteringLength / exact - 1)).toBeLessThan(tolerance);
  });

  it.each(potentials.squareWell)('square well of depth $depth', ({ depth, phaseShifts }) => {
    for (const [p, delta] of phaseShifts) {
      // An edge in position leaves errors of order 1/Λ³ behind a sharp cutoff.
      const grid = at(`${-depth}*step(1 - r)`, 'r', p, 60);
      expect(Math.abs(Math.sin((full(grid, p).phaseShift! * Math.PI) / 180 - delta))).toBeLessThan(1e-4);
    }
  });
  it.each(potentials.exponential)('exponential of depth $depth', ({ depth, phaseShifts }) => {
    for (const [p, delta] of phaseShifts) {
      const grid = at(`${-depth}*exp(-r)`, 'r', p, 300);
      expect(Math.abs(Math.sin((full(grid, p).phaseShift! * Math.PI) / 180 - delta))).toBeLessThan(1e-7);
    }
  });
  // Malfliet and Tjon, Nucl. Phys. A 127 (1969) 161.
  it('two nucleons bound by MT-III', () => {
    const grid = at('(1438.720*exp(-3.11*r) - 626.885*exp(-1.55*r))/r', 'r', 0.2, 1500, { mu: 1 / (2 * 41.47) });
    const states = boundStates(grid.setup, grid.cutoff, potentialParts(grid, []), () => {});
    expect(states).toHaveLength(1);
    expect(states[0].energy).toBeCloseTo(-potentials.malflietTjonIII.energy, 4);
    // A sharp cutoff of 1500 fm^-1 is not infinity: that is no part of the grid's error.
    expect(states[0].error).toBeLessThan(1e-6);
  });
  // The depth at which a bound state appears is 1/η at zero energy (Weinberg, Phys. Rev. 131 (1963) 440).
  it.each([
    ['square well', 'step(1 - r)'],
    ['exponential', 'exp(-r)'],
    ['Gaussian', 'exp(-r^2)'],
    ['Yukawa', 'exp(-r)/r'],
  ] as const)('first bound state of the %s', (name, shape) => {
    const p = 1e-5;
    const { largestEigenvalue } = convergenceAt(at(`-${shape}`, 'r', p, name === 'square well' ? 60 : 1000), { p, E: p * p });
    const depth = potentials.thresholds[name].depth;
    expect(Math.abs(depth * largestEigenvalue!.re - 1)).toBeLessThan(name === 'Yukawa' ? 1e-3 : 1e-4);
  });
});

describe('two opposite deltas', () => {
  // Elementary matching at the two points; a sharp cutoff at 30/a leaves a few percent, falling like 1/Λ.
  it.each(amplitudes.oppositeDeltas.values)('c1 = $c1, a = $a, p = $p', ({ c1, a, mu, p, t }) => {
    const grid = at(`${c1 / a}*(delta(x + ${a / 2}) - delta(x - ${a / 2}))`, 'x', p, 30 / a, { mu }, 1);
    const { transmission, reflection } = full(grid, p);
    expect(Math.abs(transmission! / (t.re ** 2 + t.im ** 2) - 1)).toBeLessThan(0.05);
    expect(transmission! + reflection!).toBeCloseTo(1, 9);
  });
});
