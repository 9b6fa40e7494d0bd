// `npm start`: installs, builds, and checks a sample model; what follows `--` goes to `tare check` in place of it.
import { spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { installNpmPackages } from './npm.mjs';

const root = join(import.meta.dirname, '..');
installNpmPackages();
const { buildAll } = await import('./build.mjs');
await buildAll();

const files = process.argv.length > 2 ? process.argv.slice(2) : ['sample-specs/wire.tare'];
console.log(`$ tare check ${files.join(' ')}\n`);
const { status } = spawnSync(process.execPath, [join(root, 'dist/cli.js'), 'check', ...files], { cwd: root, stdio: 'inherit' });
process.exitCode = status ?? 1;
