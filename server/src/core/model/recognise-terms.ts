import { binary, number } from '../algebra/expression';
import type { Expr } from '../algebra/expression';
import { constantValue, realValue } from './recognise-constant';

/** base^exponent. */
export interface Factor {
  readonly base: Expr;
  readonly exponent: number;
}

/** A product of factors. */
export type Term = readonly Factor[];

/** Above this, a sum is left as the one factor it is. */
const MOST_TERMS = 64;

/** Multiplies `expr` out into a sum of products. `positive`: symbols known to be >= 0, whose powers may be combined freely. */
export function expandTerms(expr: Expr, positive: ReadonlySet<string>): readonly Term[] {
  const whole: readonly Term[] = [[{ base: expr, exponent: 1 }]];
  if (constantValue(expr)) return whole;
  const inner = (e: Expr) => expandTerms(e, positive);
  switch (expr.kind) {
    case 'add':
      return [...inner(expr.left), ...inner(expr.right)];
    case 'subtract':
      return [...inner(expr.left), ...inner(expr.right).map(negated)];
    case 'negate':
      return inner(expr.argument).map(negated);
    case 'multiply':
      return cross(inner(expr.left), inner(expr.right)) ?? whole;
    case 'divide':
      return cross(inner(expr.left), raised(expr.right, -1, positive)) ?? whole;
    case 'power': {
      const exponent = realValue(expr.right);
      return exponent === null ? whole : raised(expr.left, exponent, positive);
    }
    case 'call':
      return expr.name === 'sqrt' ? raised(expr.arguments[0], 0.5, positive) : whole;
    default:
      return whole;
  }
}

/** The factors of a term as an expression again. */
export function termExpr(term: Term): Expr {
  return term
    .map(f => (f.exponent === 1 ? f.base : binary('power', f.base, number(f.exponent))))
    .reduce((left, right) => binary('multiply', left, right), number(1));
}

function raised(base: Expr, exponent: number, positive: ReadonlySet<string>): readonly Term[] {
  const terms = expandTerms(base, positive);
  if (terms.length === 1) {
    const [term] = terms;
    if (Number.isInteger(exponent) || term.every(f => isPositive(f, positive))) {
      return [term.map(f => ({ base: f.base, exponent: f.exponent * exponent }))];
    }
  } else if (Number.isInteger(exponent) && exponent > 0 && terms.length ** exponent <= MOST_TERMS) {
    let product = terms;
    for (let n = 1; n < exponent; n++) product = cross(product, terms)!;
    return product;
  }
  return [[{ base, exponent }]];
}

function isPositive({ base }: Factor, positive: ReadonlySet<string>): boolean {
  if (base.kind === 'symbol') return positive.has(base.name);
  if (base.kind === 'call') return base.name === 'exp' || base.name === 'abs';
  return (realValue(base) ?? -1) > 0;
}

function cross(left: readonly Term[], right: readonly Term[]): readonly Term[] | null {
  if (left.length * right.length > MOST_TERMS) return null;
  return left.flatMap(x => right.map(y => [...x, ...y]));
}

const negated = (term: Term): Term => [{ base: number(-1), exponent: 1 }, ...term];
