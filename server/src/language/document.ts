import type { ModelSpec } from '../core/model/spec';

/** Half-open, in UTF-16 units from the start of the text. */
export interface Span {
  readonly start: number;
  readonly end: number;
}

export type ProblemCode =
  'syntax' | 'unknown-name' | 'dimension' | 'duplicate' | 'missing' | 'value' | 'file' | 'not-evaluated' | 'not-hermitian' | 'reading';

/** A mistake in the text (or a hint about how it was read). One a mistake, at its place; says what is wrong and what to do. */
export interface Problem {
  readonly code: ProblemCode;
  readonly severity: 'error' | 'hint';
  readonly message: string;
  readonly span: Span;
  /** What it is about: a name. */
  readonly subject?: string;
  readonly related?: readonly { readonly span: Span; readonly message: string }[];
  /** A replacement that mends it, where one is certain. */
  readonly mend?: { readonly title: string; readonly span: Span; readonly text: string };
}

/** Where each thing of a model stands; the arrays run parallel to those of the spec. */
export interface Places {
  /** From `model` to `}`. */
  readonly model: Span;
  readonly name: Span;
  /** Just before the closing brace, where a statement can be added. */
  readonly insertAt: number;
  readonly couplings: readonly NamedPlace[];
  readonly interactions: readonly NamedPlace[];
  readonly counterterms: readonly NamedPlace[];
  readonly cutoff: NamedPlace | null;
  readonly series: { readonly statement: Span; readonly keyword: Span } | null;
  readonly expectations: readonly { readonly statement: Span; /** the text after `expect` */ readonly text: string }[];
}

export interface NamedPlace {
  readonly statement: Span;
  readonly name: Span;
}

export interface ModelInText {
  readonly name: string;
  readonly places: Places;
  /** Problems inside this model. */
  readonly problems: readonly Problem[];
  /** Null where an error keeps the model from being evaluated. */
  readonly spec: ModelSpec | null;
}

export interface SourceDocument {
  readonly text: string;
  /** Problems outside any model. */
  readonly problems: readonly Problem[];
  readonly models: readonly ModelInText[];
}

/** The highest order that may be asked for: above it the monomials are more than a person can read. */
export const highestOrder = 12;

/** What a model that declares no cutoff or series gets (from the settings); momenta in the model's unit. */
export interface Defaults {
  readonly cutoff: number;
  readonly order: number;
}

/** What the command line sets over the files; null: nothing. A momentum here is in each model's own unit. */
export interface Overrides {
  readonly cutoff: number | null;
  readonly order: number | null;
}
