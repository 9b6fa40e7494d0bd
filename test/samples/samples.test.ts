import { existsSync, readFileSync, readdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { findingsOf } from '../../server/src/findings';
import { jsonReport } from '../../server/src/report/json';
import { checkComplete } from '../../server/src/session/check';
import { standardDefaults } from '../../server/src/session/settings';
import { digest } from './digest';
import { agreeing } from './quantity';

const folder = join(import.meta.dirname, '../../sample-specs');
const goldens = join(import.meta.dirname, 'golden');
const samples = readdirSync(folder)
  .filter(name => name.endsWith('.tare'))
  .map(name => name.slice(0, -'.tare'.length));
const none = { cutoff: null, order: null };

/** What the command line would report of a sample, as the golden files keep it. */
function found(name: string): unknown {
  const text = readFileSync(join(folder, `${name}.tare`), 'utf8');
  const checked = checkComplete(text, standardDefaults, none, { shouldStop: () => false, budget: 2e10, full: false });
  const report = jsonReport([{ path: `${name}.tare`, sha256: '', text, checked, findings: findingsOf(checked) }], none);
  return digest(JSON.parse(report) as Parameters<typeof digest>[0]);
}

/** Writes the golden file where UPDATE_GOLDEN=1 asks for it, but only if something really differs. */
function update(path: string, now: unknown): void {
  const before: unknown = existsSync(path) ? JSON.parse(readFileSync(path, 'utf8')) : null;
  if (JSON.stringify(agreeing(before, now)) !== JSON.stringify(before)) writeFileSync(path, `${JSON.stringify(now, null, 1)}\n`);
}

describe('the samples give what their golden files say', () => {
  test.each(samples)('%s', name => {
    const path = join(goldens, `${name}.json`);
    const now = found(name);
    if (process.env['UPDATE_GOLDEN'] === '1') update(path, now);
    const wanted: unknown = JSON.parse(readFileSync(path, 'utf8'));
    expect(agreeing(wanted, now)).toEqual(wanted);
  });

  test('there is a golden file for each sample, and none without one', () => {
    expect(readdirSync(goldens).sort()).toEqual(samples.map(name => `${name}.json`).sort());
  });
});

describe('how numbers are compared', () => {
  const wanted = { a: [{ re: 1, im: 0, tolerance: 0.01 }], b: 'x' };

  test('within the tolerance a number is the one wanted', () => {
    expect(agreeing(wanted, { a: [{ re: 1.02, im: 0.01, tolerance: 0.01 }], b: 'x' })).toEqual(wanted);
  });

  test('beyond it, or in a word, it is not', () => {
    expect(agreeing(wanted, { a: [{ re: 1.05, im: 0, tolerance: 0.01 }], b: 'x' })).not.toEqual(wanted);
    expect(agreeing(wanted, { a: [{ re: 1, im: 0, tolerance: 0.01 }], b: 'y' })).not.toEqual(wanted);
    expect(agreeing(wanted, { a: [], b: 'x' })).not.toEqual(wanted);
  });
});
