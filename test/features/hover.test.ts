import { describe, expect, test } from 'vitest';
import { hoverAt } from '../../server/src/features/hover';
import type { CheckedDocument } from '../../server/src/session/checked';
import { checkedWire, termOf, wireText } from '../support/wire';

const text = wireText();
const wire = checkedWire();

/** The hover at the first place of `word`, `into` characters behind its start. */
const hover = (
  word: string,
  { document = wire, images = false, into = 0 }: { document?: CheckedDocument; images?: boolean; into?: number } = {},
) => hoverAt(document, document.document.text.indexOf(word) + into, { images });
const rowOf = (markdown: string, first: string): string[] =>
  markdown
    .split('\n')
    .find(line => line.startsWith(`| ${first} |`))
    ?.split('|')
    .slice(2, -1)
    .map(cell => cell.trim()) ?? [];

describe('an interaction', () => {
  const { markdown, span } = hover('twist(', { into: 2 })!;

  test('covers its name', () => expect(text.slice(span.start, span.end)).toBe('twist'));

  test('shows verdict, growth and values of each monomial that has it, and of no other', () => {
    expect(rowOf(markdown, '`twist^2`')).toEqual([
      '2',
      'L^1, cancelled by `z0`',
      '−3.1194 − 0.01225i ± 1e-9',
      '−2.9245e-5 − 0.01225i ± 1e-9',
    ]);
    expect(rowOf(markdown, '`bump*twist^2`').slice(0, 2)).toEqual(['3', 'L^1, through `twist^2`, cancelled by `z0`']);
    expect(rowOf(markdown, '`bump^2`')).toEqual([]);
  });

  test("shows what is left with its coefficient, what absorbs it, and the counterterm at the model's cutoff", () => {
    expect(markdown).toContain('- `twist^2` leaves (−0.077986 ± 1e-10) L^1 × `1`: the coupling of `bump` can absorb it');
    expect(markdown).toContain('`z0` has the strength 3.1194 at L = 40.');
  });

  test('says that a divergence is not cancelled', () => {
    expect(rowOf(hover('twist(', { document: checkedWire({ cancelled: false }) })!.markdown, '`twist^2`')[1]).toBe(
      'L^1, **not cancelled**',
    );
  });

  test('is found where a counterterm cancels it', () => expect(hover('twist^2')!.markdown).toBe(markdown));

  test('shows many monomials in few rows', () => {
    const terms = Array.from({ length: 60 }, (_, n) => termOf(`twist^${n}`, [0, n + 1]));
    const long = hover('twist(', { document: checkedWire({ results: results => ({ ...results, terms }) }) })!.markdown;
    expect(long.match(/^\| `/gm)).toHaveLength(14);
    expect(long).toContain('46 more monomials');
  });
});

describe('plots', () => {
  test('are images where the client shows them', () => {
    const { markdown } = hover('twist(', { images: true })!;
    const [, alt, data] = /!\[([^\]]+)\]\(data:image\/svg\+xml;base64,([A-Za-z0-9+/=]+)\)/.exec(markdown)!;
    expect(alt).toContain('while L runs over 10 to 400: bare from −0.77');
    expect(Buffer.from(data, 'base64').toString('utf8')).toMatch(/^<svg .*twist\^2 against the cutoff.*<\/svg>$/);
    expect(markdown.length).toBeLessThan(50_000);
  });

  test('are tables elsewhere', () => {
    const { markdown } = hover('twist(')!;
    expect(markdown).not.toContain('data:');
    expect(rowOf(markdown, '40')).toEqual(['−3.1194', '−5.4e-5']);
    expect(rowOf(markdown, '400')[0]).toBe('−31.194');
  });
});

test('a coupling shows its value, what it sets and how it runs', () => {
  const { markdown } = hover('c0 =')!;
  expect(markdown).toMatch(/^\*\*c0\*\* = 0\.2 · coupling\n\nSets `bump`\. It runs with the cutoff/);
  expect(rowOf(markdown, '40')).toEqual(['3.3194', '0.2']);
  expect(hover('i*c1', { into: 2 })!.markdown).toMatch(/^\*\*c1\*\* = 0\.35/);
});

test('a counterterm shows how it is set and its strength against the cutoff', () => {
  const { markdown } = hover('z0')!;
  expect(markdown).toMatch(/^\*\*z0\*\* · counterterm, set at p = 0\.1\n\n`z0` has the strength 3\.1194 at L = 40\./);
  expect(rowOf(markdown, '80')).toEqual(['6.2389']);
});

describe('the series', () => {
  test('is shown by order, with its drift and its largest eigenvalue', () => {
    const { markdown } = hover('series')!;
    expect(rowOf(markdown, 'order 2')).toEqual(['−2.92e-5 − 0.81i']);
    expect(rowOf(markdown, '**sum**')).toEqual(['0.20297 − 0.81i']);
    expect(rowOf(markdown, 'drift')).toEqual(['0.4 %']);
    expect(rowOf(markdown, 'largest eigenvalue')).toEqual(['0.4 + 0.1i, modulus 0.41231']);
    expect(markdown).toContain('It converges there.');
  });

  test('says where it does not converge', () => {
    const document = checkedWire({
      results: results => ({ ...results, series: results.series.map(point => ({ ...point, converges: false })) }),
    });
    expect(hover('series', { document })!.markdown).toContain('It does **not** converge at p = 0.05.');
  });

  test('is drawn where all of it was scanned', () => {
    const document = checkedWire({ results: results => ({ ...results, terms: results.terms.slice(4, 5) }) });
    expect(hover('series', { document, images: true })!.markdown).toContain('data:image/svg+xml');
  });
});

describe('nothing is said', () => {
  test.each(['<p|V|k>', 'natural', 'p out', 'defect', 'expect', 'subtract'])('on %s', word => expect(hover(word, { into: 1 })).toBeNull());

  test('of a model that could not be evaluated', () => {
    const document = {
      ...wire,
      models: wire.models.map(({ source }) => ({ source: { ...source, spec: null }, results: null, stage: 'text' as const })),
    };
    expect(hover('twist(', { document })).toBeNull();
  });
});

test('numbers that are not there are words', () => {
  const document = checkedWire({
    results: results => ({
      ...results,
      sum: results.sum.map(point => ({ ...point, drift: null })),
      series: results.series.map(point => ({ ...point, largestEigenvalue: null, converges: null })),
      counterterms: results.counterterms.map(one => ({ ...one, at: null })),
      terms: results.terms.map(term => ({ ...term, values: [{ p: 0.05, E: 0.00125, bare: null, renormalised: null, uncertainty: null }] })),
    }),
  });
  for (const word of ['twist(', 'c0 =', 'z0', 'series']) {
    const { markdown } = hover(word, { document })!;
    expect(markdown).toContain('undetermined');
    expect(markdown).not.toMatch(/NaN|undefined|null/);
  }
});

test('before the numbers are there, the verdicts are', () => {
  const document = checkedWire({
    stage: 'symbolic',
    results: results => ({ ...results, sum: [], terms: results.terms.map(term => ({ ...term, values: [] })) }),
  });
  const { markdown } = hover('twist(', { document })!;
  expect(rowOf(markdown, '`twist^2`')).toEqual(['2', 'L^1, cancelled by `z0`']);
  expect(markdown).toMatch(/the numbers follow\.\*$/);
});
