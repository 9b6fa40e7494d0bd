import type { Complex } from '../algebra/expression';
import { momentumGrid } from '../model/momentum-grid';
import { gridWishes } from './amplitudes';
import { energyAway } from './contact-divergences';
import { GridKernels } from './dense-words';
import { contactPowers, GridChain, type ScaledVertex } from './grid-chain';
import { loopWeights } from './loop-weights';
import { kernelScales, oscillationLength, type Setup } from './setup';
import { externalsAt } from './subtraction';

/** Energies (away from thresholds and poles) and external momenta at which amplitudes are followed up a ladder of cutoffs. */
export interface Ladder {
  readonly cutoffs: readonly number[];
  readonly energies: readonly Complex[];
  readonly externals: readonly number[];
  /** Starts the recursion afresh, on the same grids and kernels. */
  restart(): void;
  /** Advances every rung to monomial n. */
  step(n: number): void;
  /** R_n at [rung] for one energy, row and column (indices of `externals`). */
  values(n: number, energy: number, row: number, column: number): Complex[];
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

/** Start of the ladder in units of the largest soft momentum; a power law has to be visible through its corrections. */
const START = 50;
/** Ratio of successive cutoffs: no simple number, so that no oscillation is met always at the same phase. */
const RATIO = { gentle: 1.5422107, steep: 1.2713049 };

export function buildLadder(setup: Setup, wishes: LadderWishes): Ladder {
  const { kinematics, regulator, list, vertices } = setup;
  const scales = kernelScales(vertices);
  const length = oscillationLength(vertices);
  const soft = Math.max(setup.momentum, ...scales.filter(s => s < 1e3 * setup.momentum));
  const momenta = Array.from({ length: wishes.momenta }, (_, j) => soft * (0.61803 + 0.41421 * j));
  const externals = momenta.flatMap(k => externalsAt(kinematics, k));
  const start = START * Math.max(soft, length > 0 ? 2 / length : 0);
  const ratio = wishes.steepest > 3 ? RATIO.steep : RATIO.gentle;
  const cutoffs = Array.from({ length: wishes.rungs }, (_, j) => start * ratio ** j);
  const energies = Array.from({ length: wishes.energies }, (_, j) => energyAway(kinematics, soft, 0.7310585786 + 0.6 * j));
  const rungs = cutoffs.map(cutoff => {
    const soft = { external: 0, edgeWidth: Math.min(Infinity, ...scales) };
    const grid = momentumGrid(kinematics, regulator, cutoff, {
      ...gridWishes(setup, cutoff, momenta, wishes.pointsPerPanel),
      ...(length > 0 ? {} : soft),
    });
    const problems = energies.map(E =>
      loopWeights(kinematics, regulator, grid, E, false, externals, 2 * Math.max(setup.size, ...wishes.powers), contactPowers(vertices)),
    );
    const kernels = new GridKernels(grid);
    const start = () => new GridChain(list, vertices, kernels, problems, wishes.powers);
    return { start, chain: start(), cutoff };
  });
  return {
    restart: () => rungs.forEach(rung => (rung.chain = rung.start())),
    cutoffs,
    energies,
    externals,
    step: n => rungs.forEach(rung => rung.chain.step(n)),
    values: (n, energy, row, column) => rungs.map(rung => wholeAmplitude(rung.chain, n, energy, externals, row, column)),
    parts: (n, energy) =>
      partsOf(
        rungs.map(rung => rung.chain),
        n,
        energy,
        externals,
      ),
    addCounterterm: (n, parts) => rungs.forEach(rung => rung.chain.addCounterterm(n, parts(rung.cutoff))),
  };
}

/** R_n(p, k) put together from its parts. */
function wholeAmplitude(chain: GridChain, n: number, energy: number, externals: readonly number[], row: number, column: number): Complex {
  const sum = { re: 0, im: 0 };
  const add = (c: number, weight: number) => {
    const left = chain.dressedAmplitude(n, energy, row, c);
    chain.contactEnd(n, energy, c).forEach((u, a) => {
      const p = externals[row] ** chain.powers[a];
      left.re += p * u.re;
      left.im += p * u.im;
    });
    sum.re += weight * left.re;
    sum.im += weight * left.im;
  };
  add(column, 1);
  chain.endPowers.forEach((d, j) => add(externals.length + j, externals[column] ** d));
  return sum;
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
