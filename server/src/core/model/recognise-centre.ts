import { binary, number, symbol } from '../algebra/expression';
import type { Expr } from '../algebra/expression';
import { polynomialIn } from './recognise-polynomial';
import type { Term } from './recognise-terms';

/** Where the term sits: the zero of its delta's or modulus's argument, else the top of its Gaussian, else the zero of its one linear factor. */
export function centreOf(term: Term, variable: string): number {
  let slope = 0;
  let curvature = 0;
  for (const { base, exponent } of term) {
    if (base.kind !== 'call') continue;
    const line = lineIn(base.arguments[0], variable);
    if ((base.name === 'delta' || base.name === 'abs') && line) return -line.constant / line.slope + 0;
    const inner = base.name === 'exp' ? modulusIn(base.arguments[0], variable) : null;
    if (inner !== null) return inner;
    const polynomial = base.name === 'exp' ? polynomialIn(base.arguments[0], [variable]) : null;
    for (const t of polynomial ?? []) {
      if (t.powers[0] === 1) slope += t.coefficient.re * exponent;
      if (t.powers[0] === 2) curvature += t.coefficient.re * exponent;
    }
  }
  return curvature === 0 ? 0 : -slope / (2 * curvature) + 0;
}

/** `expr` with variable + centre for the variable; constants that cancel in a linear argument are gone, so that |x - a| becomes |y| exactly. */
export function shifted(expr: Expr, variable: string, centre: number): Expr {
  const line = lineIn(expr, variable);
  if (line) {
    const constant = line.constant + line.slope * centre;
    const slope = binary('multiply', number(line.slope), symbol(variable));
    return Math.abs(constant) <= 1e-14 * Math.abs(line.constant) ? slope : binary('add', slope, number(constant));
  }
  if (expr.kind === 'number' || expr.kind === 'symbol') return expr;
  if (expr.kind === 'negate') return { ...expr, argument: shifted(expr.argument, variable, centre) };
  if (expr.kind === 'call') return { ...expr, arguments: expr.arguments.map(a => shifted(a, variable, centre)) };
  return { ...expr, left: shifted(expr.left, variable, centre), right: shifted(expr.right, variable, centre) };
}

/** The zero of the argument of the first modulus in `expr`. */
function modulusIn(expr: Expr, variable: string): number | null {
  if (expr.kind === 'call') {
    const line = expr.name === 'abs' ? lineIn(expr.arguments[0], variable) : null;
    if (line) return -line.constant / line.slope + 0;
    return null;
  }
  if (expr.kind === 'negate') return modulusIn(expr.argument, variable);
  if (expr.kind === 'number' || expr.kind === 'symbol') return null;
  return modulusIn(expr.left, variable) ?? modulusIn(expr.right, variable);
}

/** slope·variable + constant with real coefficients; null for anything else, and for constants. */
export function lineIn(expr: Expr, variable: string): { slope: number; constant: number } | null {
  const terms = polynomialIn(expr, [variable]);
  if (!terms || terms.some(t => t.powers[0] > 1 || t.coefficient.im !== 0)) return null;
  const at = (power: number) => terms.find(t => t.powers[0] === power)?.coefficient.re ?? 0;
  return at(1) === 0 ? null : { slope: at(1), constant: at(0) };
}
