import type { ExpectationResult } from '../core/results';
import { divergences } from './divergence';
import { placeOfMonomial } from './places';
import { onResults, type Draft, type FindingRule } from './rule';
import { formatNumber, listed } from './words/numbers';

/** An `expect` that does not hold. Stands on the statement; for `finite` it points at what diverges. */
export const expectation: FindingRule = {
  code: 'expectation',
  raise: onResults(model =>
    model.results.expectations.flatMap((result, index): Draft[] => {
      if (result.holds !== false) return [];
      const about = model.spec.expectations[index];
      const upTo = about?.kind === 'finite' ? (about.to ?? model.spec.series.order) : 0;
      const growing =
        about?.kind === 'finite'
          ? divergences(model).filter(({ open, kind, term }) => open && kind !== 'nested' && term.order <= upTo)
          : [];
      return [
        {
          severity: 'error',
          message:
            growing.length > 0
              ? notFinite(
                  result.text,
                  growing.map(({ term }) => term.monomial),
                )
              : `\`expect ${result.text}\` does not hold${measured(result)}.`,
          span: model.source.places.expectations[index]?.statement ?? model.source.places.name,
          subject: result.text,
          related: growing
            .slice(0, 8)
            .map(({ term }) => ({ span: placeOfMonomial(model, term.exponents), message: `${term.monomial} is not cancelled` })),
        },
      ];
    }),
  ),
};

const notFinite = (text: string, monomials: readonly string[]): string =>
  `\`expect ${text}\` does not hold: ${listed(monomials, 5)} ${monomials.length === 1 ? 'diverges' : 'diverge'} and ${monomials.length === 1 ? 'is' : 'are'} not cancelled.`;

function measured({ value, wanted, tolerance, measured }: ExpectationResult): string {
  if (value === undefined || wanted === undefined) return measured ? `: ${measured}` : '';
  const within = tolerance === undefined ? '' : `, and the difference may be ${formatNumber(tolerance)}`;
  return `: the value is ${formatNumber(value)}, wanted is ${formatNumber(wanted)}${within}`;
}
