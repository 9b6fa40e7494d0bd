import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import reference from '../../outside/data/low-energy.json';
import { solved } from './solve';

const off = (x: { re: number; im: number }, y: { re: number; im: number }) => Math.hypot(x.re - y.re, x.im - y.im) / Math.hypot(y.re, y.im);

// Landau, Lifshitz, Quantum Mechanics, §25. A sharp cutoff at 20 takes exp(-30) of a smooth potential.
describe('what gets over and through a barrier on a line', () => {
  it.each(reference.transmission.values)('strength $strength, p = $p', row => {
    const { transmission, reflection } = solved(['x', `-${row.strength}/cosh(x)^2`], row.p, { dimension: 1, cutoff: 20 }).full();
    expect(transmission).toBeCloseTo(row.transmission, 9);
    expect(transmission! + reflection!).toBeCloseTo(1, 11);
  });
});

describe('the full solution and the series', () => {
  const weak = [
    ['space', ['r', '-0.02*exp(-r)/r'], {}],
    ['plane', ['r', '0.02*exp(-r^2)'], { dimension: 2 }],
    ['line', ['x', '0.02*exp(-x^2)'], { dimension: 1, wave: 'even' }],
    ['p wave', '0.0001*p*k', { wave: 1, cutoff: 10 }],
  ] as const;
  it.each(weak)('%s: what n orders leave is as small as the next one', (_, kernel, place) => {
    const { full, orders } = solved(kernel, 0.8, { ...place, order: 4 });
    const exact = full().forward;
    const sum = { re: 0, im: 0 };
    const T = orders();
    T.slice(0, -1).forEach((t, n) => {
      sum.re += t.re;
      sum.im += t.im;
      const left = Math.hypot(exact.re - sum.re, exact.im - sum.im);
      expect(left / Math.hypot(T[n + 1].re, T[n + 1].im)).toBeCloseTo(1, 1);
    });
  });

  // Yamaguchi, Phys. Rev. 95 (1954) 1628: of rank one, so every order is the one before times η, and T = V/(1 - η).
  it('of a separable interaction is the geometric sum of its one eigenvalue, even where the series diverges', () => {
    fc.assert(
      fc.property(fc.double({ min: -60, max: 60, noNaN: true }), fc.double({ min: 0.1, max: 3, noNaN: true }), (c, p) => {
        fc.pre(Math.abs(c) > 1);
        const { full, orders, eigenvalues } = solved(`${c}/((p^2 + 1)*(k^2 + 1))`, p, { order: 3 });
        const { largestEigenvalue: eta, converges, eigenvalues: all } = eigenvalues();
        const T = orders();
        expect(all).toHaveLength(1);
        for (const n of [1, 2]) {
          const next = { re: T[n - 1].re * eta!.re - T[n - 1].im * eta!.im, im: T[n - 1].re * eta!.im + T[n - 1].im * eta!.re };
          expect(off(next, T[n])).toBeLessThan(1e-10);
        }
        const t = full().forward;
        const product = { re: t.re * (1 - eta!.re) + t.im * eta!.im, im: t.im * (1 - eta!.re) - t.re * eta!.im };
        expect(off(product, T[0])).toBeLessThan(1e-10);
        expect(converges).toBe(Math.hypot(eta!.re, eta!.im) < 1);
      }),
      { numRuns: 8 },
    );
  });
});

// Weinberg, Phys. Rev. 131 (1963) 440.
describe('the eigenvalues of G₀V', () => {
  it('are as many as the rank of the interaction, and add up to its trace', () => {
    const { eigenvalues } = solved('0.3 + 0.02*(p^2 + k^2)', 0.8, { cutoff: 5, mu: 0.7 });
    const found = eigenvalues().eigenvalues;
    expect(found).toHaveLength(2);
    // ∫G₀(0.3 + 0.04 k²), by hand.
    const loop = -(5 - 0.4 * Math.log(5.8 / 4.2));
    const square = -125 / 3 + 0.64 * loop;
    const norm = (2 * 0.7) / (2 * Math.PI ** 2);
    expect(found.reduce((s, v) => s + v.re, 0)).toBeCloseTo(norm * (0.3 * loop + 0.04 * square), 11);
    expect(found.reduce((s, v) => s + v.im, 0)).toBeCloseTo((-norm * Math.PI * 0.8 * (0.3 + 0.04 * 0.64)) / 2, 11);
  });

  it('scale with the strength, and decide whether the orders fall', () => {
    const at = (g: number) => solved(['r', `${g}*exp(-r^2)`], 0.5, { order: 9 });
    const eta = (g: number) => at(g).eigenvalues().largestEigenvalue!;
    const one = eta(-1);
    expect(off(eta(-3), { re: 3 * one.re, im: 3 * one.im })).toBeLessThan(1e-10);
    const critical = 1 / Math.hypot(one.re, one.im);
    for (const share of [0.8, 1.25]) {
      const { orders, eigenvalues } = at(-share * critical);
      const T = orders();
      expect(Math.hypot(T[8].re, T[8].im) / Math.hypot(T[7].re, T[7].im)).toBeCloseTo(share, 3);
      expect(eigenvalues().converges).toBe(share < 1);
    }
  });
});
