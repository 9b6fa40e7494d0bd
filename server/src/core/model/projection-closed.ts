import { legendreQAbove } from '../special/legendre-q';
import { scaledModifiedSphericalBessel } from '../special/modified-spherical-bessel';
import type { LocalPiece, PoleTerm } from './transform';
import { planeProjection } from './projection-plane';
import { positionProjection } from './projection-position';
import { wellProjection } from './projection-well';

/** Adds the projection of v on a wave, at points p, k >= 0, to `out`. */
export type Projection = (p: Float64Array, k: Float64Array, out: Float64Array) => void;

/** ½∫P_l(x) v dx (dimension 2: the mean of cos(mφ) v) by other means than a rule over angles, without cancellation at p ≈ k; null where there are none. */
export function specialProjection(piece: LocalPiece, dimension: 2 | 3, l: number): Projection | null {
  const { family } = piece;
  if (family.kind === 'well') return wellProjection(dimension, l, family.radius);
  if (family.kind === 'edged') return positionProjection(family.panels, dimension, l);
  if (dimension === 2) return planeProjection(piece, l);
  if (family.kind === 'gaussian' && family.coefficients.length === 1) return gaussian(family.coefficients[0], family.alpha, l);
  if (family.kind !== 'poles') return null;
  const square = family.mass ** 2;
  if (l > 0 && family.terms.some(t => t.nu !== 1 && t.nu !== 2)) return null;
  const projections = family.terms.map(t => (l > 0 ? polesAnyWave(t, square, l) : poles(t, square)));
  return (p, k, out) => projections.forEach(add => add(p, k, out));
}

/** Dimension 1, even (sign 1) and odd (-1): ½[v(p-k) + sign·v(p+k)] without cancellation. */
export function closedParity(piece: LocalPiece, sign: 1 | -1): Projection | null {
  const { family } = piece;
  if (piece.centre !== 0 || piece.odd) return null;
  if (family.kind === 'gaussian' && family.coefficients.length === 1) {
    const beta = 1 / (4 * family.alpha);
    const front = 0.5 * family.coefficients[0];
    return (p, k, out) => {
      for (let j = 0; j < p.length; j++) {
        const peak = front * Math.exp(-beta * (p[j] - k[j]) ** 2);
        out[j] += peak * (sign > 0 ? 1 + Math.exp(-4 * beta * p[j] * k[j]) : -Math.expm1(-4 * beta * p[j] * k[j]));
      }
    };
  }
  if (family.kind !== 'poles') return null;
  const square = family.mass ** 2;
  return (p, k, out) => {
    for (const { coefficient, nu } of family.terms) {
      for (let j = 0; j < p.length; j++) {
        const near = (p[j] - k[j]) ** 2 + square;
        const ratio = -nu * Math.log1p((4 * p[j] * k[j]) / near);
        out[j] += 0.5 * coefficient * near ** -nu * (sign > 0 ? 1 + Math.exp(ratio) : -Math.expm1(ratio));
      }
    }
  };
}

/** exp(-(p-k)²/4α) exp(-z) i_l(z), z = pk/2α. */
function gaussian(coefficient: number, alpha: number, l: number): Projection {
  return (p, k, out) => {
    for (let j = 0; j < p.length; j++) {
      const z = (p[j] * k[j]) / (2 * alpha);
      const difference = p[j] - k[j];
      out[j] += coefficient * Math.exp((-difference * difference) / (4 * alpha)) * scaledModifiedSphericalBessel(l, z);
    }
  };
}

/** l = 0, u = (p-k)² + m², w = (p+k)² + m²: (w^(1-ν) - u^(1-ν)) / ((1-ν)(w-u)), for ν = 1 ln(w/u)/(w-u). */
function poles({ coefficient, nu }: PoleTerm, square: number): Projection {
  if (nu === 1) {
    return (p, k, out) => {
      for (let j = 0; j < p.length; j++) {
        const difference = p[j] - k[j];
        const u = difference * difference + square;
        const width = 4 * p[j] * k[j];
        // The logarithm of 1 + tiny is not worth its time.
        out[j] += width < 1e-16 * u ? coefficient / u : (coefficient * Math.log1p(width / u)) / width;
      }
    };
  }
  if (nu === 2) {
    return (p, k, out) => {
      for (let j = 0; j < p.length; j++) {
        const difference = p[j] - k[j];
        const u = difference * difference + square;
        out[j] += coefficient / (u * (u + 4 * p[j] * k[j]));
      }
    };
  }
  const rest = 1 - nu;
  return (p, k, out) => {
    for (let j = 0; j < p.length; j++) {
      const u = (p[j] - k[j]) ** 2 + square;
      const width = 4 * p[j] * k[j];
      if (width < 1e-16 * u) out[j] += coefficient * u ** -nu;
      else if (u === 0) out[j] += rest > 0 ? (coefficient * width ** rest) / (rest * width) : Infinity;
      else out[j] += (coefficient * u ** rest * Math.expm1(rest * Math.log1p(width / u))) / (rest * width);
    }
  };
}

/** Any l, ν = 1: Q_l(z)/2pk, z = 1 + u/2pk; ν = 2: -Q_l'(z)/(2pk)², with Q_l' from Q_l and Q_(l+1), which does not cancel at large z. */
function polesAnyWave({ coefficient, nu }: PoleTerm, square: number, l: number): Projection {
  return (p, k, out) => {
    for (let j = 0; j < p.length; j++) {
      const twice = 2 * p[j] * k[j];
      if (twice === 0) continue;
      const t = ((p[j] - k[j]) ** 2 + square) / twice;
      if (nu === 1) out[j] += (coefficient * legendreQAbove(l, t)) / twice;
      else {
        const slope = ((l + 1) * ((1 + t) * legendreQAbove(l, t) - legendreQAbove(l + 1, t))) / (t * (t + 2));
        out[j] += (coefficient * slope) / (twice * twice);
      }
    }
  };
}
