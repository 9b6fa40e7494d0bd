import type { Remark, TermResult, Ultraviolet } from '../results';
import { CutoffGrid, seriesAtCutoff, type OnShellAmplitude, type OnShellPoint } from './amplitudes';
import { declaredScheme, type DeclaredScheme, type StrengthLaw } from './contact-declared';
import { NOISE, settles } from './growth-fit';
import { isProperPart } from './monomials';
import { softMomentum, type Setup } from './setup';
import { vertexValue } from './subtraction';
import type { SymbolicVerdicts } from './verdicts';

type Status = TermResult['status'];

/** What the declared counterterms achieve, as far as the exact algebra of contacts reaches. */
export interface Declared {
  readonly scheme: DeclaredScheme | null;
  readonly remarks: readonly Remark[];
}

export function declaredContacts(setup: Setup, { contacts }: SymbolicVerdicts): Declared {
  if (!contacts || setup.counterterms.length === 0) return { scheme: null, remarks: [] };
  const scheme = declaredScheme(contacts, setup.counterterms);
  const remarks = scheme.singular.map(({ group }): Remark => {
    const names = group.counterterms.map(c => `\`${c.spec.name}\``);
    const message =
      names.length === 1
        ? `The form of ${names[0]} vanishes where it is subtracted, so nothing sets its strength: subtract at another momentum.`
        : `${names.join(' and ')} cannot be told apart on shell, so one condition does not set them: use \`subtract minimal\`, or fewer forms.`;
    return { code: 'value', message, subject: group.counterterms[0].spec.name };
  });
  return { scheme, remarks };
}

/** Status of each monomial; null where only numbers can tell and `dense` was not given. */
export function statuses(
  setup: Setup,
  symbolic: SymbolicVerdicts,
  terms: readonly Ultraviolet[],
  { scheme }: Declared,
  dense: readonly boolean[] | null,
): Status[] {
  return terms.map((t, n): Status => {
    if (t.verdict === 'undecided' || symbolic.terms[n].tooSoft) return t.verdict === 'undecided' ? null : 'uncancelled';
    const grew = t.verdict === 'diverges' || t.verdict === 'oscillates';
    const exact = scheme?.growth[n];
    if (exact) return exact.power > 0 || exact.log > 0 ? 'uncancelled' : grew ? 'cancelled' : 'finite';
    if (!touched(setup, n)) return grew ? 'uncancelled' : 'finite';
    if (!dense) return null;
    return dense[n] ? (grew ? 'cancelled' : 'finite') : 'uncancelled';
  });
}

/** Does a counterterm enter this monomial? */
function touched(setup: Setup, n: number): boolean {
  const { exponents } = setup.list.terms[n];
  return setup.counterterms.some(c => c.spec.cancels.some(m => m.join() === exponents.join() || isProperPart(m, exponents)));
}

/** The counterterms of a monomial and of what is nested in it. */
export function cancelledBy(setup: Setup, n: number): string[] {
  const { exponents } = setup.list.terms[n];
  return setup.counterterms
    .filter(c => c.spec.cancels.some(m => m.join() === exponents.join() || isProperPart(m, exponents)))
    .map(c => c.spec.name);
}

/** A short ladder, low enough for what is left to stand out from the rounding of what has been taken away. */
export function statusCutoffs(setup: Setup): number[] {
  const soft = Math.max(softMomentum(setup), ...setup.counterterms.map(c => c.spec.scheme.at));
  return CUTOFFS.map(x => x * soft);
}

const CUTOFFS = Array.from({ length: 8 }, (_, j) => 25 * 1.2713049 ** j);

/** For each monomial: does its renormalised on-shell amplitude converge as the cutoff is lifted, as far as numbers tell? */
export function renormalisedConverges(setup: Setup, strengths: readonly StrengthLaw[], shouldStop: () => boolean): boolean[] {
  const p = setup.momentum * 0.8660254;
  const point = { p, E: setup.kinematics.energy(p) };
  const cutoffs = statusCutoffs(setup);
  const runs = cutoffs.map(L => (shouldStop() ? null : seriesAtCutoff(new CutoffGrid(setup, L, [p], 16), [point], strengths)));
  if (runs.some(r => r === null)) return setup.list.terms.map(() => false);
  return setup.list.terms.map((_, n) => {
    const at = runs.map(r => r!.renormalised[0][n]);
    const errors = runs.map((r, j) => NOISE * Math.hypot(...sizes(r!.bare[0][n])) + lawError(strengths, n, point, cutoffs[j]));
    const { backward } = at[0];
    return (
      settles(
        cutoffs,
        at.map(a => a.forward),
        errors,
      ) &&
      (backward === null ||
        settles(
          cutoffs,
          at.map(a => a.backward!),
          errors,
        ))
    );
  });
}

const sizes = ({ forward, backward }: OnShellAmplitude): number[] => [forward.re, forward.im, backward?.re ?? 0, backward?.im ?? 0];

/** What the errors of fitted strengths make of the amplitude of monomial n. */
function lawError(strengths: readonly StrengthLaw[], n: number, { p, E }: OnShellPoint, cutoff: number): number {
  const own = strengths.filter(law => law.term === n);
  return own.reduce((sum, { counterterm, errors }) => {
    const form = vertexValue(counterterm.vertex, p, p, E);
    const strength = errors.reduce((s, e) => s + e.size * cutoff ** e.power * Math.abs(Math.log(cutoff)) ** e.log, 0);
    return sum + Math.hypot(form.re, form.im) * strength;
  }, 0);
}
