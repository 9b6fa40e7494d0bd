import fc from 'fast-check';
import { expect, test } from 'vitest';
import { ResultsCache, keyOf } from '../../server/src/session/cache';
import { contact, results } from './model';

test('a key tells apart what physics tells apart', () => {
  expect(keyOf(contact('a', 0.2))).not.toBe(keyOf(contact('a', 0.2000000001)));
  expect(keyOf(contact('a', 0))).not.toBe(keyOf(contact('a', -0)));
  expect(keyOf({ ...contact('a'), mu: NaN })).not.toBe(keyOf({ ...contact('a'), mu: Infinity }));
});

test('the name of a model plays no part', () => {
  expect(keyOf(contact('a'))).toBe(keyOf(contact('b')));
});

test('the order in which a spec was put together plays no part', () => {
  const entries = Object.entries(contact('a'));
  fc.assert(
    fc.property(fc.shuffledSubarray(entries, { minLength: entries.length }), shuffled => {
      expect(keyOf(Object.fromEntries(shuffled) as unknown as ReturnType<typeof contact>)).toBe(keyOf(contact('a')));
    }),
  );
});

test('what was not asked for longest goes first', () => {
  const { complete } = new ResultsCache(2);
  complete.set('a', results('of a'));
  complete.set('b', results('of b'));
  complete.get('a');
  complete.set('c', results('of c'));
  expect(complete.get('a')).toEqual(results('of a'));
  expect(complete.get('b')).toBeUndefined();
  expect(complete.get('c')).toEqual(results('of c'));
});
