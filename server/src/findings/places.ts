import type { Monomial } from '../core/model/spec';
import type { Span } from '../language/document';
import { termOf, type Evaluated } from './rule';

/** Where a finding about a monomial stands: on the name of the interaction declared last in it. */
export function placeOfMonomial(model: Evaluated, monomial: Monomial): Span {
  const last = monomial.reduce((found, exponent, index) => (exponent > 0 ? index : found), -1);
  return model.source.places.interactions[last]?.name ?? model.source.places.name;
}

/** Where a finding about a monomial, an interaction, a counterterm, a coupling or an expectation stands; the model's name if about none. */
export function placeOfSubject(model: Evaluated, subject: string | null): Span {
  const { source, spec } = model;
  const places = source.places;
  const term = termOf(model, subject);
  if (term) return placeOfMonomial(model, term.exponents);
  const named = (list: readonly { readonly name: string }[]): number => list.findIndex(item => item.name === subject);
  const vertex = places.interactions[named(spec.interactions)] ?? places.counterterms[named(spec.counterterms)];
  const expectation = places.expectations.find(({ text }) => text === subject);
  const cutoff = subject === spec.cutoff.name ? places.cutoff : null;
  return (vertex ?? places.couplings[named(spec.couplings)] ?? cutoff)?.name ?? expectation?.statement ?? places.name;
}

/** Where a finding about the whole series stands: on the word `series`, or on the model's name where none is declared. */
export const placeOfSeries = (model: Evaluated): Span => model.source.places.series?.keyword ?? model.source.places.name;
