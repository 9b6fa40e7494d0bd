import { specialFunctions } from '../special';
import { complexArithmetic, complexFunction, complexPower } from './compile';
import type { Complex, Expr, FunctionName } from './expression';

type Operation = 'add' | 'subtract' | 'multiply' | 'divide' | 'power';

/**
 * The value of `expr` where `values` gives each of its symbols. Principal branches; step(0) = 1/2. Raises no error: what has no
 * finite value (1/0, log 0, delta, an unknown symbol, a special function off the real axis) comes out as Infinity or NaN.
 */
export function evaluate(expr: Expr, values: ReadonlyMap<string, Complex>): Complex {
  switch (expr.kind) {
    case 'number':
      return expr;
    case 'symbol':
      return values.get(expr.name) ?? undefinedValue;
    case 'negate': {
      const x = evaluate(expr.argument, values);
      return { re: -x.re, im: x.im === 0 ? 0 : -x.im };
    }
    case 'call':
      return applyFunction(
        expr.name,
        expr.arguments.map(argument => evaluate(argument, values)),
      );
    default:
      return combine(expr.kind, evaluate(expr.left, values), evaluate(expr.right, values));
  }
}

/** x + y, x - y, x*y, x/y or x^y. */
export function combine(kind: Operation, x: Complex, y: Complex): Complex {
  if (kind !== 'power') return x.im === 0 && y.im === 0 ? { re: realArithmetic(kind, x.re, y.re), im: 0 } : complexArithmetic(kind, x, y);
  const real = x.im === 0 && y.im === 0 && (x.re >= 0 || Number.isInteger(y.re));
  return real ? { re: x.re ** y.re, im: 0 } : complexPower(x, y);
}

/** A function of the language at complex arguments. */
export function applyFunction(name: FunctionName, args: readonly Complex[]): Complex {
  if (args.every(argument => argument.im === 0)) {
    const real = realFunctions[name] ?? specialFunctions[name];
    const value = real?.(...args.map(argument => argument.re));
    if (value !== undefined && !Number.isNaN(value)) return { re: value, im: 0 };
  }
  return args.length === 1 ? complexFunction(name, args[0]) : undefinedValue;
}

const undefinedValue: Complex = { re: NaN, im: NaN };

/** Those whose complex formula would leave a rounding error in the imaginary part. */
const realFunctions: Partial<Record<FunctionName, (...args: number[]) => number>> = {
  asin: Math.asin,
  acos: Math.acos,
  atan: Math.atan,
  step: x => (x > 0 ? 1 : x < 0 ? 0 : x === 0 ? 0.5 : NaN),
};

function realArithmetic(kind: Exclude<Operation, 'power'>, x: number, y: number): number {
  switch (kind) {
    case 'add':
      return x + y;
    case 'subtract':
      return x - y;
    case 'multiply':
      return x * y;
    case 'divide':
      return x / y;
  }
}
