import { symbolsOf } from '../core/algebra/expression';
import type { TermResult } from '../core/results';
import type { Evaluated } from '../findings/rule';
import { momentumUnit } from '../findings/words/momenta';
import { formatComplex, formatNumber, listed } from '../findings/words/numbers';
import { amplitudePlot, runningPlot, strengthPlot } from './amplitude-plot';
import { code, plotMarkdown } from './markdown';
import { termsMarkdown } from './terms';

/** An interaction: the monomials it is part of, and how the first one that diverges depends on the cutoff. */
export function interactionMarkdown(model: Evaluated, index: number, images: boolean): string {
  const { name, order } = model.spec.interactions[index];
  const terms = model.results.terms.filter(({ exponents }) => exponents[index] > 0);
  return sections([
    `**${name}** · interaction of order ${order}`,
    termsMarkdown(model, terms),
    strengths(model, terms),
    termPlot(model, terms, images),
  ]);
}

/** A coupling: its value, how it runs where it absorbs something, and the monomials of the interactions that it sets. */
export function couplingMarkdown(model: Evaluated, index: number, images: boolean): string {
  const { name, value, dimension } = model.spec.couplings[index];
  const result = model.results.couplings.find(coupling => coupling.name === name);
  const users = model.spec.interactions.flatMap(({ kernel }, at) => (symbolsOf(kernel).has(name) ? [at] : []));
  const terms = model.results.terms.filter(({ exponents }) => users.some(at => exponents[at] > 0));
  const used = users.length > 0 ? `Sets ${listed(users.map(at => code(model.spec.interactions[at].name)))}.` : 'No interaction uses it.';
  const running = result?.running ? `It runs with the cutoff, since its interaction absorbs a divergence.` : '';
  const plot = result?.running ? plotMarkdown(runningPlot(result, model.spec), images) : termPlot(model, terms, images);
  const unit = dimension === '1' ? '' : ` ${dimension}`;
  return sections([
    `**${name}** = ${formatNumber(value)}${unit} · coupling`,
    [used, running].filter(Boolean).join(' '),
    users.length > 0 ? termsMarkdown(model, terms) : '',
    plot,
  ]);
}

/** A counterterm: what it cancels, its strength at the model's cutoff and how that grows. */
export function countertermMarkdown(model: Evaluated, index: number, images: boolean): string {
  const { name, form, scheme } = model.spec.counterterms[index];
  const result = model.results.counterterms.find(counterterm => counterterm.name === name);
  const terms = model.results.terms.filter(({ exponents }) =>
    model.spec.counterterms[index].cancels.some(one => one.join() === exponents.join()),
  );
  const set =
    scheme.kind === 'minimal'
      ? `set minimally, logarithms as ln(${model.spec.cutoff.name}/${formatNumber(scheme.at)})`
      : `set at ${scheme.kind} = ${formatNumber(scheme.at)}${momentumUnit(model.spec)}`;
  const of = 'of' in form ? ` of the form of ${code(form.of)}` : '';
  return sections([
    `**${name}** · counterterm${of}, ${set}`,
    strengths(model, terms),
    termsMarkdown(model, terms),
    result ? plotMarkdown(strengthPlot(result, model.spec), images) : '',
  ]);
}

/** The strength, at the model's cutoff, of every counterterm that takes part in cancelling these monomials. */
function strengths({ results, spec }: Evaluated, terms: readonly TermResult[]): string {
  const names = new Set(terms.flatMap(({ cancelledBy }) => cancelledBy));
  return results.counterterms
    .filter(({ name }) => names.has(name))
    .map(
      ({ name, at }) =>
        `${code(name)} has the strength ${formatComplex(at)} at ${spec.cutoff.name} = ${formatNumber(spec.cutoff.value)}${momentumUnit(spec)}.`,
    )
    .join(' ');
}

function termPlot(model: Evaluated, terms: readonly TermResult[], images: boolean): string {
  const drawn = terms.filter(({ scan }) => scan);
  const term = drawn.find(({ ultraviolet }) => ultraviolet.verdict !== 'converges') ?? drawn.at(-1);
  return term ? plotMarkdown(amplitudePlot(term, model.spec), images) : '';
}

/** The parts that have something to say, one below the other. */
export const sections = (parts: readonly string[]): string => parts.filter(Boolean).join('\n\n');
