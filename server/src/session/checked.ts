import type { ModelResults } from '../core/results';
import type { ModelInText, SourceDocument } from '../language/document';

/** A model with what has been found out about it so far. */
export interface CheckedModel {
  readonly source: ModelInText;
  /** Null where the text cannot be evaluated. */
  readonly results: ModelResults | null;
  /** Verdicts by power counting come first, numbers and their confirmation follow. */
  readonly stage: 'text' | 'symbolic' | 'complete';
}

export interface CheckedDocument {
  readonly document: SourceDocument;
  readonly models: readonly CheckedModel[];
}
