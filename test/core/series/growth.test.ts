import { describe, expect, it } from 'vitest';
import { growthFit, growthFromNumbers, growsAs, settles } from '../../../server/src/core/series/growth-fit';

const cutoffs = Array.from({ length: 12 }, (_, j) => 50 * 1.5422107 ** j);
const real = (f: (L: number) => number) => cutoffs.map(L => ({ re: f(L), im: 0 }));

describe('growth read off numbers alone', () => {
  it.each([
    ['L', 1, 0, (L: number) => 0.3 * L - 2 + 5 / L],
    ['L^3', 3, 0, (L: number) => -(L ** 3) + 40 * L + 7],
    ['ln L', 0, 1, (L: number) => 2 * Math.log(L) + 1 - 3 / L],
    ['ln² L', 0, 2, (L: number) => Math.log(L) ** 2 - 4 * Math.log(L)],
  ] as const)('%s', (_, power, log, f) => {
    expect(growthFromNumbers(cutoffs, real(f))).toEqual({ verdict: 'diverges', power, log });
    expect(growsAs(cutoffs, real(f), { power, log })).toBe(true);
    expect(growsAs(cutoffs, real(f), null)).toBe(false);
    expect(growsAs(cutoffs, real(f), { power: power + 1, log })).toBe(false);
  });

  it.each([
    ['1/L', (L: number) => 4 + 3 / L],
    ['ln L/L', (L: number) => 4 + (3 * Math.log(L)) / L],
    ['an oscillation that dies out', (L: number) => 1 + Math.sin(1.7 * L) / L],
    ['nothing', () => 0],
  ])('%s converges', (_, f) => {
    expect(growthFromNumbers(cutoffs, real(f)).verdict).toBe('converges');
    expect(growsAs(cutoffs, real(f), null)).toBe(true);
  });

  it.each([
    ['an oscillation that stays', (L: number) => 1 + Math.sin(1.7 * L)],
    ['one that grows', (L: number) => 1 + L * Math.sin(1.7 * L)],
  ])('%s does not converge', (_, f) => {
    expect(growthFromNumbers(cutoffs, real(f)).verdict).not.toBe('converges');
  });
});

describe('coming to rest within errors', () => {
  const errors = cutoffs.map(L => 1e-9 * L ** 2);
  it('what sinks into the errors has come to rest', () => {
    expect(
      settles(
        cutoffs,
        real(L => 1 + 2 / L ** 2 + 5e-10 * L ** 2 * Math.sin(L)),
        errors,
      ),
    ).toBe(true);
  });
  it('what rises out of them has not', () => {
    expect(
      settles(
        cutoffs,
        real(L => 1 + 1e-3 * Math.log(L)),
        errors,
      ),
    ).toBe(false);
    expect(
      settles(
        cutoffs,
        real(L => 1 + 2 / L + 1e-7 * L ** 2),
        errors,
      ),
    ).toBe(false);
  });
});

describe('a fit of what grows', () => {
  const growing = [
    { power: 1, log: 0 },
    { power: 0, log: 1 },
  ];
  const falling = [0, -1, -2, -3].map(power => ({ power, log: 0 }));

  it('finds coefficients within their errors, which know how large the numbers once were', () => {
    const exact = [0.25, -1.5];
    const y = cutoffs.map(L => exact[0] * L + exact[1] * Math.log(L) + 3 + 2 / L - 1 / (L + 7));
    const fit = growthFit(cutoffs, growing, falling)!;
    const { coefficients, shift } = fit(y);
    exact.forEach((c, j) => expect(Math.abs(coefficients[j] - c)).toBeLessThan(Math.max(10 * shift[j], 1e-12)));
    const before = fit(
      y,
      cutoffs.map(L => L ** 5),
    );
    expect(before.shift[1]).toBeGreaterThan(1e3 * shift[1]);
  });

  it('is refused where there are too few cutoffs to check it', () => {
    expect(growthFit(cutoffs.slice(0, 7), growing, falling)).toBeNull();
  });
});
