import { describe, expect, it } from 'vitest';
import { besselJ } from '../../../server/src/core/special/bessel-j';
import { digamma } from '../../../server/src/core/special/digamma';
import { ellipticIntegrals } from '../../../server/src/core/special/elliptic';
import { erf } from '../../../server/src/core/special/erf';
import { gamma, logGamma } from '../../../server/src/core/special/gamma';
import { legendreP } from '../../../server/src/core/special/legendre-p';
import { legendreQ, legendreQAbove } from '../../../server/src/core/special/legendre-q';
import { scaledModifiedBessel } from '../../../server/src/core/special/modified-bessel';
import { scaledModifiedSphericalBessel } from '../../../server/src/core/special/modified-spherical-bessel';
import { sphericalBessel, sphericalBessels } from '../../../server/src/core/special/spherical-bessel';
import { specialFunctions } from '../../../server/src/core/special';
import reference from '../../outside/data/special.json';

type Row = readonly number[];
const values = reference.values as Record<string, Row[]>;

/** Largest error, relative to the value or, for functions that oscillate, to their amplitude at that argument. */
function worst(rows: readonly Row[], f: (...args: number[]) => number, size: (row: Row) => number): number {
  return Math.max(...rows.map(row => Math.abs(f(...row.slice(0, -1)) - row[row.length - 1]) / size(row)));
}
const value = (row: Row) => Math.abs(row[row.length - 1]);
const amplitude = (fall: (x: number) => number) => (row: Row) => Math.max(value(row), row[1] > row[0] ? fall(row[1]) : 0);

describe('special functions against mpmath, SciPy and GSL', () => {
  it('erf', () => expect(worst(values.erf, erf, value)).toBeLessThan(1e-15));
  it('gamma', () => expect(worst(values.gamma, gamma, value)).toBeLessThan(5e-14));
  it('I_n', () => expect(worst(values.scaledModifiedBessel, scaledModifiedBessel, value)).toBeLessThan(1e-14));
  it('K', () => expect(worst(values.ellipticFirst, (a, b) => ellipticIntegrals(a, b).first, value)).toBeLessThan(1e-15));
  it('E', () => expect(worst(values.ellipticSecond, (a, b) => ellipticIntegrals(a, b).second, value)).toBeLessThan(1e-14));
  it('digamma', () => expect(worst(values.digamma, digamma, row => Math.max(value(row), 0.1))).toBeLessThan(1e-14));
  // A phase of 1000 is rounded by 1e-13 before the cosine is taken.
  it('J_n', () =>
    expect(
      worst(
        values.besselj,
        besselJ,
        amplitude(x => Math.sqrt(2 / (Math.PI * x))),
      ),
    ).toBeLessThan(2e-14));
  it('j_l', () =>
    expect(
      worst(
        values.sphericalj,
        sphericalBessel,
        amplitude(x => 1 / x),
      ),
    ).toBeLessThan(5e-15));
  it('P_l', () => expect(worst(values.legendrep, legendreP, row => Math.max(value(row), 0.1))).toBeLessThan(5e-15));
  // The reference takes the argument as a double; 1.00001 - 1 is then exact.
  it('Q_l', () =>
    expect(worst(values.legendreq, legendreQ, row => Math.max(value(row), Math.abs(row[1]) < 1 ? 0.1 : 0))).toBeLessThan(5e-14));
  it('exp(-z) i_l(z)', () => expect(worst(values.scaledModifiedSphericalBessel, scaledModifiedSphericalBessel, value)).toBeLessThan(2e-14));
});

describe('special functions at their edges', () => {
  it('have no value at the poles of gamma and digamma', () => {
    expect([gamma(0), gamma(-3), digamma(0), digamma(-2)]).toEqual([NaN, NaN, NaN, NaN]);
  });
  it('log gamma continues gamma beyond the largest double', () => {
    expect(logGamma(150) - Math.log(gamma(150))).toBeCloseTo(0, 11);
    expect(logGamma(1000)).toBeCloseTo(5905.220423209181, 8);
  });
  it('Q_l keeps its digits next to 1', () => {
    expect(legendreQAbove(0, 1e-20)).toBeCloseTo(0.5 * Math.log(2e20), 12);
    expect(legendreQAbove(3, 0)).toBe(Infinity);
    expect(legendreQ(2, -1.5)).toBeCloseTo(-legendreQ(2, 1.5), 14);
  });
  it('parities', () => {
    for (const n of [0, 1, 2, 3]) {
      expect(besselJ(n, -3.3)).toBeCloseTo((-1) ** n * besselJ(n, 3.3), 15);
      expect(besselJ(-n, 3.3)).toBeCloseTo((-1) ** n * besselJ(n, 3.3), 15);
      expect(sphericalBessel(n, -3.3)).toBeCloseTo((-1) ** n * sphericalBessel(n, 3.3), 15);
    }
  });
  it('the row of spherical Bessel functions is the single ones', () => {
    for (const x of [0, 1e-4, 0.3, 3.14159, 17, 22, 400, -2.5]) {
      const row = new Float64Array(20);
      sphericalBessels(19, x, row);
      row.forEach((y, l) => expect(Math.abs(y - sphericalBessel(l, x))).toBeLessThan(2e-15));
    }
  });
  it('orders that are no whole number have no value', () => {
    expect(specialFunctions.besselj!(0.5, 1)).toBeNaN();
    expect(specialFunctions.legendrep!(-1, 0.5)).toBeNaN();
    expect(specialFunctions.sphericalj!(2, 1)).toBeCloseTo(0.06203505201137386, 15);
  });
});
