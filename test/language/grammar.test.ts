import { readFileSync } from 'node:fs';
import { expect, test } from 'vitest';
import { functionNames, observables, reservedWords } from '../../server/src/language/words';
import { unitWords } from '../../server/src/language/units';

interface Rule {
  readonly match: string;
  readonly name?: string;
  readonly captures?: Readonly<Record<string, { readonly name: string }>>;
}

interface Grammar {
  readonly patterns: readonly { readonly include: string }[];
  readonly repository: Readonly<Record<string, Rule | { readonly patterns: readonly Rule[] }>>;
}

interface Configuration {
  readonly comments: { readonly lineComment: string };
  readonly autoClosingPairs: readonly { readonly open: string }[];
  readonly wordPattern: { readonly pattern: string; readonly flags: string };
}

const read = (file: string): unknown => JSON.parse(readFileSync(new URL(`../../grammar/${file}`, import.meta.url), 'utf8'));
const grammar = read('tare.tmLanguage.json') as Grammar;

/** The first rule that matches at the start of `text`, as the editor's highlighter tries them. */
function scopesOf(text: string): string[] {
  const rules = grammar.patterns.flatMap(({ include }) => {
    const rule = grammar.repository[include.slice(1)];
    return 'patterns' in rule ? rule.patterns : [rule];
  });
  for (const rule of rules) {
    const match = new RegExp(rule.match, 'uy').exec(text);
    if (match)
      return [
        ...(rule.name ? [rule.name] : []),
        ...Object.entries(rule.captures ?? {})
          .filter(([i]) => match[Number(i)])
          .map(([, { name }]) => name),
      ];
  }
  return [];
}

test('every word of the language is coloured as what it is', () => {
  for (const word of reservedWords) expect(scopesOf(`${word} `)[0]).toMatch(/^keyword/);
  for (const name of functionNames) expect(scopesOf(`${name}(`)).toEqual(['support.function.tare']);
  for (const unit of unitWords) expect(scopesOf(`1.5 ${unit}^-1`)).toEqual(['constant.numeric.tare', 'keyword.other.unit.tare']);
  for (const name of Object.keys(observables)) expect(scopesOf(`expect ${name} =`)).toContain('support.constant.observable.tare');
  expect(scopesOf('# model {')).toEqual(['comment.line.number-sign.tare']);
  expect(scopesOf('interaction c₀(p, k) = 1')).toContain('variable.parameter.tare');
  expect(scopesOf('model a from b {')).toContain('entity.other.inherited-class.tare');
});

test('names are left alone', () => {
  for (const name of ['order', 'free', 'K', 'u', 'gamma', 'scanner', 'modelling', 'c0']) expect(scopesOf(`${name} + 1`)).toEqual([]);
});

test('the configuration closes what the language opens', () => {
  const configuration = read('language-configuration.json') as Configuration;
  expect(configuration.comments.lineComment).toBe('#');
  expect(configuration.autoClosingPairs.map(({ open }) => open)).toEqual(['{', '[', '(', '"']);
  const word = new RegExp(configuration.wordPattern.pattern, configuration.wordPattern.flags);
  expect(word.exec('2*c₀')?.[0]).toBe('c₀');
});
