import { fixesFor } from './counterterms/fixes';
import { divergences, inside, type Divergence } from './divergence';
import { placeOfMonomial } from './places';
import { onResults, termOf, type Evaluated, type FindingRule } from './rule';
import { growthFormula } from './words/growth';
import { listed } from './words/numbers';

/**
 * What grows with the cutoff is no local form: no counterterm of the monomial's own can cancel it. Usually one is missing
 * for a monomial inside it. An error where uncancelled, else information.
 */
export const nonlocalDivergence: FindingRule = {
  code: 'nonlocal-divergence',
  raise: onResults(model =>
    divergences(model)
      .filter(({ kind }) => kind === 'nonlocal')
      .map(found => ({
        severity: found.open ? ('error' as const) : ('information' as const),
        message: sentence(model, found),
        span: placeOfMonomial(model, found.term.exponents),
        subject: found.term.monomial,
        related: inside(model, found),
        fixes: found.open ? fixesFor(model, found) : [],
      })),
  ),
};

function sentence(model: Evaluated, { term: { monomial, ultraviolet } }: Divergence): string {
  const growth = growthFormula(ultraviolet, model.spec.cutoff.name);
  const grows = `What is left of ${monomial} grows${growth ? ` as ${growth}` : ''} and is not local, so no counterterm of its own can cancel it`;
  const missing = ultraviolet.nestedIn.filter(inner => termOf(model, inner)?.status === 'uncancelled');
  return missing.length > 0
    ? `${grows}: cancel ${listed(missing, 4)} first, which ${missing.length === 1 ? 'diverges' : 'diverge'} inside it.`
    : `${grows}. Look for an interaction that is singular at short distance, and sum it at order 0 or give it a finite range.`;
}
