import type { Complex } from '../algebra/expression';
import { momentumGrid, type GridWishes } from '../model/momentum-grid';
import { gridWishes } from './amplitudes';
import { energyAway } from './contact-divergences';
import { GridKernels } from './dense-words';
import { contactStates } from './contact-states';
import { GridChain, type ScaledVertex } from './grid-chain';
import { loopWeights } from './loop-weights';
import { kernelScales, oscillationLength, softMomentum, type Setup } from './setup';
import { externalsAt } from './subtraction';

/** A ladder of cutoffs, with the grids and kernels at each rung. */
export interface Ladder {
  readonly cutoffs: readonly number[];
  /** The bare series at one energy and a few external momenta: what its growth is read from. */
  bare(): BareRun;
  /** The series at several energies and more momenta, with room for counterterms: what forms are fitted to. */
  fitting(): FittingRun;
}

export interface BareRun {
  readonly energy: Complex;
  readonly externals: readonly number[];
  /** Advances every rung to monomial n. */
  step(n: number): void;
  /** R_n at [rung] for one row and column (indices of `externals`). */
  values(n: number, row: number, column: number): Complex[];
}

export interface FittingRun {
  readonly cutoffs: readonly number[];
  readonly energies: readonly Complex[];
  readonly externals: readonly number[];
  step(n: number): void;
  /** The parts of R_n by what stands at its ends, each at [rung]. */
  parts(n: number, energy: number): AmplitudePart[];
  /** Adds a counterterm to monomial n: its strength at each rung. */
  addCounterterm(n: number, parts: (cutoff: number) => readonly ScaledVertex[]): void;
}

/**
 * One end of a chain: a contact, which leaves a power of the external momentum; or another kernel, at one of the ladder's external momenta.
 */
export type ChainEnd = { readonly power: number } | { readonly momentum: number };

/** Coefficient of the powers at the ends. R_n(p, k) is the sum over all ends that are powers or stand at p and k. */
export interface AmplitudePart {
  readonly left: ChainEnd;
  readonly right: ChainEnd;
  readonly values: readonly Complex[];
}

export interface LadderWishes {
  readonly rungs: number;
  readonly energies: number;
  /** Different external momenta (each with both signs in dimension 1, full). */
  readonly momenta: number;
  readonly pointsPerPanel: number;
  /** Powers of momentum that counterterms on the ladder may bring in. */
  readonly powers: readonly number[];
  /** Fastest bare growth: steep ones take a short ladder, since rounding of the leading term hides what lies below it. */
  readonly steepest: number;
}

/**
 * Start of the ladder in units of the largest soft momentum; a power law has to be visible through its corrections. Edges of a potential and
 * deltas away from the origin oscillate in momentum up to the highest cutoff, and the grid has to follow.
 */
const START = { smooth: 50, edged: 15 };
/** Ratio of successive cutoffs: no simple number, so that no oscillation is met always at the same phase. */
const RATIO = { gentle: 1.5422107, steep: 1.2713049 };

/** The cutoffs of the ladder, lowest first. */
export function ladderCutoffs(setup: Setup, { rungs, steepest }: Pick<LadderWishes, 'rungs' | 'steepest'>): number[] {
  const length = oscillationLength(setup.vertices);
  // Only kernels that act on functions of momentum make a fine grid costly.
  const edged = length > 0 && setup.vertices.some(v => !v.finiteRank);
  const start = START[edged ? 'edged' : 'smooth'] * Math.max(softMomentum(setup), length > 0 ? 2 / length : 0);
  const ratio = RATIO[edged || steepest > 3 ? 'steep' : 'gentle'];
  return Array.from({ length: rungs }, (_, j) => start * ratio ** j);
}

const ladderMomenta = (setup: Setup, { momenta }: Pick<LadderWishes, 'momenta'>): number[] =>
  Array.from({ length: momenta }, (_, j) => softMomentum(setup) * (0.61803 + 0.41421 * j));

/** What the grid of a rung has to resolve: off shell there is no pole, but what oscillates does so everywhere. */
export function rungWishes(setup: Setup, cutoff: number, wishes: Pick<LadderWishes, 'momenta' | 'pointsPerPanel'>): GridWishes {
  const all = gridWishes(setup, cutoff, ladderMomenta(setup, wishes), wishes.pointsPerPanel);
  return oscillationLength(setup.vertices) > 0
    ? all
    : { ...all, external: 0, edgeWidth: Math.min(Infinity, ...kernelScales(setup.vertices)) };
}

export function buildLadder(setup: Setup, wishes: LadderWishes): Ladder {
  const { kinematics, regulator, list, vertices } = setup;
  const soft = softMomentum(setup);
  const cutoffs = ladderCutoffs(setup, wishes);
  const momenta = ladderMomenta(setup, wishes);
  const externals = momenta.flatMap(k => externalsAt(kinematics, k));
  const energies = Array.from({ length: wishes.energies }, (_, j) => energyAway(kinematics, soft, 0.7310585786 + 0.6 * j));
  const rungs = cutoffs.map(cutoff => {
    const grid = momentumGrid(kinematics, regulator, cutoff, rungWishes(setup, cutoff, wishes));
    return { cutoff, grid, kernels: new GridKernels(grid) };
  });
  return {
    cutoffs,
    bare: () => {
      const two = externalsAt(kinematics, momenta[0]).length > 1 ? externalsAt(kinematics, momenta[0]) : externals.slice(0, 2);
      const chains = rungs.map(({ grid, kernels }) => {
        const problem = loopWeights(kinematics, regulator, grid, energies[0], false, two, 2 * setup.size);
        return new GridChain(list, vertices, kernels, [problem]);
      });
      return {
        energy: energies[0],
        externals: two,
        step: n => chains.forEach(chain => chain.step(n)),
        values: (n, row, column) => chains.map(chain => chain.amplitude(n, 0, row, column)),
      };
    },
    fitting: () => {
      const highest = 2 * Math.max(setup.size, ...wishes.powers);
      const centralPowers = [...new Set(contactStates(vertices).flatMap(({ power, phase }) => (phase === 0 ? [power] : [])))];
      const chains = rungs.map(({ grid, kernels }) => {
        const problems = energies.map(E => loopWeights(kinematics, regulator, grid, E, false, externals, highest, centralPowers));
        return new GridChain(
          list,
          vertices,
          kernels,
          problems,
          wishes.powers.map(power => ({ power, phase: 0 })),
        );
      });
      return {
        cutoffs,
        energies,
        externals,
        step: n => chains.forEach(chain => chain.step(n)),
        parts: (n, energy) => partsOf(chains, n, energy, externals),
        addCounterterm: (n, parts) => chains.forEach((chain, j) => chain.addCounterterm(n, parts(cutoffs[j]))),
      };
    },
  };
}

function partsOf(chains: readonly GridChain[], n: number, energy: number, externals: readonly number[]): AmplitudePart[] {
  const { powers, endPowers } = chains[0];
  const rights: ChainEnd[] = [...externals.map((_, momentum) => ({ momentum })), ...endPowers.map(power => ({ power }))];
  return rights.flatMap((right, c) => {
    const ends = chains.map(chain => chain.contactEnd(n, energy, c));
    const contacts = powers.map((power, a): AmplitudePart => ({ left: { power }, right, values: ends.map(e => e[a]) }));
    const others = externals.map((_, momentum): AmplitudePart => ({
      left: { momentum },
      right,
      values: chains.map(chain => chain.dressedAmplitude(n, energy, momentum, c)),
    }));
    return [...contacts, ...others].filter(part => part.values.some(v => v.re !== 0 || v.im !== 0));
  });
}
