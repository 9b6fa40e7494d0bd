import { atInfinity } from '../algebra/at-infinity';
import type { AsymptoticTerm, Asymptotics } from '../algebra/at-infinity';
import { binary, call, number } from '../algebra/expression';
import type { Complex, Expr } from '../algebra/expression';
import { gamma } from '../special/gamma';
import type { TailTerm } from './kernel-shape';

/** Orders kept of a potential's expansion about a point. */
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
  return atInfinity(byExponentials(expr), new Map([[variable, position]]), DEPTH)
    .terms.filter(t => t.power >= -DEPTH)
    .map(t => ({ power: -t.power + 0, log: t.log, c: t.log % 2 === 0 ? t.c : { re: -t.c.re, im: -t.c.im } }));
}

/** V(q) for q → ∞, by falling power. Throws NoExpansion where it oscillates or grows like an exponential. */
export function expandTransfer(expr: Expr): Asymptotics['terms'] {
  return atInfinity(expr, new Map([['q', { terms: [{ power: 1, log: 0, c: { re: 1, im: 0 } }], truncated: -Infinity }]]), DEPTH).terms;
}

/** Circular and hyperbolic functions through the exponential, whose expansion is known to every order. */
function byExponentials(expr: Expr): Expr {
  if (expr.kind === 'number' || expr.kind === 'symbol') return expr;
  if (expr.kind === 'negate') return { ...expr, argument: byExponentials(expr.argument) };
  if (expr.kind !== 'call') return binary(expr.kind, byExponentials(expr.left), byExponentials(expr.right));
  const args = expr.arguments.map(byExponentials);
  const exponential = (factor: Complex) => call('exp', [binary('multiply', number(factor.re, factor.im), args[0])]);
  const half = (unit: Complex, kind: 'add' | 'subtract', front: Complex) =>
    binary('multiply', number(front.re, front.im), binary(kind, exponential(unit), exponential({ re: -unit.re, im: -unit.im })));
  const i = { re: 0, im: 1 };
  const one = { re: 1, im: 0 };
  const cos = () => half(i, 'add', { re: 0.5, im: 0 });
  const sin = () => half(i, 'subtract', { re: 0, im: -0.5 });
  const cosh = () => half(one, 'add', { re: 0.5, im: 0 });
  const sinh = () => half(one, 'subtract', { re: 0.5, im: 0 });
  switch (expr.name) {
    case 'cos':
      return cos();
    case 'sin':
      return sin();
    case 'tan':
      return binary('divide', sin(), cos());
    case 'cosh':
      return cosh();
    case 'sinh':
      return sinh();
    case 'tanh':
      return binary('divide', sinh(), cosh());
    default:
      return { ...expr, arguments: args };
  }
}

/**
 * Terms of an integral transform for q → ∞ from f ~ Σ c r^s ln^β r at the origin (β ≤ 1), where r^s becomes front(s) q^(-s-shift); a
 * logarithm is the derivative by s.
 */
export function originTail(terms: readonly LocalTerm[], front: (s: number) => number, shift: number, part: 're' | 'im'): readonly TailTerm[] {
  const tail: TailTerm[] = [];
  const push = (coefficient: number, power: number, log: number) => {
    if (coefficient !== 0) tail.push({ coefficient: { re: coefficient, im: 0 }, power, log, phase: 0 });
  };
  for (const { power: s, log, c } of terms) {
    if (log === 0) push(c[part] * front(s), -s - shift, 0);
    else if (log === 1) {
      const h = 1e-3;
      const slope = (8 * (front(s + h) - front(s - h)) - (front(s + 2 * h) - front(s - 2 * h))) / (12 * h);
      push(c[part] * slope, -s - shift, 0);
      push(-c[part] * front(s), -s - shift, 1);
    }
  }
  return tail;
}

/**
 * The constant in the transform of r^s, exactly 0 where it vanishes (and its neighbourhood smooth). `cosine`, `sine`: ∫_0^∞ r^s trig(qr) dr =
 * Γ(s+1) trig(π(s+1)/2) q^(-s-1). `plane`: 2π∫_0^∞ r^(s+1) J_0(qr) dr = 2^(s+2) π Γ(s/2+1)/Γ(-s/2) q^(-s-2).
 */
export const FRONTS: Readonly<Record<'cosine' | 'sine' | 'plane', (s: number) => number>> = {
  cosine: s => gamma(s + 1) * quarterTurns(s + 1),
  sine: s => gamma(s + 1) * quarterTurns(s),
  plane: s => (s >= 0 && s % 2 === 0 ? 0 : (2 ** (s + 2) * Math.PI * gamma(s / 2 + 1)) / gamma(-s / 2)),
};

/** cos(πx/2). */
function quarterTurns(x: number): number {
  return Number.isInteger(x) ? [1, 0, -1, 0][((x % 4) + 4) % 4] : Math.cos((Math.PI * x) / 2);
}

/** One term of exp(iqR) Σ z q^power. */
export interface EdgeTerm {
  readonly z: Complex;
  readonly power: number;
}

/** What an edge at r = R adds to ∫f exp(iqr) dr: exp(iqR) Σ n! J_n (i/q)^(n+1), J_n the jumps of the Taylor coefficients of f. */
export function edgeSeries(above: readonly LocalTerm[], below: readonly LocalTerm[], part: 're' | 'im'): readonly EdgeTerm[] {
  const series: EdgeTerm[] = [];
  for (let n = 0; n < 10; n++) {
    const taylor = (terms: readonly LocalTerm[]) => terms.find(t => t.power === n && t.log === 0)?.c[part] ?? 0;
    // Below the edge the distance is R - r, so odd coefficients change sign.
    const up = taylor(above);
    const down = taylor(below) * (n % 2 === 0 ? 1 : -1);
    const jump = up - down;
    if (Math.abs(jump) > 1e-12 * (Math.abs(up) + Math.abs(down))) series.push({ z: timesPowerOfI(gamma(n + 1) * jump, n + 1), power: -n - 1 });
  }
  return series;
}

/** Re [z exp(iqR)] q^power as a pair of oscillating terms. */
export function realPart({ z, power }: EdgeTerm, at: number): readonly TailTerm[] {
  const half = { re: z.re / 2, im: z.im / 2 };
  return [
    { coefficient: half, power, log: 0, phase: at },
    { coefficient: { re: half.re, im: -half.im }, power, log: 0, phase: -at },
  ];
}

/** x i^n. */
export function timesPowerOfI(x: number, n: number): Complex {
  return { re: [1, 0, -1, 0][n % 4] * x + 0, im: [0, 1, 0, -1][n % 4] * x + 0 };
}

/** Σ coefficient q^power ln^log(q) exp(iq phase), which must come out real, q > 0. Stops where an asymptotic series turns. */
export function tailValue(tail: readonly TailTerm[], q: number): number {
  let sum = 0;
  for (const { coefficient: c, power, log, phase } of tail) {
    const size = q ** power * (log === 0 ? 1 : Math.log(q) ** log);
    sum += size * (phase === 0 ? c.re : c.re * Math.cos(q * phase) - c.im * Math.sin(q * phase));
  }
  return sum;
}

/** Terms of equal form added up, largest first; what cancels is gone. */
export function mergeTail(terms: readonly TailTerm[]): readonly TailTerm[] {
  const sums = new Map<string, TailTerm & { readonly size: number }>();
  for (const t of terms) {
    const key = `${t.power} ${t.log} ${t.phase}`;
    const before = sums.get(key);
    const { re, im } = t.coefficient;
    const coefficient = { re: re + (before?.coefficient.re ?? 0), im: im + (before?.coefficient.im ?? 0) };
    sums.set(key, { ...t, coefficient, size: Math.hypot(re, im) + (before?.size ?? 0) });
  }
  return [...sums.values()]
    .filter(t => Math.hypot(t.coefficient.re, t.coefficient.im) > 1e-13 * t.size)
    .sort((x, y) => y.power - x.power || y.log - x.log)
    .map(({ coefficient, power, log, phase }) => ({ coefficient, power, log, phase }));
}
