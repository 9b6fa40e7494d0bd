import { describe, expect, it } from 'vitest';
import { analyse } from '../../../server/src/core/analysis';
import { expr } from '../../support/expr';
import { modelIn } from '../model/potentials';

const options = { shouldStop: () => false, budget: Infinity, full: true };

/** A contact of strength c under a sharp cutoff, at the energy -κ²/2μ: ∫ k²dk/2π² G₀ is elementary. */
function contactAt(c: number, mu: number, cutoff: number, kappa: number) {
  const base = modelIn(3, 0);
  return analyse(
    {
      ...base,
      mu,
      interactions: [{ name: 'c', arguments: 'pk', kernel: expr(String(c)), order: 1 }],
      cutoff: { ...base.cutoff, value: cutoff },
      series: { order: 3, declared: true, points: [{ p: null, E: (-kappa * kappa) / (2 * mu) }] },
    },
    options,
  );
}

describe('an energy below threshold', () => {
  const [c, mu, cutoff, kappa] = [0.37, 1.3, 20, 0.8];
  const loop = (-mu / Math.PI ** 2) * (cutoff - kappa * Math.atan(cutoff / kappa));
  const { terms, sum, series } = contactAt(c, mu, cutoff, kappa);

  it('gives each order of a contact, and names no momentum', () => {
    terms.forEach(({ values: [value] }, n) => {
      const wanted = c ** (n + 1) * loop ** n;
      expect(value.p).toBeUndefined();
      expect(Math.hypot(value.bare!.re - wanted, value.bare!.im)).toBeLessThanOrEqual(value.uncertainty! + 1e-15);
      expect(value.uncertainty).toBeLessThan(1e-12);
    });
  });

  it('gives the geometric sum as the full solution, with nothing going out', () => {
    expect(sum[0].full!.re).toBeCloseTo(c / (1 - c * loop), 12);
    expect(sum[0]).not.toHaveProperty('phaseShift');
  });

  it('has the ratio of the geometric sum as its eigenvalue', () => {
    expect(series[0].largestEigenvalue!.re).toBeCloseTo(c * loop, 12);
  });
});
