import { compile } from '../algebra/compile';
import { symbol } from '../algebra/expression';
import type { Expr } from '../algebra/expression';
import { specialFunctions } from '../special';
import { KernelError } from './kernel-error';
import { constantValue } from './recognise-constant';
import { polynomialIn } from './recognise-polynomial';
import { expandTerms, termExpr } from './recognise-terms';
import type { Term } from './recognise-terms';
import { complexArithmetic, complexPower } from '../algebra/compile';
import type { LocalPiece } from './transform';
import type { ContactPower, Transformed } from './transform-local';
import { gaussianInTransfer } from './transform-gaussian';
import { polesPiece } from './transform-poles';

/** A kernel given as V(q): powers of q, poles and Gaussians in closed form, other terms as they stand. */
export function transferPieces(kernel: Expr, dimension: 1 | 2 | 3): Transformed {
  const contacts: ContactPower[] = [];
  const pieces: LocalPiece[] = [];
  for (const term of expandTerms(kernel, new Set(dimension > 1 ? ['q'] : []))) {
    const closed = closedTerm(term, dimension);
    if (closed && 'power' in closed) contacts.push(closed);
    else if (closed) pieces.push(closed);
    else pieces.push(...plainPieces(termExpr(term), dimension));
  }
  return { contacts, pieces };
}

function closedTerm(term: Term, dimension: 1 | 2 | 3): ContactPower | LocalPiece | null {
  let coefficient = { re: 1, im: 0 };
  let power = 0;
  let beta = 0;
  let pole: { square: number; nu: number } | null = null;
  for (const { base, exponent } of term) {
    const constant = constantValue(base);
    if (constant) coefficient = complexArithmetic('multiply', coefficient, complexPower(constant, { re: exponent, im: 0 }));
    else if (base.kind === 'symbol') power += exponent;
    else {
      const exponential = base.kind === 'call' && base.name === 'exp';
      const terms = polynomialIn(exponential ? base.arguments[0] : base, ['q']);
      if (!terms || terms.some(t => (t.powers[0] !== 0 && t.powers[0] !== 2) || t.coefficient.im !== 0)) return null;
      const at = (n: number) => terms.find(t => t.powers[0] === n)?.coefficient.re ?? 0;
      if (exponential) {
        beta -= at(2) * exponent;
        coefficient = { re: coefficient.re * Math.exp(at(0) * exponent), im: coefficient.im * Math.exp(at(0) * exponent) };
      } else {
        if (exponent >= 0 || pole || !(at(0) / at(2) > 0)) return null;
        pole = { square: at(0) / at(2), nu: -exponent };
        coefficient = complexArithmetic('multiply', coefficient, complexPower({ re: at(2), im: 0 }, { re: exponent, im: 0 }));
      }
    }
  }
  const odd = Math.abs(power) % 2 === 1;
  const withFactor = (piece: LocalPiece): LocalPiece => ({ ...piece, coefficient, transfer: termExpr(term) });
  if (pole && beta === 0 && (power === 0 || (power === 1 && dimension === 1))) {
    return withFactor(polesPiece([{ coefficient: 1, nu: pole.nu }], Math.sqrt(pole.square), odd, { smooth: false, origin: null }));
  }
  if (pole || !Number.isInteger(power)) return null;
  if (beta === 0 && power >= 0 && (dimension === 1 || !odd)) return { coefficient, power, centre: 0 };
  if (beta === 0 && power < 0 && power > -2 * dimension && (dimension > 1 || power > -1)) {
    return withFactor(polesPiece([{ coefficient: 1, nu: -power / 2 }], 0, false, { smooth: false, origin: null }));
  }
  if (beta > 0 && power >= 0 && (dimension === 1 || !odd)) {
    const coefficients = new Array<number>(Math.floor(power / 2)).fill(0).concat(1);
    return { ...withFactor(gaussianInTransfer(coefficients, 1 / (4 * beta), odd, 0)), origin: null };
  }
  return null;
}

/** V(q) by the compiled expression: its real and its imaginary part. */
function plainPieces(expr: Expr, dimension: 1 | 2 | 3): readonly LocalPiece[] {
  const compiled = compile(expr, specialFunctions);
  const evaluate = (q: Float64Array) => {
    const re = new Float64Array(q.length);
    const im = new Float64Array(q.length);
    compiled({ q }, re, im);
    return { re, im };
  };
  const { scale, complex } = probe(evaluate, dimension);
  const piece = (part: 're' | 'im'): LocalPiece => ({
    coefficient: part === 're' ? { re: 1, im: 0 } : { re: 0, im: 1 },
    centre: 0,
    odd: false,
    value(q, out) {
      out.set(evaluate(q)[part]);
      // 0/0 at one point, as of sin(q)/q: the value beside it.
      for (let j = 0; j < q.length; j++) if (Number.isNaN(out[j])) out[j] = evaluate(new Float64Array([q[j] + 1e-7 * scale]))[part][0];
    },
    family: { kind: 'other' },
    scale,
    tail: null,
    smooth: false,
    origin: null,
    transfer: part === 're' ? expr : { kind: 'multiply', left: { kind: 'number', re: 0, im: 0 }, right: symbol('q') },
    relativeError: 1e-14,
  });
  return complex ? [piece('re'), piece('im')] : [piece('re')];
}

/** Where V(q) changes: the smallest q at which it has left its value near 0 by a tenth; 0 if it has no such value. */
function probe(evaluate: (q: Float64Array) => { re: Float64Array; im: Float64Array }, dimension: 1 | 2 | 3): { scale: number; complex: boolean } {
  const points = 400;
  const q = Float64Array.from({ length: points }, (_, j) => 1e-8 * 10 ** ((16 * j) / points));
  const { re, im } = evaluate(q);
  const { im: imBackward } = dimension === 1 ? evaluate(q.map(x => -x)) : { im };
  const first = Math.hypot(re[0], im[0]);
  if (Array.from(q.keys()).every(j => Number.isNaN(re[j]))) throw new KernelError('value', 'This kernel has no value at any momentum transfer.');
  const singular = !Number.isFinite(first) || Math.abs(Math.hypot(re[20], im[20]) - first) > 1e-3 * first;
  const changed = q.findIndex((_, j) => Math.hypot(re[j] - re[0], im[j] - im[0]) > 0.1 * first);
  const scale = singular ? 0 : changed < 0 ? 1 : q[changed];
  return { scale, complex: im.some(x => x !== 0) || imBackward.some(x => x !== 0) };
}
