import type { Complex } from '../core/algebra/expression';
import type { ModelResults, SumResult, TermResult, Ultraviolet, ValueResult } from '../core/results';

/** What was found out about a model, under the keys of the report; the five lists that are always there are empty for a model without results. */
export function resultsJson(results: ModelResults | null): object {
  if (!results) return { terms: [], sum: [], series: [] };
  const { terms, sum, series, counterterms, couplings, observables, expectations } = results;
  return {
    terms: terms.map(termJson),
    sum: sum.map(sumJson),
    series: series.map(({ p, E, largestEigenvalue, converges, eigenvalues }) => ({
      ...momentum(p),
      E,
      largestEigenvalue: complex(largestEigenvalue),
      converges,
      eigenvalues: eigenvalues.map(complex),
    })),
    ...(counterterms.length > 0 && {
      counterterms: counterterms.map(({ name, cancels, at, cutoff, strength }) => ({
        name,
        cancels,
        at: complex(at),
        ...(cutoff && { cutoff }),
        ...(strength && { strength: strength.map(complex) }),
      })),
    }),
    ...(couplings.length > 0 && {
      couplings: couplings.map(({ name, value, dimension, running }) => ({
        name,
        value,
        dimension,
        ...(running && { running: { cutoff: running.cutoff, value: running.value } }),
      })),
    }),
    ...(observables && { observables }),
    ...(expectations.length > 0 && {
      expectations: expectations.map(({ text, holds, measured, value, wanted, tolerance }) => ({
        text,
        holds,
        measured,
        ...given({ value, wanted, tolerance }),
      })),
    }),
  };
}

function termJson({ monomial, order, ultraviolet, infrared, status, cancelledBy, values, scan }: TermResult): object {
  return {
    monomial,
    order,
    ultraviolet: ultravioletJson(ultraviolet),
    infrared: { verdict: infrared.verdict },
    status,
    cancelledBy,
    values: values.map(valueJson),
    ...(scan && {
      scan: {
        ...(scan.p === undefined ? { E: scan.E } : { p: scan.p }),
        cutoff: scan.cutoff,
        bare: scan.bare.map(complex),
        renormalised: scan.renormalised.map(complex),
      },
    }),
  };
}

const ultravioletJson = ({ verdict, conditional, power, log, nested, nestedIn, overall, confirmed }: Ultraviolet): object => ({
  verdict,
  conditional,
  power,
  log,
  nested,
  nestedIn,
  overall: overall.map(form => ({
    form: form.form,
    power: form.power,
    log: form.log,
    coefficient: complex(form.coefficient),
    uncertainty: form.uncertainty,
    universal: form.universal,
    absorbedBy: form.absorbedBy,
  })),
  confirmed,
});

const valueJson = ({ p, E, bare, renormalised, backward, uncertainty }: ValueResult): object => ({
  ...momentum(p),
  E,
  bare: complex(bare),
  renormalised: complex(renormalised),
  ...(backward && { backward: { bare: complex(backward.bare), renormalised: complex(backward.renormalised) } }),
  uncertainty,
});

const sumJson = ({ p, E, orders, byOrder, full, phaseShift, transmission, reflection, drift }: SumResult): object => ({
  ...momentum(p),
  E,
  orders,
  byOrder: byOrder.map(complex),
  ...(full && { full: complex(full) }),
  ...given({ phaseShift, transmission, reflection, drift }),
});

const momentum = (p: number | undefined): object => given({ p });

/** Without the keys that have no value. */
const given = (values: Readonly<Record<string, number | null | undefined>>): object =>
  Object.fromEntries(Object.entries(values).filter(([, value]) => value !== undefined));

const complex = (z: Complex | null): Complex | null =>
  z && Number.isFinite(z.re) && Number.isFinite(z.im) ? { re: z.re, im: z.im } : null;
