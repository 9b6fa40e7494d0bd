// `npm run bench`: builds the product and the benchmark, and prints its ratios.
import { spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { build } from 'esbuild';
import { buildAll } from './build.mjs';

const root = join(import.meta.dirname, '..');
await buildAll();
const outfile = join(root, 'test-output', 'bench.cjs');
await build({
  entryPoints: [join(root, 'test/bench/bench.ts')],
  bundle: true,
  platform: 'node',
  format: 'cjs',
  target: 'node20',
  outfile,
  logLevel: 'warning',
  mainFields: ['module', 'main'],
});
process.exitCode = spawnSync(process.execPath, [outfile], { stdio: 'inherit' }).status ?? 1;
