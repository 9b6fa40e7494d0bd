import { gamma } from '../special/gamma';
import type { Complex } from '../algebra/expression';
import type { TailTerm } from './kernel-shape';
import type { LocalPiece, PoleTerm } from './transform';

/** Beyond this power of r the terms of the closed form begin to cancel. */
export const HIGHEST_POWER = 8;

/**
 * Fourier transform of r^n exp(-m r) (dimension 1: |x|^n exp(-m|x|), times sign(x) if `odd`) as Σ c (q² + m²)^(-nu), times q and the
 * coefficient -i if `odd`: the base case differentiated n times by -m. Null where there is no such form.
 */
export function exponentialPiece(dimension: 1 | 2 | 3, n: number, m: number, odd: boolean): LocalPiece | null {
  const first = dimension === 1 ? 0 : -1;
  if (!Number.isInteger(n) || n < first || n > HIGHEST_POWER || !(m > 0)) return null;
  // Terms c · m^a · (q² + m²)^(-nu).
  const base =
    dimension === 3
      ? { c: 4 * Math.PI, a: 0, nu: 1 }
      : dimension === 2
        ? { c: 2 * Math.PI, a: 0, nu: 0.5 }
        : { c: 2, a: odd ? 0 : 1, nu: 1 };
  let terms = [base];
  for (let step = first; step < n; step++) {
    terms = combine(
      terms.flatMap(({ c, a, nu }) => [
        { c: -a * c, a: a - 1, nu },
        { c: 2 * nu * c, a: a + 1, nu: nu + 1 },
      ]),
    );
  }
  const poles = terms.map(({ c, a, nu }) => ({ coefficient: c * m ** a, nu }));
  const origin = n > 0 || (dimension === 1 && odd) ? 0 : n === 0 ? 1 : null;
  return polesPiece(poles, m, odd, { smooth: false, origin: origin === null ? null : { re: origin, im: 0 } });
}

/** Transform of r^power without any exponential, -dimension < power < 0: a power of q. */
export function powerPiece(dimension: 1 | 2 | 3, power: number): LocalPiece | null {
  if (!(power < 0 && power > -dimension)) return null;
  const nu = (power + dimension) / 2;
  const coefficient = (2 ** (power + dimension) * Math.PI ** (dimension / 2) * gamma(nu)) / gamma(-power / 2);
  return polesPiece([{ coefficient, nu }], 0, false, { smooth: false, origin: null });
}

/** Σ coefficient · q^odd · (q² + mass²)^(-nu). */
export function polesPiece(
  terms: readonly PoleTerm[],
  mass: number,
  odd: boolean,
  position: { smooth: boolean; origin: Complex | null },
): LocalPiece {
  const square = mass * mass;
  return {
    coefficient: odd ? { re: 0, im: -1 } : { re: 1, im: 0 },
    centre: 0,
    odd,
    value(q, out) {
      out.fill(0);
      for (const { coefficient, nu } of terms) {
        if (nu === 1) for (let j = 0; j < q.length; j++) out[j] += coefficient / (q[j] * q[j] + square);
        else if (nu === 2) for (let j = 0; j < q.length; j++) out[j] += coefficient / (q[j] * q[j] + square) ** 2;
        else for (let j = 0; j < q.length; j++) out[j] += coefficient * (q[j] * q[j] + square) ** -nu;
      }
      if (odd) for (let j = 0; j < q.length; j++) out[j] *= q[j];
    },
    family: { kind: 'poles', mass, terms },
    scale: mass,
    tail: tailOf(terms, square, odd ? 1 : 0),
    ...position,
    transfer: null,
    relativeError: 1e-14,
  };
}

function combine(terms: readonly { c: number; a: number; nu: number }[]): { c: number; a: number; nu: number }[] {
  const sums = new Map<string, { c: number; a: number; nu: number }>();
  for (const t of terms) {
    const key = `${t.a} ${t.nu}`;
    sums.set(key, { ...t, c: t.c + (sums.get(key)?.c ?? 0) });
  }
  return [...sums.values()].filter(t => t.c !== 0);
}

/** (q² + m²)^(-nu) = Σ_j binomial(-nu, j) m^(2j) q^(-2nu - 2j). */
function tailOf(terms: readonly PoleTerm[], square: number, shift: number): readonly TailTerm[] {
  const sums = new Map<number, { sum: number; size: number }>();
  const orders = square === 0 ? 1 : 8;
  for (const { coefficient, nu } of terms) {
    let factor = coefficient;
    for (let j = 0; j < orders; j++) {
      const power = shift - 2 * nu - 2 * j;
      const before = sums.get(power) ?? { sum: 0, size: 0 };
      sums.set(power, { sum: before.sum + factor, size: before.size + Math.abs(factor) });
      factor *= (-(nu + j) / (j + 1)) * square;
    }
  }
  const lowest = Math.max(...terms.map(t => shift - 2 * t.nu)) - 2 * (orders - 1);
  return [...sums]
    .filter(([power, { sum, size }]) => power >= lowest && Math.abs(sum) > 1e-12 * size)
    .sort(([x], [y]) => y - x)
    .map(([power, { sum }]) => ({ coefficient: { re: sum, im: 0 }, power, log: 0, phase: 0 }));
}
