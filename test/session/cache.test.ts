import { expect, test } from 'vitest';
import { ResultsCache, keyOf } from '../../server/src/session/cache';
import { contact, results } from './model';

test('a key tells apart what physics tells apart', () => {
  expect(keyOf(contact('a', 0.2))).not.toBe(keyOf(contact('a', 0.2000000001)));
  expect(keyOf({ ...contact('a'), mu: 1 })).not.toBe(keyOf({ ...contact('a'), mu: 2 }));
  expect(keyOf({ ...contact('a'), wave: { kind: 'even' } })).not.toBe(keyOf(contact('a')));
});

test('the name of a model plays no part', () => {
  expect(keyOf(contact('a'))).toBe(keyOf(contact('b')));
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
