import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import type { ModelResults } from '../../server/src/core/results';
import { findingsOf } from '../../server/src/findings';
import type { Finding } from '../../server/src/findings/finding';
import { fileFinding } from '../../server/src/findings/file';
import type { CheckedFile } from '../../server/src/report/checked-file';
import { widthOf } from '../../server/src/report/columns';
import { colourPalette, plainPalette } from '../../server/src/report/palette';
import { textReport } from '../../server/src/report/text';
import { expectGolden } from '../support/golden';
import { checkedWire } from '../support/wire';

const fileOf = (checked: ReturnType<typeof checkedWire>): CheckedFile => ({
  path: 'wire.tare',
  sha256: 'ab',
  text: checked.document.text,
  checked,
  findings: findingsOf(checked),
});
const good = fileOf(checkedWire());
const bad = fileOf(checkedWire({ cancelled: false }));
const unread: CheckedFile = {
  path: 'other.tare',
  sha256: null,
  text: '',
  checked: null,
  findings: [fileFinding('There is no such file.', { start: 0, end: 0 })],
};

const withFinding = (text: string, start: number, end: number): CheckedFile => {
  const finding: Finding = {
    code: 'syntax',
    severity: 'error',
    message: 'Wrong.',
    span: { start, end },
    model: null,
    related: [],
    docs: '',
    fixes: [],
  };
  return { path: 'x.tare', sha256: 'ab', text, checked: null, findings: [finding] };
};
const linesOf = (file: CheckedFile, width = 60): string[] => textReport([file], width, plainPalette).split('\n');

describe('the report for a person', () => {
  test.each([
    ['good', good],
    ['bad', bad],
  ] as const)('of a %s model is the one that was agreed on', (name, file) => {
    expectGolden(join(import.meta.dirname, `wire-${name}.txt`), textReport([file], 100, plainPalette));
  });

  test.each([60, 80, 100])('keeps to %d columns', width => {
    const lines = textReport([good, bad, unread], width, plainPalette).split('\n');
    expect(lines.filter(line => widthOf(line) > width)).toEqual([]);
  });

  test('in colour says the same', () => {
    const coloured = textReport([good, bad, unread], 100, colourPalette);
    // eslint-disable-next-line no-control-regex
    expect(coloured.replace(/\u001b\[\d+m/g, '')).toBe(textReport([good, bad, unread], 100, plainPalette));
    expect(coloured).toContain('\u001b[31m');
  });

  test('names a file that could not be read without a place in it', () => {
    expect(textReport([unread], 80, plainPalette)).toBe(
      'error  other.tare  file\n  There is no such file.\n\n1 file, 0 models: 1 error.\n',
    );
  });
});

describe('the solution beyond the series', () => {
  const solved = (results: Partial<ModelResults>): string =>
    textReport([fileOf(checkedWire({ results: all => ({ ...all, ...results }) }))], 100, plainPalette);

  test('is shown where there is one, with what it lets through', () => {
    const shown = solved({
      sum: [
        {
          p: 0.05,
          E: 0.00125,
          orders: [1],
          byOrder: [{ re: 1, im: 0 }],
          full: { re: 0.5, im: -0.25 },
          transmission: 0.75,
          reflection: 0.25,
        },
      ],
    });
    expect(shown).toMatch(/solved at p = 0\.05 +T = 0\.5 − 0\.25i +transmitted 0\.75, reflected 0\.25/);
  });

  test('gives low-energy numbers with their errors and definition', () => {
    const shown = solved({
      observables: {
        scattering_length: -5.25,
        binding_energies: [0.5, 0.125],
        definition: 'p cot(delta) = -1/a + r p^2/2',
        uncertainties: { scattering_length: 0.01, binding_energies: [0.001, 0.0001] },
      },
    });
    expect(shown).toMatch(/scattering length +−5\.25\(1\) +p cot\(delta\)/);
    expect(shown).toMatch(/bound state +0\.500\(1\) below threshold/);
    expect(shown).toMatch(/bound state +0\.1250\(1\) below threshold/);
    expect(shown).not.toContain('effective range');
  });
});

describe('the line with the place', () => {
  test('has carets under it, also behind tabs and wide signs', () => {
    const text = '\tmass 波 reduced 0';
    const at = text.indexOf('reduced');
    const [, , shown, carets] = linesOf(withFinding(text, at, at + 7));
    expect(shown).toBe('   1    mass 波 reduced 0');
    expect(carets).toBe(`${' '.repeat(widthOf(shown.slice(0, shown.indexOf('reduced'))))}^^^^^^^`);
  });

  test('is cut around the place where it is long', () => {
    const text = `${'9'.repeat(5000)}x${'9'.repeat(5000)}`;
    const [, , shown, carets] = linesOf(withFinding(text, 5000, 5001));
    expect(widthOf(shown)).toBeLessThanOrEqual(60);
    expect(shown[carets.indexOf('^')]).toBe('x');
  });

  test('of a place over many lines or at the very end has a caret', () => {
    expect(linesOf(withFinding('model m {\n}\n', 0, 11)).slice(2, 4)).toEqual(['   1  model m {', '      ^^^^^^^^^']);
    expect(linesOf(withFinding('model m {', 9, 9)).slice(2, 4)).toEqual(['   1  model m {', '               ^']);
  });

  test('cannot steer the terminal', () => {
    expect(textReport([withFinding('a\u001b[2Jb', 0, 1)], 80, plainPalette)).not.toContain('\u001b');
  });
});
