import fc from 'fast-check';
import { expect, test } from 'vitest';
import { TextDocument } from 'vscode-languageserver-textdocument';
import { Lines } from '../../server/src/report/position';

test("lines and characters are those of the editor's protocol", () => {
  const text = fc.string({ unit: fc.constantFrom('a', ' ', 'Λ', '𝜇', '\n', '\r', '\r\n'), maxLength: 60 });
  fc.assert(
    fc.property(text, fc.nat(130), (content, at) => {
      // The protocol's document keeps a place from standing between CR and LF, where none of ours stands.
      const offset = content[at - 1] === '\r' && content[at] === '\n' ? at - 1 : at;
      expect(new Lines(content).position(offset)).toEqual(TextDocument.create('', '', 0, content).positionAt(offset));
    }),
  );
});

test('a line comes without its end', () => {
  const lines = new Lines('one\r\ntwo\rthree\n');
  expect([0, 1, 2, 3].map(index => lines.line(index))).toEqual(['one', 'two', 'three', '']);
});
