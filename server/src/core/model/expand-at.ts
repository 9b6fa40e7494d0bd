import { atInfinity } from '../algebra/at-infinity';
import type { Asymptotics, AsymptoticTerm } from '../algebra/at-infinity';
import { binary, call, number, substitute } from '../algebra/expression';
import type { Complex, Expr } from '../algebra/expression';
import { realValue } from './recognise-constant';
import { taylorCoefficients } from './taylor';

/** Orders kept of an expansion. */
const DEPTH = 14;

/** coefficient · t^power · ln^log t, t the distance from the point. */
export interface LocalTerm {
  readonly power: number;
  readonly log: number;
  readonly c: Complex;
}

/** A function on one side (direction ±1) of a point, by rising power of the distance. Throws NoExpansion. */
export function expandAt(expr: Expr, variable: string, at: number, direction: 1 | -1): readonly LocalTerm[] {
  const terms: AsymptoticTerm[] = [{ power: -1, log: 0, c: { re: direction, im: 0 } }];
  if (at !== 0) terms.unshift({ power: 0, log: 0, c: { re: at, im: 0 } });
  const position: Asymptotics = { terms, truncated: -Infinity };
  return atInfinity(knownToEveryOrder(expr, variable, at), new Map([[variable, position]]), DEPTH)
    .terms.filter(t => t.power >= -DEPTH)
    .map(t => ({ power: -t.power + 0, log: t.log, c: t.log % 2 === 0 ? t.c : { re: -t.c.re, im: -t.c.im } }));
}

/** V(q) for q → ∞, by falling power. Throws NoExpansion where it oscillates or grows like an exponential. */
export function expandTransfer(expr: Expr): Asymptotics['terms'] {
  return atInfinity(expr, new Map([['q', { terms: [{ power: 1, log: 0, c: { re: 1, im: 0 } }], truncated: -Infinity }]]), DEPTH).terms;
}

/** Circular and hyperbolic functions through the exponential, other functions as Taylor polynomials about where their argument tends to. */
function knownToEveryOrder(expr: Expr, variable: string, at: number): Expr {
  const inner = (e: Expr) => knownToEveryOrder(e, variable, at);
  if (expr.kind === 'number' || expr.kind === 'symbol') return expr;
  if (expr.kind === 'negate') return { ...expr, argument: inner(expr.argument) };
  if (expr.kind !== 'call') return binary(expr.kind, inner(expr.left), inner(expr.right));
  const args = expr.arguments.map(inner);
  const exponential = (factor: Complex) => call('exp', [binary('multiply', number(factor.re, factor.im), args[0])]);
  const half = (unit: Complex, kind: 'add' | 'subtract', front: Complex) =>
    binary('multiply', number(front.re, front.im), binary(kind, exponential(unit), exponential({ re: -unit.re, im: -unit.im })));
  const i = { re: 0, im: 1 };
  const one = { re: 1, im: 0 };
  const circular = { cos: () => half(i, 'add', { re: 0.5, im: 0 }), sin: () => half(i, 'subtract', { re: 0, im: -0.5 }) };
  const hyperbolic = { cosh: () => half(one, 'add', { re: 0.5, im: 0 }), sinh: () => half(one, 'subtract', { re: 0.5, im: 0 }) };
  switch (expr.name) {
    case 'cos':
    case 'sin':
      return circular[expr.name]();
    case 'tan':
      return binary('divide', circular.sin(), circular.cos());
    case 'cosh':
    case 'sinh':
      return hyperbolic[expr.name]();
    case 'tanh':
      return binary('divide', hyperbolic.sinh(), hyperbolic.cosh());
    case 'sqrt':
    case 'exp':
    case 'log':
    case 'abs':
    case 'step':
      return { ...expr, arguments: args };
    default:
      return asTaylor({ ...expr, arguments: args }, variable, at) ?? { ...expr, arguments: args };
  }
}

/** f(u) as Σ c_j (u - u0)^j, u0 its argument at the point; null where that is not finite or f has no series there. */
function asTaylor(expr: Expr & { kind: 'call' }, variable: string, at: number): Expr | null {
  const last = expr.arguments.length - 1;
  const argument = expr.arguments[last];
  const centre = realValue(substitute(argument, new Map([[variable, number(at)]])));
  if (centre === null || !Number.isFinite(centre)) return null;
  const value = (u: number) => realValue({ ...expr, arguments: expr.arguments.map((a, j) => (j === last ? number(u) : a)) }) ?? NaN;
  const coefficients = taylorCoefficients(value, centre, DEPTH);
  if (!coefficients) return null;
  const distance = binary('subtract', argument, number(centre));
  return coefficients
    .map((c, j) => (j === 0 ? number(c) : binary('multiply', number(c), binary('power', distance, number(j)))))
    .filter((_, j) => coefficients[j] !== 0)
    .reduce((left, right) => binary('add', left, right), number(0));
}
