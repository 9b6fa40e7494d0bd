import type { ModelSpec } from '../core/model/spec';
import type { ModelResults, TermResult } from '../core/results';
import type { ModelInText, Problem, ProblemCode } from '../language/document';
import type { CheckedModel } from '../session/checked';
import type { Finding, FindingCode, QuickFix } from './finding';

/** What a rule looks at: one model, or what stands outside every model (`model` null). */
export interface Scope {
  readonly text: string;
  readonly problems: readonly Problem[];
  readonly model: CheckedModel | null;
}

/** A finding before the table adds its code, model and page. */
export type Draft = Pick<Finding, 'severity' | 'message' | 'span' | 'subject' | 'p'> & Partial<Pick<Finding, 'related' | 'fixes'>>;

/** One kind of finding: its code, and when and how it is raised. */
export interface FindingRule {
  readonly code: FindingCode;
  readonly raise: (scope: Scope) => Draft[];
}

/** A model that could be evaluated, with what is known about it so far. */
export interface Evaluated {
  readonly text: string;
  readonly source: ModelInText;
  readonly spec: ModelSpec;
  readonly results: ModelResults;
  /** False while only the verdicts of power counting are there. */
  readonly complete: boolean;
}

/** The model as a rule about results needs it; null where the text could not be evaluated. */
export function evaluated(text: string, model: CheckedModel | null): Evaluated | null {
  if (!model?.source.spec || !model.results) return null;
  return { text, source: model.source, spec: model.source.spec, results: model.results, complete: model.stage === 'complete' };
}

/** The term of this monomial, if the series has it. */
export const termOf = (model: Evaluated, monomial: string | null): TermResult | undefined =>
  model.results.terms.find(term => term.monomial === monomial);

/** Lifts a rule about results to one about a scope. */
export const onResults =
  (raise: (model: Evaluated) => Draft[]) =>
  (scope: Scope): Draft[] => {
    const model = evaluated(scope.text, scope.model);
    return model ? raise(model) : [];
  };

/** The problems of the text that carry `code`, as drafts; a certain replacement becomes the preferred quick fix. */
export const fromText =
  (code: ProblemCode) =>
  (scope: Scope): Draft[] =>
    scope.problems.filter(problem => problem.code === code).map(draftOf);

function draftOf({ severity, message, span, subject, related, mend }: Problem): Draft {
  const fixes: QuickFix[] = mend ? [{ title: mend.title, edits: [{ span: mend.span, text: mend.text }], preferred: true }] : [];
  return { severity, message, span, fixes, ...(related && { related }), ...(subject !== undefined && { subject }) };
}
