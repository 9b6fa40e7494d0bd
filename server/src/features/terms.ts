import type { OverallForm, TermResult } from '../core/results';
import type { Evaluated } from '../findings/rule';
import { growthFormula } from '../findings/words/growth';
import { pointInWords } from '../findings/words/momenta';
import { formatComplex, listed } from '../findings/words/numbers';
import { code, table } from './markdown';

/** Rows of a table in a hover; a hover is no report. */
const most = 14;

/** The monomials with their verdicts and, once there are numbers, their values at the first momentum; then what each leaves. */
export function termsMarkdown(model: Evaluated, terms: readonly TermResult[]): string {
  if (terms.length === 0) return 'No monomial up to the order of the series has it.';
  const first = terms.flatMap(({ values }) => values.slice(0, 1))[0];
  const at = first ? ` at ${pointInWords(first, model.spec)}` : '';
  const head = ['monomial', 'order', 'when the cutoff is lifted', ...(first ? [`bare T${at}`, 'renormalised'] : [])];
  const rows = terms
    .slice(0, most)
    .map(term => [code(term.monomial), String(term.order), behaviour(model, term), ...(first ? valuesOf(term) : [])]);
  const more = terms.length > most ? `\n\n${terms.length - most} more monomials are in the report of the command line.` : '';
  return [table(head, rows) + more, leftovers(model, terms)].filter(Boolean).join('\n\n');
}

function valuesOf({ values: [value] }: TermResult): string[] {
  const renormalised = formatComplex(value?.renormalised, value?.uncertainty);
  return [formatComplex(value?.bare, value?.uncertainty), renormalised];
}

/** `converges`, `L^1, cancelled by z0`, `ln L, **not cancelled**`. */
function behaviour({ spec, complete }: Evaluated, { ultraviolet, status, cancelledBy, infrared }: TermResult): string {
  const growth = growthFormula(ultraviolet, spec.cutoff.name);
  const conditional = ultraviolet.conditional ? ' (k with −k)' : '';
  const settled =
    status === 'cancelled'
      ? `, cancelled${cancelledBy.length > 0 ? ` by ${listed(cancelledBy.map(code))}` : ''}`
      : status === 'uncancelled'
        ? ', **not cancelled**'
        : '';
  const verdict = { converges: 'converges', oscillates: `oscillates${growth && `, ${growth}`}`, undecided: 'undecided', diverges: growth }[
    ultraviolet.verdict
  ];
  const nested =
    ultraviolet.nested && ultraviolet.overall.length === 0 && complete ? `, through ${listed(ultraviolet.nestedIn.map(code), 3)}` : '';
  return `${verdict}${conditional}${nested}${settled}${infrared.verdict === 'diverges' ? ', infrared divergent' : ''}`;
}

/** One line for each local form that a monomial leaves, with its coefficient and what can take it. */
function leftovers({ spec }: Evaluated, terms: readonly TermResult[]): string {
  const line = (monomial: string, form: OverallForm): string => {
    const growth = growthFormula(form, spec.cutoff.name);
    const taker = form.absorbedBy === null ? 'a new counterterm is needed' : `the coupling of ${code(form.absorbedBy)} can absorb it`;
    const times = form.form.startsWith('of ') ? `the kernel of ${code(form.form.slice(3))}` : code(form.form);
    return `- ${code(monomial)} leaves (${formatComplex(form.coefficient, form.uncertainty)}) ${growth} × ${times}: ${taker}${form.universal ? '; the same for every shape of cutoff' : ''}`;
  };
  const lines = terms.flatMap(({ monomial, ultraviolet }) => ultraviolet.overall.map(form => line(monomial, form)));
  return [...lines.slice(0, most), ...(lines.length > most ? [`- and ${lines.length - most} more`] : [])].join('\n');
}
