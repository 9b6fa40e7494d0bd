import fc from 'fast-check';
import { expect, test } from 'vitest';
import { aligned, fitted, harmless, widthOf, wrapped } from '../../server/src/report/columns';

test('widths are those of a terminal', () => {
  expect(['twist', 'Λ₀', 'e\u0301', '波', '\u200d'].map(widthOf)).toEqual([5, 2, 1, 2, 0]);
});

test('nothing can steer the terminal', () => {
  expect(harmless('a\u001b[31mb\tc\u202ed')).toBe('a·[31mb  c·d');
});

test('tables keep to their width and align', () => {
  const words = fc.array(fc.tuple(fc.string({ maxLength: 40 }), fc.string({ maxLength: 40 }), fc.string({ maxLength: 40 })), {
    minLength: 1,
    maxLength: 6,
  });
  fc.assert(
    fc.property(words, fc.integer({ min: 30, max: 120 }), (rows, width) => {
      const lines = aligned(
        rows.map(row => row.map(text => ({ text: harmless(text) }))),
        width,
        new Set([1]),
      );
      expect(lines.every(line => widthOf(line) <= width)).toBe(true);
    }),
  );
  expect(
    aligned(
      [
        [{ text: 'monomial' }, { text: 'order' }],
        [{ text: 'a' }, { text: '2' }],
      ],
      40,
      new Set([1]),
    ),
  ).toEqual(['monomial   order', 'a              2']);
});

test('words wrap, and what is too long is cut', () => {
  expect(wrapped('one two three', 7)).toEqual(['one two', 'three']);
  expect([fitted('0123456789', 5), wrapped('0123456789', 5)[0]]).toEqual(['0123…', '0123…']);
});
