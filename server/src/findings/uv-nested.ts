import { divergences, inside } from './divergence';
import { placeOfMonomial } from './places';
import { onResults, type FindingRule } from './rule';
import { growthFormula } from './words/growth';
import { listed } from './words/numbers';

/** A monomial that diverges only through others inside it, which have findings of their own; `related` points there. */
export const uvNested: FindingRule = {
  code: 'uv-nested',
  raise: onResults(model =>
    divergences(model)
      .filter(({ kind }) => kind === 'nested')
      .map(found => {
        const { monomial, ultraviolet, exponents } = found.term;
        const growth = growthFormula(ultraviolet, model.spec.cutoff.name);
        const through = listed(ultraviolet.nestedIn, 4) || 'a part of it';
        const then = found.open
          ? `; once ${ultraviolet.nestedIn.length > 1 ? 'they are' : 'that is'} cancelled, it needs no counterterm of its own`
          : `, which ${ultraviolet.nestedIn.length > 1 ? 'are' : 'is'} cancelled`;
        return {
          severity: 'information' as const,
          message: `${monomial} diverges${growth ? `, as ${growth},` : ''} only through ${through}${then}.`,
          span: placeOfMonomial(model, exponents),
          subject: monomial,
          related: inside(model, found),
        };
      }),
  ),
};
