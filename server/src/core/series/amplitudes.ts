import type { Complex } from '../algebra/expression';
import type { LaurentTerm } from '../algebra/laurent';
import { solveSmall } from '../linear/solve';
import { momentumGrid, type GridWishes, type MomentumGrid } from '../model/momentum-grid';
import { GridKernels } from './dense-words';
import { contactStates } from './contact-states';
import { GridChain, type ScaledVertex } from './grid-chain';
import type { StrengthLaw } from './contact-declared';
import { loopWeights, type LoopWeights } from './loop-weights';
import { isSingular, kernelScales, oscillationLength, type Setup } from './setup';
import {
  blockAmplitude,
  conditionMatrix,
  externalsAt,
  subtractionGroups,
  type Counterterm,
  type SubtractionGroup,
  type SubtractionPoint,
} from './subtraction';
import { amplitudesFromStandingWaves, type Block } from './unitarity';

/** The strength of one counterterm, for one of the monomials it cancels, at one cutoff. */
export interface Strength {
  readonly counterterm: Counterterm;
  readonly term: number;
  readonly value: Complex;
}

/**
 * An on-shell momentum asked for, with its energy. `below`: the energy is below threshold by as much as that of p is above it, and the
 * amplitude is T(p, p; E), off shell.
 */
export interface OnShellPoint {
  readonly p: number;
  readonly E: number;
  readonly below?: boolean;
}

/** A point as results name it: by its momentum too where it is on shell. */
export const named = ({ p, E, below }: OnShellPoint): { p?: number; E: number } => (below ? { E } : { p, E });

/** Everything at one cutoff: amplitudes at [momentum][monomial], regulator of the external legs included. */
export interface CutoffResult {
  readonly cutoff: number;
  readonly bare: readonly (readonly OnShellAmplitude[])[];
  readonly renormalised: readonly (readonly OnShellAmplitude[])[];
  readonly strengths: readonly Strength[];
}

/** T(p, p) and, in dimension 1 (full), T(-p, p). */
export interface OnShellAmplitude {
  readonly forward: Complex;
  readonly backward: Complex | null;
}

/** What a grid for this model has to resolve. */
export function gridWishes(setup: Setup, cutoff: number, momenta: readonly number[], pointsPerPanel: number): GridWishes {
  const scales = kernelScales(setup.vertices);
  const length = oscillationLength(setup.vertices);
  const external = Math.max(...momenta.map(Math.abs));
  const narrowest = Math.min(Infinity, ...scales, ...(length > 0 ? [5 / length] : []));
  return {
    // A pole at p leaves something smooth behind on a panel a few times as wide.
    smallest: Math.min(3 * Math.min(...momenta.map(Math.abs).filter(p => p > 0)), narrowest),
    external: length > 0 ? Infinity : external,
    kernelScale: narrowest,
    edgeWidth: Math.max(narrowest, cutoff / 8),
    singular: setup.vertices.some(isSingular) ? [...new Set(momenta.map(Math.abs))] : [],
    pointsPerPanel,
    growth: 2 * (setup.size - 1) + setup.kinematics.dimension,
  };
}

/** The grid at a cutoff with its kernels, shared by every run there. */
export class CutoffGrid {
  readonly grid: MomentumGrid;
  readonly kernels: GridKernels;

  constructor(
    readonly setup: Setup,
    readonly cutoff: number,
    momenta: readonly number[],
    pointsPerPanel: number,
  ) {
    const subtraction = setup.counterterms.filter(c => c.spec.scheme.kind !== 'minimal').map(c => c.spec.scheme.at);
    this.grid = momentumGrid(
      setup.kinematics,
      setup.regulator,
      cutoff,
      gridWishes(setup, cutoff, [...momenta, ...subtraction], pointsPerPanel),
    );
    this.kernels = new GridKernels(this.grid);
  }
}

/** The series at one cutoff: bare, and with the counterterms the model declares. */
export function seriesAtCutoff(at: CutoffGrid, points: readonly OnShellPoint[], laws: readonly StrengthLaw[]): CutoffResult {
  const { setup, cutoff } = at;
  const problems = points.map(point => onShellWeights(at, point));
  const bare = runBare(at, problems);
  if (setup.counterterms.length === 0) {
    const amplitudes = points.map((point, j) =>
      onShell(
        setup,
        cutoff,
        problems[j],
        point,
        bare.map(blocks => blocks[j]),
      ),
    );
    return { cutoff, bare: amplitudes, renormalised: amplitudes, strengths: [] };
  }
  const run = runRenormalised(at, problems, laws);
  return {
    cutoff,
    bare: points.map((point, j) =>
      onShell(
        setup,
        cutoff,
        problems[j],
        point,
        bare.map(blocks => blocks[j]),
      ),
    ),
    renormalised: points.map((point, j) =>
      onShell(
        setup,
        cutoff,
        problems[j],
        point,
        run.standing.map(blocks => blocks[j]),
      ),
    ),
    strengths: run.strengths,
  };
}

/** The problem of one point; at threshold and below, where the propagator has no pole, the amplitude at p itself. */
export function onShellWeights(at: CutoffGrid, { p, E }: OnShellPoint): LoopWeights {
  const weights = weightsAt(at, E, true, []);
  return weights.externals.length ? weights : withoutWeight(weightsAt(at, E, false, externalsAt(at.setup.kinematics, p)));
}

/** The external momenta as loop momenta of no weight, so that every solver finds them where it looks for on-shell ones. */
function withoutWeight(problem: LoopWeights): LoopWeights {
  const count = problem.externals.length;
  const padded = (g: Float64Array) => (g.length ? Float64Array.from([...g, ...new Float64Array(count)]) : g);
  return { ...problem, g: { re: padded(problem.g.re), im: padded(problem.g.im) }, density: problem.externals.map(() => 0) };
}

function weightsAt({ setup, grid }: CutoffGrid, E: number, onShell: boolean, others: readonly number[]): LoopWeights {
  return loopWeights(setup.kinematics, setup.regulator, grid, { re: E, im: 0 }, onShell, others, 2 * setup.size);
}

/** K at [monomial][problem]. */
function runBare(at: CutoffGrid, problems: readonly LoopWeights[]): Block[][] {
  const { list, vertices } = at.setup;
  const chain = new GridChain(list, vertices, at.kernels, problems);
  return list.terms.map((_, n) => {
    chain.step(n);
    return problems.map((p, j) => blockFrom(chain, n, j, p.externals.length));
  });
}

function blockFrom(chain: GridChain, n: number, problem: number, count: number): Block {
  const indices = Array.from({ length: count }, (_, i) => i);
  return indices.map(row => indices.map(column => chain.amplitude(n, problem, row, column)));
}

function runRenormalised(
  at: CutoffGrid,
  problems: readonly LoopWeights[],
  laws: readonly StrengthLaw[],
): { standing: Block[][]; strengths: Strength[] } {
  const { setup } = at;
  const { list, vertices, kinematics, counterterms } = setup;
  const groups = list.terms.map(t => subtractionGroups(counterterms, t.exponents, kinematics));
  const extra: SubtractionPoint[] = [];
  const indexOf = (point: SubtractionPoint): number => {
    const known = extra.findIndex(p => p.E === point.E && p.momentum === point.momentum);
    return problems.length + (known >= 0 ? known : extra.push(point) - 1);
  };
  groups.flat().forEach(group => group.points.forEach(indexOf));
  const all = [...problems, ...extra.map(p => weightsAt(at, p.E, p.onShell, p.onShell ? [] : externalsAt(kinematics, p.momentum)))];
  const chain = new GridChain(list, vertices, at.kernels, all, contactStates(counterterms.map(c => c.vertex)));
  const strengths: Strength[] = [];
  const standing = list.terms.map((_, n) => {
    chain.step(n);
    const set: Strength[] = laws
      .filter(l => l.term === n)
      .map(l => ({ counterterm: l.counterterm, term: n, value: evaluateLaw(l.law, at.cutoff) }));
    for (const group of groups[n])
      set.push(...solveGroup(group, n, (point, row, column) => amplitudeAt(chain, n, all, indexOf(point), point, row, column)));
    if (set.length) {
      strengths.push(...set);
      chain.addCounterterm(
        n,
        set.map((s): ScaledVertex => ({ vertex: s.counterterm.vertex, strength: s.value })),
      );
    }
    return problems.map((p, j) => blockFrom(chain, n, j, p.externals.length));
  });
  return { standing, strengths };
}

function amplitudeAt(
  chain: GridChain,
  n: number,
  all: readonly LoopWeights[],
  problem: number,
  point: SubtractionPoint,
  row: 1 | -1,
  column: 1 | -1,
): Complex {
  const externals = all[problem].externals;
  return chain.amplitude(n, problem, nearest(externals, row * point.momentum), nearest(externals, column * point.momentum));
}

export function nearest(externals: readonly number[], momentum: number): number {
  let best = 0;
  externals.forEach((k, j) => {
    if (Math.abs(k - momentum) < Math.abs(externals[best] - momentum)) best = j;
  });
  return best;
}

function solveGroup(
  group: SubtractionGroup,
  term: number,
  value: (point: SubtractionPoint, row: 1 | -1, column: 1 | -1) => Complex,
): Strength[] {
  const rhs = group.weights.map(weights => {
    const sum = { re: 0, im: 0 };
    group.points.forEach((point, j) => {
      const v = blockAmplitude(group.block, (row, column) => value(point, row, column));
      sum.re -= weights[j] * v.re;
      sum.im -= weights[j] * v.im;
    });
    return sum;
  });
  const solved = solveSmall(conditionMatrix(group), rhs);
  return solved ? solved.map((strength, j) => ({ counterterm: group.counterterms[j], term, value: strength })) : [];
}

/** Σ c L^power (ln L)^log. */
export function evaluateLaw(law: readonly LaurentTerm[], cutoff: number): Complex {
  const sum = { re: 0, im: 0 };
  for (const t of law) {
    const size = cutoff ** t.power * Math.log(cutoff) ** t.log;
    sum.re += t.re * size;
    sum.im += t.im * size;
  }
  return sum;
}

/** T with the external legs' regulator, at the momentum asked for. */
function onShell(setup: Setup, cutoff: number, problem: LoopWeights, { p }: OnShellPoint, standing: readonly Block[]): OnShellAmplitude[] {
  const amplitudes = amplitudesFromStandingWaves(setup.list, standing, problem.density);
  const leg = setup.regulator.leg(p / cutoff) ** 2;
  const column = nearest(problem.externals, p);
  const scaled = (c: Complex): Complex => ({ re: c.re * leg, im: c.im * leg });
  return amplitudes.map(block => ({
    forward: scaled(block[column][column]),
    backward: setup.kinematics.signed ? scaled(block[nearest(problem.externals, -p)][column]) : null,
  }));
}
