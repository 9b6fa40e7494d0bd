import fc from 'fast-check';
import { all, create } from 'mathjs';
import { describe, expect, test } from 'vitest';
import { evaluate } from '../../server/src/core/algebra/evaluate';
import type { ModelSpec } from '../../server/src/core/model/spec';
import { everyProblem, read, sound } from './carets';

const mathjs = create(all);

const statements = [
  'const w = 2*v0',
  'dimension 1',
  'mass reduced 1.5',
  'coupling v0 = 0.3',
  'coupling v1 = 0.7',
  'interaction step0(p, k) = v0*(1 + w*p*k)',
  "interaction kick(x) = v1*delta'(x - 1) order 2",
  'cutoff L = 25 gaussian(2) scan 5 .. 50 (6 points)',
  'series to 3 at p = 0.5, 1 .. 2 (3 points)',
  'counterterm z(p, k) = 1 cancels step0^2, kick*step0 subtract minimal at 2',
  'expect drift < 5 % at p = 1',
  'expect transmission = 0.5 within 50 % at p = 1',
];
const model = `const mu0 = 3\nmodel gate {\n${statements.map(line => `  ${line}\n`).join('')}}\n`;

const spansAreInside = (text: string) => {
  const document = read(text);
  for (const { span, message, mend } of everyProblem(document)) {
    expect(span.start).toBeGreaterThanOrEqual(0);
    expect(span.end).toBeGreaterThanOrEqual(span.start);
    expect(span.end).toBeLessThanOrEqual(text.length);
    if (mend) expect(mend.span.end).toBeLessThanOrEqual(text.length);
    expect(message).not.toMatch(/NaN|undefined|null|\[object/);
  }
  for (const { places, spec, problems } of document.models) {
    expect(places.model.end).toBeLessThanOrEqual(text.length);
    expect(places.insertAt).toBeLessThanOrEqual(places.model.end);
    if (spec !== null) {
      expect(problems.filter(({ severity }) => severity === 'error')).toEqual([]);
      expect(places.interactions).toHaveLength(spec.interactions.length);
      expect(places.couplings).toHaveLength(spec.couplings.length);
      expect(places.counterterms).toHaveLength(spec.counterterms.length);
      expect(places.expectations).toHaveLength(spec.expectations.length);
    }
  }
};

const scraps = [
  ...statements,
  'model',
  '{',
  '}',
  'from',
  '"',
  '#',
  '\n',
  'MeV',
  'order',
  '..',
  '(',
  ')',
  '1e999',
  'i',
  '^',
  '*',
  ',',
  'use',
  'units MeV, fm',
  'free',
  'fix v0 with',
  '=',
  '[1, 2]',
  "'",
  'ₐ',
  '₂',
  'µ',
  '\u0301',
  '\u00a0',
  '\ud83d',
];

describe('any text is read without an exception, every place inside it', () => {
  test('characters', () => {
    fc.assert(fc.property(fc.string({ unit: 'binary', maxLength: 200 }), spansAreInside), { numRuns: 300 });
  });
  test('scraps of the language', () => {
    fc.assert(
      fc.property(fc.array(fc.constantFrom(...scraps), { maxLength: 40 }), parts => spansAreInside(parts.join(' '))),
      { numRuns: 300 },
    );
  });
  test('a sound model with a piece cut out, doubled or replaced', () => {
    const mutation = fc.tuple(fc.nat(model.length), fc.nat(30), fc.oneof(fc.constantFrom(...scraps), fc.string({ maxLength: 5 })));
    fc.assert(
      fc.property(mutation, ([at, length, scrap]) => spansAreInside(model.slice(0, at) + scrap + model.slice(at + length))),
      { numRuns: 500 },
    );
  });
});

test('cutting a text off anywhere never makes an exception', () => {
  for (let end = 0; end <= model.length; end++) spansAreInside(model.slice(0, end));
});

test('the order of statements changes only how things are listed', () => {
  const sorted = (spec: ModelSpec) => {
    const names = spec.interactions.map(({ name }) => name);
    const monomial = (exponents: readonly number[]) =>
      names
        .map((name, i) => `${name}^${exponents[i]}`)
        .sort()
        .join('*');
    const byName = <T extends { name: string }>(list: readonly T[]) => [...list].sort((a, b) => (a.name < b.name ? -1 : 1));
    return {
      ...spec,
      couplings: byName(spec.couplings),
      interactions: byName(spec.interactions),
      counterterms: spec.counterterms.map(counterterm => ({ ...counterterm, cancels: counterterm.cancels.map(monomial) })),
      expectations: spec.expectations.map(expectation => JSON.stringify(expectation)).sort(),
    };
  };
  const wanted = sorted(sound(model));
  fc.assert(
    fc.property(fc.shuffledSubarray(statements, { minLength: statements.length }), shuffled => {
      expect(sorted(sound(`model gate { ${shuffled.join(' ')} }`))).toEqual(wanted);
    }),
    { numRuns: 100 },
  );
});

test('editing and reading gives what reading afresh gives', () => {
  fc.assert(
    fc.property(fc.nat(model.length), fc.constantFrom(...scraps), (at, scrap) => {
      const edited = model.slice(0, at) + scrap + model.slice(at);
      const first = read(edited);
      read(model);
      expect(read(edited)).toEqual(first);
    }),
    { numRuns: 100 },
  );
});

describe('expressions mean what they mean elsewhere (mathjs as oracle)', () => {
  const leaf = fc.oneof(
    fc.constantFrom('a', 'b', 'pi'),
    fc.integer({ min: 1, max: 9 }).map(String),
    fc.constantFrom('0.5', '1.25', '2e-1'),
  );
  const { formula } = fc.letrec<{ formula: string }>(tie => ({
    formula: fc.oneof(
      { depthSize: 'small', withCrossShrink: true },
      leaf,
      fc.tuple(tie('formula'), fc.constantFrom('+', '-', '*', '/'), tie('formula')).map(([x, operator, y]) => `${x} ${operator} ${y}`),
      fc.tuple(leaf, fc.constantFrom('2', '-1', '-2^2', '0.5', 'b')).map(([x, n]) => `${x}^${n}`),
      tie('formula').map(x => `-${x}`),
      tie('formula').map(x => `(${x})`),
      fc
        .tuple(fc.constantFrom('sqrt', 'exp', 'log', 'sin', 'cos', 'atan', 'tanh', 'abs', 'gamma', 'erf'), tie('formula'))
        .map(([f, x]) => `${f}(${x})`),
    ),
  }));
  const values = { a: 1.7, b: 0.6 };

  const theirs = (text: string): { re: number; im: number } | null => {
    const value: unknown = mathjs.evaluate(text, { ...values });
    if (typeof value === 'number') return Number.isFinite(value) ? { re: value, im: 0 } : null;
    const complex = value as { re: number; im: number };
    return Number.isFinite(complex.re) && Number.isFinite(complex.im) ? { re: complex.re, im: complex.im } : null;
  };
  const safely = (text: string) => {
    try {
      return theirs(text);
    } catch {
      // mathjs has no erf or gamma of a complex number.
      return null;
    }
  };

  test('values and precedence', () => {
    let compared = 0;
    fc.assert(
      fc.property(formula, text => {
        const wanted = safely(text);
        if (wanted === null || Math.hypot(wanted.re, wanted.im) > 1e12) return;
        const document = read(
          `const a = 1.7 const b = 0.6 const value = ${text}\nmodel m { mass reduced 1 interaction v(p, k, E) = value }`,
        );
        const kernel = document.models[0].spec?.interactions[0].kernel;
        if (kernel === undefined) {
          // Complex constants make the contact non-Hermitian; what is undefined here has no finite intermediate value there either.
          expect(everyProblem(document).every(({ code }) => code === 'not-hermitian' || code === 'value')).toBe(true);
          return;
        }
        const mine = evaluate(kernel, new Map());
        const size = Math.max(1, Math.hypot(wanted.re, wanted.im));
        // Both round in every step; sums may cancel.
        expect(Math.abs(mine.re - wanted.re)).toBeLessThan(1e-9 * size);
        expect(Math.abs(mine.im - wanted.im)).toBeLessThan(1e-9 * size);
        compared++;
      }),
      { numRuns: 500 },
    );
    expect(compared).toBeGreaterThan(200);
  });

  test.each([
    ['2^-3^2', 2 ** -9],
    ['8/4*2', 4],
    ['-2^2', -4],
    ['2*-3', -6],
    ['1 - -1', 2],
    ['2^3^0', 2],
    ['abs(3 + 4*i)', 5],
    ['legendrep(2, 0.5)', -0.125],
    ['step(0)', 0.5],
  ])('%s', (text, value) => {
    const spec = sound(`const value = ${text}\nmodel m { mass reduced 1 interaction v(p, k) = value }`);
    expect(evaluate(spec.interactions[0].kernel, new Map()).re).toBeCloseTo(value, 12);
  });
});
