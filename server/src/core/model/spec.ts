import type { Expr } from '../algebra/expression';

/**
 * A model as physics sees it: names resolved, dimensions checked, every number in the model's own units
 * (hbar = 1; momenta 1/length, energies, mu = mass/hbar^2 in 1/(energy*length^2)). No positions, no text.
 */
export interface ModelSpec {
  readonly name: string;
  readonly dimension: 1 | 2 | 3;
  readonly wave: Wave;
  readonly units: { readonly energy: string; readonly length: string } | null;
  /** Reduced mass over hbar^2. NaN only where `kinetic` is given and nothing uses it. */
  readonly mu: number;
  /** Masses as mc^2 in the model's energy unit, A then B; null for `mass reduced` or natural units. */
  readonly masses: readonly [number, number] | null;
  /** Kinetic energy of the relative motion in `k`; null means k^2/(2*mu). */
  readonly kinetic: Expr | null;
  readonly couplings: readonly CouplingSpec[];
  readonly interactions: readonly InteractionSpec[];
  readonly cutoff: CutoffSpec;
  readonly series: SeriesSpec;
  readonly counterterms: readonly CountertermSpec[];
  readonly expectations: readonly ExpectationSpec[];
}

export type Wave =
  | { readonly kind: 'full' | 'even' | 'odd' }
  /** m in dimension 2, l in dimension 3. */
  | { readonly kind: 'angular'; readonly number: number };

export interface CouplingSpec {
  readonly name: string;
  readonly value: number;
  /** In words, as the report gives it: "1", "MeV*fm^3". */
  readonly dimension: string;
}

/** What a kernel is a function of. */
export type KernelArguments = 'pk' | 'pkE' | 'q' | 'x' | 'r';

export interface InteractionSpec {
  readonly name: string;
  readonly arguments: KernelArguments;
  /** In the arguments and the names of couplings; constants are already numbers. */
  readonly kernel: Expr;
  /** Place in the power counting, >= 1. */
  readonly order: number;
}

export type CutoffShape = { readonly kind: 'sharp' } | { readonly kind: 'gaussian' | 'pole'; readonly n: number };

export interface CutoffSpec {
  readonly name: string;
  readonly value: number;
  readonly shape: CutoffShape;
  /** False where it comes from the settings or the command line. */
  readonly declared: boolean;
  readonly scan: { readonly from: number; readonly to: number; readonly points: number } | null;
}

export interface SeriesSpec {
  readonly order: number;
  readonly declared: boolean;
  /** On-shell momenta asked for; an energy asked for directly (`at E`) may lie below threshold, then `p` is null. */
  readonly points: readonly { readonly p: number | null; readonly E: number | null }[];
}

/** Exponent of each interaction, in the order of declaration: [0, 2] is twist^2 of (bump, twist). */
export type Monomial = readonly number[];

export interface CountertermSpec {
  readonly name: string;
  /** A form of its own, or the kernel of the interaction `of`. */
  readonly form: { readonly arguments: 'pk' | 'pkE'; readonly expr: Expr } | { readonly of: string };
  readonly cancels: readonly Monomial[];
  readonly scheme: { readonly kind: 'minimal'; readonly at: number } | { readonly kind: 'p' | 'kappa'; readonly at: number };
}

export type Observable =
  | 'scattering_length'
  | 'effective_range'
  | 'binding_energy'
  | 'phase_shift'
  | 'amplitude'
  | 'transmission'
  | 'reflection'
  | 'cross_section';

export type ExpectationSpec =
  | { readonly kind: 'finite'; readonly to: number | null }
  | { readonly kind: 'converges'; readonly point: SeriesSpec['points'][number] }
  | { readonly kind: 'drift'; readonly percent: number; readonly point: SeriesSpec['points'][number] }
  | {
      readonly kind: 'observable';
      readonly observable: Observable;
      readonly value: number;
      /** Absolute tolerance, in the observable's unit. */
      readonly tolerance: number;
      readonly point: SeriesSpec['points'][number] | null;
    };
