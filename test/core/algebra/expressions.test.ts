import fc from 'fast-check';
import { evaluate as evaluateByMathjs, parse } from 'mathjs';
import { describe, expect, it } from 'vitest';
import { compile } from '../../../server/src/core/algebra/compile';
import { evaluate } from '../../../server/src/core/algebra/evaluate';
import { expr } from '../../support/expr';

/** Texts of expressions in p and k; real and finite for p, k > 0 where nothing overflows. */
const texts = fc.letrec<{ expression: string }>(tie => ({
  expression: fc.oneof(
    { maxDepth: 4 },
    fc.constantFrom('p', 'k'),
    fc.double({ min: 0.1, max: 9, noNaN: true }).map(x => x.toFixed(3)),
    fc.tuple(tie('expression'), fc.constantFrom('+', '-', '*', '/'), tie('expression')).map(([a, o, b]) => `(${a} ${o} ${b})`),
    fc.tuple(tie('expression'), fc.constantFrom(-2, 2, 3)).map(([a, n]) => `(${a})^(${n})`),
    fc.tuple(fc.constantFrom('exp', 'sin', 'cos', 'tanh', 'atan', 'abs'), tie('expression')).map(([f, a]) => `${f}(${a})`),
  ),
})).expression;

const at = (p: number, k: number) => ({ p, k });

describe('expressions against mathjs', () => {
  it('have the same values, one by one and compiled', () => {
    fc.assert(
      fc.property(texts, fc.double({ min: 0.05, max: 4, noNaN: true }), fc.double({ min: 0.05, max: 4, noNaN: true }), (text, p, k) => {
        const wanted = evaluateByMathjs(text, at(p, k)) as number;
        fc.pre(Number.isFinite(wanted) && Math.abs(wanted) < 1e100 && intermediatesAreFinite(text, p, k));
        const one = evaluate(expr(text), new Map(Object.entries(at(p, k)).map(([name, re]) => [name, { re, im: 0 }])));
        const [re, im] = [new Float64Array(1), new Float64Array(1)];
        compile(expr(text))({ p: Float64Array.of(p), k }, re, im);
        const size = Math.max(1e-9, Math.abs(wanted));
        expect(Math.hypot(one.re - wanted, one.im) / size).toBeLessThan(1e-9);
        expect(Math.hypot(re[0] - wanted, im[0]) / size).toBeLessThan(1e-9);
      }),
      { numRuns: 300 },
    );
  });
});

/** Sums that cancel lose digits by themselves: only texts whose parts stay moderate are compared. */
function intermediatesAreFinite(text: string, p: number, k: number): boolean {
  let fine = true;
  parse(text).traverse(node => {
    const value = node.evaluate(at(p, k)) as number;
    if (!Number.isFinite(value) || Math.abs(value) > 1e4 || (value !== 0 && Math.abs(value) < 1e-4)) fine = false;
  });
  return fine;
}
