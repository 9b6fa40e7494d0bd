import { gamma } from '../special/gamma';
import type { Complex } from '../algebra/expression';
import type { MomentumTerm } from './kernel-shape';
import { KernelError } from './kernel-error';
import type { Wave } from './spec';

/** coefficient · q^power projected on the wave, exactly; null where it is no polynomial in p and k (odd powers of |p - k|). */
export function projectedPower(coefficient: Complex, power: number, dimension: 1 | 2 | 3, wave: Wave): readonly MomentumTerm[] | null {
  const term = (a: number, b: number, factor: number): MomentumTerm => ({
    a,
    b,
    e: 0,
    re: coefficient.re * factor + 0,
    im: coefficient.im * factor + 0,
  });
  const terms: MomentumTerm[] = [];
  if (dimension === 1) {
    for (let b = 0; b <= power; b++) terms.push(term(power - b, b, (b % 2 === 0 ? 1 : -1) * choose(power, b)));
    return projectedTerms(terms, wave);
  }
  if (power % 2 !== 0) return null;
  // q^2j = (p² + k² - 2pk cos)^j.
  const j = power / 2;
  for (let c = 0; c <= j; c++) {
    const moment = dimension === 3 ? legendreMoment(c, angular(wave)) : fourierMoment(c, angular(wave));
    if (moment === 0) continue;
    for (let a = 0; a <= j - c; a++) {
      terms.push(term(2 * a + c, 2 * (j - c - a) + c, choose(j, c) * choose(j - c, a) * (-2) ** c * moment));
    }
  }
  return merge(terms);
}

/** Dimension 1: what the wave keeps of a polynomial in signed p and k. Other dimensions: all of it. */
export function projectedTerms(terms: readonly MomentumTerm[], wave: Wave): readonly MomentumTerm[] {
  if (wave.kind === 'full' || wave.kind === 'angular') return terms;
  if (terms.some(t => (t.a + t.b) % 2 !== 0)) throw mixedParity();
  return terms.filter(t => (t.b % 2 === 0) === (wave.kind === 'even'));
}

export function mixedParity(): KernelError {
  return new KernelError('value', 'This interaction mixes even and odd waves (V(-p,-k) is not V(p,k)); use `wave full`.');
}

export const angular = (wave: Wave): number => (wave.kind === 'angular' ? wave.number : 0);

function merge(terms: readonly MomentumTerm[]): readonly MomentumTerm[] {
  const sums = new Map<string, MomentumTerm>();
  for (const t of terms) {
    const key = `${t.a} ${t.b}`;
    const before = sums.get(key);
    sums.set(key, before ? { ...t, re: before.re + t.re, im: before.im + t.im } : t);
  }
  return [...sums.values()].filter(t => t.re !== 0 || t.im !== 0);
}

/** ½∫x^c P_l(x) dx over [-1, 1]. */
function legendreMoment(c: number, l: number): number {
  if (c < l || (c - l) % 2 !== 0) return 0;
  let value = 1;
  for (let n = 1; n <= c; n++) value *= n;
  for (let n = c + l + 1; n > 1; n -= 2) value /= n;
  for (let n = (c - l) / 2; n >= 1; n--) value /= 2 * n;
  return value;
}

/** (1/2π)∫cos^c(φ) cos(mφ) dφ. */
function fourierMoment(c: number, m: number): number {
  const size = Math.abs(m);
  return c < size || (c - size) % 2 !== 0 ? 0 : choose(c, (c - size) / 2) / 2 ** c;
}

const choose = (n: number, k: number): number => Math.round(gamma(n + 1) / (gamma(k + 1) * gamma(n - k + 1)));
