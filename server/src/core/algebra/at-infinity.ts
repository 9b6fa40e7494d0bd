import type { Complex, Expr } from './expression';
import { complexArithmetic, complexFunction, complexPower } from './compile';

/** One term c * x^power * (ln x)^log. */
export interface AsymptoticTerm {
  readonly power: number;
  readonly log: number;
  readonly c: Complex;
}

/**
 * A function of x as x -> +infinity: terms by falling power, good down to (not including) x^truncated.
 * No terms and truncated = -Infinity: zero, or smaller than every power.
 */
export interface Asymptotics {
  readonly terms: readonly AsymptoticTerm[];
  readonly truncated: number;
}

/** Thrown where a function has no expansion in powers and logarithms here: it grows exponentially, or oscillates. */
export class NoExpansion extends Error {}

const ZERO: Asymptotics = { terms: [], truncated: -Infinity };
const RELATIVE_ZERO = 1e-13;

/** Terms of equal power and log joined; those that cancel dropped; those below `truncated` cut. */
function normal(terms: readonly AsymptoticTerm[], truncated: number): Asymptotics {
  const joined = new Map<string, { power: number; log: number; re: number; im: number; size: number }>();
  for (const t of terms) {
    if (t.power <= truncated) continue;
    const power = Math.round(t.power * 1e9) / 1e9;
    const key = `${power}/${t.log}`;
    const entry = joined.get(key) ?? { power, log: t.log, re: 0, im: 0, size: 0 };
    entry.re += t.c.re;
    entry.im += t.c.im;
    entry.size += Math.hypot(t.c.re, t.c.im);
    joined.set(key, entry);
  }
  const kept = [...joined.values()].filter(t => Math.hypot(t.re, t.im) > RELATIVE_ZERO * t.size);
  kept.sort((s, t) => t.power - s.power || t.log - s.log);
  return { terms: kept.map(t => ({ power: t.power, log: t.log, c: { re: t.re, im: t.im } })), truncated };
}

const constant = (c: Complex): Asymptotics =>
  c.re === 0 && c.im === 0 ? ZERO : { terms: [{ power: 0, log: 0, c }], truncated: -Infinity };
const isZero = (f: Asymptotics): boolean => f.terms.length === 0 && f.truncated === -Infinity;
const leadingPower = (f: Asymptotics): number => (f.terms.length ? f.terms[0].power : f.truncated);

function add(f: Asymptotics, g: Asymptotics): Asymptotics {
  return normal([...f.terms, ...g.terms], Math.max(f.truncated, g.truncated));
}

function multiply(f: Asymptotics, g: Asymptotics): Asymptotics {
  if (isZero(f) || isZero(g)) return ZERO;
  const truncated = Math.max(leadingPower(f) + g.truncated, leadingPower(g) + f.truncated);
  const terms: AsymptoticTerm[] = [];
  for (const s of f.terms)
    for (const t of g.terms) terms.push({ power: s.power + t.power, log: s.log + t.log, c: complexArithmetic('multiply', s.c, t.c) });
  return normal(terms, truncated);
}

/** Σ c_j u^j for u -> 0, the c_j of a Taylor series, as far as `depth` powers reach. */
function taylor(u: Asymptotics, coefficients: (j: number) => Complex, depth: number): Asymptotics {
  let sum = constant(coefficients(0));
  if (isZero(u)) return sum;
  const step = -leadingPower(u);
  if (!(step > 0)) throw new NoExpansion('the inner series does not fall off');
  let power: Asymptotics = constant({ re: 1, im: 0 });
  const highest = Math.ceil(depth / step);
  for (let j = 1; j <= highest; j++) {
    power = multiply(power, u);
    sum = add(sum, multiply(constant(coefficients(j)), power));
  }
  return normal(sum.terms, Math.max(sum.truncated, -(highest + 1) * step));
}

/** f = leading * (1 + u): the leading term and u. */
function split(f: Asymptotics): { leading: AsymptoticTerm; u: Asymptotics } {
  if (!f.terms.length) throw new NoExpansion('nothing is left at the depth kept');
  const leading = f.terms[0];
  if (leading.log !== 0) throw new NoExpansion('a power of a logarithm');
  const scale = complexArithmetic('divide', { re: 1, im: 0 }, leading.c);
  const rest: Asymptotics = { terms: f.terms.slice(1), truncated: f.truncated };
  return { leading, u: multiply(rest, { terms: [{ power: -leading.power, log: 0, c: scale }], truncated: -Infinity }) };
}

function power(f: Asymptotics, r: number, depth: number): Asymptotics {
  if (r === 0) return constant({ re: 1, im: 0 });
  if (Number.isInteger(r) && r > 0) {
    let product = f;
    for (let j = 1; j < r; j++) product = multiply(product, f);
    return product;
  }
  if (isZero(f)) {
    if (r > 0) return ZERO;
    throw new NoExpansion('division by zero');
  }
  const { leading, u } = split(f);
  let binomial = 1;
  const coefficients: number[] = [1];
  const series = taylor(
    u,
    j => {
      while (coefficients.length <= j) {
        binomial *= (r - coefficients.length + 1) / coefficients.length;
        coefficients.push(binomial);
      }
      return { re: coefficients[j], im: 0 };
    },
    depth,
  );
  return multiply(series, {
    terms: [{ power: leading.power * r, log: 0, c: complexPower(leading.c, { re: r, im: 0 }) }],
    truncated: -Infinity,
  });
}

function exponential(f: Asymptotics, depth: number): Asymptotics {
  const growing = f.terms.filter(t => t.power > 0 || (t.power === 0 && t.log > 0));
  if (growing.length) {
    const c = growing[0].c;
    if (growing.length === 1 && growing[0].power === 0 && growing[0].log === 1 && c.im === 0) {
      const rest = exponential({ terms: f.terms.filter(t => t !== growing[0]), truncated: f.truncated }, depth);
      return multiply(rest, { terms: [{ power: c.re, log: 0, c: { re: 1, im: 0 } }], truncated: -Infinity });
    }
    if (c.re < 0) return ZERO;
    throw new NoExpansion(c.re > 0 ? 'it grows exponentially' : 'it oscillates');
  }
  const at = f.terms.find(t => t.power === 0)?.c ?? { re: 0, im: 0 };
  const u: Asymptotics = { terms: f.terms.filter(t => t.power < 0), truncated: f.truncated };
  let factorial = 1;
  const inverse: number[] = [1];
  const series = taylor(
    u,
    j => {
      while (inverse.length <= j) inverse.push(1 / (factorial *= inverse.length));
      return { re: inverse[j], im: 0 };
    },
    depth,
  );
  return multiply(constant(complexFunction('exp', at)), series);
}

function logarithm(f: Asymptotics, depth: number): Asymptotics {
  const { leading, u } = split(f);
  const series = taylor(u, j => ({ re: j === 0 ? 0 : (j % 2 ? 1 : -1) / j, im: 0 }), depth);
  const log: AsymptoticTerm[] = leading.power === 0 ? [] : [{ power: 0, log: 1, c: { re: leading.power, im: 0 } }];
  return add(series, add(constant(complexFunction('log', leading.c)), { terms: log, truncated: -Infinity }));
}

/** A function smooth at the (finite) limit of its argument: constant there, plus its first derivative by differences, then cut. */
function smooth(f: Asymptotics, value: (x: Complex) => Complex): Asymptotics {
  const at = f.terms.find(t => t.power === 0 && t.log === 0)?.c ?? { re: 0, im: 0 };
  const h = 1e-4;
  const up = value({ re: at.re + h, im: at.im });
  const down = value({ re: at.re - h, im: at.im });
  const slope = { re: (up.re - down.re) / (2 * h), im: (up.im - down.im) / (2 * h) };
  const u: Asymptotics = { terms: f.terms.filter(t => t.power < 0), truncated: f.truncated };
  if (isZero(u)) return constant(value(at));
  const linear = add(constant(value(at)), multiply(constant(slope), u));
  return normal(linear.terms, Math.max(linear.truncated, 2 * leadingPower(u)));
}

/**
 * `expr` as x -> +infinity, where each symbol is an expansion of its own (k = x, or k = x - u/2, …), with `depth` powers kept below the
 * leading one where an infinite series starts. Throws `NoExpansion`.
 */
export function atInfinity(expr: Expr, symbols: ReadonlyMap<string, Asymptotics>, depth: number): Asymptotics {
  const recurse = (e: Expr) => atInfinity(e, symbols, depth);
  switch (expr.kind) {
    case 'number':
      return constant(expr);
    case 'symbol': {
      const value = symbols.get(expr.name);
      if (!value) throw new NoExpansion(`${expr.name} has no value`);
      return value;
    }
    case 'negate':
      return multiply(constant({ re: -1, im: 0 }), recurse(expr.argument));
    case 'add':
      return add(recurse(expr.left), recurse(expr.right));
    case 'subtract':
      return add(recurse(expr.left), multiply(constant({ re: -1, im: 0 }), recurse(expr.right)));
    case 'multiply':
      return multiply(recurse(expr.left), recurse(expr.right));
    case 'divide':
      return multiply(recurse(expr.left), power(recurse(expr.right), -1, depth));
    case 'power': {
      const exponent = recurse(expr.right);
      const fixed = exponent.terms.length === 0 ? 0 : exponent.terms[0];
      if (fixed === 0) return constant({ re: 1, im: 0 });
      if (exponent.terms.length === 1 && fixed.power === 0 && fixed.log === 0 && fixed.c.im === 0)
        return power(recurse(expr.left), fixed.c.re, depth);
      return exponential(multiply(exponent, logarithm(recurse(expr.left), depth)), depth);
    }
    case 'call':
      return atInfinityOfCall(expr, recurse(expr.arguments[0]), depth);
  }
}

function atInfinityOfCall(expr: Expr & { kind: 'call' }, f: Asymptotics, depth: number): Asymptotics {
  const grows = leadingPower(f) > 0 || (leadingPower(f) === 0 && f.terms[0].log > 0);
  const sign = f.terms.length ? Math.sign(f.terms[0].c.re) : 0;
  switch (expr.name) {
    case 'sqrt':
      return power(f, 0.5, depth);
    case 'exp':
      return exponential(f, depth);
    case 'log':
      return logarithm(f, depth);
    case 'cosh':
    case 'sinh': {
      const minus = expr.name === 'cosh' ? 1 : -1;
      const up = exponential(f, depth);
      const down = exponential(multiply(constant({ re: -1, im: 0 }), f), depth);
      return multiply(constant({ re: 0.5, im: 0 }), add(up, multiply(constant({ re: minus, im: 0 }), down)));
    }
    case 'abs':
      if (f.terms.some(t => t.c.im !== 0)) throw new NoExpansion('the modulus of a complex function');
      return sign < 0 ? multiply(constant({ re: -1, im: 0 }), f) : f;
    case 'step':
      return constant({ re: sign > 0 ? 1 : sign < 0 ? 0 : 0.5, im: 0 });
    case 'tanh':
    case 'erf':
      if (grows) return constant({ re: sign, im: 0 });
      return smooth(f, expr.name === 'tanh' ? x => complexFunction('tanh', x) : x => ({ re: errorFunction(x.re), im: 0 }));
    case 'atan': {
      if (!grows) return smooth(f, x => complexFunction('atan', x));
      const inverse = power(f, -1, depth);
      const odd = taylor(inverse, j => ({ re: j % 2 ? (j % 4 === 1 ? -1 : 1) / j : 0, im: 0 }), depth);
      return add(constant({ re: (sign * Math.PI) / 2, im: 0 }), odd);
    }
    default:
      if (grows || expr.arguments.length > 1) throw new NoExpansion(`${expr.name} has no expansion here`);
      return smooth(f, x => complexFunction(expr.name, x));
  }
}

/** erf by its power series; only ever asked near the origin of an expansion, |x| of order one. */
function errorFunction(x: number): number {
  let term = x;
  let sum = x;
  for (let n = 1; n < 200 && Math.abs(term) > 1e-18 * Math.abs(sum); n++) {
    term *= (-x * x) / n;
    sum += term / (2 * n + 1);
  }
  return (2 / Math.sqrt(Math.PI)) * sum;
}
