// `npm test`: installs what is missing, builds, checks types, style and the whole test suite. What follows `--` goes to vitest.
import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { installEditor } from './editor.mjs';
import { installNpmPackages } from './npm.mjs';

const root = join(import.meta.dirname, '..');
const report = join(root, 'test-output', 'tests.json');
const failedChecks = [];
const checks = [
  ['types', 'node_modules/typescript/bin/tsc', '-p', '.'],
  ['lint', 'node_modules/eslint/bin/eslint.js', '.', '--max-warnings', '0'],
  ['format', 'node_modules/prettier/bin/prettier.cjs', '--check', '--log-level', 'warn', '.'],
];

function run(name, ...args) {
  console.log(`\n== ${name}`);
  const { status } = spawnSync(process.execPath, args, { cwd: root, stdio: ['ignore', 'inherit', 'inherit'] });
  return status === 0;
}

installNpmPackages();
const skipped = installEditor();
const { buildAll } = await import('./build.mjs');
await buildAll();

for (const [name, ...args] of checks) if (!run(name, ...args)) failedChecks.push(name);
rmSync(report, { force: true });
const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`];
const testsPassed = run('tests', 'node_modules/vitest/vitest.mjs', 'run', ...reporters, ...process.argv.slice(2));

if (skipped) console.log(`\nSKIPPED: the tests in a real editor: ${skipped}`);
if (failedChecks.length > 0) console.log(`\nFAILED: ${failedChecks.join(', ')}`);
if (!existsSync(report)) throw new Error('The tests could not be run.');
const { numPassedTests, numFailedTests, numPendingTests, numFailedTestSuites } = JSON.parse(readFileSync(report, 'utf8'));
// A file that cannot even be read counts as a failure of its own.
const failedTests = testsPassed ? 0 : Math.max(numFailedTests, numFailedTestSuites, 1);
const passed = numPassedTests + checks.length - failedChecks.length;
const failed = failedTests + failedChecks.length;
console.log(`\n${passed} passed, ${failed} failed${numPendingTests > 0 ? `, ${numPendingTests} skipped` : ''}`);
process.exitCode = failed === 0 ? 0 : 1;
