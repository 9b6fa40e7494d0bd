import { complexArithmetic } from '../algebra/compile';
import type { Complex, Expr } from '../algebra/expression';
import { constantValue, realValue } from './recognise-constant';

/** coefficient · Π variable_j^powers_j, whole powers >= 0. */
export interface PolynomialTerm {
  readonly powers: readonly number[];
  readonly coefficient: Complex;
}

/** More terms than this are not worth expanding. */
const MOST_TERMS = 400;

/** `expr` as a polynomial in `variables`, terms combined; null where it is none (or a very long one). */
export function polynomialIn(expr: Expr, variables: readonly string[]): readonly PolynomialTerm[] | null {
  const constant = constantValue(expr);
  if (constant) return collect([{ powers: variables.map(() => 0), coefficient: constant }]);
  switch (expr.kind) {
    case 'symbol': {
      const at = variables.indexOf(expr.name);
      return at < 0 ? null : [{ powers: variables.map((_, j) => (j === at ? 1 : 0)), coefficient: { re: 1, im: 0 } }];
    }
    case 'negate': {
      const argument = polynomialIn(expr.argument, variables);
      return argument && scale(argument, { re: -1, im: 0 });
    }
    case 'add':
    case 'subtract': {
      const left = polynomialIn(expr.left, variables);
      const right = left && polynomialIn(expr.right, variables);
      return left && right && collect([...left, ...scale(right, { re: expr.kind === 'add' ? 1 : -1, im: 0 })]);
    }
    case 'multiply': {
      const left = polynomialIn(expr.left, variables);
      const right = left && polynomialIn(expr.right, variables);
      return left && right && multiply(left, right);
    }
    case 'divide': {
      const divisor = constantValue(expr.right);
      const left = divisor && polynomialIn(expr.left, variables);
      return divisor && left && collect(left.map(t => ({ ...t, coefficient: complexArithmetic('divide', t.coefficient, divisor) })));
    }
    case 'power': {
      const exponent = realValue(expr.right);
      if (exponent === null || !Number.isInteger(exponent) || exponent < 0 || exponent > 64) return null;
      const base = polynomialIn(expr.left, variables);
      return base && raise(base, exponent, variables.length);
    }
    default:
      return null;
  }
}

function raise(base: readonly PolynomialTerm[], exponent: number, variables: number): readonly PolynomialTerm[] | null {
  let result: readonly PolynomialTerm[] | null = [{ powers: new Array<number>(variables).fill(0), coefficient: { re: 1, im: 0 } }];
  for (let n = 0; n < exponent && result; n++) result = multiply(result, base);
  return result;
}

function multiply(left: readonly PolynomialTerm[], right: readonly PolynomialTerm[]): readonly PolynomialTerm[] | null {
  if (left.length * right.length > MOST_TERMS) return null;
  const products = left.flatMap(x =>
    right.map(y => ({
      powers: x.powers.map((n, j) => n + y.powers[j]),
      coefficient: complexArithmetic('multiply', x.coefficient, y.coefficient),
    })),
  );
  return collect(products);
}

function scale(terms: readonly PolynomialTerm[], by: Complex): readonly PolynomialTerm[] {
  return terms.map(t => ({ ...t, coefficient: complexArithmetic('multiply', t.coefficient, by) }));
}

/** Adds up equal powers; what cancels exactly is gone. */
export function collect(terms: readonly PolynomialTerm[]): readonly PolynomialTerm[] {
  const sums = new Map<string, PolynomialTerm>();
  for (const term of terms) {
    const key = term.powers.join();
    const before = sums.get(key);
    sums.set(key, before ? { powers: term.powers, coefficient: complexArithmetic('add', before.coefficient, term.coefficient) } : term);
  }
  return [...sums.values()].filter(t => t.coefficient.re !== 0 || t.coefficient.im !== 0);
}
