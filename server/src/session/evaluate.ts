import { Cancelled, analyse } from '../core/analysis';
import type { ModelSpec } from '../core/model/spec';
import type { ModelResults } from '../core/results';

export interface CompleteHooks {
  /** Polled often; the check ends with a `Cancelled` soon after it returns true. */
  shouldStop(): boolean;
  /** Evaluations of kernels that one model may cost. */
  readonly budget: number;
  /** Also the non-perturbative solution of models in which nothing asks for it. */
  readonly full: boolean;
  /** `done` runs from 0 to 1 within each model. */
  progress?(model: string, done: number, what: string): void;
}

/** Everything about one model. Throws only `Cancelled`. */
export function completeResults(spec: ModelSpec, hooks: CompleteHooks): ModelResults {
  return guarded(spec, () =>
    analyse(spec, {
      shouldStop: () => hooks.shouldStop(),
      budget: hooks.budget,
      full: hooks.full,
      progress: (done, what) => hooks.progress?.(spec.name, done, what),
    }),
  );
}

/** One model that breaks the evaluation must not hide the rest of the file: then its results say so. */
export function guarded(spec: ModelSpec, evaluate: () => ModelResults): ModelResults {
  try {
    return evaluate();
  } catch (error) {
    if (error instanceof Cancelled) throw error;
    return brokenDown(spec, error instanceof Error ? error.message : String(error));
  }
}

/** What is known of a model whose evaluation broke down: nothing, and a remark that says so. */
export function brokenDown(spec: ModelSpec, reason: string): ModelResults {
  const message = `This model could not be evaluated because of a mistake in Tare itself (${reason}). Please report it together with the model.`;
  return {
    terms: [],
    sum: [],
    series: [],
    counterterms: [],
    couplings: [],
    observables: null,
    expectations: spec.expectations.map(() => ({ text: '', holds: null, measured: 'not evaluated' })),
    remarks: [{ code: 'undecided', message, subject: null }],
  };
}
