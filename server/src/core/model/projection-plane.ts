import { ellipticIntegrals } from '../special/elliptic';
import { scaledModifiedBessel } from '../special/modified-bessel';
import type { Projection } from './projection-closed';
import type { LocalPiece, PoleTerm } from './transform';

/** (1/π)∫cos(mφ) v dφ over [0, π] in closed form: a Gaussian on any wave, poles on m = 0; null for anything else. */
export function planeProjection({ family }: LocalPiece, m: number): Projection | null {
  if (family.kind === 'gaussian' && family.coefficients.length === 1) return gaussian(family.coefficients[0], family.alpha, m);
  if (family.kind !== 'poles' || m !== 0) return null;
  const { mass, terms } = family;
  const projections = terms.map(term => poles(term, mass * mass));
  if (projections.some(add => add === null)) return null;
  return (p, k, out) => projections.forEach(add => add!(p, k, out));
}

/** exp(-(p-k)²/4α) exp(-z) I_m(z), z = pk/2α. */
function gaussian(coefficient: number, alpha: number, m: number): Projection {
  return (p, k, out) => {
    for (let j = 0; j < p.length; j++) {
      const peak = Math.exp(-((p[j] - k[j]) ** 2) / (4 * alpha));
      if (peak > 0) out[j] += coefficient * peak * scaledModifiedBessel(m, (p[j] * k[j]) / (2 * alpha));
    }
  };
}

/** The mean over angles of (q² + m²)^(-ν), u = (p-k)² + m², w = (p+k)² + m²: (2/π)K/√w for ν = ½, 1/√(uw) for 1, (2/π)E/(u√w) for 3/2. */
function poles({ coefficient, nu }: PoleTerm, square: number): Projection | null {
  const mean = MEANS.get(nu);
  if (!mean) return null;
  return (p, k, out) => {
    for (let j = 0; j < p.length; j++) {
      const u = Math.sqrt((p[j] - k[j]) ** 2 + square);
      const w = Math.sqrt((p[j] + k[j]) ** 2 + square);
      out[j] += coefficient * (u === 0 ? Infinity : mean(u, w));
    }
  };
}

/** By ν, of the roots of u and w. */
const MEANS: ReadonlyMap<number, (u: number, w: number) => number> = new Map([
  [0.5, (u, w) => (2 / Math.PI) * ellipticIntegrals(w, u).first],
  [1, (u, w) => 1 / (u * w)],
  [1.5, (u, w) => ((2 / Math.PI) * ellipticIntegrals(w, u).second) / (u * u * w * w)],
]);
