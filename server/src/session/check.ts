import { symbolicResults } from '../core/analysis';
import type { ModelSpec } from '../core/model/spec';
import type { ModelResults } from '../core/results';
import { readDocument } from '../language';
import type { Defaults, ModelInText, Overrides, SourceDocument } from '../language/document';
import { ResultsCache, type SpecKey, keyOf } from './cache';
import type { CheckedDocument, CheckedModel } from './checked';
import { type CompleteHooks, completeResults, guarded } from './evaluate';

/** Reads `text` and gives each model its verdicts by power counting, or everything where `cache` has it already. Never throws. */
export function checkSymbolic(text: string, defaults: Defaults, overrides: Overrides, cache = new ResultsCache()): CheckedDocument {
  return checkModels(readDocument(text, defaults, overrides), spec => {
    const key = keyOf(spec);
    const complete = cache.complete.get(key);
    if (complete) return { results: complete, stage: 'complete' };
    const results = cache.symbolic.get(key) ?? guarded(spec, () => symbolicResults(spec));
    cache.symbolic.set(key, results);
    return { results, stage: 'symbolic' };
  });
}

/** `checked` with everything about the models that have this key. */
export function withResults(checked: CheckedDocument, key: SpecKey, results: ModelResults): CheckedDocument {
  const models = checked.models.map((model): CheckedModel => {
    const { spec } = model.source;
    return spec && keyOf(spec) === key ? { ...model, results: withTexts(results, model.source), stage: 'complete' } : model;
  });
  return { ...checked, models };
}

/** Reads `text` and finds out everything about each model. Throws only `Cancelled`, and that only where `hooks` ask for it. */
export function checkComplete(
  text: string,
  defaults: Defaults,
  overrides: Overrides,
  hooks: CompleteHooks,
  cache = new ResultsCache(),
): CheckedDocument {
  return checkModels(readDocument(text, defaults, overrides), spec => {
    const key = keyOf(spec);
    const results = cache.complete.get(key) ?? completeResults(spec, hooks);
    cache.complete.set(key, results);
    return { results, stage: 'complete' };
  });
}

function checkModels(
  document: SourceDocument,
  evaluate: (spec: ModelSpec) => { readonly results: ModelResults; readonly stage: 'symbolic' | 'complete' },
): CheckedDocument {
  const models = document.models.map((source): CheckedModel => {
    if (source.spec === null) return { source, results: null, stage: 'text' };
    const { results, stage } = evaluate(source.spec);
    return { source, results: withTexts(results, source), stage };
  });
  return { document, models };
}

/** The core knows expectations by their place; here they get the words they stand in the file with. */
function withTexts(results: ModelResults, source: ModelInText): ModelResults {
  const expectations = results.expectations.map((one, index) => ({ ...one, text: source.places.expectations[index]?.text ?? one.text }));
  return { ...results, expectations };
}
