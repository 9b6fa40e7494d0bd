import { readFileSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import type { ModelResults, Remark } from '../../server/src/core/results';
import { findingsOf, rules } from '../../server/src/findings';
import type { FindingCode, Severity } from '../../server/src/findings/finding';
import type { ProblemCode } from '../../server/src/language/document';
import type { CheckedDocument } from '../../server/src/session/checked';
import { checkedWire, converges, diverges, termOf } from '../support/wire';

const root = join(import.meta.dirname, '../..');
const codes = Object.keys(rules) as FindingCode[];

const withProblem = (code: ProblemCode, severity: 'error' | 'hint' = 'error'): CheckedDocument => {
  const { document, models } = checkedWire();
  const problem = { code, severity, message: 'What is wrong.', span: { start: 8, end: 12 } };
  return { document, models: models.map(model => ({ ...model, source: { ...model.source, problems: [problem] } })) };
};
const withRemark = (code: Remark['code'], subject: string | null, more: Partial<ModelResults> = {}): CheckedDocument =>
  checkedWire({ results: results => ({ ...results, remarks: [{ code, subject, message: 'What is so.' }], ...more }) });
const withTerm = (...[monomial, exponents, more]: Parameters<typeof termOf>): CheckedDocument =>
  checkedWire({
    results: results => ({
      ...results,
      terms: [...results.terms.filter(term => term.monomial !== monomial), termOf(monomial, exponents, more)],
    }),
  });

/** For each code a document that raises it, with the severity it then has. */
const examples: { readonly [Code in FindingCode]: readonly (readonly [CheckedDocument, Severity])[] } = {
  syntax: [[withProblem('syntax'), 'error']],
  'unknown-name': [[withProblem('unknown-name'), 'error']],
  dimension: [[withProblem('dimension'), 'error']],
  'not-hermitian': [
    [withProblem('not-hermitian'), 'error'],
    [withRemark('not-hermitian', 'twist'), 'error'],
  ],
  duplicate: [[withProblem('duplicate'), 'error']],
  missing: [[withProblem('missing'), 'error']],
  value: [
    [withProblem('value'), 'error'],
    [withRemark('value', 'bump'), 'error'],
  ],
  file: [[withProblem('file'), 'error']],
  'not-evaluated': [
    [withProblem('not-evaluated'), 'error'],
    [withRemark('not-evaluated', null), 'error'],
  ],
  'uv-divergence': [
    [checkedWire({ cancelled: false }), 'error'],
    [checkedWire(), 'information'],
  ],
  'nonlocal-divergence': [[withTerm('twist^3', [0, 3], { ultraviolet: diverges([]), status: 'uncancelled' }), 'error']],
  'cutoff-too-soft': [
    [withRemark('cutoff-too-soft', null), 'error'],
    [withRemark('cutoff-too-soft', 'twist^2'), 'information'],
  ],
  'uv-nested': [
    [checkedWire(), 'information'],
    [checkedWire({ cancelled: false }), 'information'],
  ],
  'infrared-divergence': [
    [withTerm('bump^2', [2, 0], { infrared: { verdict: 'diverges' } }), 'warning'],
    [
      withTerm('bump^2', [2, 0], {
        infrared: { verdict: 'diverges' },
        values: [{ p: 0.05, E: 0.00125, bare: null, renormalised: null, uncertainty: null }],
      }),
      'error',
    ],
  ],
  expectation: [[checkedWire({ cancelled: false }), 'error']],
  undecided: [
    [
      withTerm('bump^3', [3, 0], {
        ultraviolet: { ...converges, verdict: 'undecided', power: null, log: null, confirmed: false },
        status: null,
      }),
      'error',
    ],
    [withRemark('undecided', 'bump^3'), 'warning'],
    [withRemark('undecided', null, { expectations: [{ text: 'finite', holds: null, measured: '' }] }), 'error'],
  ],
  budget: [
    [withRemark('budget', null), 'warning'],
    [withRemark('budget', 'finite', { expectations: [{ text: 'finite', holds: null, measured: '' }] }), 'error'],
  ],
  'series-diverges': [
    [
      checkedWire({ results: results => ({ ...results, series: results.series.map(point => ({ ...point, converges: false })) }) }),
      'information',
    ],
    [
      checkedWire({
        results: results => ({ ...results, series: results.series.map(point => ({ ...point, converges: false })) }),
        spec: spec => ({ ...spec, expectations: [{ kind: 'converges', point: { p: 0.05, E: null } }] }),
      }),
      'warning',
    ],
  ],
  'cutoff-dependence': [
    [checkedWire(), 'information'],
    [checkedWire({ spec: spec => ({ ...spec, expectations: [{ kind: 'drift', percent: 5, point: { p: 0.05, E: null } }] }) }), 'warning'],
  ],
  reading: [[withProblem('reading', 'hint'), 'hint']],
};

describe('the table of findings', () => {
  test('files every rule under its own code', () => {
    expect(codes.map(code => rules[code].code)).toEqual(codes);
  });

  test('has one file for each code', () => {
    const files = readdirSync(join(root, 'server/src/findings'));
    expect(codes.filter(code => !files.includes(`${code}.ts`))).toEqual([]);
  });

  test('is documented, a section a code and no other', () => {
    const page = readFileSync(join(root, 'docs/findings.md'), 'utf8');
    const sections = page.split(/^## /m).slice(1);
    expect(sections.map(section => section.split('\n')[0]).sort()).toEqual([...codes].sort());
    for (const section of sections) expect(section).toContain('**What to do:**');
  });

  const cases = codes.flatMap(code => examples[code].map(([document, severity]) => ({ code, severity, document })));
  test.each(cases)('$code is raised as $severity', ({ code, severity, document }) => {
    const found = findingsOf(document).filter(finding => finding.code === code);
    expect(found.map(finding => finding.severity)).toEqual([severity]);
    expect(found[0].docs).toBe(`docs/findings.md#${code}`);
    expect(found[0].model).toBe('defect_in_a_wire');
    expect(found[0].message).toMatch(/^[\s\S]*\.$/);
    expect(found[0].message).not.toMatch(/undefined|NaN|null|\[object/);
  });
});
