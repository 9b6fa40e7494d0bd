import type { Complex } from '../core/algebra/expression';
import type { CountertermResult, CouplingResult, TermResult } from '../core/results';
import type { ModelSpec } from '../core/model/spec';
import { rangeInWords, type Plot } from '../report/plot';
import { growthInWords } from '../findings/words/growth';
import { formatNumber } from '../findings/words/numbers';
import { pointInWords } from '../findings/words/momenta';

/** The amplitude of a monomial against the cutoff, bare and renormalised: the part, real or imaginary, that moves more. */
export function amplitudePlot({ monomial, scan, ultraviolet, status }: TermResult, spec: ModelSpec): Plot | null {
  if (!scan) return null;
  const part = livelier(scan.bare);
  const bare = scan.bare.map(z => z[part]);
  const renormalised = scan.renormalised.map(z => z[part]);
  const both = status === 'cancelled' || bare.some((value, index) => value !== renormalised[index]);
  const amplitude = `${part === 're' ? 'Re' : 'Im'} T`;
  const grows = ultraviolet.verdict === 'diverges' ? ` It diverges ${growthInWords(ultraviolet, spec.cutoff.name)}.` : '';
  return {
    title: `${monomial} against the cutoff`,
    description: `${amplitude} of ${monomial} at ${pointInWords(scan, spec)} while ${spec.cutoff.name} runs over ${rangeInWords(scan.cutoff)}: bare from ${rangeInWords(bare)}${both ? `, renormalised from ${rangeInWords(renormalised)}` : ''}.${grows}`,
    ...against(scan.cutoff, spec),
    yLabel: `${amplitude}, ${monomial} at ${pointInWords(scan, spec)}`,
    curves: both
      ? [
          { name: 'bare', y: bare },
          { name: 'renormalised', y: renormalised },
        ]
      : [{ name: 'amplitude', y: bare }],
  };
}

/** The strength of a counterterm against the cutoff. */
export function strengthPlot({ name, cutoff, strength, cancels }: CountertermResult, spec: ModelSpec): Plot | null {
  if (!cutoff || !strength) return null;
  const part = livelier(strength);
  const y = strength.map(z => z[part]);
  return {
    title: `${name} against the cutoff`,
    description: `Strength of the counterterm ${name}, which cancels ${cancels.join(', ')}, while ${spec.cutoff.name} runs over ${rangeInWords(cutoff)}: from ${rangeInWords(y)}.`,
    ...against(cutoff, spec),
    yLabel: part === 're' ? name : `Im ${name}`,
    curves: [{ name: 'strength', y }],
  };
}

/** The running of a coupling, beside the value that the model gives it. */
export function runningPlot({ name, value, running }: CouplingResult, spec: ModelSpec): Plot | null {
  if (!running) return null;
  return {
    title: `${name} against the cutoff`,
    description: `Bare coupling ${name} while ${spec.cutoff.name} runs over ${rangeInWords(running.cutoff)}: from ${rangeInWords(running.value)}.`,
    ...against(running.cutoff, spec),
    yLabel: name,
    curves: [
      { name: 'bare', y: running.value },
      { name: 'renormalised', y: running.value.map(() => value) },
    ],
  };
}

const against = (x: readonly number[], { cutoff, units }: ModelSpec): Pick<Plot, 'x' | 'xLabel' | 'mark'> => ({
  x,
  xLabel: `cutoff ${cutoff.name}${units ? ` / ${units.length}⁻¹` : ''}`,
  mark: { x: cutoff.value, label: `${cutoff.name} = ${formatNumber(cutoff.value)}` },
});

function livelier(values: readonly Complex[]): 're' | 'im' {
  const spread = (part: 're' | 'im'): number => {
    const finite = values.map(z => z[part]).filter(Number.isFinite);
    return finite.length === 0 ? 0 : Math.max(...finite) - Math.min(...finite);
  };
  const size = (part: 're' | 'im'): number => Math.max(0, ...values.map(z => Math.abs(z[part])).filter(Number.isFinite));
  const [re, im] = [spread('re') || 1e-12 * size('re'), spread('im') || 1e-12 * size('im')];
  return im > re ? 'im' : 're';
}

/** The sum of all monomials against the cutoff, bare and renormalised; null unless all were scanned over the same cutoffs. */
export function seriesPlot(terms: readonly TermResult[], spec: ModelSpec): Plot | null {
  const first = terms[0]?.scan;
  if (!first || terms.some(({ scan }) => scan?.cutoff.join() !== first.cutoff.join())) return null;
  const total = (pick: 'bare' | 'renormalised', part: 're' | 'im'): number[] =>
    first.cutoff.map((_, index) => terms.reduce((sum, { scan }) => sum + scan![pick][index][part], 0));
  const part = livelier(first.cutoff.map((_, index) => ({ re: total('bare', 're')[index], im: total('bare', 'im')[index] })));
  const [bare, renormalised] = [total('bare', part), total('renormalised', part)];
  const amplitude = `${part === 're' ? 'Re' : 'Im'} T`;
  return {
    title: 'The series against the cutoff',
    description: `${amplitude} of the sum at ${pointInWords(first, spec)} while ${spec.cutoff.name} runs over ${rangeInWords(first.cutoff)}: bare from ${rangeInWords(bare)}, renormalised from ${rangeInWords(renormalised)}.`,
    ...against(first.cutoff, spec),
    yLabel: `${amplitude}, sum at ${pointInWords(first, spec)}`,
    curves: [
      { name: 'bare', y: bare },
      { name: 'renormalised', y: renormalised },
    ],
  };
}
