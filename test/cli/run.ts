import { spawnSync } from 'node:child_process';
import { mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

export const program = join(import.meta.dirname, '../../dist/cli.js');

export interface Run {
  readonly status: number | null;
  readonly out: string;
  readonly err: string;
}

/** Runs `tare` as a shell would, its output not a terminal. */
export function tare(args: readonly string[], env: Record<string, string> = {}): Run {
  const { status, stdout, stderr } = spawnSync(process.execPath, [program, ...args], {
    encoding: 'utf8',
    env: { ...process.env, ...env },
    timeout: 60_000,
    maxBuffer: 1e8,
  });
  return { status, out: stdout, err: stderr };
}

const folder = mkdtempSync(join(tmpdir(), 'tare-cli-'));

/** A file with these contents in a folder of its own; returns its path. */
export function fileOf(name: string, contents: string | Uint8Array): string {
  const path = join(folder, name);
  writeFileSync(path, contents);
  return path;
}

/** A model in three dimensions with one contact; lines may be replaced, `''` leaves one out. */
export function model(lines: Partial<Record<'mass' | 'interaction' | 'cutoff' | 'series' | 'more', string>> = {}, name = 'm'): string {
  const { mass, interaction, cutoff, series, more } = {
    mass: 'mass reduced 0.5',
    interaction: 'interaction v(p, k) = c',
    cutoff: 'cutoff L = 12 sharp',
    series: 'series to 1 at p = 0.5',
    more: '',
    ...lines,
  };
  return `model ${name} {\n  dimension 3\n  wave l = 0\n  ${mass}\n  coupling c = 0.3\n  ${interaction}\n  ${cutoff}\n  ${series}\n  ${more}\n}\n`;
}
