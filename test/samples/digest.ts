import type { Complex } from '../../server/src/core/algebra/expression';
import { quantity, type Quantity } from './quantity';

/** What of the report (format 1) a sample's golden file keeps. */
interface Report {
  readonly exit: number;
  readonly files: readonly { readonly findings: readonly ReportedFinding[] }[];
  readonly models: readonly ReportedModel[];
}

interface ReportedModel {
  readonly model: string;
  readonly terms: readonly ReportedTerm[];
  readonly sum: readonly { readonly orders: readonly number[]; readonly byOrder: readonly Complex[]; readonly drift?: number | null }[];
  readonly series: readonly { readonly largestEigenvalue: Complex | null; readonly converges: boolean | null }[];
  readonly counterterms?: readonly { readonly name: string; readonly cancels: readonly string[]; readonly at: Complex }[];
  readonly expectations?: readonly { readonly text: string; readonly holds: boolean | null; readonly value?: number }[];
  readonly findings: readonly ReportedFinding[];
}

interface ReportedTerm {
  readonly monomial: string;
  readonly ultraviolet: {
    readonly verdict: string;
    readonly conditional: boolean;
    readonly power: number | null;
    readonly log: number | null;
    readonly nestedIn: readonly string[];
    readonly overall: readonly {
      readonly form: string;
      readonly power: number;
      readonly log: number;
      readonly coefficient: Complex;
      readonly uncertainty: number;
      readonly universal: boolean;
      readonly absorbedBy: string | null;
    }[];
  };
  readonly infrared: { readonly verdict: string };
  readonly status: string | null;
  readonly cancelledBy: readonly string[];
  readonly values: readonly { readonly bare: Complex | null; readonly renormalised: Complex | null; readonly uncertainty: number | null }[];
}

interface ReportedFinding {
  readonly code: string;
  readonly severity: string;
  readonly range: { readonly start: { readonly line: number; readonly character: number } };
  readonly subject?: string;
}

/** Relative tolerance of a number that the report gives without an uncertainty: an eigenvalue, a strength, a drift. */
const unstated = 1e-4;
/** Sums that run in another order, or on another processor, differ by less than this, whatever the uncertainty says. */
const rounding = 1e-9;

/** The verdicts, growth, forms, statuses, findings and main numbers of a report: amplitudes at the first and the last momentum. */
export function digest(report: Report): object {
  return {
    exit: report.exit,
    findings: report.files.flatMap(file => file.findings.map(findingWords)),
    models: report.models.map(model => ({
      model: model.model,
      terms: model.terms.map(termDigest),
      counterterms: (model.counterterms ?? []).map(({ name, cancels, at }) => ({ name, cancels, at: quantity(at, unstated * size(at)) })),
      sum: ends(model.sum).map(({ byOrder, orders, drift }) => ({
        orders,
        byOrder: byOrder.map(z => quantity(z, unstated * Math.max(...byOrder.map(size)))),
        ...(typeof drift === 'number' && { drift: quantity(drift, 10 * unstated * Math.max(drift, 1e-3)) }),
      })),
      series: ends(model.series).map(({ largestEigenvalue: z, converges }) => ({
        largestEigenvalue: z && quantity(size(z), unstated * size(z)),
        converges,
      })),
      expectations: (model.expectations ?? []).map(({ text, holds }) => ({ text, holds })),
      findings: model.findings.map(findingWords),
    })),
  };
}

function termDigest({ monomial, ultraviolet, infrared, status, cancelledBy, values }: ReportedTerm): object {
  const { verdict, conditional, power, log, nestedIn, overall } = ultraviolet;
  return {
    monomial,
    ultraviolet: { verdict, conditional, power, log, nestedIn },
    overall: overall.map(({ coefficient, uncertainty, ...form }) => ({
      ...pick(form),
      coefficient: quantity(coefficient, Math.max(uncertainty, rounding * size(coefficient))),
    })),
    infrared: infrared.verdict,
    status,
    cancelledBy,
    values: ends(values).map(({ bare, renormalised, uncertainty }) => ({
      bare: amplitude(bare, bare, uncertainty),
      // Where much is subtracted, the rounding of what it was taken from stays.
      renormalised: amplitude(renormalised, bare, uncertainty),
    })),
  };
}

const pick = ({
  form,
  power,
  log,
  universal,
  absorbedBy,
}: Omit<ReportedTerm['ultraviolet']['overall'][number], 'coefficient' | 'uncertainty'>) => ({
  form,
  power,
  log,
  universal,
  absorbedBy,
});

const amplitude = (z: Complex | null, largest: Complex | null, uncertainty: number | null): Quantity | null =>
  z && quantity(z, Math.max(uncertainty ?? 0, rounding * Math.max(size(z), largest ? size(largest) : 0)));

const findingWords = ({ code, severity, range, subject }: ReportedFinding): string =>
  [severity, code, `${range.start.line + 1}:${range.start.character + 1}`, ...(subject === undefined ? [] : [subject])].join(' ');

const ends = <T>(list: readonly T[]): readonly T[] => (list.length > 2 ? [list[0], list[list.length - 1]] : list);
const size = (z: Complex): number => Math.hypot(z.re, z.im);
