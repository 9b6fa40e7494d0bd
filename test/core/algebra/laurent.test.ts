import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { LaurentRing, type Laurent, type LaurentTerm } from '../../../server/src/core/algebra/laurent';

const ring = new LaurentRing(-40, 40, 8);
const term = fc.record({
  power: fc.integer({ min: -4, max: 4 }),
  log: fc.integer({ min: 0, max: 2 }),
  re: fc.double({ min: -3, max: 3, noNaN: true }),
  im: fc.double({ min: -3, max: 3, noNaN: true }),
});
const elements = fc.array(term, { maxLength: 5 }).map(terms => ring.of(terms));

/** The number at one cutoff. */
function at(x: Laurent, L: number): { re: number; im: number } {
  return ring.terms(x).reduce(
    (sum, t: LaurentTerm) => {
      const size = L ** t.power * Math.log(L) ** t.log;
      return { re: sum.re + t.re * size, im: sum.im + t.im * size };
    },
    { re: 0, im: 0 },
  );
}
function product(x: Laurent, y: Laurent): Laurent {
  ring.clear();
  ring.addProduct(x, y);
  return ring.take();
}

describe('polynomials in L, 1/L and ln L', () => {
  it('multiply as their values do', () => {
    fc.assert(
      fc.property(elements, elements, fc.double({ min: 1.1, max: 3, noNaN: true }), (x, y, L) => {
        const [a, b, c] = [at(x, L), at(y, L), at(product(x, y), L)];
        expect(c.re).toBeCloseTo(a.re * b.re - a.im * b.im, 6);
        expect(c.im).toBeCloseTo(a.re * b.im + a.im * b.re, 6);
      }),
    );
  });

  it('what cancels is absent, not small', () => {
    fc.assert(
      fc.property(elements, elements, (x, y) => {
        ring.clear();
        ring.addProduct(x, y);
        ring.addScaled(product(y, x), -1, 0);
        expect(ring.terms(ring.take())).toEqual([]);
      }),
    );
  });
});
