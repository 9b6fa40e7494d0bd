// Bundles the programs of the extension into dist/: what the editor loads, the language server, its worker and the command line.
import { chmodSync, readdirSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { build } from 'esbuild';
import { writeNotices } from './notices.mjs';

const root = join(import.meta.dirname, '..');

/** Bundles everything into `dist/`. Throws where something does not compile. */
export async function buildAll() {
  const common = {
    absWorkingDir: root,
    bundle: true,
    platform: 'node',
    format: 'cjs',
    target: 'node20',
    logLevel: 'warning',
    legalComments: 'none', // whole licences go to NOTICES.txt
    metafile: true,
    // Packages offer two forms; from the one in modules the unused parts can be left out.
    mainFields: ['module', 'main'],
  };
  const program = (entry, name, more = {}) => build({ ...common, entryPoints: [entry], outfile: `dist/${name}.js`, ...more });
  const bundles = await Promise.all([
    program('client/src/extension.ts', 'client', { external: ['vscode'] }),
    program('server/src/lsp/main.ts', 'server'),
    program('server/src/session/worker.ts', 'worker'),
    program('server/src/cli/main.ts', 'cli', { banner: { js: '#!/usr/bin/env node' } }),
  ]);
  const inputs = bundles.flatMap(({ metafile }) => Object.keys(metafile.inputs));
  writeNotices(root, inputs, join(root, 'dist/NOTICES.txt'));
  chmodSync(join(root, 'dist/cli.js'), 0o755);
}

/** Bundles unless `dist/` is newer than everything it is made from. */
export async function buildIfStale() {
  const built = Math.min(...['client', 'server', 'worker', 'cli'].map(name => timeOf(join(root, 'dist', `${name}.js`))));
  const sources = ['client/src', 'server/src'].flatMap(folder => filesIn(join(root, folder)));
  const newest = Math.max(...[...sources, join(root, 'package-lock.json'), import.meta.filename].map(timeOf));
  if (built <= newest) await buildAll();
}

const filesIn = folder => readdirSync(folder, { recursive: true }).map(name => join(folder, name));
const timeOf = path => statSync(path, { throwIfNoEntry: false })?.mtimeMs ?? 0;

if (process.argv[1] === import.meta.filename) await buildAll();
