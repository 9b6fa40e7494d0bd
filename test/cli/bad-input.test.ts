import { mkdirSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { fileOf, model, tare, type Run } from './run';

/** Nothing of what a program says when it has lost its way. */
function requireClean({ out, err }: Run): void {
  for (const text of [out, err]) {
    expect(text).not.toMatch(/\bNaN\b|Infinity|undefined\b|\bnull\b|\[object|^\s+at .*:\d+:\d+/m);
    expect(text).not.toMatch(/TypeError|RangeError|SyntaxError/);
  }
}

/** The errors of a report: `line:column code`. */
const errorsIn = (out: string): string[] =>
  [...out.matchAll(/^error {2}\S+?:(\d+:\d+) {2}(\S+)$/gm)].map(([, place, code]) => `${place} ${code}`);

const healthy = model({}, 'healthy');

describe('a mistake has one message at its place, and the rest of the file is still checked', () => {
  it.each([
    ['a cutoff of 0', model({ cutoff: 'cutoff L = 0 sharp' }), '7:14 value', /positive momentum, and this is 0/],
    ['a cutoff of -1', model({ cutoff: 'cutoff L = -1 sharp' }), '7:14 value', /positive momentum, and this is -1/],
    ['a cutoff of 1e400', model({ cutoff: 'cutoff L = 1e400 sharp' }), '7:14 value', /above 1\.8e308/],
    ['a pole on the real axis', model({ interaction: 'interaction v(q) = c/(q^2 - 1)' }), '6:15 value', /infinite at q = 1/],
    ['a double pole', model({ interaction: 'interaction v(q) = c/(1 - q^2)^2' }), '6:15 value', /infinite at q = 1/],
    ['a pole in p and k', model({ interaction: 'interaction v(p, k) = c/((p - 1)*(k - 1))' }), '6:15 value', /infinite at real momenta/],
    ['0/0', model({ interaction: 'interaction v(p, k) = c*0/0' }), '6:25 value', /0\/0 has no value/],
    ['1/0', model({ interaction: 'interaction v(p, k) = c/0' }), '6:25 value', /divides by zero/],
    ['a constant that needs itself', model({ more: 'const a = b  const b = a' }), '9:9 value', /depends on itself: `a` → `b` → `a`/],
    ['a series to 50', model({ series: 'series to 50 at p = 0.5' }), '8:13 value', /at most 12/],
    ['a series to 0', model({ series: 'series to 0 at p = 0.5' }), '8:13 value', /at least 1/],
    ['a mass of 0', model({ mass: 'mass reduced 0' }), '4:16 value', /A mass is positive, and this is 0/],
    ['deep parentheses', model({ interaction: `interaction v(p, k) = c*${'('.repeat(9000)}1` }), null, /cut this one into several/],
    [
      'a subtraction point beyond a sharp cutoff',
      model({ series: 'series to 2 at p = 0.5', more: 'counterterm z(p, k) = 1 cancels v^2 subtract at p = 20' }),
      '9:55 value',
      /lies beyond the sharp cutoff, 12/,
    ],
    [
      'a kernel that is Hermitian only among momenta of one size',
      model({ cutoff: 'cutoff L = 10 sharp', interaction: 'interaction v(p, k) = sqrt(1 - p^2)*sqrt(1 - k^2)/((1 + p^4)*(1 + k^4))' }),
      '6:25 not-hermitian',
      /is not Hermitian/,
    ],
    ['a null byte', model({ interaction: 'interaction v(p, k) = c\u0000' }), '6:26 syntax', /has no meaning here/],
  ])('%s', (name, text, place, message) => {
    const run = tare(['check', fileOf(`${name.replace(/\W/g, '_')}.tare`, text + healthy)]);
    requireClean(run);
    expect(run.status).toBe(1);
    expect(run.out).toMatch(message);
    if (place) expect(errorsIn(run.out)).toEqual([place]);
    else expect(errorsIn(run.out)).toHaveLength(1);
    expect(run.out).toMatch(/^healthy\n(.*\n)+? {2}v +1 +converges/m);
  });

  it('a file in Latin-1', () => {
    const text = Buffer.from(`# gr\u00f6\u00dfer\n${healthy}`, 'latin1');
    const run = tare(['check', fileOf('latin1.tare', text)]);
    requireClean(run);
    expect(run.status).toBe(1);
    expect(errorsIn(run.out)).toEqual(['1:5 file']);
    expect(run.out).toMatch(/^healthy\n(.*\n)+? {2}v +1 +converges/m);
  });
});

describe('a file that cannot be used', () => {
  it.each([
    ['an empty one', '', /This file has no model/],
    ['10 MB of digits', '1234567890'.repeat(1e6), /10\.0 MB; a model file may have at most 4 MB/],
    ['bytes that are no text', Uint8Array.from({ length: 4096 }, (_, j) => j % 256), /not in UTF-8/],
  ])('%s', (name, contents, message) => {
    const run = tare(['check', fileOf(`${name.replace(/\W/g, '_')}.tare`, contents)]);
    requireClean(run);
    expect(run.status).toBe(1);
    expect(errorsIn(run.out)).toHaveLength(1);
    expect(run.out).toMatch(message);
  });

  it('a missing one or a folder, beside a good one', () => {
    const good = fileOf('good.tare', healthy);
    const folder = join(dirname(good), 'folder.tare');
    mkdirSync(folder, { recursive: true });
    const run = tare(['check', join(dirname(good), 'missing.tare'), folder, good]);
    requireClean(run);
    expect(run.status).toBe(2);
    expect(run.out).toContain('There is no such file.');
    expect(run.out).toContain('This is a folder');
    expect(run.out).toMatch(/^healthy$/m);
  });
});

describe('what would take too long is refused by its budget', () => {
  it.each([
    [
      'hundreds of interactions',
      model({ more: Array.from({ length: 300 }, (_, j) => `interaction v${j}(p, k) = c`).join('\n'), series: 'series to 2' }),
    ],
    [
      'many interactions to a high order',
      model({ more: Array.from({ length: 4 }, (_, j) => `interaction v${j}(p, k) = c*(p*k)^${2 * j}`).join('\n'), series: 'series to 8' }),
    ],
    ['a potential with edges, far away', model({ interaction: 'interaction v(r) = c*step(300 - r)', series: 'series to 2' })],
  ])('%s', (name, text) => {
    const run = tare(['check', fileOf(`${name.replace(/\W/g, '_')}.tare`, text + healthy)]);
    requireClean(run);
    expect(run.status).toBe(1);
    expect(errorsIn(run.out)).toEqual(['1:7 budget']);
    expect(run.out).toMatch(/^healthy$/m);
  });

  it('a power too steep for numbers is open, not wrong', () => {
    const run = tare([
      'check',
      fileOf('steep.tare', model({ interaction: 'interaction v(p, k) = c*(p*k)^200', series: 'series to 2' }) + healthy),
    ]);
    requireClean(run);
    expect(run.status).toBe(1);
    expect(errorsIn(run.out)).toEqual(['6:15 undecided']);
  });
});
