import { describe, expect, test } from 'vitest';
import { version } from '../../package.json';
import { findingsOf } from '../../server/src/findings';
import { fileFinding } from '../../server/src/findings/file';
import type { CheckedFile } from '../../server/src/report/checked-file';
import { jsonReport } from '../../server/src/report/json';
import { checkedWire } from '../support/wire';

const none = { cutoff: null, order: null };
const fileOf = (checked: ReturnType<typeof checkedWire>): CheckedFile => ({
  path: 'wire.tare',
  sha256: 'ab',
  text: checked.document.text,
  checked,
  findings: findingsOf(checked),
});
/** What a program in another language sees: keys and what stands under them. */
interface Tree {
  readonly [key: string]: Tree;
}
const parsed = (files: readonly CheckedFile[], options: Parameters<typeof jsonReport>[1] = none): Tree =>
  JSON.parse(jsonReport(files, options)) as Tree;
const [good, bad] = [fileOf(checkedWire()), fileOf(checkedWire({ cancelled: false }))];

describe('the report for programs, format 1', () => {
  const report = parsed([good]);
  const model = report.models[0];

  test('begins with what it is', () => {
    expect(Object.keys(report)).toEqual(['tool', 'version', 'format', 'exit', 'options', 'files', 'models']);
    expect(report).toMatchObject({ tool: 'tare', version, format: 1, exit: 0, options: none });
    expect(report.files).toEqual([{ file: 'wire.tare', sha256: 'ab', models: 1, findings: [] }]);
    expect(parsed([good], { cutoff: 80, order: 2 }).options).toEqual({ cutoff: 80, order: 2 });
  });

  test('describes the model', () => {
    const { terms, sum, series, counterterms, couplings, expectations, findings, ...about } = model;
    expect(about).toEqual({
      model: 'defect_in_a_wire',
      file: 'wire.tare',
      dimension: 1,
      wave: 'full',
      cutoff: { name: 'L', value: 40, shape: 'sharp', declared: true, scan: [10, 400] },
      order: 3,
      orderDeclared: true,
    });
    expect([terms, sum, series, counterterms, couplings, expectations, findings].every(Array.isArray)).toBe(true);
  });

  test('writes waves, shapes and units as the language does', () => {
    const spec = checkedWire({
      spec: one => ({
        ...one,
        dimension: 3,
        wave: { kind: 'angular', number: 2 },
        units: { energy: 'MeV', length: 'fm' },
        cutoff: { ...one.cutoff, shape: { kind: 'gaussian', n: 2 }, scan: null, declared: false },
      }),
    });
    expect(parsed([fileOf(spec)]).models[0]).toMatchObject({
      wave: 'l = 2',
      units: { energy: 'MeV', length: 'fm' },
      cutoff: { shape: 'gaussian(2)', declared: false },
    });
    expect(parsed([fileOf(spec)]).models[0].cutoff).not.toHaveProperty('scan');
  });

  test('has every key of a term', () => {
    const term = model.terms[4];
    expect(Object.keys(term)).toEqual(['monomial', 'order', 'ultraviolet', 'infrared', 'status', 'cancelledBy', 'values', 'scan']);
    expect(term).toMatchObject({
      monomial: 'twist^2',
      order: 2,
      infrared: { verdict: 'converges' },
      status: 'cancelled',
      cancelledBy: ['z0'],
    });
    expect(term.ultraviolet).toEqual({
      verdict: 'diverges',
      conditional: false,
      power: 1,
      log: 0,
      nested: false,
      nestedIn: [],
      confirmed: true,
      overall: [
        {
          form: '1',
          power: 1,
          log: 0,
          coefficient: { re: expect.closeTo(-0.0779859221, 10) as number, im: 0 },
          uncertainty: 1e-10,
          universal: false,
          absorbedBy: 'bump',
        },
      ],
    });
    expect(term.values[0]).toEqual({
      p: 0.05,
      E: 0.00125,
      bare: { re: -3.119427136, im: -0.01225 },
      renormalised: { re: -0.00002924479696, im: -0.01225 },
      backward: { bare: { re: -3.119436885, im: 0 }, renormalised: { re: -0.0000389934, im: 0 } },
      uncertainty: 1e-9,
    });
    expect(Object.keys(term.scan)).toEqual(['p', 'cutoff', 'bare', 'renormalised']);
    expect(model.terms[0]).not.toHaveProperty('scan');
  });

  test('has the sum, the eigenvalues, the counterterms, the couplings and the expectations', () => {
    expect(model.sum[0]).toMatchObject({ p: 0.05, E: 0.00125, orders: [1, 2, 3], drift: 0.004 });
    expect(model.sum[0]).not.toHaveProperty('full');
    expect(model.series[0]).toEqual({
      p: 0.05,
      E: 0.00125,
      largestEigenvalue: { re: 0.4, im: 0.1 },
      converges: true,
      eigenvalues: [
        { re: 0.4, im: 0.1 },
        { re: -0.02, im: 0 },
      ],
    });
    expect(model.counterterms[0]).toMatchObject({ name: 'z0', cancels: ['twist^2'], at: { re: 3.119397892, im: 0 } });
    expect(Object.keys(model.couplings[0])).toEqual(['name', 'value', 'dimension', 'running']);
    expect(model.expectations[0]).toEqual({ text: 'finite', holds: true, measured: 'every monomial to order 3 is finite or cancelled' });
  });

  test('gives a finding with its range from 0, its page and its fixes', () => {
    const finding = parsed([bad]).models[0].findings[0];
    expect(finding).toMatchObject({
      code: 'uv-divergence',
      severity: 'error',
      file: 'wire.tare',
      subject: 'twist^2',
      docs: 'docs/findings.md#uv-divergence',
      range: { start: { line: 10, character: 14 }, end: { line: 10, character: 19 } },
    });
    expect(finding.fixes[0]).toMatch(/^Add counterterm z0/);
    expect(finding.related[0]).toEqual({
      file: 'wire.tare',
      range: { start: { line: 9, character: 14 }, end: { line: 9, character: 18 } },
      message: '`bump` has the form 1 and can absorb it',
    });
    expect(parsed([good]).models[0].findings[2]).toMatchObject({
      code: 'cutoff-dependence',
      severity: 'information',
      subject: 'twist^2',
      p: 0.05,
    });
  });
});

describe('its numbers', () => {
  test('are finite, or null', () => {
    const broken = checkedWire({
      results: results => ({
        ...results,
        terms: results.terms.map(term => ({
          ...term,
          values: [{ p: 0.05, E: NaN, bare: { re: Infinity, im: 0 }, renormalised: null, uncertainty: NaN }],
        })),
        observables: { scattering_length: -Infinity, definition: 'd', uncertainties: {} },
      }),
    });
    const { terms, observables } = parsed([fileOf(broken)]).models[0];
    expect(terms[0].values[0]).toEqual({ p: 0.05, E: null, bare: null, renormalised: null, uncertainty: null });
    expect(observables.scattering_length).toBeNull();
  });

  test('are the same bytes on every run', () =>
    expect(jsonReport([good, bad], none)).toBe(jsonReport([fileOf(checkedWire()), fileOf(checkedWire({ cancelled: false }))], none)));
});

describe('its exit status', () => {
  const unread: CheckedFile = {
    path: 'gone.tare',
    sha256: null,
    text: '',
    checked: null,
    findings: [fileFinding('There is no such file.', { start: 0, end: 0 })],
  };

  test.each([
    [[good], 0],
    [[good, bad], 1],
    [[bad, unread], 2],
    [[good, unread], 2],
  ] as const)('%#', (files, exit) => {
    expect(parsed(files).exit).toBe(exit);
  });

  test('goes with a finding outside any model where a file was not read', () => {
    expect(parsed([good, unread]).files[1]).toEqual({
      file: 'gone.tare',
      models: 0,
      findings: [
        {
          code: 'file',
          severity: 'error',
          message: 'There is no such file.',
          file: 'gone.tare',
          docs: 'docs/findings.md#file',
          range: { start: { line: 0, character: 0 }, end: { line: 0, character: 0 } },
        },
      ],
    });
  });
});

test('a model that could not be read to its end has its lists, empty', () => {
  const { document, models } = checkedWire();
  const text = models.map(({ source }) => ({ source: { ...source, spec: null }, results: null, stage: 'text' as const }));
  expect(parsed([{ ...good, checked: { document, models: text }, findings: [] }]).models[0]).toEqual({
    model: 'defect_in_a_wire',
    file: 'wire.tare',
    terms: [],
    sum: [],
    series: [],
    findings: [],
  });
});
