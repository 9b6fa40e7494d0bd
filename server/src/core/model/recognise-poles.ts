import { compile } from '../algebra/compile';
import { symbolsOf } from '../algebra/expression';
import type { Expr } from '../algebra/expression';
import { specialFunctions } from '../special';
import { realValue } from './recognise-constant';

/** The divisors in `expr` that depend on one of `names` but not on the energy. */
function divisorsOf(expr: Expr, names: readonly string[], into: Expr[] = []): Expr[] {
  if (expr.kind === 'number' || expr.kind === 'symbol') return into;
  if (expr.kind === 'negate') return divisorsOf(expr.argument, names, into);
  if (expr.kind === 'call') {
    for (const argument of expr.arguments) divisorsOf(argument, names, into);
    return into;
  }
  const divides = expr.kind === 'divide' ? expr.right : expr.kind === 'power' && (realValue(expr.right) ?? 0) < 0 ? expr.left : null;
  if (divides) {
    const symbols = symbolsOf(divides);
    if (names.some(name => symbols.has(name)) && !symbols.has('E')) into.push(...simpleFactors(divides));
  }
  return divisorsOf(expr.right, names, divisorsOf(expr.left, names, into));
}

/** What may vanish in a divisor, without powers: (1 - q^2)^2 vanishes where 1 - q^2 changes its sign. */
function simpleFactors(expr: Expr): Expr[] {
  if (expr.kind === 'negate') return simpleFactors(expr.argument);
  if (expr.kind === 'multiply') return [...simpleFactors(expr.left), ...simpleFactors(expr.right)];
  if (expr.kind === 'power' && (realValue(expr.right) ?? 0) > 0) return simpleFactors(expr.left);
  return [expr];
}

/** Momenta looked at: eight decades either side of one, no round numbers. */
const GRID = Float64Array.from({ length: 161 }, (_, j) => 1.0437 * 10 ** ((j - 80) / 10));
const SIGNED = Float64Array.from([...GRID.map(x => -x).reverse(), ...GRID]);

/**
 * A place where the kernel is infinite at finite momenta: names of the arguments with their values; null where none is found.
 * `signed`: momenta run over both signs. The momentum transfer 0 and momentum 0 are not counted: that is infrared physics.
 */
export function findPole(kernel: Expr, variables: readonly ['q'] | readonly ['p', 'k'], signed: boolean): string | null {
  const divisors = divisorsOf(kernel, variables);
  if (divisors.length === 0) return null;
  const grid = signed ? SIGNED : GRID;
  const along = variables[variables.length - 1];
  const others = variables.length === 1 ? [null] : Array.from(grid).filter((_, j) => j % 8 === 0);
  for (const divisor of divisors) {
    const f = evaluator(divisor, along);
    for (const p of others) {
      const values = f(grid, p);
      for (let j = 1; j < grid.length; j++) {
        const between = Math.sign(values[j]) * Math.sign(values[j - 1]) < 0 && Math.sign(grid[j]) === Math.sign(grid[j - 1]);
        if (!between && values[j] !== 0) continue;
        const root = between ? bisect(x => f(Float64Array.of(x), p)[0], grid[j - 1], grid[j]) : grid[j];
        if (growsAt(evaluator(kernel, along), root, p)) return (p === null ? '' : `p = ${round(p)}, `) + `${along} = ${round(root)}`;
      }
    }
  }
  return null;
}

function evaluator(expr: Expr, along: string): (x: Float64Array, p: number | null) => Float64Array {
  const compiled = compile(expr, specialFunctions);
  return (x, p) => {
    const re = new Float64Array(x.length);
    const im = new Float64Array(x.length);
    compiled({ E: -0.0173, ...(p === null ? {} : { p }), [along]: x }, re, im);
    for (let j = 0; j < re.length; j++) if (im[j] !== 0) re[j] = NaN;
    return re;
  };
}

function bisect(f: (x: number) => number, from: number, to: number): number {
  const sign = Math.sign(f(from));
  for (let n = 0; n < 60; n++) {
    const middle = (from + to) / 2;
    if (Math.sign(f(middle)) === sign) from = middle;
    else to = middle;
  }
  return (from + to) / 2;
}

/** A divisor's zero may be lifted by the numerator, as in sin(q)/q: then the kernel does not grow a thousandfold between these distances. */
function growsAt(kernel: (x: Float64Array, p: number | null) => Float64Array, root: number, p: number | null): boolean {
  const [far, near] = [1e-9, 1e-12].map(d => {
    const values = kernel(Float64Array.of(root * (1 + d), root * (1 - d)), p);
    return Math.max(Math.abs(values[0]), Math.abs(values[1]));
  });
  return !(near < 100 * far);
}

const round = (x: number): string => String(Number(x.toPrecision(4)));
