import { NoExpansion } from '../algebra/at-infinity';
import { compile, complexArithmetic, complexPower } from '../algebra/compile';
import { binary, negate, number, substitute, symbol } from '../algebra/expression';
import type { Expr } from '../algebra/expression';
import { specialFunctions } from '../special';
import { expandTransfer } from './expand-at';
import { KernelError } from './kernel-error';
import type { TailTerm } from './kernel-shape';
import { constantValue } from './recognise-constant';
import { polynomialIn } from './recognise-polynomial';
import { expandTerms, termExpr } from './recognise-terms';
import type { Term } from './recognise-terms';
import type { LocalPiece } from './transform';
import type { ContactPower, Transformed } from './transform-local';
import { gaussianInTransfer } from './transform-gaussian';
import { polesPiece } from './transform-poles';
import { mergeTail } from './transform-tail';

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

/** V(q) by the compiled expression: its even and odd, real and imaginary parts, those that there are. */
function plainPieces(expr: Expr, dimension: 1 | 2 | 3): readonly LocalPiece[] {
  if (dimension > 1) return partsOf(expr, false);
  const mirrored = substitute(expr, new Map([['q', negate(symbol('q'))]]));
  const half = (kind: 'add' | 'subtract') => binary('divide', binary(kind, expr, mirrored), number(2));
  return [...partsOf(half('add'), false), ...partsOf(half('subtract'), true)];
}

function partsOf(expr: Expr, odd: boolean): readonly LocalPiece[] {
  const compiled = compile(expr, specialFunctions);
  const evaluate = (q: Float64Array) => {
    const re = new Float64Array(q.length);
    const im = new Float64Array(q.length);
    compiled({ q }, re, im);
    return { re, im };
  };
  const { scale, present } = probe(evaluate);
  return present.map(part => ({
    coefficient: part === 're' ? { re: 1, im: 0 } : { re: 0, im: 1 },
    centre: 0,
    odd,
    value(q, out) {
      out.set(evaluate(q)[part]);
      // 0/0 at one point, as of sin(q)/q: the value beside it.
      for (let j = 0; j < q.length; j++) if (Number.isNaN(out[j])) out[j] = evaluate(Float64Array.of(q[j] + 1e-7 * (scale || 1)))[part][0];
    },
    family: { kind: 'other' },
    scale,
    tail: tailOf(expr, part),
    smooth: false,
    origin: null,
    transfer: present.length === 1 ? expr : null,
    relativeError: 1e-14,
  }));
}

function tailOf(expr: Expr, part: 're' | 'im'): readonly TailTerm[] | null {
  try {
    return mergeTail(expandTransfer(expr).map(t => ({ coefficient: { re: t.c[part], im: 0 }, power: t.power, log: t.log, phase: 0 })));
  } catch (error) {
    if (error instanceof NoExpansion) return null;
    throw error;
  }
}

/** Where V(q) changes: the smallest q at which it has left its value near 0 by a tenth; 0 if it has no such value. */
function probe(evaluate: (q: Float64Array) => { re: Float64Array; im: Float64Array }): { scale: number; present: ('re' | 'im')[] } {
  const { re, im } = evaluate(PROBES);
  const sizes = re.map((x, j) => Math.hypot(x, im[j]));
  if (sizes.every(Number.isNaN)) throw new KernelError('value', 'This kernel has no value at any momentum transfer.');
  const largest = Math.max(...sizes.filter(Number.isFinite));
  const present = (['re', 'im'] as const).filter(part => ({ re, im })[part].some(x => Math.abs(x) > 1e-14 * largest));
  const start = sizes[0];
  const settled = Math.hypot(re[25] - re[0], im[25] - im[0]) <= 1e-3 * Math.max(start, 1e-6 * largest);
  const changed = PROBES.findIndex((_, j) => Math.hypot(re[j] - re[0], im[j] - im[0]) > 0.1 * (start || largest));
  return { scale: !settled ? 0 : changed < 0 ? 1 : PROBES[changed], present };
}

const PROBES = Float64Array.from({ length: 401 }, (_, j) => 1e-8 * 10 ** ((16 * j) / 400));
