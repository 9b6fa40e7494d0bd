import { judge } from './expectations';
import type { ModelSpec } from './model/spec';
import type { ModelResults, Remark, SumResult, TermResult, Ultraviolet } from './results';
import { beyondTheSeries, wantsFull, type BeyondTheSeries } from './scattering/beyond-the-series';
import { named, type OnShellPoint } from './series/amplitudes';
import { cost } from './series/cost';
import { byOrder, countertermResults, couplingResults, driftOf, evaluateSeries, valuesOf, type Evaluation } from './series/evaluation';
import { ladderWishes } from './series/ladder-wishes';
import { onShellPoints } from './series/points';
import { oscillationLength, setUp, type Setup } from './series/setup';
import { cancelledBy, declaredContacts, renormalisedConverges, statuses } from './series/statuses';
import { fullUltraviolet, symbolicUltraviolet } from './series/ultraviolet';
import { symbolicVerdicts } from './series/verdicts';
import { infraredVerdicts } from './series/infrared';

export interface AnalysisOptions {
  /** Polled often; where it says true the analysis ends with `Cancelled`. */
  shouldStop(): boolean;
  /** Evaluations (kernel elements and products) that one model may cost. */
  readonly budget: number;
  /** Also the non-perturbative solution where nothing in the model asks for it. */
  readonly full: boolean;
  /** `done` from 0 to 1. */
  progress?(done: number, what: string): void;
}

/** Thrown by `analyse` soon after `shouldStop` says so. */
export class Cancelled extends Error {}

/** Verdicts by power counting: fast, nothing confirmed by numbers yet. */
export function symbolicResults(spec: ModelSpec): ModelResults {
  const { setup, remarks } = setUp(spec);
  if (!setup) return nothing(spec, remarks);
  const symbolic = symbolicVerdicts(setup);
  const terms = symbolicUltraviolet(setup, symbolic);
  const declared = declaredContacts(setup, symbolic);
  const status = statuses(setup, symbolic, terms, declared, null);
  return {
    ...nothing(spec, [...remarks, ...symbolic.remarks, ...declared.remarks]),
    terms: setup.list.terms.map((_, n) => termResult(setup, n, terms[n], status[n], [], 'converges')),
    couplings: couplingResults(setup, null),
  };
}

/** About a gigabyte. */
const MOST_HELD = 1.5e8;

/** What makes a model smaller. */
const remedy = ({ vertices }: Setup): string =>
  oscillationLength(vertices) > 0
    ? 'Edges of a potential and deltas away from the origin oscillate up to the highest cutoff: round the edges off, bring them nearer to the origin, or take a sharp cutoff and a shorter scan.'
    : 'A lower order, fewer cutoffs or fewer momenta make it smaller.';

/** Everything about a model: verdicts with forms and their confirmation, amplitudes, counterterm strengths, convergence, expectations. */
export function analyse(spec: ModelSpec, options: AnalysisOptions): ModelResults {
  const { setup, remarks: lowering } = setUp(spec);
  if (!setup) return nothing(spec, lowering);
  const stop = () => {
    if (options.shouldStop()) throw new Cancelled();
    return false;
  };
  const symbolic = symbolicVerdicts(setup);
  const declared = declaredContacts(setup, symbolic);
  const asked = onShellPoints(setup);
  const remarks: Remark[] = [...lowering, ...symbolic.remarks, ...declared.remarks, ...asked.remarks];
  const { evaluations, held } = cost(setup, ladderWishes(setup, symbolic), wantsFull(spec, options.full));
  if (evaluations > options.budget || held > MOST_HELD) {
    const needs =
      evaluations > options.budget
        ? `take about ${evaluations.toPrecision(2)} evaluations and ${options.budget.toPrecision(2)} are allowed`
        : `keep ${held.toPrecision(2)} numbers of kernels at once and ${MOST_HELD.toPrecision(1)} are allowed`;
    const message = `The numbers of this model would ${needs}. ${remedy(setup)}`;
    const results = symbolicResults(spec);
    // What has not been confirmed by numbers is no verdict.
    const terms = results.terms.map(t => ({ ...t, ultraviolet: undecided(t.ultraviolet), status: null }));
    return { ...results, terms, remarks: [...remarks, { code: 'budget', message, subject: null }] };
  }
  options.progress?.(0, 'divergences');
  const ultraviolet = fullUltraviolet(setup, symbolic, stop);
  stop();
  const laws = [...(declared.scheme?.strengths ?? []), ...ultraviolet.strengths];
  const dense =
    setup.counterterms.length && symbolic.terms.some((t, n) => !t.contact || !declared.scheme?.growth[n])
      ? renormalisedConverges(setup, laws, stop)
      : null;
  const terms = ultraviolet.terms.map(t => (t.confirmed || t.verdict === 'undecided' ? t : undecided(t)));
  const status = statuses(setup, symbolic, terms, declared, dense);
  options.progress?.(0.3, 'amplitudes');
  const points = asked.points;
  const evaluation = points.length
    ? evaluateSeries(setup, points, laws, done => {
        stop();
        options.progress?.(0.3 + 0.5 * done, 'amplitudes along the scan of the cutoff');
      })
    : null;
  options.progress?.(0.8, 'convergence of the series');
  const infrared = infraredVerdicts(setup);
  const results: TermResult[] = setup.list.terms.map((_, n) => {
    const found = evaluation ? valuesOf(setup, evaluation, n).slice(0, asked.reported) : [];
    // Loops that the cutoff does not make finite have no value at any cutoff.
    const values = symbolic.terms[n].tooSoft
      ? found.map(value => ({ ...value, bare: null, renormalised: null, uncertainty: null }))
      : found;
    const one = termResult(setup, n, terms[n], status[n], values, infrared.verdicts[n]);
    const scan = evaluation && !symbolic.terms[n].tooSoft && scanOf(evaluation, n);
    return scan ? { ...one, scan } : one;
  });
  const infinite = symbolic.terms.some(t => t.tooSoft);
  const solution = beyondTheSeries(
    setup,
    infinite ? null : evaluation,
    infinite ? [] : points.slice(0, asked.reported),
    options.full,
    stop,
  );
  const expectations = judge(spec.expectations, {
    terms: results,
    convergenceAt: point => solution.convergence(asked.find(point)),
    driftAt: point => {
      const at = points.indexOf(asked.find(point)!);
      return evaluation && !infinite && at >= 0 ? driftOf(setup, evaluation, at) : null;
    },
    fullAt: point => solution.full(asked.find(point)),
    observables: solution.observables,
    dimension: spec.dimension,
    partialWave: spec.wave.kind === 'angular' ? spec.wave.number : 0,
  });
  return {
    terms: results,
    sum: evaluation && !infinite ? sums(setup, evaluation, points.slice(0, asked.reported), solution.wanted ? solution.full : null) : [],
    series: infinite ? [] : points.slice(0, asked.reported).map(p => solution.convergence(p)!),
    counterterms: evaluation && !infinite ? countertermResults(setup, evaluation) : [],
    couplings: couplingResults(setup, evaluation),
    observables: solution.observables,
    expectations,
    remarks: [...remarks, ...ultraviolet.remarks, ...infrared.remarks],
  };
}

const undecided = (t: Ultraviolet): Ultraviolet => ({ ...t, verdict: 'undecided', power: null, log: null });

function termResult(
  setup: Setup,
  n: number,
  ultraviolet: Ultraviolet,
  status: TermResult['status'],
  values: TermResult['values'],
  infrared: TermResult['infrared']['verdict'],
): TermResult {
  const { name, exponents, order } = setup.list.terms[n];
  return {
    monomial: name,
    exponents,
    order,
    ultraviolet,
    infrared: { verdict: infrared },
    status,
    cancelledBy: status === 'cancelled' ? cancelledBy(setup, n) : [],
    values,
  };
}

function scanOf(evaluation: Evaluation, n: number): TermResult['scan'] | null {
  const usable = evaluation.scan.filter(s => Number.isFinite(s.bare[0][n].forward.re) && Number.isFinite(s.renormalised[0][n].forward.re));
  if (!usable.length) return null;
  return {
    ...named(evaluation.points[0]),
    cutoff: usable.map(s => s.cutoff),
    bare: usable.map(s => s.bare[0][n].forward),
    renormalised: usable.map(s => s.renormalised[0][n].forward),
  };
}

function sums(setup: Setup, evaluation: Evaluation, points: readonly OnShellPoint[], full: BeyondTheSeries['full'] | null): SumResult[] {
  return points.flatMap((point, j): SumResult[] => {
    const { orders, values } = byOrder(setup, evaluation.at.renormalised[j]);
    if (values.some(v => !Number.isFinite(v.re) || !Number.isFinite(v.im))) return [];
    const solved = full?.(point);
    const beyond = solved
      ? {
          full: solved.forward,
          ...(solved.phaseShift === null ? {} : { phaseShift: solved.phaseShift }),
          ...(solved.transmission === null ? {} : { transmission: solved.transmission, reflection: solved.reflection! }),
        }
      : {};
    const scanned = evaluation.scan.length ? { drift: driftOf(setup, evaluation, j) } : {};
    return [{ ...named(point), orders, byOrder: values, ...beyond, ...scanned }];
  });
}

function nothing(spec: ModelSpec, remarks: readonly Remark[]): ModelResults {
  return {
    terms: [],
    sum: [],
    series: [],
    counterterms: [],
    couplings: spec.couplings.map(({ name, value, dimension }) => ({ name, value, dimension })),
    observables: null,
    expectations: spec.expectations.map(() => ({ text: '', holds: null, measured: 'not evaluated' })),
    remarks,
  };
}
