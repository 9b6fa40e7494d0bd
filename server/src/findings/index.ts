import type { CheckedDocument } from '../session/checked';
import { budget } from './budget';
import { cutoffDependence } from './cutoff-dependence';
import { cutoffTooSoft } from './cutoff-too-soft';
import { dimension } from './dimension';
import { duplicate } from './duplicate';
import { expectation } from './expectation';
import { file } from './file';
import type { Finding, FindingCode } from './finding';
import { finished } from './finished';
import { infraredDivergence } from './infrared-divergence';
import { missing } from './missing';
import { nonlocalDivergence } from './nonlocal-divergence';
import { notEvaluated } from './not-evaluated';
import { notHermitian } from './not-hermitian';
import { reading } from './reading';
import type { FindingRule, Scope } from './rule';
import { seriesDiverges } from './series-diverges';
import { syntax } from './syntax';
import { undecided } from './undecided';
import { unknownName } from './unknown-name';
import { uvDivergence } from './uv-divergence';
import { uvNested } from './uv-nested';
import { value } from './value';

/** Every kind of finding, by its code. */
export const rules: { readonly [Code in FindingCode]: FindingRule } = {
  syntax,
  'unknown-name': unknownName,
  dimension,
  'not-hermitian': notHermitian,
  duplicate,
  missing,
  value,
  file,
  'not-evaluated': notEvaluated,
  'uv-divergence': uvDivergence,
  'nonlocal-divergence': nonlocalDivergence,
  'cutoff-too-soft': cutoffTooSoft,
  'uv-nested': uvNested,
  'infrared-divergence': infraredDivergence,
  expectation,
  undecided,
  budget,
  'series-diverges': seriesDiverges,
  'cutoff-dependence': cutoffDependence,
  reading,
};

/** All findings of a document, by their place in the text; equal places keep the order of the table. */
export function findingsOf({ document, models }: CheckedDocument): Finding[] {
  const outside: Scope = { text: document.text, problems: document.problems, model: null };
  const scopes = [outside, ...models.map((model): Scope => ({ text: document.text, problems: model.source.problems, model }))];
  const found = scopes.flatMap(scope =>
    Object.values(rules).flatMap(rule => rule.raise(scope).map(draft => finished(rule.code, scope.model?.source.name ?? null, draft))),
  );
  return found.sort((a, b) => a.span.start - b.span.start || a.span.end - b.span.end);
}
