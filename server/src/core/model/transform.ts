import type { Complex, Expr } from '../algebra/expression';
import type { TailTerm } from './kernel-shape';
import type { Panels } from './transform-panels';

/**
 * One term of a local interaction in momentum space: V(q) = coefficient · exp(-i·q·centre) · v(q) with a real function v, even or
 * odd in q; q = p - k in dimension 1, |p - k| otherwise (then v is even and centre 0).
 */
export interface LocalPiece {
  readonly coefficient: Complex;
  readonly centre: number;
  readonly odd: boolean;
  /** Fills `out` with v at the points `q`. */
  value(q: Float64Array, out: Float64Array): void;
  readonly family: Family;
  /** Momentum over which v changes (distance of its nearest singularity from the real axis); 0 where v is singular at q = 0. */
  readonly scale: number;
  /** v for q → ∞; null where it is not known. Times (-1)^odd for q → -∞. */
  readonly tail: readonly TailTerm[] | null;
  readonly smooth: boolean;
  readonly origin: Complex | null;
  readonly transfer: Expr | null;
  /** Bound of the error of v, relative to its largest value. */
  readonly relativeError: number;
}

/** What a closed projection needs to know about v. */
export type Family =
  /** Σ c · m^a · q^odd · (q² + m²)^(-nu). */
  | { readonly kind: 'poles'; readonly mass: number; readonly terms: readonly PoleTerm[] }
  /** exp(-q²/(4 alpha)) Σ_j c_j q^(2j + odd). */
  | { readonly kind: 'gaussian'; readonly alpha: number; readonly coefficients: readonly number[] }
  /** Transform of step(radius - r). */
  | { readonly kind: 'well'; readonly radius: number }
  /** A potential with edges, in dimensions 2 and 3; the panels hold r V(r). */
  | { readonly kind: 'edged'; readonly panels: Panels }
  /** q^power: a delta or its derivative. */
  | { readonly kind: 'contact' }
  | { readonly kind: 'other' };

export interface PoleTerm {
  readonly coefficient: number;
  readonly nu: number;
}
