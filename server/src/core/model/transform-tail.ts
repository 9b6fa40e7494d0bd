import type { Complex } from '../algebra/expression';
import { gamma } from '../special/gamma';
import type { LocalTerm } from './expand-at';
import type { TailTerm } from './kernel-shape';

/**
 * Terms of an integral transform for q → ∞ from f ~ Σ c r^s ln^β r at the origin (β ≤ 1), where r^s becomes front(s) q^(-s-shift); a
 * logarithm is the derivative by s.
 */
export function originTail(
  terms: readonly LocalTerm[],
  front: (s: number) => number,
  shift: number,
  part: 're' | 'im',
): readonly TailTerm[] {
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
    if (Math.abs(jump) > 1e-12 * (Math.abs(up) + Math.abs(down)))
      series.push({ z: timesPowerOfI(gamma(n + 1) * jump, n + 1), power: -n - 1 });
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
