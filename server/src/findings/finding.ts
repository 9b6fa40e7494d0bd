import type { Span } from '../language/document';

export type Severity = 'error' | 'warning' | 'information' | 'hint';

export type FindingCode =
  | 'syntax'
  | 'unknown-name'
  | 'dimension'
  | 'not-hermitian'
  | 'duplicate'
  | 'missing'
  | 'value'
  | 'file'
  | 'not-evaluated'
  | 'uv-divergence'
  | 'nonlocal-divergence'
  | 'cutoff-too-soft'
  | 'uv-nested'
  | 'infrared-divergence'
  | 'expectation'
  | 'undecided'
  | 'budget'
  | 'series-diverges'
  | 'cutoff-dependence'
  | 'reading';

/** A change of the text that a person can accept. */
export interface QuickFix {
  readonly title: string;
  readonly edits: readonly { readonly span: Span; readonly text: string }[];
  readonly preferred: boolean;
}

export interface Finding {
  readonly code: FindingCode;
  readonly severity: Severity;
  readonly message: string;
  readonly span: Span;
  /** Null outside any model. */
  readonly model: string | null;
  /** The monomial, name or momentum it is about. */
  readonly subject?: string;
  readonly p?: number;
  readonly related: readonly { readonly span: Span; readonly message: string }[];
  /** docs/findings.md#CODE */
  readonly docs: string;
  readonly fixes: readonly QuickFix[];
}
