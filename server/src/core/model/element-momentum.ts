import { compile } from '../algebra/compile';
import { binary, negate, number, substitute, symbol } from '../algebra/expression';
import type { Expr } from '../algebra/expression';
import { specialFunctions } from '../special';
import type { MomentumTerm } from './kernel-shape';
import { KernelError } from './kernel-error';
import type { Element } from './element';
import { mixedParity, projectedTerms } from './projection-polynomial';
import { findPole } from './recognise-poles';
import type { ModelSpec, Wave } from './spec';

/** A polynomial in p, k and E; in dimension 1 what the wave keeps of it. */
export function contactElement(all: readonly MomentumTerm[], wave: Wave): Element {
  const terms = projectedTerms(all, wave);
  return {
    add(p, k, E, re, im) {
      for (const t of terms) {
        const cr = t.re * E ** t.e;
        const ci = t.im * E ** t.e;
        if (t.a === 0 && t.b === 0) {
          for (let j = 0; j < re.length; j++) re[j] += cr;
          if (ci !== 0) for (let j = 0; j < im.length; j++) im[j] += ci;
          continue;
        }
        const left = powers(p, t.a);
        const right = powers(k, t.b);
        for (let j = 0; j < re.length; j++) re[j] += cr * left[j] * right[j];
        if (ci !== 0) for (let j = 0; j < im.length; j++) im[j] += ci * left[j] * right[j];
      }
    },
    real: terms.every(t => t.im === 0),
    symmetric: terms.every(t => terms.some(s => s.a === t.b && s.b === t.a && s.e === t.e && s.re === t.re && s.im === t.im)),
    relativeError: 1e-15,
    shape: { kind: 'polynomial', terms },
  };
}

function powers(x: Float64Array, n: number): Float64Array {
  if (n === 1) return x;
  const out = new Float64Array(x.length).fill(1);
  for (let m = 0; m < n; m++) for (let j = 0; j < out.length; j++) out[j] *= x[j];
  return out;
}

/** Any other kernel in p and k (and E), evaluated as it stands. */
export function generalElement(kernel: Expr, { dimension, wave }: ModelSpec): Element {
  const pole = findPole(kernel, ['p', 'k'], dimension === 1);
  if (pole)
    throw new KernelError(
      'value',
      `The kernel is infinite at real momenta, for example at ${pole}: such a pole has no meaning without a rule for passing it.`,
    );
  const expr = wave.kind === 'even' || wave.kind === 'odd' ? parityPart(kernel, wave.kind) : kernel;
  const compiled = compile(expr, specialFunctions);
  const evaluate = (p: Float64Array, k: Float64Array, E: number) => {
    const re = new Float64Array(p.length);
    const im = new Float64Array(p.length);
    compiled({ p, k, E }, re, im);
    return { re, im };
  };
  return {
    add(p, k, E, re, im) {
      const value = evaluate(p, k, E);
      for (let j = 0; j < re.length; j++) {
        if (Number.isNaN(value.re[j])) [value.re[j], value.im[j]] = besides(evaluate, p[j], k[j], E);
        re[j] += value.re[j];
        im[j] += value.im[j];
      }
    },
    real: isReal(evaluate, dimension === 1),
    symmetric: false,
    relativeError: 1e-14,
    shape: { kind: 'general', expr },
  };
}

type Evaluate = (p: Float64Array, k: Float64Array, E: number) => { re: Float64Array; im: Float64Array };

/** 0/0 at a point, as of sin(p - k)/(p - k) at p = k: the mean of the values around it. */
function besides(evaluate: Evaluate, p: number, k: number, E: number): [number, number] {
  const step = 1e-6 * (Math.abs(k) || 1);
  const { re, im } = evaluate(Float64Array.of(p, p), Float64Array.of(k - step, k + step), E);
  return [(re[0] + re[1]) / 2, (im[0] + im[1]) / 2];
}

function samples(signed: boolean): { p: Float64Array; k: Float64Array } {
  const momenta = [0.0137, 0.29, 0.83, 1.7, 5.3, 47].flatMap(x => (signed ? [x, -x] : [x]));
  const pairs = momenta.flatMap(p => momenta.map(k => [p, 1.13 * k] as const));
  return { p: Float64Array.from(pairs, x => x[0]), k: Float64Array.from(pairs, x => x[1]) };
}

function isReal(evaluate: Evaluate, signed: boolean): boolean {
  const { p, k } = samples(signed);
  return [-0.37, 0.61].every(E => evaluate(p, k, E).im.every(x => x === 0));
}

function parityPart(kernel: Expr, wave: 'even' | 'odd'): Expr {
  const minus = (names: readonly string[]) => substitute(kernel, new Map(names.map(name => [name, negate(symbol(name))])));
  const { p, k } = samples(true);
  const values = [kernel, minus(['p', 'k'])].map(expr => {
    const re = new Float64Array(p.length);
    const im = new Float64Array(p.length);
    compile(expr, specialFunctions)({ p, k, E: -0.37 }, re, im);
    return { re, im };
  });
  const [there, mirrored] = values;
  const differs = there.re.some((x, j) => Math.hypot(x - mirrored.re[j], there.im[j] - mirrored.im[j]) > 1e-9 * Math.hypot(x, there.im[j]));
  if (differs) throw mixedParity();
  return binary('divide', binary(wave === 'even' ? 'add' : 'subtract', kernel, minus(['k'])), number(2));
}
