import { placeOfMonomial } from './places';
import { fromRemarks } from './remarks';
import { onResults, termOf, type Draft, type Evaluated, type FindingRule } from './rule';
import { listed } from './words/numbers';
import { pointInWords } from './words/momenta';

const remarked = fromRemarks('infrared-divergence', (model, { subject }) => severity(model, subject));

/** A loop diverges at small momenta or at a singular kernel, whatever the cutoff. An error where an amplitude asked for does not exist. */
export const infraredDivergence: FindingRule = {
  code: 'infrared-divergence',
  raise: scope => [...remarked(scope), ...onResults(unremarked)(scope)],
};

function unremarked(model: Evaluated): Draft[] {
  const spoken = new Set(model.results.remarks.filter(({ code }) => code === 'infrared-divergence').map(({ subject }) => subject));
  return model.results.terms
    .filter(({ infrared, monomial }) => infrared.verdict === 'diverges' && !spoken.has(monomial))
    .map(term => ({
      severity: severity(model, term.monomial),
      message: `${term.monomial} diverges in the infrared: no cutoff at large momenta helps${where(model, term.monomial)}. Give the interaction a finite range, or look away from the threshold.`,
      span: placeOfMonomial(model, term.exponents),
      subject: term.monomial,
    }));
}

const absent = (model: Evaluated, monomial: string | null) => termOf(model, monomial)?.values.filter(({ bare }) => bare === null) ?? [];

const severity = (model: Evaluated, monomial: string | null): 'error' | 'warning' =>
  absent(model, monomial).length > 0 ? 'error' : 'warning';

function where(model: Evaluated, monomial: string): string {
  const points = absent(model, monomial);
  return points.length > 0
    ? `, and it has no value at ${listed(
        points.map(point => pointInWords(point, model.spec)),
        4,
      )}`
    : '';
}
