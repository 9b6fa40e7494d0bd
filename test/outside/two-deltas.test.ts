import { describe, expect, it } from 'vitest';
import { fullAmplitude, potentialParts } from '../../server/src/core/scattering/solution';
import { CutoffGrid, seriesAtCutoff } from '../../server/src/core/series/amplitudes';
import { setupOf } from '../support/spec';
import amplitudes from './data/amplitudes.json';

interface Pair {
  readonly c1: number;
  readonly a: number;
  readonly mu: number;
  readonly p: number;
}

/** Strengths -c1/a at a/2 and c1/a at -a/2 under a sharp cutoff: amplitudes order by order, and the full solution. */
function atCutoff({ c1, a, mu, p }: Pair, cutoff: number) {
  const kernel = `${c1 / a}*(delta(x + ${a / 2}) - delta(x - ${a / 2}))`;
  const setup = setupOf({ v: ['x', kernel] }, { dimension: 1, mu, cutoff, momenta: [p], order: 3 });
  const grid = new CutoffGrid(setup, cutoff, [p], 10);
  const point = { p, E: setup.kinematics.energy(p) };
  return {
    orders: () => seriesAtCutoff(grid, [point], []).bare[0],
    full: () => fullAmplitude(grid, potentialParts(grid, []), point),
  };
}

// Elementary matching at the two points, with no cutoff: what a sharp one leaves falls as 1/Λ, which two cutoffs take away.
describe('two opposite deltas, order by order', () => {
  it.each(amplitudes.oppositeDeltas.values)('c1 = $c1, a = $a, p = $p', pair => {
    const [low, high] = [60, 120].map(n => atCutoff(pair, n / pair.a).orders());
    const size = (pair.c1 / pair.a) ** 2 / (pair.p / pair.mu);
    pair.orders.forEach((exact, n) => {
      const found = { re: 2 * high[n].forward.re - low[n].forward.re, im: 2 * high[n].forward.im - low[n].forward.im };
      const scale = Math.max(Math.hypot(exact.re, exact.im), n === 2 ? size * (pair.c1 / pair.a) : 0, 1e-9);
      expect(Math.hypot(found.re - exact.re, found.im - exact.im) / scale, `order ${n + 1}`).toBeLessThan(2e-3);
    });
  });

  // A cutoff at 20/a leaves some 6 %.
  it('close to each other they let through what a/c1² says, and nothing else', () => {
    const through = (c1: number, a: number) => atCutoff({ c1, a, mu: 1, p: 0.5 }, 20 / a).full().transmission!;
    const wanted = 1 / (1 + (2 * 0.2 ** 2) ** 2 / (0.02 * 0.5) ** 2);
    for (const share of [1, 0.5]) expect(Math.abs(through(0.2 * share, 0.02 * share ** 2) / wanted - 1)).toBeLessThan(0.1);
    expect(Math.abs(through(0.1, 0.02) / wanted - 1)).toBeGreaterThan(1);
  });
});
