import { existsSync, readFileSync, readdirSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { findingsOf } from '../../server/src/findings';
import type { CheckedFile } from '../../server/src/report/checked-file';
import { plainPalette } from '../../server/src/report/palette';
import { textReport } from '../../server/src/report/text';
import { checkComplete } from '../../server/src/session/check';
import { standardDefaults } from '../../server/src/session/settings';
import { edited } from '../support/annotated';

const root = join(import.meta.dirname, '../..');
const read = (path: string): string => readFileSync(join(root, path), 'utf8');

function check(path: string, text: string): CheckedFile {
  const hooks = { shouldStop: () => false, budget: 2e10, full: false };
  const checked = checkComplete(text, standardDefaults, { cutoff: null, order: null }, hooks);
  return { path, sha256: '', text, checked, findings: findingsOf(checked) };
}

/** The fenced blocks of a page in this language. */
const blocks = (page: string, language: string): string[] =>
  [...read(page).matchAll(new RegExp(`^\`\`\`${language}\\n(.*?)^\`\`\``, 'gms'))].map(match => match[1]);

describe.each(['README.md', 'docs/language.md'])('the models in %s', page => {
  test.each(blocks(page, 'tare').map((text, index) => [index + 1, text] as const))(
    'block %d is right, apart from its divergences',
    (_, text) => {
      const { checked, findings } = check(page, text);
      expect(checked?.models.every(({ results }) => results !== null)).toBe(true);
      const errors = findings.filter(({ severity }) => severity === 'error').map(({ code }) => code);
      expect(errors.filter(code => code !== 'uv-divergence' && code !== 'expectation')).toEqual([]);
    },
  );
});

test('the language guide has models to check, and its first ones check clean', () => {
  const [first, ...others] = blocks('docs/language.md', 'tare');
  expect(others.length).toBeGreaterThanOrEqual(3);
  expect(check('', first).findings.filter(({ severity }) => severity === 'error')).toEqual([]);
});

describe('what the README prints', () => {
  const sessions = blocks('README.md', 'console');

  test.each(sessions)('%s', session => {
    const [command, ...lines] = session.trimEnd().split('\n');
    const path = /^\$ tare check (\S+)$/.exec(command)![1];
    const printed = textReport([check(path, read(path))], 100, plainPalette);
    // `…` alone on a line stands for what is left out.
    const parts = lines.join('\n').split(/^…$\n?/m);
    let from = 0;
    for (const part of parts.map(one => one.trimEnd())) {
      expect(printed.slice(from)).toContain(part);
      from = printed.indexOf(part, from) + part.length;
    }
  });

  test('there are the model with its divergence, and the one with its counterterm', () => {
    expect(sessions).toHaveLength(2);
  });
});

test('the quick fix of the first model adds the line that the README shows, and leaves a file that checks clean', () => {
  const text = read('sample-specs/wire.tare');
  const [fix] = check('', text).findings.flatMap(({ fixes }) => fixes);
  const mended = edited(text, fix.edits);
  const [line, ...others] = mended.split('\n').filter(one => !text.split('\n').includes(one));
  expect(others).toEqual([]);
  expect(read('README.md')).toContain(`\`\`\`\n${line}\n\`\`\``);
  expect(read('sample-specs/wire-renormalised.tare')).toContain(line);
  expect(check('', mended).findings.filter(({ severity }) => severity === 'error')).toEqual([]);
});

test('the model that the README shows is the sample', () => {
  expect(read('sample-specs/wire.tare')).toContain(blocks('README.md', 'tare')[0]);
});

test('what is linked to in the pages is there', () => {
  const pages = ['README.md', 'DEVELOPERS.md', 'docs/language.md', 'docs/numbers.md'];
  const links = pages.flatMap(page =>
    [...read(page).matchAll(/\]\((?!https?:)([^)]*)\)/g)].map(match => {
      const [file, anchor] = match[1].split('#');
      return { page, target: file === '' ? page : join(page, '..', file), anchor };
    }),
  );
  const anchors = (path: string): string[] =>
    [...read(path).matchAll(/^#+ (.*)$/gm)].map(match =>
      match[1]
        .toLowerCase()
        .replace(/[^\p{L}\p{N} _-]/gu, '')
        .replace(/ /g, '-'),
    );
  const broken = links.filter(
    ({ target, anchor }) => !existsSync(join(root, target)) || (anchor !== undefined && !anchors(target).includes(anchor)),
  );
  expect(links.length).toBeGreaterThan(20);
  expect(broken).toEqual([]);
});

test('the map of DEVELOPERS.md names every folder, and every file it names is there', () => {
  const named = [...read('DEVELOPERS.md').matchAll(/`((?:server|client|test|grammar|sample-specs|scripts|docs)\/[^`*\s]*)`/g)].map(
    match => match[1],
  );
  expect(named.filter(path => !path.includes('NAME') && !existsSync(join(root, path)))).toEqual([]);
  const folders = ['server/src', 'server/src/core'].flatMap(parent =>
    readdirSync(join(root, parent))
      .map(name => `${parent}/${name}`)
      .filter(path => statSync(join(root, path)).isDirectory()),
  );
  expect(folders.filter(path => !named.includes(path))).toEqual([]);
});
