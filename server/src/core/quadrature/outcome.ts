/** What became of an integral, with its evidence. */
export interface Outcome {
  readonly status: 'converged' | 'budgetExhausted' | 'divergent' | 'nonFinite' | 'cancelled';
  /** Best value so far; NaN where the status is nonFinite. */
  readonly value: number;
  /** Bound of the absolute error of `value`, as the rule estimates it. */
  readonly errorEstimate: number;
  /** ∫|f|: digits are lost where it is much larger than |value|. */
  readonly absIntegral: number;
  readonly evaluations: number;
}

export interface Limits {
  /** Wanted error relative to |value|; 1e-10 unless given. */
  readonly relative?: number;
  /** Wanted absolute error; 0 unless given. Either of the two is enough. */
  readonly absolute?: number;
  /** Most evaluations of the integrand; 100,000 unless given. */
  readonly budget?: number;
  readonly shouldStop?: () => boolean;
}
