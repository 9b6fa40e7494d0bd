import type { Complex } from '../core/algebra/expression';
import type { SumResult } from '../core/results';
import type { Evaluated } from '../findings/rule';
import { momentumUnit, pointInWords } from '../findings/words/momenta';
import { formatComplex, formatNumber, listed, unknown } from '../findings/words/numbers';
import { seriesPlot } from './amplitude-plot';
import { sections } from './descriptions';
import { plotMarkdown, table } from './markdown';

/** The whole series: the renormalised amplitude order by order at three of its momenta, its drift, and whether it converges. */
export function seriesMarkdown(model: Evaluated, images: boolean): string {
  const { results, spec } = model;
  const { order, declared } = spec.series;
  const head = `**series** to order ${order}${declared ? '' : ' (not declared: from the settings)'}, cutoff ${spec.cutoff.name} = ${formatNumber(spec.cutoff.value)}${momentumUnit(spec)}`;
  return sections([head, orders(model), convergence(model), plotMarkdown(seriesPlot(results.terms, spec), images)]);
}

function orders(model: Evaluated): string {
  const picked = spread(model.results.sum);
  if (picked.length === 0) return model.complete ? 'The series has no momenta: write `at p = …` behind its order.' : '';
  const all = [...new Set(picked.flatMap(({ orders }) => orders))].sort((a, b) => a - b);
  const rows = all.map(order => [`order ${order}`, ...picked.map(({ orders, byOrder }) => formatComplex(byOrder[orders.indexOf(order)]))]);
  const sum = ['**sum**', ...picked.map(({ byOrder }) => formatComplex(total(byOrder)))];
  const full = picked.some(one => one.full) ? [['full solution', ...picked.map(one => (one.full ? formatComplex(one.full) : '–'))]] : [];
  const drift = picked.some(one => one.drift !== undefined)
    ? [
        [
          'drift',
          ...picked.map(one => (typeof one.drift === 'number' ? `${formatNumber(Number((100 * one.drift).toPrecision(3)))} %` : unknown)),
        ],
      ]
    : [];
  return table(
    ['renormalised T', ...picked.map(point => pointInWords(point, model.spec))],
    [...rows, sum, ...full, ...drift, ...eigenvalues(model, picked)],
  );
}

function eigenvalues({ results }: Evaluated, picked: readonly SumResult[]): string[][] {
  if (results.series.length === 0) return [];
  const cell = (point: SumResult): string => {
    const found = results.series.find(({ p, E }) => p === point.p && E === point.E);
    return found?.largestEigenvalue
      ? `${formatComplex(found.largestEigenvalue)}, modulus ${formatNumber(Math.hypot(found.largestEigenvalue.re, found.largestEigenvalue.im))}`
      : unknown;
  };
  return [['largest eigenvalue', ...picked.map(cell)]];
}

function convergence({ results, spec }: Evaluated): string {
  const failing = results.series.filter(({ converges }) => converges === false);
  const open = results.series.filter(({ converges }) => converges === null);
  if (results.series.length === 0) return '';
  if (failing.length > 0)
    return `It does **not** converge at ${listed(
      failing.map(point => pointInWords(point, spec)),
      6,
    )}.`;
  if (open.length > 0)
    return `Whether it converges is undetermined at ${listed(
      open.map(point => pointInWords(point, spec)),
      6,
    )}.`;
  return results.series.length === 1 ? 'It converges there.' : `It converges at all ${results.series.length} momenta.`;
}

/** The first, a middle and the last one. */
const spread = <T>(items: readonly T[]): T[] =>
  [...new Set([0, Math.floor((items.length - 1) / 2), items.length - 1])].flatMap(index => items[index] ?? []);

const total = (values: readonly Complex[]): Complex =>
  values.reduce((sum, z) => ({ re: sum.re + z.re, im: sum.im + z.im }), { re: 0, im: 0 });
