import { compile } from '../algebra/compile';
import { number, substitute, symbolsOf } from '../algebra/expression';
import type { Complex, Expr } from '../algebra/expression';
import { specialFunctions } from '../special';

/** The value of an expression without symbols; null where it has one. */
export function constantValue(expr: Expr): Complex | null {
  if (expr.kind === 'number') return { re: expr.re, im: expr.im };
  if (symbolsOf(expr).size > 0) return null;
  const re = new Float64Array(1);
  const im = new Float64Array(1);
  compile(expr, specialFunctions)({}, re, im);
  return { re: re[0], im: im[0] };
}

/** As `constantValue`, for real values only. */
export function realValue(expr: Expr): number | null {
  const value = constantValue(expr);
  return value && value.im === 0 ? value.re : null;
}

/** `expr` with the values of the couplings put in. */
export function bindCouplings(expr: Expr, couplings: ReadonlyMap<string, number>): Expr {
  return substitute(expr, new Map([...couplings].map(([name, value]) => [name, number(value)])));
}
