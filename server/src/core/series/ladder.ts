import type { Complex } from '../algebra/expression';
import { momentumGrid } from '../model/momentum-grid';
import { gridWishes } from './amplitudes';
import { energyAway } from './contact-divergences';
import { GridKernels } from './dense-words';
import { GridChain, type ScaledVertex } from './grid-chain';
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
  /** Adds a counterterm to monomial n: its strength at each rung. */
  addCounterterm(n: number, parts: (cutoff: number) => readonly ScaledVertex[]): void;
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
    const grid = momentumGrid(kinematics, regulator, cutoff, gridWishes(setup, momenta, wishes.pointsPerPanel));
    const problems = energies.map(E => loopWeights(kinematics, regulator, grid, E, false, externals, 2 * Math.max(setup.size, ...wishes.powers)));
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
    values: (n, energy, row, column) => rungs.map(rung => rung.chain.amplitude(n, energy, row, column)),
    addCounterterm: (n, parts) => rungs.forEach(rung => rung.chain.addCounterterm(n, parts(rung.cutoff))),
  };
}
