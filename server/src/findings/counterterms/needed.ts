import type { CountertermSpec } from '../../core/model/spec';
import type { TermResult } from '../../core/results';
import { countertermsFor, type Divergence } from '../divergence';
import { termOf, type Evaluated } from '../rule';
import { proportional, readForm } from './forms';

/** A form that a monomial still needs a counterterm of, and the interaction whose coupling can take it. */
export interface NeededForm {
  /** As in the results: an expression in p, k, E, or `of NAME`. */
  readonly form: string;
  readonly absorbedBy: string | null;
}

/** A monomial and the forms that no counterterm of the model covers yet. */
export interface Need {
  readonly term: TermResult;
  readonly forms: readonly NeededForm[];
}

/** What is missing for a divergence to be cancelled, the monomials inside it first. */
export function needsOf(model: Evaluated, { term }: Divergence): Need[] {
  const inside = term.ultraviolet.nestedIn
    .flatMap(monomial => termOf(model, monomial) ?? [])
    .filter(({ status }) => status === 'uncancelled');
  return [...new Set([...inside, term])].map(one => needOf(model, one)).filter(({ forms }) => forms.length > 0);
}

/** What is missing for one monomial, whatever diverges inside it. */
export function needOf(model: Evaluated, term: TermResult): Need {
  const declared = countertermsFor(model, term.exponents);
  const distinct = term.ultraviolet.overall.filter(({ form }, index, all) => all.findIndex(other => other.form === form) === index);
  return { term, forms: distinct.filter(form => !declared.some(counterterm => covers(counterterm, form))) };
}

function covers({ form }: CountertermSpec, needed: NeededForm): boolean {
  if ('of' in form) return needed.absorbedBy === form.of || needed.form === `of ${form.of}`;
  const wanted = readForm(needed.form);
  return wanted !== null && proportional(form.expr, wanted);
}
