import { readFileSync, readdirSync } from 'node:fs';
import { join, relative, sep } from 'node:path';
import ts from 'typescript';
import { describe, expect, test } from 'vitest';

const root = join(import.meta.dirname, '..');

/** What each layer may import from, besides itself. The map of DEVELOPERS.md. */
const below: Record<string, readonly string[]> = {
  core: [],
  language: ['core'],
  session: ['core', 'language'],
  findings: ['core', 'language', 'session'],
  report: ['core', 'language', 'session', 'findings'],
  features: ['core', 'language', 'session', 'findings', 'report'],
  lsp: ['core', 'language', 'session', 'findings', 'features'],
  cli: ['core', 'language', 'session', 'findings', 'report'],
};

/** Packages that only some places may know. */
const reserved: readonly { readonly packages: RegExp; readonly layers: readonly string[] }[] = [
  { packages: /^vscode$|^vscode-languageclient/, layers: ['client'] },
  { packages: /^vscode-(languageserver|jsonrpc)/, layers: ['lsp'] },
  { packages: /^chevrotain/, layers: ['language'] },
  { packages: /^commander/, layers: ['cli'] },
  { packages: /^(node:)?worker_threads$/, layers: ['session'] },
  { packages: /^(node:)?(fs|path|process|os|child_process)(\/|$)/, layers: ['cli', 'lsp', 'client'] },
];

interface Import {
  readonly file: string;
  readonly layer: string;
  readonly target: string;
}

function importsOf(folder: string): Import[] {
  return readdirSync(join(root, folder), { recursive: true, encoding: 'utf8' })
    .filter(name => name.endsWith('.ts'))
    .flatMap(name => {
      const file = join(root, folder, name);
      const layer = folder.startsWith('client') ? 'client' : name.split(sep)[0];
      const { importedFiles } = ts.preProcessFile(readFileSync(file, 'utf8'), true, true);
      return importedFiles.map(({ fileName }) => ({ file: relative(root, file), layer, target: resolved(file, fileName) }));
    });
}

/** A relative import as its path in the repository; a package as it is. */
const resolved = (from: string, target: string): string => (target.startsWith('.') ? relative(root, join(from, '..', target)) : target);

const server = importsOf('server/src');
const client = importsOf('client/src');

describe('the map of the layers', () => {
  test('every folder of the server is a layer', () => {
    const folders = readdirSync(join(root, 'server/src'));
    expect(folders.filter(name => !(name in below))).toEqual([]);
    expect(server.length).toBeGreaterThan(20);
  });

  test('imports run downwards only', () => {
    const upwards = server.filter(({ layer, target }) => {
      const [, , other] = target.match(/^(server\/src)\/([^/]+)/) ?? [];
      return other !== undefined && other !== layer && !below[layer].includes(other);
    });
    expect(upwards).toEqual([]);
  });

  test('the server and the client share no code', () => {
    expect(server.filter(({ target }) => target.startsWith('client/'))).toEqual([]);
    expect(client.filter(({ target }) => target.startsWith('server/'))).toEqual([]);
  });

  test('no source imports a test', () => {
    expect([...server, ...client].filter(({ target }) => target.startsWith('test/'))).toEqual([]);
  });

  test.each(reserved)('$packages is known to $layers alone', ({ packages, layers }) => {
    const users = [...server, ...client].filter(({ target }) => packages.test(target));
    expect(users.filter(({ layer }) => !layers.includes(layer))).toEqual([]);
  });
});
