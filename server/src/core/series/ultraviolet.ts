import type { OverallForm, Remark, Ultraviolet } from '../results';
import type { Complex } from '../algebra/expression';
import { isMultipleOf } from './forms';
import { contactAgrees, contactsOnLadder } from './contact-confirm';
import { contactOverall } from './contact-divergences';
import { fitOverall, type FittedForm, type FittedOverall } from './dense-overall';
import { growsAs } from './growth-fit';
import type { ScaledVertex } from './grid-chain';
import type { StrengthLaw } from './contact-declared';
import { fittedStrengths, minimalCounterterms } from './declared-strengths';
import { infraredVerdicts } from './infrared';
import { buildLadder, type Ladder } from './ladder';
import { ladderWishes, leavesSomething, needsNumbers, STEEPEST_REMAINDER } from './ladder-wishes';
import type { Setup } from './setup';
import type { SymbolicVerdicts } from './verdicts';
import { formVertex } from './form-vertex';

/** Ultraviolet answers for every monomial, with whatever else has to be said. */
export interface UltravioletResults {
  readonly terms: readonly Ultraviolet[];
  /** Strengths of the declared minimal counterterms of monomials that are no contacts. */
  readonly strengths: readonly StrengthLaw[];
  readonly remarks: readonly Remark[];
}

/** Verdicts alone: nothing confirmed, no forms yet. */
export function symbolicUltraviolet(setup: Setup, symbolic: SymbolicVerdicts): Ultraviolet[] {
  return symbolic.terms.map((_, n) => assemble(setup, symbolic, n, symbolic.leftOver, [], false));
}

/** Verdicts, forms with coefficients, and the numerical confirmation. */
export function fullUltraviolet(setup: Setup, symbolic: SymbolicVerdicts, shouldStop: () => boolean): UltravioletResults {
  const remarks: Remark[] = [];
  const infinite = infraredVerdicts(setup).verdicts.map(v => v === 'diverges');
  const exact = symbolic.contacts ? contactOverall(symbolic.contacts) : [];
  const fitted: (FittedOverall | null)[] = symbolic.terms.map(() => null);
  const ladder = buildLadder(setup, ladderWishes(setup, symbolic));
  const bare = confirm(symbolic, ladder, shouldStop);
  const fits = symbolic.terms.some(leavesSomething);
  if (fits) fitDense(setup, symbolic, ladder, bare, exact, fitted, 1, shouldStop);
  const strengths = fits ? denseStrengths(setup, symbolic, ladder, bare, fitted, shouldStop) : [];
  const forms = symbolic.terms.map((_, n): OverallForm[] => {
    const list: readonly FittedForm[] =
      exact[n]?.forms.map(f => ({ ...f, uncertainty: 1e-10 * Math.hypot(f.coefficient.re, f.coefficient.im) })) ?? fitted[n]?.forms ?? [];
    return withUniversality(setup, list);
  });
  const leftOver = forms.map(f => f.length > 0);
  const local = symbolic.terms.map((_, n) => exact[n]?.local ?? fitted[n]?.local ?? true);
  const terms = symbolic.terms.map((t, n) => {
    const unknown = local[n] ? setup.list.splits(n).find(({ inner }) => !local[inner])?.inner : n;
    const agrees = bare[n].confirmed && unknown === undefined;
    if (t.verdict !== 'undecided' && !t.tooSoft && !infinite[n] && !agrees)
      remarks.push({ code: 'undecided', subject: setup.list.terms[n].name, message: disagreement(setup, n, t, unknown) });
    return assemble(setup, symbolic, n, leftOver, forms[n], agrees);
  });
  return { terms, strengths, remarks };
}

function assemble(
  setup: Setup,
  symbolic: SymbolicVerdicts,
  n: number,
  leftOver: readonly boolean[],
  overall: readonly OverallForm[],
  confirmed: boolean,
): Ultraviolet {
  const t = symbolic.terms[n];
  const nestedIn = setup.list.splits(n).flatMap(({ inner }) => (leftOver[inner] ? [setup.list.terms[inner].name] : []));
  return {
    verdict: t.verdict,
    conditional: t.conditional,
    power: t.power,
    log: t.log,
    nested: nestedIn.length > 0,
    nestedIn,
    overall,
    confirmed,
  };
}

/** `unknown`: a monomial of which no local forms are left, n itself or one nested in it. */
function disagreement(setup: Setup, n: number, t: SymbolicVerdicts['terms'][number], unknown: number | undefined): string {
  const name = setup.list.terms[n].name;
  if (unknown !== undefined && unknown !== n)
    return `What is left of ${name} is open: ${setup.list.terms[unknown].name}, nested in it, could not be subtracted.`;
  if (unknown === n && t.overallDegree > STEEPEST_REMAINDER)
    return `What is left of ${name} may grow up to L^${t.overallDegree}, too steeply for a fit in double precision: no counterterm is offered.`;
  if (unknown === n)
    return `What is left of ${name} after subtracting everything nested is neither a polynomial in p, k, E nor one of the kernels: no counterterm is offered.`;
  const said = t.verdict === 'converges' ? 'it converges' : `it grows as L^${t.power}${t.log ? ` ln^${t.log} L` : ''}`;
  return `Whether ${name} diverges is open: power counting says that ${said}, the numbers on a ladder of cutoffs do not bear it out.`;
}

interface BareTerm {
  readonly confirmed: boolean;
  /** |R_n| at each rung. */
  readonly sizes: readonly number[];
}

/** Walks the ladder with the bare series: contacts against their exact values, everything else by its growth. */
function confirm({ contacts, terms }: SymbolicVerdicts, { cutoffs, bare }: Ladder, shouldStop: () => boolean): BareTerm[] {
  const run = bare();
  const exact = contacts ? contactsOnLadder(contacts, run) : [];
  const last = run.externals.length - 1;
  return terms.map((t, n) => {
    if (shouldStop()) return { confirmed: false, sizes: [] };
    run.step(n);
    const values = run.values(n, 0, last);
    const confirmed = t.contact
      ? contactAgrees(contacts!, exact[n]!, cutoffs, run, n)
      : t.verdict === 'oscillates' || growsAs(cutoffs, values, t.verdict === 'diverges' ? { power: t.power!, log: t.log! } : null);
    return { confirmed, sizes: values.map(v => Math.hypot(v.re, v.im)) };
  });
}

/** Walks the ladder again with every nested divergence subtracted minimally, contacts exactly and the others as fitted on the way. */
function fitDense(
  setup: Setup,
  symbolic: SymbolicVerdicts,
  ladder: Ladder,
  bare: readonly BareTerm[],
  exact: ReturnType<typeof contactOverall> | readonly [],
  fitted: (FittedOverall | null)[],
  scale: number,
  shouldStop: () => boolean,
): void {
  const run = ladder.fitting();
  for (let n = 0; n < symbolic.terms.length && !shouldStop(); n++) {
    run.step(n);
    const t = symbolic.terms[n];
    if (leavesSomething(t))
      fitted[n] =
        t.overallDegree > STEEPEST_REMAINDER
          ? { forms: [], local: false }
          : fitOverall(
              setup,
              run,
              n,
              t.overallDegree,
              scale,
              Math.max(1, setup.list.terms[n].factors - 1 - (setup.kinematics.dimension === 2 ? 0 : 1)),
              bare[n].sizes,
            );
    const forms: readonly Pick<FittedForm, 'form' | 'power' | 'log' | 'coefficient'>[] = exact[n]?.forms ?? fitted[n]?.forms ?? [];
    if (!forms.length) continue;
    const vertices = forms.map(f => ('interaction' in f.form ? setup.vertices[f.form.interaction] : formVertex(f.form)));
    run.addCounterterm(n, L =>
      forms.map((f, j): ScaledVertex => ({
        vertex: vertices[j],
        strength: scaled(f.coefficient, -(L ** f.power) * Math.log(L / scale) ** f.log),
      })),
    );
  }
}

/** The declared minimal counterterms of monomials that are no contacts: from the fit with logarithms of L over the scale each of them names. */
function denseStrengths(
  setup: Setup,
  symbolic: SymbolicVerdicts,
  ladder: Ladder,
  bare: readonly BareTerm[],
  atUnit: readonly (FittedOverall | null)[],
  shouldStop: () => boolean,
): StrengthLaw[] {
  const wanted = setup.list.terms.flatMap((_, n) =>
    needsNumbers(symbolic.terms[n]) ? minimalCounterterms(setup, n).map(c => ({ n, scale: c.spec.scheme.at })) : [],
  );
  return [...new Set(wanted.map(w => w.scale))].flatMap(scale => {
    const fitted = [...atUnit];
    if (scale !== 1)
      fitDense(setup, symbolic, ladder, bare, symbolic.contacts ? contactOverall(symbolic.contacts, scale) : [], fitted, scale, shouldStop);
    return [...new Set(wanted.filter(w => w.scale === scale).map(w => w.n))].flatMap(n =>
      fitted[n] ? fittedStrengths(setup, n, fitted[n], scale) : [],
    );
  });
}

const scaled = (c: Complex, s: number): Complex => ({ re: c.re * s, im: c.im * s });

function withUniversality(setup: Setup, forms: readonly FittedForm[]): OverallForm[] {
  return forms.map(f => {
    const highest = Math.max(...forms.filter(g => g.form.text === f.form.text && g.power === 0).map(g => g.log));
    return {
      form: f.form.text,
      power: f.power,
      log: f.log,
      coefficient: f.coefficient,
      uncertainty: f.uncertainty,
      universal: f.power === 0 && f.log === highest,
      absorbedBy: absorber(setup, f.form),
    };
  });
}

function absorber(setup: Setup, form: FittedForm['form']): string | null {
  if ('interaction' in form) return setup.vertices[form.interaction].name;
  return setup.vertices.find(v => v.contact && isMultipleOf(v.contact, form.terms))?.name ?? null;
}
