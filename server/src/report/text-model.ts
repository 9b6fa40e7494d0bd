import type { ModelSpec } from '../core/model/spec';
import type { ModelResults, TermResult } from '../core/results';
import { growthOf } from '../findings/words/growth';
import { momentumUnit } from '../findings/words/momenta';
import { formatComplex, formatNumber, listed } from '../findings/words/numbers';
import type { CheckedModel } from '../session/checked';
import { aligned, fitted, harmless, wrapped, type Cell } from './columns';
import type { Palette } from './palette';
import { solutionRows } from './text-solution';
import { shapeInWords, waveInWords } from './spec-words';

const indent = '  ';

/** A model for a person: what it is, a row for each monomial, its counterterms and its expectations. Lines of at most `width` columns. */
export function modelText({ source, results }: CheckedModel, width: number, palette: Palette): string[] {
  const name = palette.bold(fitted(harmless(source.name), width));
  const { spec } = source;
  if (!spec || !results) return [name, `${indent}not evaluated: see the errors below`];
  const inner = width - indent.length;
  const parts = [
    termRows(spec, results, inner, palette),
    countertermRows(spec, results, inner, palette),
    solutionRows(spec, results, inner, palette),
    expectationRows(results, inner, palette),
  ];
  const head = wrapped(headline(spec), inner).map(line => indent + palette.faint(line));
  return [name, ...head, ...parts.filter(rows => rows.length > 0).flatMap(rows => ['', ...rows.map(row => indent + row)])];
}

function headline(spec: ModelSpec): string {
  const { cutoff, series, dimension, units } = spec;
  const unit = momentumUnit(spec);
  const scan = cutoff.scan ? `, scan ${formatNumber(cutoff.scan.from)} .. ${formatNumber(cutoff.scan.to)}${unit}` : '';
  const origin = (declared: boolean): string => (declared ? '' : ' (not in the model)');
  return [
    `dimension ${dimension}, wave ${waveInWords(spec.wave, dimension)}`,
    units ? `${units.energy} and ${units.length}` : 'natural units',
    `cutoff ${cutoff.name} = ${formatNumber(cutoff.value)}${unit} ${shapeInWords(cutoff.shape)}${scan}${origin(cutoff.declared)}`,
    `order ${series.order}${origin(series.declared)}`,
  ].join('; ');
}

function termRows({ cutoff }: ModelSpec, { terms }: ModelResults, width: number, palette: Palette): string[] {
  if (terms.length === 0) return [];
  const head = ['monomial', 'order', 'verdict', 'growth', 'absorbed by', 'status'].map(text => ({ text, paint: palette.faint }));
  const rows = terms.map((term): Cell[] => [
    { text: term.monomial },
    { text: String(term.order) },
    { text: term.ultraviolet.verdict },
    { text: growthOf(term, cutoff.name) },
    { text: absorber(term) },
    status(term, palette),
  ]);
  return aligned([head, ...rows], width, new Set([1]));
}

/** What can take the divergence: interactions whose couplings absorb it, a new counterterm, or the monomials it comes through. */
function absorber({ ultraviolet: { verdict, overall, nestedIn } }: TermResult): string {
  if (verdict !== 'diverges') return '–';
  if (overall.length === 0) return nestedIn.length > 0 ? `through ${listed(nestedIn, 2)}` : '–';
  const names = [...new Set(overall.map(({ absorbedBy }) => absorbedBy ?? 'new counterterm'))];
  return names.sort((a, b) => Number(a === 'new counterterm') - Number(b === 'new counterterm')).join(', ');
}

function status({ status: found, cancelledBy, infrared }: TermResult, palette: Palette): Cell {
  if (infrared.verdict === 'diverges') return { text: 'infrared divergent', paint: palette.warn };
  if (found === 'finite') return { text: 'finite', paint: palette.good };
  if (found === 'cancelled')
    return { text: `cancelled${cancelledBy.length > 0 ? ` by ${listed(cancelledBy, 4)}` : ''}`, paint: palette.good };
  return found === 'uncancelled' ? { text: 'not cancelled', paint: palette.bad } : { text: 'undecided', paint: palette.warn };
}

function countertermRows(spec: ModelSpec, { counterterms }: ModelResults, width: number, palette: Palette): string[] {
  const rows = counterterms.map(({ name, cancels, at }): Cell[] => [
    { text: `counterterm ${name}` },
    { text: `${formatComplex(at)} at ${spec.cutoff.name} = ${formatNumber(spec.cutoff.value)}${momentumUnit(spec)}` },
    { text: `cancels ${cancels.join(', ')}`, paint: palette.faint },
  ]);
  return aligned(rows, width, new Set());
}

function expectationRows({ expectations }: ModelResults, width: number, palette: Palette): string[] {
  const rows = expectations.map(({ text, holds, measured }): Cell[] => [
    { text: harmless(`expect ${text}`) },
    holds === null
      ? { text: 'undecided', paint: palette.warn }
      : holds
        ? { text: 'holds', paint: palette.good }
        : { text: 'fails', paint: palette.bad },
    { text: measured, paint: palette.faint },
  ]);
  return aligned(rows, width, new Set());
}
