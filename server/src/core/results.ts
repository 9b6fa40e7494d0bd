import type { Complex } from './algebra/expression';

/** What the core finds out about a model. The names are those of the report, format 1. */
export interface ModelResults {
  readonly terms: readonly TermResult[];
  readonly sum: readonly SumResult[];
  readonly series: readonly ConvergenceResult[];
  readonly counterterms: readonly CountertermResult[];
  readonly couplings: readonly CouplingResult[];
  readonly observables: ObservablesResult | null;
  readonly expectations: readonly ExpectationResult[];
  /** What else the core has to say: each becomes a finding. */
  readonly remarks: readonly Remark[];
}

export interface Remark {
  readonly code: 'undecided' | 'budget' | 'cutoff-too-soft' | 'infrared-divergence' | 'not-hermitian' | 'not-evaluated' | 'value';
  readonly message: string;
  /** The monomial, interaction, counterterm or expectation it is about. */
  readonly subject: string | null;
  readonly p?: number;
}

export interface TermResult {
  readonly monomial: string;
  readonly exponents: readonly number[];
  readonly order: number;
  readonly ultraviolet: Ultraviolet;
  readonly infrared: { readonly verdict: 'converges' | 'diverges' | 'undecided' };
  readonly status: 'finite' | 'cancelled' | 'uncancelled' | null;
  readonly cancelledBy: readonly string[];
  readonly values: readonly ValueResult[];
  readonly scan?: {
    readonly p?: number;
    readonly E: number;
    readonly cutoff: readonly number[];
    readonly bare: readonly Complex[];
    readonly renormalised: readonly Complex[];
  };
}

export interface Ultraviolet {
  readonly verdict: 'diverges' | 'converges' | 'oscillates' | 'undecided';
  readonly conditional: boolean;
  readonly power: number | null;
  readonly log: number | null;
  readonly nested: boolean;
  readonly nestedIn: readonly string[];
  readonly overall: readonly OverallForm[];
  /** The symbolic and the numerical answer agree. */
  readonly confirmed: boolean;
}

export interface OverallForm {
  /** An expression of the language in p, k, E, i that can be pasted, or "of NAME". */
  readonly form: string;
  readonly power: number;
  readonly log: number;
  readonly coefficient: Complex;
  readonly uncertainty: number;
  readonly universal: boolean;
  readonly absorbedBy: string | null;
}

export interface ValueResult {
  readonly p?: number;
  readonly E: number;
  readonly bare: Complex | null;
  readonly renormalised: Complex | null;
  readonly backward?: { readonly bare: Complex; readonly renormalised: Complex };
  readonly uncertainty: number | null;
}

export interface SumResult {
  readonly p?: number;
  readonly E: number;
  readonly orders: readonly number[];
  readonly byOrder: readonly Complex[];
  readonly full?: Complex;
  readonly phaseShift?: number;
  readonly transmission?: number;
  readonly reflection?: number;
  readonly drift?: number | null;
}

export interface ConvergenceResult {
  readonly p?: number;
  readonly E: number;
  readonly largestEigenvalue: Complex | null;
  readonly converges: boolean | null;
  readonly eigenvalues: readonly Complex[];
}

export interface CountertermResult {
  readonly name: string;
  readonly cancels: readonly string[];
  readonly at: Complex | null;
  readonly cutoff?: readonly number[];
  readonly strength?: readonly Complex[];
}

export interface CouplingResult {
  readonly name: string;
  readonly value: number;
  readonly dimension: string;
  readonly running?: { readonly cutoff: readonly number[]; readonly value: readonly number[] };
}

export interface ObservablesResult {
  readonly scattering_length?: number;
  readonly effective_range?: number;
  readonly binding_energies?: readonly number[];
  readonly definition: string;
  readonly uncertainties: Readonly<Record<string, number | readonly number[]>>;
}

export interface ExpectationResult {
  /** "finite to 2", "converges at p = 50 MeV": the statement without its first word. Filled in by the language's side. */
  readonly text: string;
  readonly holds: boolean | null;
  readonly measured: string;
  readonly value?: number;
  readonly wanted?: number;
  readonly tolerance?: number;
}
