import type { TermResult } from '../core/results';
import { divergences } from './divergence';
import { placeOfMonomial } from './places';
import { onResults, type Draft, type Evaluated, type FindingRule } from './rule';
import { formatNumber } from './words/numbers';
import { pointInWords } from './words/momenta';

/** Below this relative change over the upper half of the scan nothing is said. */
const notable = 0.001;

/**
 * The renormalised sum still moves with the cutoff although every divergence is cancelled. Stands on the monomial that
 * moves most where that is known at the momentum where the sum moves most. A warning where an expectation speaks of drift, else information.
 */
export const cutoffDependence: FindingRule = {
  code: 'cutoff-dependence',
  raise: onResults((model): Draft[] => {
    if (!model.complete || divergences(model).some(({ open }) => open)) return [];
    const worst = model.results.sum.reduce<{ drift: number; p?: number; E: number } | null>(
      (found, { drift, ...point }) => (typeof drift === 'number' && drift > (found?.drift ?? 0) ? { ...point, drift } : found),
      null,
    );
    if (!worst || !(worst.drift >= notable)) return [];
    const term = mover(model, worst.p);
    const through = term ? `, most of it through ${term.monomial}` : '';
    return [
      {
        severity: model.spec.expectations.some(({ kind }) => kind === 'drift') ? 'warning' : 'information',
        message: `The renormalised sum changes by ${formatNumber(Number((100 * worst.drift).toPrecision(2)))} % over the upper half of the scan at ${pointInWords(worst, model.spec)}${through}.`,
        span: term ? placeOfMonomial(model, term.exponents) : model.source.places.name,
        ...(term && { subject: term.monomial }),
        ...(worst.p !== undefined && { p: worst.p }),
      },
    ];
  }),
};

/** The term whose renormalised amplitude changes most over the upper half of the scan, where the scan is at this momentum. */
function mover(model: Evaluated, p: number | undefined): TermResult | undefined {
  if (model.results.terms.every(({ scan }) => scan?.p !== p)) return undefined;
  const change = ({ scan }: TermResult): number => {
    const upper = scan?.renormalised.slice(Math.floor(scan.renormalised.length / 2)) ?? [];
    const last = upper[upper.length - 1];
    return last ? Math.max(...upper.map(z => Math.hypot(z.re - last.re, z.im - last.im))) : 0;
  };
  return [...model.results.terms].filter(term => change(term) > 0).sort((a, b) => change(b) - change(a))[0];
}
