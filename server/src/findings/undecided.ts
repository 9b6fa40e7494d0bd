import type { Remark, TermResult } from '../core/results';
import { placeOfMonomial } from './places';
import { fromRemarks, severityWhereOpen } from './remarks';
import { onResults, type Draft, type Evaluated, type FindingRule } from './rule';

const remarked = fromRemarks('undecided', severityWhereOpen);

/** The tool could not tell whether a monomial is finite, or whether an expectation holds. The core's own words where it has some. */
export const undecided: FindingRule = {
  code: 'undecided',
  raise: scope => [
    ...remarked(scope),
    ...onResults(model => (model.complete ? [...openTerms(model), ...openExpectations(model)] : []))(scope),
  ],
};

function openTerms(model: Evaluated): Draft[] {
  return model.results.terms
    .filter(({ status, infrared, monomial }) => status === null && infrared.verdict !== 'diverges' && !spokenOf(model, monomial))
    .map(term => ({
      severity: 'error',
      message: sentence(model, term),
      span: placeOfMonomial(model, term.exponents),
      subject: term.monomial,
    }));
}

function sentence({ spec }: Evaluated, { monomial, ultraviolet }: TermResult): string {
  const lifted = `when ${spec.cutoff.name} is lifted`;
  return ultraviolet.confirmed
    ? `The tool could not tell what ${monomial} does ${lifted}. Another shape of cutoff, or a lower order, may settle it.`
    : `Power counting and the numbers disagree on what ${monomial} does ${lifted}, so no verdict is given. Another shape of cutoff may settle it.`;
}

function openExpectations(model: Evaluated): Draft[] {
  return model.results.expectations.flatMap(({ holds, text, measured }, index): Draft[] => {
    if (holds !== null || spokenOf(model, text)) return [];
    const span = model.source.places.expectations[index]?.statement ?? model.source.places.name;
    const reason = measured ? `: ${measured}` : '';
    return [{ severity: 'error', message: `Whether \`${text}\` holds could not be decided${reason}.`, span, subject: text }];
  });
}

const reasons: readonly Remark['code'][] = ['undecided', 'budget', 'cutoff-too-soft'];

/** Whether the core has said why; a remark about nothing in particular explains everything that is open. */
const spokenOf = ({ results }: Evaluated, subject: string): boolean =>
  results.remarks.some(remark => (remark.subject === subject || remark.subject === null) && reasons.includes(remark.code));
