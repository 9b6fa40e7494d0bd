import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Complex } from '../../../server/src/core/algebra/expression';
import { growthFit, growsAs, type Growth } from '../../../server/src/core/series/growth-fit';

/** Fifteen cutoffs in a ratio that is no simple number. */
const cutoffs = Array.from({ length: 15 }, (_, j) => 40 * 1.5422107 ** j);
const strength = fc.integer({ min: 4, max: 40 }).chain(n => fc.constantFrom(n / 16, -n / 16));
const laws = fc.record({ power: fc.constantFrom(0, 1, 2, 3), log: fc.constantFrom(0, 1, 2) }).filter(g => g.power > 0 || g.log > 0);
const value = ({ power, log }: Growth, L: number) => L ** power * Math.log(L) ** log;

describe('sequences that grow as one law, with terms that fall off beside it', () => {
  it('are told from those with a power or a logarithm more or less', () => {
    fc.assert(
      fc.property(laws, strength, strength, strength, ({ power, log }, c, d, e) => {
        // Real and imaginary part grow alike, as the parts of an amplitude do.
        const y = cutoffs.map((L): Complex => {
          const rest = d * value({ power: power - 1, log: 0 }, L) + e * value({ power: power - 2, log: 0 }, L);
          return { re: c * value({ power, log }, L) + rest, im: 0.5 * c * value({ power, log }, L) - rest };
        });
        expect(growsAs(cutoffs, y, { power, log })).toBe(true);
        expect(growsAs(cutoffs, y, null)).toBe(false);
        expect(growsAs(cutoffs, y, { power: power + 1, log })).toBe(false);
        expect(growsAs(cutoffs, y, { power, log: log + 1 })).toBe(false);
        if (log > 0 && (power > 0 || log > 1)) expect(growsAs(cutoffs, y, { power, log: log - 1 })).toBe(false);
      }),
      { numRuns: 60 },
    );
  });

  it('do not grow at all where everything falls off', () => {
    fc.assert(
      fc.property(fc.constantFrom(-1, -2, -3), fc.constantFrom(0, 1), strength, strength, (power, log, c, d) => {
        const y = cutoffs.map((L): Complex => ({ re: c + d * value({ power, log }, L), im: 0 }));
        expect(growsAs(cutoffs, y, null)).toBe(true);
        expect(growsAs(cutoffs, y, { power: 0, log: 1 })).toBe(false);
      }),
    );
  });
});

describe('a fit of several laws', () => {
  it('finds each coefficient within ten times its error, whatever the unit of the logarithm', () => {
    const growing: Growth[] = [
      { power: 2, log: 1 },
      { power: 2, log: 0 },
      { power: 1, log: 0 },
      { power: 0, log: 1 },
    ];
    const falling: Growth[] = [0, -1, -2, -3].map(power => ({ power, log: 0 }));
    fc.assert(
      fc.property(fc.tuple(strength, strength, strength, strength), fc.double({ min: 0.5, max: 20, noNaN: true }), (c, unit) => {
        const y = cutoffs.map(
          L => c.reduce((sum, x, j) => sum + x * L ** growing[j].power * Math.log(L / unit) ** growing[j].log, 0) + 3 - 1 / (L + 2),
        );
        const { coefficients, shift } = growthFit(cutoffs, growing, falling, unit)!(y);
        c.forEach((x, j) => expect(Math.abs(coefficients[j] - x)).toBeLessThanOrEqual(10 * shift[j]));
        expect(shift[0]).toBeLessThan(1e-8);
      }),
    );
  });
});
