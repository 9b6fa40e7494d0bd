import { execFileSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';

const root = join(import.meta.dirname, '..');
const read = (path: string): string => readFileSync(join(root, path), 'utf8');

interface Manifest {
  readonly version: string;
  readonly main: string;
  readonly bin: Record<string, string>;
  readonly contributes: {
    readonly languages: { id: string; extensions: string[]; configuration: string }[];
    readonly grammars: { language: string; scopeName: string; path: string }[];
    readonly commands: { command: string }[];
  };
}
const manifest = JSON.parse(read('package.json')) as Manifest;

test('the lock file names no registry', () => {
  expect(read('package-lock.json')).not.toMatch(/"resolved"|https?:\/\/registry/);
});

test('the changelog knows this version', () => {
  expect(read('CHANGELOG.md')).toContain(`## ${manifest.version}`);
});

test('what the manifest refers to is there', () => {
  const { languages, grammars } = manifest.contributes;
  const paths = [
    manifest.main,
    ...Object.values(manifest.bin),
    ...languages.map(one => one.configuration),
    ...grammars.map(one => one.path),
  ];
  expect(paths.filter(path => !existsSync(join(root, path)))).toEqual([]);
  for (const { path, scopeName } of grammars) expect(JSON.parse(read(path))).toMatchObject({ scopeName });
});

test('the client registers the commands that the manifest declares', () => {
  const client = read('dist/client.js');
  for (const { command } of manifest.contributes.commands) expect(client).toContain(`registerCommand("${command}"`);
});

test('the command line can be started by its name', () => {
  expect(execFileSync(join(root, manifest.bin.tare), ['--version'], { encoding: 'utf8' }).trim()).toBe(manifest.version);
});

test('the extension is packed with what it needs and nothing else', () => {
  const list = execFileSync(process.execPath, [join(root, 'node_modules/@vscode/vsce/vsce'), 'ls', '--no-dependencies'], {
    cwd: root,
    encoding: 'utf8',
  });
  const files = list.trim().split('\n');
  const allowed = /^(dist|docs|grammar)\/|^(README\.md|LICENSE|CHANGELOG\.md|package\.json)$/;
  expect(files.filter(file => !allowed.test(file))).toEqual([]);
  expect(files).toEqual(
    expect.arrayContaining(['dist/client.js', 'dist/server.js', 'dist/worker.js', 'dist/NOTICES.txt', 'docs/findings.md', 'LICENSE']),
  );
});
