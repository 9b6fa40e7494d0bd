import { placeOfSeries } from './places';
import { onResults, type Draft, type FindingRule } from './rule';
import { formatNumber, listed } from './words/numbers';
import { pointInWords } from './words/momenta';

/**
 * The series does not converge at some of the momenta asked for: an eigenvalue of G₀V has a modulus of 1 or more.
 * One finding names them all. A warning where an expectation speaks of convergence, else information.
 */
export const seriesDiverges: FindingRule = {
  code: 'series-diverges',
  raise: onResults((model): Draft[] => {
    const failing = model.results.series.filter(({ converges }) => converges === false);
    if (failing.length === 0) return [];
    const moduli = failing.map(({ largestEigenvalue: z }) => (z ? Math.hypot(z.re, z.im) : 0));
    const worst = failing[moduli.indexOf(Math.max(...moduli))];
    const all = failing.length === model.results.series.length;
    const points = listed(
      failing.map(point => pointInWords(point, model.spec)),
      4,
    );
    const size =
      Math.max(...moduli) > 0
        ? `: the largest eigenvalue of G₀V has modulus ${formatNumber(Math.max(...moduli))} at ${pointInWords(worst, model.spec)}, and it must be below 1`
        : '';
    return [
      {
        severity: model.spec.expectations.some(({ kind }) => kind === 'converges') ? 'warning' : 'information',
        message: `The series does not converge at ${all && failing.length > 1 ? `any momentum asked for (${points})` : points}${size}. More orders do not improve the sum there.`,
        span: placeOfSeries(model),
        subject: 'series',
        ...(worst.p !== undefined && { p: worst.p }),
      },
    ];
  }),
};
