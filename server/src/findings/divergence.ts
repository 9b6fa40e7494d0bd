import type { CountertermSpec, Monomial } from '../core/model/spec';
import type { TermResult } from '../core/results';
import type { Finding } from './finding';
import { placeOfMonomial } from './places';
import { termOf, type Evaluated } from './rule';
import { growthFormula } from './words/growth';

/**
 * A monomial that has no limit as the cutoff is lifted, and what kind of finding that makes:
 * `own` something grows that its own counterterm must take, `nested` it grows only through a monomial inside it,
 * `nonlocal` what is left cannot be taken by any counterterm of its own.
 */
export interface Divergence {
  readonly term: TermResult;
  readonly kind: 'own' | 'nested' | 'nonlocal';
  /** Not cancelled, as far as is known. */
  readonly open: boolean;
  /** The counterterms declared for this very monomial. */
  readonly declared: readonly CountertermSpec[];
}

/**
 * The divergences of a model, in the order of its terms. While only power counting has spoken, a monomial with a
 * counterterm of its own counts as cancelled and one with a nested divergence as nested, so that a good file stays quiet.
 */
export function divergences(model: Evaluated): Divergence[] {
  return model.results.terms.flatMap(term => {
    const { verdict } = term.ultraviolet;
    if (verdict !== 'diverges' && !(verdict === 'oscillates' && term.status === 'uncancelled')) return [];
    if (term.status === null && model.complete) return []; // a matter of the rule `undecided`
    const declared = countertermsFor(model, term.exponents);
    const open = term.status === 'uncancelled' || (term.status === null && declared.length === 0);
    return [{ term, declared, open, kind: kindOf(model, term, declared.length > 0, open) }];
  });
}

function kindOf(model: Evaluated, term: TermResult, hasOwn: boolean, open: boolean): Divergence['kind'] {
  const { nested, nestedIn, overall, verdict } = term.ultraviolet;
  // Forms come with the numbers.
  if (!model.complete) return nested && overall.length === 0 && !hasOwn ? 'nested' : 'own';
  if (verdict === 'oscillates' || !open) return overall.length > 0 || !nested ? 'own' : 'nested';
  const openInside = nestedIn.some(inner => termOf(model, inner)?.status === 'uncancelled');
  if (overall.length === 0) return openInside && !hasOwn ? 'nested' : 'nonlocal';
  return hasOwn && openInside ? 'nonlocal' : 'own';
}

export const sameMonomial = (a: Monomial, b: Monomial): boolean =>
  a.length === b.length && a.every((exponent, index) => exponent === b[index]);

/** The counterterms that a model declares for this very monomial. */
export const countertermsFor = (model: Evaluated, monomial: Monomial): CountertermSpec[] =>
  model.spec.counterterms.filter(({ cancels }) => cancels.some(one => sameMonomial(one, monomial)));

/** The monomials inside a divergent one that diverge by themselves, each at its place. */
export function inside(model: Evaluated, { term }: Pick<Divergence, 'term'>): Finding['related'] {
  return term.ultraviolet.nestedIn.flatMap(monomial => {
    const inner = termOf(model, monomial);
    if (!inner) return [];
    const growth = growthFormula(inner.ultraviolet, model.spec.cutoff.name);
    return [
      {
        span: placeOfMonomial(model, inner.exponents),
        message: `the loops of ${monomial} inside ${term.monomial} diverge by themselves${growth ? `, as ${growth}` : ''}`,
      },
    ];
  });
}
