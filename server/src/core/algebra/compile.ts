import type { Complex, Expr, FunctionName } from './expression';

/** Where the arguments of a compiled expression come from: one array per argument (equal lengths), or a number for all. */
export type Bindings = Readonly<Record<string, Float64Array | number>>;

/** Evaluates on a batch: fills re (and im) with the value at each point. Raises no error: 1/0 is Infinity or NaN, for the caller to judge. */
export type Compiled = (bindings: Bindings, re: Float64Array, im: Float64Array) => void;

/** A real special function of (order, argument) that the caller lends: the compiler knows only the elementary ones. */
export type LentFunctions = Readonly<Partial<Record<FunctionName, (...args: number[]) => number>>>;

interface Pair {
  readonly re: Float64Array;
  /** Null where the value is real. */
  readonly im: Float64Array | null;
}

type Node = (bindings: Bindings, count: number) => Pair;

const ELEMENTARY: Partial<Record<FunctionName, (x: number) => number>> = {
  exp: Math.exp,
  sin: Math.sin,
  cos: Math.cos,
  tan: Math.tan,
  atan: Math.atan,
  sinh: Math.sinh,
  cosh: Math.cosh,
  tanh: Math.tanh,
  abs: Math.abs,
  step: x => (x > 0 ? 1 : x < 0 ? 0 : 0.5),
};

/** Functions that leave the real axis outside of these intervals, where the complex branch takes over. */
const REAL_DOMAIN: Partial<Record<FunctionName, { f: (x: number) => number; inside: (x: number) => boolean }>> = {
  sqrt: { f: Math.sqrt, inside: x => x >= 0 },
  log: { f: Math.log, inside: x => x >= 0 },
  asin: { f: Math.asin, inside: x => Math.abs(x) <= 1 },
  acos: { f: Math.acos, inside: x => Math.abs(x) <= 1 },
};

/**
 * `expr` as a function of batches of its symbols. Values are real as long as no `i`, no root or logarithm of a negative number
 * occurs; complex after that (principal branches).
 */
export function compile(expr: Expr, lent: LentFunctions = {}): Compiled {
  const node = build(expr, lent);
  return (bindings, re, im) => {
    const value = node(bindings, re.length);
    re.set(value.re);
    if (value.im) im.set(value.im);
    else im.fill(0);
  };
}

function build(expr: Expr, lent: LentFunctions): Node {
  switch (expr.kind) {
    case 'number':
      return (_, n) => ({ re: new Float64Array(n).fill(expr.re), im: expr.im === 0 ? null : new Float64Array(n).fill(expr.im) });
    case 'symbol':
      return (bindings, n) => {
        const bound = bindings[expr.name];
        if (bound === undefined) throw new Error(`unbound symbol ${expr.name}`);
        return { re: typeof bound === 'number' ? new Float64Array(n).fill(bound) : bound, im: null };
      };
    case 'negate': {
      const argument = build(expr.argument, lent);
      return (b, n) => {
        const x = argument(b, n);
        return { re: x.re.map(v => -v), im: x.im && x.im.map(v => -v) };
      };
    }
    case 'call':
      return buildCall(
        expr.name,
        expr.arguments.map(a => build(a, lent)),
        lent,
      );
    case 'power':
      return buildPower(build(expr.left, lent), expr.right, lent);
    default:
      return buildArithmetic(expr.kind, build(expr.left, lent), build(expr.right, lent));
  }
}

function buildArithmetic(kind: 'add' | 'subtract' | 'multiply' | 'divide', left: Node, right: Node): Node {
  return (b, n) => {
    const x = left(b, n);
    const y = right(b, n);
    const re = new Float64Array(n);
    if (!x.im && !y.im) {
      if (kind === 'add') for (let j = 0; j < n; j++) re[j] = x.re[j] + y.re[j];
      else if (kind === 'subtract') for (let j = 0; j < n; j++) re[j] = x.re[j] - y.re[j];
      else if (kind === 'multiply') for (let j = 0; j < n; j++) re[j] = x.re[j] * y.re[j];
      else for (let j = 0; j < n; j++) re[j] = x.re[j] / y.re[j];
      return { re, im: null };
    }
    const im = new Float64Array(n);
    for (let j = 0; j < n; j++) {
      const z = complexArithmetic(kind, { re: x.re[j], im: x.im?.[j] ?? 0 }, { re: y.re[j], im: y.im?.[j] ?? 0 });
      re[j] = z.re;
      im[j] = z.im;
    }
    return { re, im };
  };
}

function buildPower(base: Node, exponent: Expr, lent: LentFunctions): Node {
  const whole =
    exponent.kind === 'number' && exponent.im === 0 && Number.isInteger(exponent.re) && Math.abs(exponent.re) <= 64 ? exponent.re : null;
  const power = build(exponent, lent);
  return (b, n) => {
    const x = base(b, n);
    const re = new Float64Array(n);
    if (!x.im && whole !== null) {
      if (whole === 2) for (let j = 0; j < n; j++) re[j] = x.re[j] * x.re[j];
      else for (let j = 0; j < n; j++) re[j] = x.re[j] ** whole;
      return { re, im: null };
    }
    const y = power(b, n);
    const realPower = !x.im && !y.im && x.re.every((v, j) => v >= 0 || Number.isInteger(y.re[j]));
    if (realPower) {
      for (let j = 0; j < n; j++) re[j] = x.re[j] ** y.re[j];
      return { re, im: null };
    }
    const im = new Float64Array(n);
    for (let j = 0; j < n; j++) {
      const z = complexPower({ re: x.re[j], im: x.im?.[j] ?? 0 }, { re: y.re[j], im: y.im?.[j] ?? 0 });
      re[j] = z.re;
      im[j] = z.im;
    }
    return { re, im };
  };
}

function buildCall(name: FunctionName, args: readonly Node[], lent: LentFunctions): Node {
  const foreign = lent[name];
  const elementary = ELEMENTARY[name];
  const restricted = REAL_DOMAIN[name];
  return (b, n) => {
    const values = args.map(a => a(b, n));
    const x = values[0];
    const re = new Float64Array(n);
    if (values.every(v => !v.im)) {
      const real = elementary ?? (restricted && x.re.every(restricted.inside) ? restricted.f : undefined);
      if (real) {
        for (let j = 0; j < n; j++) re[j] = real(x.re[j]);
        return { re, im: null };
      }
      if (foreign && !restricted) {
        for (let j = 0; j < n; j++) re[j] = foreign(...values.map(v => v.re[j]));
        return { re, im: null };
      }
    }
    const im = new Float64Array(n);
    for (let j = 0; j < n; j++) {
      const z = complexFunction(name, { re: x.re[j], im: x.im?.[j] ?? 0 });
      re[j] = z.re;
      im[j] = z.im;
    }
    return { re, im };
  };
}

/** x (kind) y for complex x, y. */
export function complexArithmetic(kind: 'add' | 'subtract' | 'multiply' | 'divide', x: Complex, y: Complex): Complex {
  switch (kind) {
    case 'add':
      return { re: x.re + y.re, im: x.im + y.im };
    case 'subtract':
      return { re: x.re - y.re, im: x.im - y.im };
    case 'multiply':
      return { re: x.re * y.re - x.im * y.im, im: x.re * y.im + x.im * y.re };
    case 'divide': {
      if (y.im === 0) return { re: x.re / y.re, im: x.im / y.re };
      const d = y.re * y.re + y.im * y.im;
      return { re: (x.re * y.re + x.im * y.im) / d, im: (x.im * y.re - x.re * y.im) / d };
    }
  }
}

/** x^y on the principal branch; whole powers by repeated multiplication. */
export function complexPower(x: Complex, y: Complex): Complex {
  if (y.im === 0 && Number.isInteger(y.re) && Math.abs(y.re) <= 64) {
    let z: Complex = { re: 1, im: 0 };
    for (let j = 0; j < Math.abs(y.re); j++) z = complexArithmetic('multiply', z, x);
    return y.re < 0 ? complexArithmetic('divide', { re: 1, im: 0 }, z) : z;
  }
  if (x.re === 0 && x.im === 0) return y.re > 0 ? { re: 0, im: 0 } : { re: Infinity, im: 0 };
  const logarithm = complexFunction('log', x);
  return complexFunction('exp', complexArithmetic('multiply', y, logarithm));
}

/** Elementary functions of a complex argument on their principal branches; NaN for those that exist for real arguments only. */
export function complexFunction(name: FunctionName, z: Complex): Complex {
  const i: Complex = { re: 0, im: 1 };
  const times = (a: Complex, b: Complex) => complexArithmetic('multiply', a, b);
  const over = (a: Complex, b: Complex) => complexArithmetic('divide', a, b);
  switch (name) {
    case 'exp': {
      const r = Math.exp(z.re);
      return z.im === 0 ? { re: r, im: 0 } : { re: r * Math.cos(z.im), im: r * Math.sin(z.im) };
    }
    case 'log':
      return { re: Math.log(Math.hypot(z.re, z.im)), im: Math.atan2(z.im, z.re) };
    case 'sqrt': {
      const r = Math.hypot(z.re, z.im);
      const re = Math.sqrt((r + z.re) / 2);
      const im = Math.sqrt((r - z.re) / 2);
      return { re, im: z.im < 0 ? -im : im };
    }
    case 'abs':
      return { re: Math.hypot(z.re, z.im), im: 0 };
    case 'sin':
      return { re: Math.sin(z.re) * Math.cosh(z.im), im: Math.cos(z.re) * Math.sinh(z.im) };
    case 'cos':
      return { re: Math.cos(z.re) * Math.cosh(z.im), im: -Math.sin(z.re) * Math.sinh(z.im) };
    case 'sinh':
      return { re: Math.sinh(z.re) * Math.cos(z.im), im: Math.cosh(z.re) * Math.sin(z.im) };
    case 'cosh':
      return { re: Math.cosh(z.re) * Math.cos(z.im), im: Math.sinh(z.re) * Math.sin(z.im) };
    case 'tan':
      return over(complexFunction('sin', z), complexFunction('cos', z));
    case 'tanh':
      return over(complexFunction('sinh', z), complexFunction('cosh', z));
    case 'asin': {
      // -i log(iz + sqrt(1 - z^2))
      const iz = times(i, z);
      const root = complexFunction('sqrt', { re: 1 - (z.re * z.re - z.im * z.im), im: -2 * z.re * z.im });
      return times({ re: 0, im: -1 }, complexFunction('log', { re: iz.re + root.re, im: iz.im + root.im }));
    }
    case 'acos': {
      const s = complexFunction('asin', z);
      return { re: Math.PI / 2 - s.re, im: -s.im };
    }
    case 'atan': {
      // (i/2) log((i + z)/(i - z))
      const w = complexFunction('log', over({ re: z.re, im: z.im + 1 }, { re: -z.re, im: 1 - z.im }));
      return times({ re: 0, im: 0.5 }, w);
    }
    default:
      return { re: NaN, im: NaN };
  }
}
