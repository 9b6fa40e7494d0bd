import { describe, expect, it } from 'vitest';
import { momentumGrid } from '../../../server/src/core/model/momentum-grid';
import type { CutoffShape } from '../../../server/src/core/model/spec';
import { gridWishes } from '../../../server/src/core/series/amplitudes';
import { loopWeights } from '../../../server/src/core/series/loop-weights';
import reference from '../../outside/data/loops.json';
import { setupOf } from '../../support/spec';

const CUTOFF = 40;
const [MU, P] = [0.8, 0.9];
type Dimension = 1 | 2 | 3;

function weights(dimension: Dimension, shape: CutoffShape, E: { re: number; im: number }, onShell: boolean, kinetic?: string) {
  const wave = dimension === 1 ? 'even' : 0;
  const setup = setupOf(
    { v: dimension === 1 ? 'p^2 + k^2' : 'p^2*k^2' },
    { dimension, wave, mu: MU, shape, cutoff: CUTOFF, momenta: [P], kinetic },
  );
  // A complex energy may have its pole nearer to the axis than a panel for P is wide.
  const grid = momentumGrid(setup.kinematics, setup.regulator, CUTOFF, gridWishes(setup, CUTOFF, [onShell ? P : P / 10], 16));
  return loopWeights(setup.kinematics, setup.regulator, grid, E, onShell, [], 4);
}
const shapeOf = (text: string): CutoffShape => {
  const [kind, n] = text.split(' ');
  return kind === 'sharp' ? { kind: 'sharp' } : { kind: kind as 'gaussian' | 'pole', n: Number(n) };
};

describe('loops on a grid against their integrals', () => {
  it.each(reference.quadratic)('dimension $dimension, k^$n, $shape', ({ dimension, n, shape, below, above }) => {
    const at = (E: number) => weights(dimension as Dimension, shapeOf(shape), { re: E, im: 0 }, E > 0).loopMoments;
    expect(Math.abs(at(-0.7).re[n] / below - 1)).toBeLessThan(1e-12);
    const principal = at((P * P) / (2 * MU));
    expect(Math.abs(principal.re[n] - above)).toBeLessThan(1e-12 * Math.abs(below));
    expect(principal.im[n]).toBe(0);
  });

  it.each(reference.otherEnergies)('kinetic(k) = $kinetic in dimension $dimension, k^$n, E = $E.re + $E.im i', row => {
    const { re, im } = weights(row.dimension as Dimension, { kind: 'sharp' }, row.E, false, row.kinetic).loopMoments;
    const off = Math.hypot(re[row.n] - row.value.re, im[row.n] - row.value.im);
    expect(off / Math.hypot(row.value.re, row.value.im)).toBeLessThan(1e-10);
  });
});

// G(E + iε) = P G - iπδ(E - H₀): μ/p, μ/2, μp/2π by hand; a smooth cutoff takes f² of it.
describe('the density of states on shell', () => {
  it.each([
    [1, MU / P],
    [2, MU / 2],
    [3, (MU * P) / (2 * Math.PI)],
  ] as const)('dimension %i', (dimension, exact) => {
    const E = { re: (P * P) / (2 * MU), im: 0 };
    expect(weights(dimension, { kind: 'sharp' }, E, true).density).toEqual([expect.closeTo(exact, 14)]);
    const smooth = weights(dimension, { kind: 'gaussian', n: 1 }, E, true);
    expect(smooth.density[0] / exact).toBeCloseTo(Math.exp(-2 * (P / CUTOFF) ** 2), 13);
  });
});
