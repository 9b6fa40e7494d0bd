import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { countUpTo, difference, monomialsUpTo } from '../../../server/src/core/series/monomials';
import { orderings } from '../../../server/src/core/series/power-counting';

const models = fc.record({
  orders: fc.array(fc.integer({ min: 1, max: 3 }), { minLength: 1, maxLength: 3 }),
  order: fc.integer({ min: 1, max: 5 }),
});
const listOf = ({ orders, order }: { orders: number[]; order: number }) =>
  monomialsUpTo(
    orders.map((o, j) => ({ name: `v${j}`, order: o })),
    order,
  );

describe('monomials', () => {
  it('of one interaction of order 1: one a power; of two: n + 1 in order n', () => {
    expect(listOf({ orders: [1], order: 7 }).terms.map(t => t.name)).toEqual(['v0', 'v0^2', 'v0^3', 'v0^4', 'v0^5', 'v0^6', 'v0^7']);
    const { terms } = listOf({ orders: [1, 1], order: 4 });
    expect([1, 2, 3, 4].map(n => terms.filter(t => t.order === n).length)).toEqual([2, 3, 4, 5]);
  });

  it('are each there once, in growing order, as many as are counted without listing them', () => {
    fc.assert(
      fc.property(models, model => {
        const { terms } = listOf(model);
        expect(new Set(terms.map(t => t.exponents.join())).size).toBe(terms.length);
        expect(terms.every((t, n) => n === 0 || t.order >= terms[n - 1].order)).toBe(true);
        const regions = terms.reduce((sum, t) => sum + [...orderings(t.exponents)].length * 2 ** (t.factors - 1), 0);
        expect(countUpTo(model.orders, model.order)).toEqual({ monomials: terms.length, regions });
      }),
    );
  });

  it('split into a part and a rest that make the whole, every proper part once', () => {
    fc.assert(
      fc.property(models, model => {
        const { terms, splits } = listOf(model);
        terms.forEach((t, n) => {
          const found = splits(n);
          expect(found).toHaveLength(t.exponents.reduce((product, m) => product * (m + 1), 1) - 2);
          for (const { inner, rest } of found) expect(difference(t.exponents, terms[inner].exponents)).toEqual(terms[rest].exponents);
        });
      }),
    );
  });
});
