import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import type { ModelResults } from '../../server/src/core/results';
import { checkComplete } from '../../server/src/session/check';
import { standardDefaults } from '../../server/src/session/settings';

const sample = (name: string): string => readFileSync(join(import.meta.dirname, `../../sample-specs/${name}.tare`), 'utf8');

/** Everything about the first model of a text, the full solution included. */
function resultsOf(text: string): ModelResults {
  const hooks = { shouldStop: () => false, budget: 2e10, full: true };
  const { models } = checkComplete(text, standardDefaults, { cutoff: null, order: null }, hooks);
  if (!models[0]?.results) throw new Error('This model cannot be evaluated.');
  return models[0].results;
}

const replaced = (text: string, from: string | RegExp, to: string): string => {
  expect(text).toMatch(from);
  return text.replace(from, to);
};

const verdicts = ({ terms }: ModelResults): object[] =>
  terms.map(({ order, ultraviolet: { verdict, power, log }, status }) => ({ order, verdict, power, log, status }));

describe('the atoms in a plane', () => {
  const text = sample('pancake');
  const results = resultsOf(text);

  test.each([
    ['kHz', 'nm'],
    ['uK', 'bohr'],
    ['eV', 'angstrom'],
  ])('in units of %s and %s they scatter as before', (energy, length) => {
    const other = resultsOf(replaced(text, 'units nK, um', `units ${energy}, ${length}`));
    expect(verdicts(other)).toEqual(verdicts(results));
    // A power of units in every number: 1e-9 leaves room for rounding along the way.
    other.sum.forEach((one, at) => expect(one.phaseShift! / results.sum[at].phaseShift!).toBeCloseTo(1, 9));
    const [scale] = other.terms[0].values.map((value, at) => value.bare!.re / results.terms[0].values[at].bare!.re);
    other.terms.forEach((term, n) =>
      term.values.forEach((value, at) => {
        const before = results.terms[n].values[at].renormalised!;
        expect(Math.hypot(value.renormalised!.re / scale - before.re, value.renormalised!.im / scale - before.im)).toBeLessThan(
          1e-9 * Math.hypot(before.re, before.im) + 1e-12,
        );
      }),
    );
  });

  test('each order goes as its power of the coupling', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.2, max: 5, noNaN: true }), factor => {
        const other = resultsOf(replaced(text, 'g = 0.6', `g = ${0.6 * factor}`));
        other.terms.forEach((term, n) => {
          const ratio = term.values[0].bare!.re / results.terms[n].values[0].bare!.re;
          expect(ratio / factor ** term.order).toBeCloseTo(1, 8);
        });
      }),
      { numRuns: 5 },
    );
  });
});

describe('the wire', () => {
  const text = sample('wire-renormalised');
  const results = resultsOf(text);

  test('under other names it is the same', () => {
    const other = resultsOf(
      text.replaceAll('twist', 'δ₁').replaceAll('bump', 'order').replaceAll('c0', 'gamma').replaceAll('z0', 'points'),
    );
    expect(verdicts(other)).toEqual(verdicts(results));
    expect(other.sum).toEqual(results.sum);
  });

  test('what does not pass comes back', () => {
    expect(results.sum).toHaveLength(12);
    for (const { transmission, reflection } of results.sum) expect(transmission! + reflection!).toBeCloseTo(1, 10);
  });
});
