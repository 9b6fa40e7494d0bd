import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { analyse, symbolicResults } from '../../../server/src/core/analysis';
import type { CutoffShape } from '../../../server/src/core/model/spec';
import type { ModelResults } from '../../../server/src/core/results';
import { specOf } from '../../support/spec';

const options = { shouldStop: () => false, budget: Infinity, full: false };

/** A Hermitian contact: c (p^a k^b + p^b k^a), or i c (p^a k^b - p^b k^a) where a line mixes parities. */
interface Contact {
  readonly c: number;
  readonly a: number;
  readonly b: number;
  readonly twisted: boolean;
}
interface Model {
  readonly place: readonly [1 | 2 | 3, 'full' | 'even' | 'odd' | number];
  readonly shape: CutoffShape;
  readonly contacts: readonly Contact[];
}

const strength = fc.integer({ min: 1, max: 20 }).chain(n => fc.constantFrom(n / 16, -n / 16));
const places = fc.constantFrom<Model['place']>([1, 'full'], [1, 'even'], [1, 'odd'], [2, 0], [2, 1], [3, 0], [3, 1]);
const shapes = fc.constantFrom<CutoffShape>(
  { kind: 'sharp' },
  { kind: 'gaussian', n: 1 },
  { kind: 'gaussian', n: 2 },
  { kind: 'pole', n: 8 },
);
/** Powers that start as the wave asks: p^l k^l times powers of p² and k²; any on a full line. */
const contactOn = ([, wave]: Model['place']): fc.Arbitrary<Contact> => {
  const start = typeof wave === 'number' ? wave : wave === 'odd' ? 1 : 0;
  const power = wave === 'full' ? fc.integer({ min: 0, max: 2 }) : fc.integer({ min: 0, max: 1 }).map(n => start + 2 * n);
  return fc.record({
    c: strength,
    a: power,
    b: power,
    twisted: fc.constant(wave === 'full').chain(can => (can ? fc.boolean() : fc.constant(false))),
  });
};
const models: fc.Arbitrary<Model> = places.chain(place =>
  fc.record({ place: fc.constant(place), shape: shapes, contacts: fc.array(contactOn(place), { minLength: 1, maxLength: 2 }) }),
);

const text = ({ c, a, b, twisted }: Contact, factor = 1) =>
  a === b
    ? `${c * factor}*p^${a}*k^${a}`
    : twisted
      ? `i*${c * factor}*(p^${a}*k^${b} - p^${b}*k^${a})`
      : `${c * factor}*(p^${a}*k^${b} + p^${b}*k^${a})`;
const run = (model: Model, kernels: Record<string, string>): ModelResults =>
  analyse(
    specOf(kernels, { dimension: model.place[0], wave: model.place[1], shape: model.shape, order: 3, momenta: [0.6], cutoff: 12 }),
    options,
  );
const plainly = (model: Model) => run(model, Object.fromEntries(model.contacts.map((c, i) => [`v${i}`, text(c)])));
const verdicts = ({ terms }: ModelResults) => terms.map(t => [t.ultraviolet.verdict, t.ultraviolet.power, t.ultraviolet.log, t.status]);
const vanishes = ({ values: [{ bare, backward }] }: ModelResults['terms'][number]) =>
  [bare!, ...(backward ? [backward.bare] : [])].every(({ re, im }) => Math.hypot(re, im) < 1e-13);
const near = (x: { re: number; im: number }, y: { re: number; im: number }, tolerance: number) =>
  expect(Math.hypot(x.re - y.re, x.im - y.im)).toBeLessThanOrEqual(tolerance * Math.hypot(y.re, y.im) + 1e-13);

describe('models of contacts', () => {
  it('what the algebra says, the numbers say too; what is said at first stays', () => {
    fc.assert(
      fc.property(models, model => {
        const results = plainly(model);
        results.terms.forEach(t => {
          // What vanishes at every momentum leaves nothing to compare but rounding.
          if (vanishes(t)) return;
          expect(t.ultraviolet.confirmed, `${t.monomial} in ${JSON.stringify(model)}`).toBe(true);
          expect(t.ultraviolet.verdict).not.toBe('undecided');
        });
        const first = symbolicResults(
          specOf(Object.fromEntries(model.contacts.map((c, i) => [`v${i}`, text(c)])), {
            dimension: model.place[0],
            wave: model.place[1],
            shape: model.shape,
            order: 3,
            cutoff: 12,
          }),
        );
        results.terms.forEach((t, n) => {
          if (!vanishes(t)) expect(verdicts(first)[n]).toEqual(verdicts(results)[n]);
        });
      }),
      { numRuns: 12 },
    );
  });

  it('under other names, and in another order, nothing changes', () => {
    fc.assert(
      fc.property(models, model => {
        const [results, renamed] = [plainly(model), run(model, Object.fromEntries(model.contacts.map((c, i) => [`z${9 - i}`, text(c)])))];
        expect(renamed.terms.map(t => ({ ...t, monomial: '', ultraviolet: { ...t.ultraviolet, nestedIn: [], overall: [] } }))).toEqual(
          results.terms.map(t => ({ ...t, monomial: '', ultraviolet: { ...t.ultraviolet, nestedIn: [], overall: [] } })),
        );
        const reversed = run(model, Object.fromEntries([...model.contacts.entries()].reverse().map(([i, c]) => [`v${i}`, text(c)])));
        for (const t of results.terms) {
          const same = reversed.terms.find(u => [...u.exponents].reverse().join() === t.exponents.join())!;
          expect(same.ultraviolet).toMatchObject({ verdict: t.ultraviolet.verdict, power: t.ultraviolet.power, log: t.ultraviolet.log });
          // Products are added up in another order.
          expect(Math.abs(same.values[0].bare!.re - t.values[0].bare!.re)).toBeLessThanOrEqual(t.values[0].uncertainty!);
        }
      }),
      { numRuns: 8 },
    );
  });

  it('in two parts with the same sum, each order is the same, and so is the largest growth in it', () => {
    fc.assert(
      fc.property(models, fc.constantFrom(0.25, 0.75, -0.5), (model, share) => {
        const [first, ...others] = model.contacts;
        const results = plainly(model);
        const split = run(model, {
          one: text(first, share),
          two: text(first, 1 - share),
          ...Object.fromEntries(others.map((c, i) => [`v${i}`, text(c)])),
        });
        results.sum[0].byOrder.forEach((value, n) => near(split.sum[0].byOrder[n], value, 1e-10));
        const growth = ({ terms }: ModelResults, order: number) =>
          Math.max(
            ...terms
              .filter(t => t.order === order && t.ultraviolet.verdict === 'diverges')
              .map(t => t.ultraviolet.power! + 0.1 * t.ultraviolet.log!),
            -1,
          );
        for (const order of [1, 2, 3]) expect(growth(split, order)).toBe(growth(results, order));
      }),
      { numRuns: 8 },
    );
  });

  it('a coupling scales a monomial, and each of its forms, by its power', () => {
    fc.assert(
      fc.property(models, fc.constantFrom(2, -0.5, 4), (model, factor) => {
        const results = plainly(model);
        const [first, ...others] = model.contacts;
        const scaled = plainly({ ...model, contacts: [{ ...first, c: factor * first.c }, ...others] });
        expect(verdicts(scaled)).toEqual(verdicts(results));
        results.terms.forEach((t, n) => {
          const power = factor ** t.exponents[0];
          const other = scaled.terms[n];
          near(other.values[0].bare!, { re: power * t.values[0].bare!.re, im: power * t.values[0].bare!.im }, 1e-12);
          expect(other.ultraviolet.overall.map(f => f.form)).toEqual(t.ultraviolet.overall.map(f => f.form));
          t.ultraviolet.overall.forEach(({ coefficient: { re, im } }, j) =>
            near(other.ultraviolet.overall[j].coefficient, { re: power * re, im: power * im }, 1e-9),
          );
        });
      }),
      { numRuns: 8 },
    );
  });
});
