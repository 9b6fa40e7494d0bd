import { execFileSync } from 'node:child_process';
import { cpSync, mkdirSync, readdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { build } from 'esbuild';
import { isInstalled } from '../../scripts/codeServer.mjs';
import { editorPackages, onPath } from '../../scripts/debian.mjs';

export const root = join(import.meta.dirname, '..', '..');
export const output = join(root, 'test-output');
export const chromium = onPath('chromium');

const missing = editorPackages.filter(one => !one.isThere()).map(one => one.package);

/** Why the tests in a browser cannot run on this machine; null where they can. `npm test` installs what it may. */
export const obstacle =
  missing.length > 0
    ? `not installed: ${missing.join(', ')}`
    : isInstalled()
      ? null
      : 'code-server is not installed: node scripts/codeServer.mjs';

/** Packs the extension as a person would install it. Returns the path of the .vsix. */
export function packExtension(): string {
  mkdirSync(output, { recursive: true });
  const vsix = join(output, 'tare.vsix');
  const arguments_ = ['package', '--no-dependencies', '--allow-missing-repository', '--no-rewrite-relative-links', '--out', vsix];
  execFileSync(process.execPath, [join(root, 'node_modules/@vscode/vsce/vsce'), ...arguments_], { cwd: root, stdio: 'pipe' });
  return vsix;
}

/** Bundles the suite that runs inside the editor. Returns the path of its entry. */
export async function packInsideSuite(): Promise<string> {
  const outfile = join(output, 'inside', 'index.js');
  await build({
    entryPoints: [join(import.meta.dirname, 'inside', 'index.ts')],
    outfile,
    bundle: true,
    platform: 'node',
    format: 'cjs',
    target: 'node20',
    external: ['vscode'],
  });
  return outfile;
}

/** What `tare check --json` says of a file, as the diagnostics that the editor should show. */
export interface ExpectedDiagnostic {
  readonly code: string;
  readonly severity: string;
  readonly message: string;
  readonly range: { readonly start: Place; readonly end: Place };
}
interface Place {
  readonly line: number;
  readonly character: number;
}

/** Puts the samples into the empty folder `workspace`, with `expected.json` beside them: the findings of the command line, by file. */
export function fillWorkspace(workspace: string): void {
  mkdirSync(workspace, { recursive: true });
  const samples = readdirSync(join(root, 'sample-specs')).filter(name => name.endsWith('.tare'));
  for (const name of samples) cpSync(join(root, 'sample-specs', name), join(workspace, name));
  const expected = Object.fromEntries(samples.map(name => [name, check(join(workspace, name)).findings]));
  writeFileSync(join(workspace, 'expected.json'), JSON.stringify(expected, null, 2));
}

/** Runs the command line on one file. */
export function check(file: string): { readonly exit: number; readonly findings: ExpectedDiagnostic[] } {
  const report = JSON.parse(runCheck(file)) as {
    exit: number;
    files: { findings: ExpectedDiagnostic[] }[];
    models: { findings: ExpectedDiagnostic[] }[];
  };
  return { exit: report.exit, findings: [...report.files, ...report.models].flatMap(one => one.findings) };
}

function runCheck(file: string): string {
  try {
    return execFileSync(process.execPath, [join(root, 'dist/cli.js'), 'check', file, '--json'], { encoding: 'utf8', stdio: 'pipe' });
  } catch (error) {
    // Findings of severity error make the status 1; the report is there all the same.
    return (error as { stdout: string }).stdout;
  }
}
