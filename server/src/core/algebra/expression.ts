/**
 * Expressions on plain data: what a kernel, a kinetic energy or a constant is made of once the text has been read.
 * Values are complex. A `symbol` is an argument of the kernel (p, k, q, x, r, E) or the name of a coupling.
 */
export type Expr =
  | { readonly kind: 'number'; readonly re: number; readonly im: number }
  | { readonly kind: 'symbol'; readonly name: string }
  | { readonly kind: 'negate'; readonly argument: Expr }
  | { readonly kind: 'add' | 'subtract' | 'multiply' | 'divide' | 'power'; readonly left: Expr; readonly right: Expr }
  /** `primes` counts the derivatives of `delta`; 0 for every other function. */
  | { readonly kind: 'call'; readonly name: FunctionName; readonly primes: number; readonly arguments: readonly Expr[] };

/** The functions of the language. All take one argument but the last four, which take (order, argument). */
export type FunctionName =
  | 'sqrt'
  | 'exp'
  | 'log'
  | 'sin'
  | 'cos'
  | 'tan'
  | 'asin'
  | 'acos'
  | 'atan'
  | 'sinh'
  | 'cosh'
  | 'tanh'
  | 'erf'
  | 'abs'
  | 'step'
  | 'gamma'
  | 'delta'
  | 'besselj'
  | 'sphericalj'
  | 'legendrep'
  | 'legendreq';

export interface Complex {
  readonly re: number;
  readonly im: number;
}

export const number = (re: number, im = 0): Expr => ({ kind: 'number', re, im });
export const symbol = (name: string): Expr => ({ kind: 'symbol', name });
export const negate = (argument: Expr): Expr => ({ kind: 'negate', argument });
export const binary = (kind: 'add' | 'subtract' | 'multiply' | 'divide' | 'power', left: Expr, right: Expr): Expr => ({
  kind,
  left,
  right,
});
export const call = (name: FunctionName, args: readonly Expr[], primes = 0): Expr => ({ kind: 'call', name, primes, arguments: args });

/** The names that occur free in `expr`. */
export function symbolsOf(expr: Expr, into: Set<string> = new Set()): Set<string> {
  switch (expr.kind) {
    case 'number':
      return into;
    case 'symbol':
      return into.add(expr.name);
    case 'negate':
      return symbolsOf(expr.argument, into);
    case 'call':
      for (const argument of expr.arguments) symbolsOf(argument, into);
      return into;
    default:
      symbolsOf(expr.left, into);
      return symbolsOf(expr.right, into);
  }
}

/** `expr` with each symbol that `values` knows replaced. */
export function substitute(expr: Expr, values: ReadonlyMap<string, Expr>): Expr {
  switch (expr.kind) {
    case 'number':
      return expr;
    case 'symbol':
      return values.get(expr.name) ?? expr;
    case 'negate':
      return negate(substitute(expr.argument, values));
    case 'call':
      return call(
        expr.name,
        expr.arguments.map(a => substitute(a, values)),
        expr.primes,
      );
    default:
      return binary(expr.kind, substitute(expr.left, values), substitute(expr.right, values));
  }
}
