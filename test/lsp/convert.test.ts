import fc from 'fast-check';
import { expect, test } from 'vitest';
import { TextDocument } from 'vscode-languageserver-textdocument';
import { toOffset, toRange, toSpan } from '../../server/src/lsp/convert';

const line = fc.string({ unit: fc.constantFrom('a', ' ', 'ψ', '𝛬', 'é') });
const text = fc.array(fc.tuple(line, fc.constantFrom('\n', '\r\n')), { maxLength: 8 }).map(lines => lines.flat().join(''));
const documentOf = (content: string): TextDocument => TextDocument.create('file:///a.tare', 'tare', 1, content);

test('a span comes back from the protocol as it went', () => {
  fc.assert(
    fc.property(text, fc.nat(), fc.nat(), (content, a, b) => {
      // Between the two characters of a line's end there is no position.
      const places = [...Array(content.length + 1).keys()].filter(at => content.slice(at - 1, at + 1) !== '\r\n');
      const [start, end] = [places[a % places.length], places[b % places.length]].sort((x, y) => x - y);
      const document = documentOf(content);
      expect(toSpan(document, toRange(document, { start, end }))).toEqual({ start, end });
    }),
  );
});

test('a range may be given backwards', () => {
  const document = documentOf('one\ntwo');
  expect(toSpan(document, { start: { line: 1, character: 2 }, end: { line: 0, character: 1 } })).toEqual({ start: 1, end: 6 });
});

test('a position outside the text means its nearest place', () => {
  fc.assert(
    fc.property(text, fc.integer(), fc.integer(), (content, at, character) => {
      const offset = toOffset(documentOf(content), { line: at, character });
      expect(offset).toBeGreaterThanOrEqual(0);
      expect(offset).toBeLessThanOrEqual(content.length);
    }),
  );
  expect(toOffset(documentOf('one\ntwo'), { line: 9, character: 0 })).toBe(7);
  expect(toOffset(documentOf('one\ntwo'), { line: -1, character: 2 })).toBe(2);
});
