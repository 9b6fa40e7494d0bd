import { describe, expect, test } from 'vitest';
import type { CountertermSpec, ModelSpec } from '../../server/src/core/model/spec';
import type { OverallForm } from '../../server/src/core/results';
import { number } from '../../server/src/core/algebra/expression';
import { findingsOf } from '../../server/src/findings';
import type { QuickFix } from '../../server/src/findings/finding';
import { fixesAt } from '../../server/src/features/fixes';
import { readDocument } from '../../server/src/language';
import type { CheckedDocument } from '../../server/src/session/checked';
import { edited } from '../support/annotated';
import { checkedWire, diverges, grows, termOf, wireText } from '../support/wire';

const without = wireText('');

/** The wire without counterterms, in which twist^2 leaves these forms. */
function leaving(overall: readonly OverallForm[], change: (spec: ModelSpec) => ModelSpec = same => same, text = without): CheckedDocument {
  const terms = [termOf('twist^2', [0, 2], { ultraviolet: diverges(overall), status: 'uncancelled' })];
  return checkedWire({ cancelled: false, text, spec: change, results: results => ({ ...results, terms, expectations: [] }) });
}

const fixesOf = (document: CheckedDocument): readonly QuickFix[] =>
  findingsOf(document).find(({ code }) => code === 'uv-divergence')!.fixes;
const titlesOf = (document: CheckedDocument): string[] => fixesOf(document).map(({ title }) => title);
/** The lines that a fix adds. */
const added = (document: CheckedDocument, title: RegExp): string[] => {
  const fix = fixesOf(document).find(one => title.test(one.title));
  return fix ? fix.edits[0].text.trim().split(/\r?\n\s*/) : [];
};
const threeD = (spec: ModelSpec): ModelSpec => ({ ...spec, dimension: 3, wave: { kind: 'angular', number: 0 } });

describe('counterterms for a divergence', () => {
  test('are offered in both kinds of subtraction, absorbed, and for the whole model', () => {
    expect(titlesOf(leaving([grows('1', 'bump')]))).toEqual([
      'Add counterterm z0(p, k) = 1 for twist^2, subtract at p = 0.05',
      'Add counterterm z0(p, k) = 1 for twist^2, subtract minimal at 0.05',
      'Let `bump` absorb it, subtract at p = 0.05',
      'Let `bump` absorb it, subtract minimal at 0.05',
      'Add all counterterms up to order 3, subtract at p = 0.05',
      'Add all counterterms up to order 3, subtract minimal at 0.05',
    ]);
    expect(fixesOf(leaving([grows('1', 'bump')])).map(({ preferred }) => preferred)).toEqual([true, false, false, false, false, false]);
  });

  test('are one statement a form, however many powers it has', () => {
    const document = leaving([grows('1', 'bump', 3), grows('1', 'bump', 1), grows('p^2+k^2', null, 1)]);
    expect(added(document, /^Add counterterms.*at p/)).toEqual([
      'counterterm z0(p, k) = 1 cancels twist^2 subtract at p = 0.05',
      'counterterm z1(p, k) = p^2+k^2 cancels twist^2 subtract at p = 0.05',
    ]);
    expect(added(document, /^Let `bump` absorb it and add z1 for the rest, subtract at p/)[0]).toBe(
      'counterterm z0 of bump cancels twist^2 subtract at p = 0.05',
    );
  });

  test('carry the energy as an argument where the form holds it', () => {
    expect(added(leaving([grows('E')]), /minimal/)).toEqual(['counterterm z0(p, k, E) = E cancels twist^2 subtract minimal at 0.05']);
  });

  test('take the form of an interaction that is no contact', () => {
    expect(added(leaving([grows('of bump')]), /minimal/)).toEqual(['counterterm z0 of bump cancels twist^2 subtract minimal at 0.05']);
  });

  test.each([
    [['1'], true],
    [['1', 'p^2+k^2'], true],
    [['1', 'E'], true],
    [['p^2+k^2', 'E'], false],
    [['p^2+k^2', 'p*k', 'E'], false],
    [['1', 'p^2+k^2', 'p^2*k^2'], true],
    [['p^2*k^2', 'p^4+k^4'], false],
    [['1', 'p*k'], true],
    [['i*(p-k)'], true],
    [['1', 'i*(p-k)'], true],
    [['1+p*k'], false],
  ])('in dimension 1, %j are set on shell: %s', (forms, wanted) => {
    expect(titlesOf(leaving(forms.map(form => grows(form)))).some(title => /at p = /.test(title))).toBe(wanted);
  });

  test.each([
    [['1', 'p^2+k^2'], true],
    [['p^2+k^2', 'p*k'], false],
    [['1+p*k'], true],
  ])('in dimension 3, %j are set on shell: %s', (forms, wanted) => {
    expect(
      titlesOf(
        leaving(
          forms.map(form => grows(form)),
          threeD,
        ),
      ).some(title => /at p = /.test(title)),
    ).toBe(wanted);
  });

  test('are set like the ones that the monomial has, and only for what those leave', () => {
    const counterterm: CountertermSpec = {
      name: 'z0',
      form: { arguments: 'pk', expr: number(2) },
      cancels: [[0, 2]],
      scheme: { kind: 'minimal', at: 0.3 },
    };
    const document = leaving([grows('1'), grows('p^2+k^2')], spec => ({ ...spec, counterterms: [counterterm] }), wireText());
    expect(titlesOf(document).filter(title => title.startsWith('Add counterterm'))).toEqual([
      'Add counterterm z1(p, k) = p^2+k^2 for twist^2, subtract minimal at 0.3',
    ]);
  });

  test('avoid names that are taken', () => {
    const document = leaving([grows('1')], spec => ({
      ...spec,
      interactions: spec.interactions.map((one, n) => (n === 0 ? { ...one, name: 'z0' } : one)),
    }));
    expect(added(document, /minimal/)[0]).toMatch(/^counterterm z1\(/);
  });

  test('include what diverges inside', () => {
    const document = checkedWire({
      cancelled: false,
      results: results => ({
        ...results,
        terms: [
          results.terms[4],
          termOf('bump*twist^2', [1, 2], {
            ultraviolet: diverges([grows('1', 'bump', 2), grows('p^2+k^2')], ['twist^2']),
            status: 'uncancelled',
          }),
        ],
      }),
    });
    const fix = findingsOf(document).find(({ subject }) => subject === 'bump*twist^2')!.fixes[0];
    expect(fix.title).toBe('Add counterterms z0 and z1 for twist^2 and bump*twist^2, subtract at p = 0.05');
    expect(fix.edits[0].text).toBe(`  counterterm z0(p, k) = 1 cancels twist^2, bump*twist^2 subtract at p = 0.05
  counterterm z1(p, k) = p^2+k^2 cancels bump*twist^2 subtract at p = 0.05
`);
  });

  test('are not offered for a cancelled divergence', () => {
    expect(findingsOf(checkedWire()).flatMap(({ fixes }) => fixes)).toEqual([]);
  });
});

describe('the momentum of a subtraction', () => {
  test('is the first one of the series in the words of the author', () => {
    const text = without.replace('at p = 0.05 .. 1.0', 'at p = 10 MeV .. 200 MeV');
    const units = (spec: ModelSpec): ModelSpec => ({
      ...spec,
      units: { energy: 'MeV', length: 'fm' },
      series: {
        ...spec.series,
        points: [
          { p: 0.0506773, E: null },
          { p: 1, E: null },
        ],
      },
    });
    expect(titlesOf(leaving([grows('1')], units, text))[0]).toBe('Add counterterm z0(p, k) = 1 for twist^2, subtract at p = 10 MeV');
  });

  test("is a number in the model's unit where the text gives an energy", () => {
    const text = without.replace('at p = 0.05 .. 1.0 (12 points)', 'at E = 5 meV');
    const units = (spec: ModelSpec): ModelSpec => ({
      ...spec,
      units: { energy: 'meV', length: 'nm' },
      series: { ...spec.series, points: [{ p: 0.25, E: 5 }] },
    });
    expect(titlesOf(leaving([grows('1')], units, text))[1]).toBe(
      'Add counterterm z0(p, k) = 1 for twist^2, subtract minimal at 0.25 nm^-1',
    );
  });

  test('is below threshold where every point is', () => {
    const text = without.replace('at p = 0.05 .. 1.0 (12 points)', 'at E = -2');
    const below = (spec: ModelSpec): ModelSpec => ({ ...spec, series: { ...spec.series, points: [{ p: null, E: -2 }] } });
    expect(titlesOf(leaving([grows('1')], below, text)).slice(0, 2)).toEqual([
      'Add counterterm z0(p, k) = 1 for twist^2, subtract at kappa = 2',
      'Add counterterm z0(p, k) = 1 for twist^2, subtract minimal at 2',
    ]);
  });

  test('is a tenth of the cutoff where the series has none', () => {
    const text = without.replace(' at p = 0.05 .. 1.0 (12 points)', '');
    const none = (spec: ModelSpec): ModelSpec => ({ ...spec, series: { ...spec.series, points: [] } });
    expect(titlesOf(leaving([grows('1')], none, text))[0]).toContain('subtract at p = 4');
  });
});

describe('where the statements go', () => {
  const after = (text: string, counterterms: readonly CountertermSpec[] = []): string => {
    const document = leaving([grows('p^2+k^2')], spec => ({ ...spec, counterterms }), text);
    return edited(text, fixesOf(document).find(({ title }) => title.includes('minimal'))!.edits);
  };
  const line = 'counterterm z0(p, k) = p^2+k^2 cancels twist^2 subtract minimal at 0.05';

  test('before the closing brace, indented like the interactions', () => {
    expect(after(without)).toBe(without.replace('  expect finite\n', `  expect finite\n  ${line}\n`));
    const tabs = without.replace(/^ {2}/gm, '\t');
    expect(after(tabs)).toContain(`\texpect finite\n\t${line}\n}`);
  });

  test('with the line ends of the file', () => {
    const text = without.replaceAll('\n', '\r\n');
    expect(after(text)).toContain(`  expect finite\r\n  ${line}\r\n}\r\n`);
  });

  test('below the last counterterm, behind its comment', () => {
    const text = without.replace(
      '  expect finite\n',
      '  counterterm y(p, k) = 1 cancels bump^2 subtract at p = 1   # why\n  expect finite\n',
    );
    const other: CountertermSpec = {
      name: 'y',
      form: { arguments: 'pk', expr: number(1) },
      cancels: [[2, 0]],
      scheme: { kind: 'p', at: 1 },
    };
    expect(after(text, [other])).toContain(`at p = 1   # why\n  ${line}\n  expect finite`);
  });

  test('on the line of a model that has one', () => {
    const text = without
      .replace(/\s*#.*/g, '')
      .replace(/\s+/g, ' ')
      .trimEnd();
    expect(after(text)).toBe(text.replace(/ }$/, ` ${line} }`));
  });
});

describe('after any fix', () => {
  const documents = [
    leaving([grows('1', 'bump')]),
    leaving([grows('1', 'bump', 3), grows('p^2+k^2'), grows('E', null, 0, 1)]),
    leaving([grows('i*(p-k)'), grows('E*p*k'), grows('of bump')]),
    leaving([grows('1')], same => same, without.replaceAll('\n', '\r\n')),
  ];
  const cases = documents.flatMap((document, n) =>
    fixesOf(document).map(fix => ({ n, title: fix.title, text: edited(document.document.text, fix.edits), before: document })),
  );

  test.each(cases)('$n: $title', ({ text, before }) => {
    const read = readDocument(text, { cutoff: 10, order: 3 }, { cutoff: null, order: null });
    expect([...read.problems, ...read.models[0].problems]).toEqual([]);
    const { counterterms } = read.models[0].spec!;
    const forms = new Set(before.models[0].results!.terms[0].ultraviolet.overall.map(({ form }) => form));
    expect(counterterms).toHaveLength(forms.size);
    expect(counterterms.every(({ cancels }) => cancels.some(one => one.join() === '0,2'))).toBe(true);
  });
});

describe('fixes at a place', () => {
  const document = checkedWire({ cancelled: false });
  const at = (word: string): { fix: QuickFix; code: string | null }[] => {
    const start = without.indexOf(word);
    return fixesAt(document, { start, end: start });
  };

  test('are those of the findings that stand there', () => {
    expect(at('twist(').map(({ code }) => code)).toEqual(Array(6).fill('uv-divergence'));
    expect(at('bump(')).toEqual([]);
  });

  test('on `series`: all counterterms', () => {
    expect(at('series').map(({ fix, code }) => [fix.title, code])).toEqual([
      ['Add all counterterms up to order 3, subtract at p = 0.05', null],
      ['Add all counterterms up to order 3, subtract minimal at 0.05', null],
    ]);
  });
});
