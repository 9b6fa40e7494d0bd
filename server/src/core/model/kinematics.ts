import { atInfinity, NoExpansion } from '../algebra/at-infinity';
import { compile } from '../algebra/compile';
import type { Expr } from '../algebra/expression';
import type { ModelSpec } from './spec';

/** One solution p of kinetic(p) = E: where the propagator has its pole. */
export interface OnShellRoot {
  /** Momentum; signed in dimension 1 with the full wave. */
  readonly p: number;
  /** dE/dk there. */
  readonly slope: number;
}

/**
 * Kinematics of the relative motion. Loop measure: norm * ∫ |k|^(D-1) dk over (0, ∞), or over (-∞, ∞) in dimension 1 with the full wave;
 * norm = 1/2π (dimension 1 full, dimension 2), 1/π (even, odd), 1/2π² (dimension 3).
 */
export interface Kinematics {
  readonly dimension: 1 | 2 | 3;
  /** Loop momenta run over both signs. */
  readonly signed: boolean;
  readonly norm: number;
  /** Kinetic energy at each k. */
  energies(k: Float64Array): Float64Array;
  energy(k: number): number;
  slope(k: number): number;
  /** All roots of kinetic(p) = E, by growing momentum. */
  roots(E: number): OnShellRoot[];
  /** Lowest kinetic energy; -Infinity where there is none. */
  readonly threshold: number;
  /** coefficient and exponent where kinetic(k) = c*k^g exactly (both signs alike); null otherwise. */
  readonly purePower: { readonly coefficient: number; readonly exponent: number } | null;
  /** kinetic(k) ~ Σ c k^power for k -> sign * infinity, in |k|. Throws `NoExpansion`. */
  expansion(sign: 1 | -1, depth: number): { readonly power: number; readonly c: number }[];
}

export function kinematicsOf(spec: Pick<ModelSpec, 'dimension' | 'wave' | 'mu' | 'kinetic'>): Kinematics {
  const signed = spec.dimension === 1 && spec.wave.kind === 'full';
  const norm = spec.dimension === 3 ? 1 / (2 * Math.PI ** 2) : spec.dimension === 2 || signed ? 1 / (2 * Math.PI) : 1 / Math.PI;
  const shared = { dimension: spec.dimension, signed, norm };
  if (!spec.kinetic) return { ...shared, ...quadraticMotion(spec.mu, signed) };
  return { ...shared, ...generalMotion(spec.kinetic, signed) };
}

type Motion = Omit<Kinematics, 'dimension' | 'signed' | 'norm'>;

function quadraticMotion(mu: number, signed: boolean): Motion {
  const energy = (k: number) => (k * k) / (2 * mu);
  return {
    energy,
    energies: k => k.map(energy),
    slope: k => k / mu,
    roots: E => {
      if (!(E > 0)) return [];
      const p = Math.sqrt(2 * mu * E);
      return signed
        ? [
            { p: -p, slope: -p / mu },
            { p, slope: p / mu },
          ]
        : [{ p, slope: p / mu }];
    },
    threshold: 0,
    purePower: { coefficient: 1 / (2 * mu), exponent: 2 },
    expansion: () => [{ power: 2, c: 1 / (2 * mu) }],
  };
}

/** Where roots of a general kinetic energy are looked for: momenta from 1e-9 to 1e9 of the model's unit, 40 a decade. */
const LADDER = Array.from({ length: 721 }, (_, j) => 10 ** (-9 + j / 40));

function generalMotion(kinetic: Expr, signed: boolean): Motion {
  const compiled = compile(kinetic);
  const energies = (k: Float64Array): Float64Array => {
    const re = new Float64Array(k.length);
    compiled({ k }, re, new Float64Array(k.length));
    return re;
  };
  const energy = (k: number) => energies(Float64Array.of(k))[0];
  const slope = (k: number) => {
    const h = 1e-4 * Math.abs(k) || 1e-9;
    const [a, b, c, d] = energies(Float64Array.of(k - 2 * h, k - h, k + h, k + 2 * h));
    return (a - 8 * b + 8 * c - d) / (12 * h);
  };
  const ladder = signed ? [...LADDER.map(k => -k).reverse(), 0, ...LADDER] : [0, ...LADDER];
  const values = energies(Float64Array.from(ladder));
  const expansion = (sign: 1 | -1, depth: number) => {
    const series = atInfinity(
      kinetic,
      new Map([['k', { terms: [{ power: 1, log: 0, c: { re: sign, im: 0 } }], truncated: -Infinity }]]),
      depth,
    );
    if (series.terms.some(t => t.log !== 0 || t.c.im !== 0)) throw new NoExpansion('the kinetic energy is not a series in powers of k');
    return series.terms.map(t => ({ power: t.power, c: t.c.re }));
  };
  return {
    energies,
    energy,
    slope,
    roots: E => rootsBetween(ladder, values, energy, E).map(p => ({ p, slope: slope(p) })),
    threshold: thresholdOf(values),
    purePower: purePowerOf(expansion, energy, signed),
    expansion,
  };
}

function rootsBetween(ladder: readonly number[], values: Float64Array, energy: (k: number) => number, E: number): number[] {
  const found: number[] = [];
  for (let j = 0; j + 1 < ladder.length; j++) {
    let [low, high] = [ladder[j], ladder[j + 1]];
    const below = values[j] < E;
    if (below === values[j + 1] < E || !Number.isFinite(values[j]) || !Number.isFinite(values[j + 1])) continue;
    for (let n = 0; n < 200 && high - low > 4e-16 * Math.abs(high); n++) {
      const middle = (low + high) / 2;
      if (energy(middle) < E === below) low = middle;
      else high = middle;
    }
    if (low !== 0 || high > 1e-9) found.push((low + high) / 2);
  }
  return found;
}

/** The least value on the ladder, unless the energy still falls at one of its ends. */
function thresholdOf(values: Float64Array): number {
  let least = 0;
  for (let j = 1; j < values.length; j++) if (values[j] < values[least]) least = j;
  const fallsForever =
    (least === 0 && values[1] > values[0] && values[0] < -1e3 * Math.abs(values[values.length >> 1] || 1)) || least === values.length - 1;
  return fallsForever ? -Infinity : values[least];
}

function purePowerOf(expansion: Motion['expansion'], energy: (k: number) => number, signed: boolean): Motion['purePower'] {
  try {
    const [leading, ...rest] = expansion(1, 6);
    if (!leading || rest.length > 0 || !(leading.c > 0)) return null;
    const exact = [0.37, 1.9, 23].every(k => {
      const expected = leading.c * k ** leading.power;
      return Math.abs(energy(k) - expected) < 1e-12 * expected && (!signed || Math.abs(energy(-k) - expected) < 1e-12 * expected);
    });
    return exact ? { coefficient: leading.c, exponent: leading.power } : null;
  } catch (error) {
    if (error instanceof NoExpansion) return null;
    throw error;
  }
}
