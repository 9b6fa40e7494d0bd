import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Complex } from '../../../server/src/core/algebra/expression';
import { CutoffGrid, seriesAtCutoff } from '../../../server/src/core/series/amplitudes';
import { monomialsUpTo } from '../../../server/src/core/series/monomials';
import { amplitudesFromStandingWaves, type Block } from '../../../server/src/core/series/unitarity';
import { setupOf } from '../../support/spec';

const size = 3;
const list = monomialsUpTo(
  [
    { name: 'a', order: 1 },
    { name: 'b', order: 1 },
  ],
  4,
);
const numbers = fc.double({ min: -1, max: 1, noNaN: true });
/** Hermitian, as the standing-wave amplitude of a Hermitian interaction is. */
const hermitian = fc.tuple(...Array.from({ length: size * size }, () => numbers)).map((x): Block =>
  Array.from({ length: size }, (_, r) =>
    Array.from({ length: size }, (__, c) => ({
      re: x[Math.min(r, c) * size + Math.max(r, c)],
      im: r === c ? 0 : (r < c ? 1 : -1) * x[Math.max(r, c) * size + Math.min(r, c)],
    })),
  ),
);

/** (Σ x_j y_j) and x - y* of complex numbers. */
const dot = (x: readonly Complex[], y: readonly Complex[]): Complex =>
  x.reduce((s, a, j) => ({ re: s.re + a.re * y[j].re - a.im * y[j].im, im: s.im + a.re * y[j].im + a.im * y[j].re }), { re: 0, im: 0 });
const conjugate = ({ re, im }: Complex): Complex => ({ re, im: -im });

describe('amplitudes from standing waves', () => {
  // T - T† = -2i T†ρT (the optical theorem with several open channels), the coefficient of each monomial.
  it('are unitary in each monomial', () => {
    fc.assert(
      fc.property(
        fc.array(hermitian, { minLength: list.terms.length, maxLength: list.terms.length }),
        fc.tuple(...Array.from({ length: size }, () => fc.double({ min: 0.05, max: 2, noNaN: true }))),
        (standing, density) => {
          const T = amplitudesFromStandingWaves(list, standing, density);
          list.terms.forEach((_, n) => {
            for (let row = 0; row < size; row++) {
              for (let column = 0; column < size; column++) {
                const out = { re: 0, im: 0 };
                for (const { inner, rest } of list.splits(n)) {
                  const left = density.map((rho, s) => ({ re: rho * T[inner][s][row].re, im: -rho * T[inner][s][row].im }));
                  const product = dot(
                    left,
                    T[rest].map(r => r[column]),
                  );
                  out.re += product.re;
                  out.im += product.im;
                }
                const [t, mirrored] = [T[n][row][column], conjugate(T[n][column][row])];
                const scale = 1 + Math.hypot(out.re, out.im);
                expect(Math.abs(t.re - mirrored.re - 2 * out.im)).toBeLessThan(1e-10 * scale);
                expect(Math.abs(t.im - mirrored.im + 2 * out.re)).toBeLessThan(1e-10 * scale);
              }
            }
          });
        },
      ),
      { numRuns: 30 },
    );
  });

  it('are the standing waves themselves where no channel is open', () => {
    const standing = list.terms.map((_, n): Block => [[{ re: n + 1, im: 0 }]]);
    expect(amplitudesFromStandingWaves(list, standing, [])).toEqual(standing);
  });
});

describe('across thresholds', () => {
  // E - k⁴ + 2k² = -(k² - p²)(k² - q²): by partial fractions the loop is the difference of two elementary ones over q² - p².
  it('a kinetic energy with two momenta at one energy opens two channels', () => {
    const setup = setupOf({ c: '0.3' }, { kinetic: 'k^4 - 2*k^2', momenta: [0.5, Math.sqrt(1.75)], order: 3 });
    const { kinematics } = setup;
    const roots = kinematics.roots(kinematics.energy(0.5));
    expect(roots.map(r => r.p)).toEqual([expect.closeTo(0.5, 12), expect.closeTo(Math.sqrt(1.75), 12)]);
    const grid = new CutoffGrid(setup, 10, [0.5], 16);
    const [, second] = seriesAtCutoff(grid, [{ p: 0.5, E: kinematics.energy(0.5) }], []).bare[0];
    const open = roots.reduce((sum, { p, slope }) => sum + (kinematics.norm * p * p) / Math.abs(slope), 0);
    expect(second.forward.im).toBeCloseTo(-Math.PI * open * 0.3 ** 2, 12);
    const [p, q] = roots.map(r => r.p);
    const elementary = (x: number) => -(x / 2) * Math.log((10 + x) / (10 - x));
    const loop = (elementary(p) - elementary(q)) / (q * q - p * p) / (2 * Math.PI ** 2);
    expect(second.forward.re).toBeCloseTo(0.3 ** 2 * loop, 12);
  });

  it('nothing is lost below the lowest energy', () => {
    const setup = setupOf({ c: '0.3', y: ['r', '-exp(-r)/r'] }, { order: 3 });
    const at = new CutoffGrid(setup, 10, [0.7], 12);
    const amplitudes = seriesAtCutoff(at, [{ p: 0.7, E: -setup.kinematics.energy(0.7), below: true }], []).bare[0];
    expect(amplitudes.map(a => a.forward.im)).toEqual(amplitudes.map(() => 0));
  });
});
