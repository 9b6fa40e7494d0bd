import { spawn, spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import manifest from '../../package.json';
import { fileOf, model, program, tare } from './run';

const good = fileOf('good.tare', model());
const diverges = fileOf('diverges.tare', model({ series: 'series to 2 at p = 0.5' }));

describe('exit status', () => {
  it.each([
    ['0 where all is well', [good], 0],
    ['1 where one of the models is not', [good, diverges], 1],
    ['2 where a file cannot be read', [good, 'nowhere.tare'], 2],
  ])('%s', (_, files, status) => {
    expect(tare(['check', ...files]).status).toBe(status);
  });

  it.each([
    ['no file', ['check']],
    ['an option that is none', ['check', good, '--colour']],
    ['a command that is none', ['inspect', good]],
    ['a cutoff that is no number', ['check', good, '--cutoff', 'abc']],
    ['a cutoff of 0', ['check', good, '--cutoff', '0']],
    ['a negative cutoff', ['check', good, '--cutoff=-1']],
    ['an infinite cutoff', ['check', good, '--cutoff', '1e400']],
    ['order 0', ['check', good, '--order', '0']],
    ['order 50', ['check', good, '--order', '50']],
  ])('2 for %s, with a word on stderr and nothing on stdout', (_, args) => {
    const { status, out, err } = tare(args);
    expect(status).toBe(2);
    expect(out).toBe('');
    expect(err).toMatch(/^error: /);
    expect(err).toContain('tare check --help');
    expect(err).not.toMatch(/^\s+at /m);
  });
});

describe('options', () => {
  it('--cutoff and --order go over what the file says', () => {
    expect(tare(['check', good, '--cutoff', '20']).out).toContain('cutoff L = 20 sharp');
    expect(tare(['check', good, '--order', '3']).out).toMatch(/v\^3 +3 +diverges +L\^2/);
  });

  it('--json is one document with the same verdict as the report', () => {
    const { status, out } = tare(['check', good, diverges, '--json']);
    const report = JSON.parse(out) as { models: { terms: { monomial: string; status: string }[] }[] };
    expect(status).toBe(1);
    expect(report.models.flatMap(m => m.terms).map(t => `${t.monomial} ${t.status}`)).toEqual(['v finite', 'v finite', 'v^2 uncancelled']);
  });

  it('--full adds what does not come from the series', () => {
    // 1/a = 2π/(μc) + 2Λ/π for a contact under a sharp cutoff; common practice.
    const length = 1 / ((2 * Math.PI) / (0.5 * 0.3) + 24 / Math.PI);
    expect(tare(['check', good]).out).not.toContain('scattering length');
    expect(Number(/scattering length +(\S+)/.exec(tare(['check', good, '--full']).out)![1])).toBeCloseTo(length, 6);
  });

  it('--help and --version answer on stdout', () => {
    expect(tare(['--version'])).toEqual({ status: 0, out: `${manifest.version}\n`, err: '' });
    for (const args of [['--help'], ['check', '--help'], ['help', 'check']]) {
      const { status, out } = tare(args);
      expect(status).toBe(0);
      expect(out).toContain('Usage: tare');
    }
    expect(tare(['check', '--help']).out).toMatch(/Exit status:[\s\S]+Examples:/);
  });
});

/** A potential with an edge, whose numbers take seconds. */
const slow = fileOf(
  'slow.tare',
  model({ interaction: 'interaction v(r) = c*step(2 - r)  interaction u(p, k) = c', series: 'series to 3 at p = 0.5' }),
);

describe('what it writes where', () => {
  it('no colour where the output is no terminal', () => {
    expect(tare(['check', diverges], { FORCE_COLOR: '1' }).out).not.toContain('\u001b');
  });

  // `script`, of Debian's essential packages, gives a program a terminal.
  it('colour on a terminal, unless NO_COLOR is set', () => {
    const onTerminal = (env: Record<string, string>) =>
      spawnSync('script', ['-qec', `'${process.execPath}' '${program}' check '${diverges}'`, '/dev/null'], {
        encoding: 'utf8',
        env: { ...process.env, TERM: 'xterm', NO_COLOR: '', ...env },
      }).stdout;
    expect(onTerminal({})).toContain('\u001b[');
    expect(onTerminal({ NO_COLOR: '1' })).not.toContain('\u001b[3');
  });

  it('progress on stderr once it takes a while, and never on stdout', () => {
    const { out, err } = tare(['check', slow]);
    expect(err).toBe(`checking ${slow} …\n`);
    expect(out).not.toContain('checking');
    expect(tare(['check', good]).err).toBe('');
  });

  it('a reader that goes away early is no failure', async () => {
    const child = spawn(process.execPath, [program, 'check', diverges, '--json'], { stdio: ['ignore', 'pipe', 'pipe'] });
    child.stdout.destroy();
    let err = '';
    child.stderr.on('data', (chunk: Buffer) => (err += chunk.toString()));
    await new Promise(resolve => child.on('close', resolve));
    expect(err).toBe('');
  });

  it('an interrupt ends it at once', async () => {
    const child = spawn(process.execPath, [program, 'check', slow, slow, slow]);
    const ended = new Promise<NodeJS.Signals | null>(resolve => child.on('close', (_, signal) => resolve(signal)));
    await new Promise(resolve => child.stderr.once('data', resolve));
    child.kill('SIGINT');
    expect(await ended).toBe('SIGINT');
  });

  it('the samples in one go: a table for each, and the mistakes counted', () => {
    const samples = join(import.meta.dirname, '../../sample-specs');
    const { status, out } = tare(['check', join(samples, 'wire-renormalised.tare'), join(samples, 'mistakes.tare')]);
    expect(status).toBe(1);
    expect(out).toMatch(/^wire_renormalised$/m);
    expect(out).toMatch(/^2 files, \d+ models: \d+ errors/m);
  });
});
