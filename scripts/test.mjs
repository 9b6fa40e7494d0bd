// `npm test`: installs what is missing, builds, checks types, style and the whole test suite. What follows `--` goes to vitest.
import { spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { installEditor } from './editor.mjs';
import { installNpmPackages } from './npm.mjs';

const root = join(import.meta.dirname, '..');
const failed = [];

function run(name, ...args) {
  console.log(`\n== ${name}`);
  const { status } = spawnSync(process.execPath, args, { cwd: root, stdio: ['ignore', 'inherit', 'inherit'] });
  if (status !== 0) failed.push(name);
}

installNpmPackages();
const skipped = installEditor();
const { buildAll } = await import('./build.mjs');
await buildAll();

run('types', 'node_modules/typescript/bin/tsc', '-p', '.');
run('lint', 'node_modules/eslint/bin/eslint.js', '.', '--max-warnings', '0');
run('format', 'node_modules/prettier/bin/prettier.cjs', '--check', '--log-level', 'warn', '.');
run('tests', 'node_modules/vitest/vitest.mjs', 'run', ...process.argv.slice(2));

if (skipped) console.log(`\nSKIPPED: the tests in a real editor: ${skipped}`);
console.log(failed.length === 0 ? '\nEverything passed.' : `\nFAILED: ${failed.join(', ')}`);
process.exitCode = failed.length === 0 ? 0 : 1;
