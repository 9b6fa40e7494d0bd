import type { Complex, Expr } from '../algebra/expression';

/** c p^a k^b E^e, exact. */
export interface MomentumTerm {
  readonly a: number;
  readonly b: number;
  readonly e: number;
  readonly re: number;
  readonly im: number;
}

/** coefficient · |q|^power · ln^log|q| · exp(i·phase·|q|). `phase` is a length: where an edge or a separated delta sits. */
export interface TailTerm {
  readonly coefficient: Complex;
  readonly power: number;
  readonly log: number;
  readonly phase: number;
}

/** A function V(q) of the momentum transfer, projected on the model's wave. */
export interface LocalShape {
  readonly kind: 'local';
  /**
   * V(q) for q → ∞, largest terms first, several orders of them; empty: falls faster than any power. Null: known only as `transfer`.
   */
  readonly tail: readonly TailTerm[] | null;
  /** The same for q → -∞ (dimension 1), in powers of |q|; equal to `tail` in dimensions 2 and 3. */
  readonly backwardTail: readonly TailTerm[] | null;
  /** V(q) as an expression in q, where the interaction was given so. */
  readonly transfer: Expr | null;
  /** V(r) has no odd or fractional power of r, no edge and no delta: then V(q) falls faster than any power. */
  readonly smooth: boolean;
  /** V(r = 0) where it is finite: ∫d^Dq/(2π)^D V(q). */
  readonly origin: Complex | null;
  /** Momentum over which V(q) changes: about the inverse range. 0: V(q) is singular at q = 0, as for a massless exchange. */
  readonly scale: number;
  /** A delta or its derivative: V(q) is its `tail` everywhere. */
  readonly contact: boolean;
}

/** What a kernel is in momentum space, for power counting. */
export type KernelShape =
  | { readonly kind: 'polynomial'; readonly terms: readonly MomentumTerm[] }
  | LocalShape
  /** Any other kernel in p, k (and E), with the couplings put in. Dimension 1, even and odd: already ½[V(p,k) ± V(p,-k)]. */
  | { readonly kind: 'general'; readonly expr: Expr }
  | { readonly kind: 'sum'; readonly parts: readonly KernelShape[] };
