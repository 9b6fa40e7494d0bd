import { gamma } from '../special/gamma';
import { digamma } from '../special/digamma';
import type { CutoffShape } from './spec';

/** How loops are cut: each leg of a vertex carries f(k/L), so each loop momentum f². t = k/L. */
export interface Regulator {
  readonly shape: CutoffShape;
  /** f(t), the factor of one leg. A sharp cutoff acts on intermediate momenta only: 1 here, the grid ends at L. */
  leg(t: number): number;
  /** Where f² has fallen below rounding, in units of L, for an integrand that grows as t^growth without it. */
  reach(growth: number): number;
  /** Above a quarter of the cutoff f² changes over this momentum, in units of L. */
  readonly width: number;
  /** f² = Σ c_j t^(step*j) for small t; sharp: 1. */
  taylor(j: number): number;
  readonly step: number;
  /** Finite part of ∫₀^∞ t^(s-1) f² dt, continued in s; at the poles s = -step*j the pole c_j/(s + step*j) is taken out. */
  mellin(s: number): number;
  /** s at and above which even f² leaves the integral divergent; Infinity where there is none. */
  readonly strength: number;
}

export function regulatorOf(shape: CutoffShape): Regulator {
  switch (shape.kind) {
    case 'sharp':
      return {
        shape,
        leg: () => 1,
        reach: () => 1,
        width: Infinity,
        taylor: j => (j === 0 ? 1 : 0),
        step: Infinity,
        mellin: s => (s === 0 ? 0 : 1 / s),
        strength: Infinity,
      };
    case 'gaussian': {
      const n2 = 2 * shape.n;
      return {
        shape,
        leg: t => Math.exp(-(Math.abs(t) ** n2)),
        width: 1.2 / shape.n,
        reach: growth => (20 + 2 * Math.max(0, growth)) ** (1 / n2),
        taylor: j => (-2) ** j / gamma(j + 1),
        step: n2,
        mellin: s => gaussianMellin(s, n2),
        strength: Infinity,
      };
    }
    case 'pole': {
      const n = shape.n;
      return {
        shape,
        leg: t => (1 + t * t) ** -n,
        width: Infinity,
        reach: growth => Math.min(1e12, 10 ** (16 / Math.max(1, 4 * n - growth))),
        taylor: j => binomial(-2 * n, j),
        step: 2,
        mellin: s => poleMellin(s, n),
        strength: 4 * n,
      };
    }
  }
}

/** ∫ t^(s-1) e^(-2 t^m) dt = 2^(-s/m) Γ(s/m)/m. Near s = -m*j: Γ(z) = (-1)^j/j! [1/(z+j) + ψ(j+1)]. */
function gaussianMellin(s: number, m: number): number {
  const z = s / m;
  if (!isPole(z)) return (2 ** -z * gamma(z)) / m;
  const j = Math.round(-z);
  return (((-2) ** j / gamma(j + 1)) * (digamma(j + 1) - Math.LN2)) / m;
}

/** ∫ t^(s-1) (1+t²)^(-2n) dt = Γ(s/2) Γ(2n - s/2) / (2 Γ(2n)). */
function poleMellin(s: number, n: number): number {
  const z = s / 2;
  if (!isPole(z)) return (gamma(z) * gamma(2 * n - z)) / (2 * gamma(2 * n));
  const j = Math.round(-z);
  const residue = ((-1) ** j / gamma(j + 1)) * (gamma(2 * n + j) / gamma(2 * n));
  return (residue * (digamma(j + 1) - digamma(2 * n + j))) / 2;
}

const isPole = (z: number): boolean => z < 0.5 && Math.abs(z - Math.round(z)) < 1e-12 && Math.round(z) <= 0;

function binomial(a: number, j: number): number {
  let value = 1;
  for (let i = 0; i < j; i++) value *= (a - i) / (i + 1);
  return value;
}
