import { CutoffGrid } from '../series/amplitudes';
import type { ScaledVertex } from '../series/grid-chain';
import { loopWeights } from '../series/loop-weights';
import type { Setup } from '../series/setup';
import { boundStateDeterminant } from './full';
import { potentialMatrix } from './potential';

/** A binding energy (positive), with its error. */
export interface BoundState {
  readonly energy: number;
  readonly error: number;
}

/** Momenta κ at which a change of sign is looked for, from LOWEST to twice the cutoff. */
const TRIALS = 160;
const LOWEST = 1e-4;

/**
 * Zeros of det(1 - V G(E)) below threshold at this cutoff, deepest first: looked for on a coarse grid, then followed on two that resolve the
 * momentum κ found, whose difference is the error. States with κ below 1e-4 of the cutoff, and pairs of states between two trials, are not
 * seen. Real potentials only.
 */
export function boundStates(setup: Setup, cutoff: number, parts: readonly ScaledVertex[], stop: () => void): BoundState[] {
  const search = new CutoffGrid(setup, cutoff, [setup.momentum], 8);
  const trials = Array.from({ length: TRIALS }, (_, j) => cutoff * LOWEST * (2 / LOWEST) ** (j / (TRIALS - 1)));
  const values = trials.map(kappa => {
    stop();
    return determinantAt(search, parts, kappa);
  });
  const states: BoundState[] = [];
  for (let j = trials.length - 2; j >= 0; j--) {
    if (values[j] > 0 === values[j + 1] > 0) continue;
    const rough = zero(kappa => determinantAt(search, parts, kappa), trials[j], trials[j + 1])!;
    const [coarse, fine] = [12, 16].map(nodes => {
      const at = new CutoffGrid(setup, cutoff, [rough], nodes);
      return zero(kappa => determinantAt(at, parts, kappa), trials[j], trials[j + 1]);
    });
    // A state at the very edge of the interval may lie just beyond it on another grid: then the interval is all that is known.
    const energy = depth(setup, fine ?? rough);
    const other = depth(setup, coarse !== null && fine !== null ? coarse : energy > depth(setup, trials[j]) ? trials[j] : trials[j + 1]);
    states.push({ energy, error: Math.abs(energy - other) + 1e-11 * energy });
  }
  return states;
}

/** Binding energy of the trial momentum κ. */
const depth = ({ kinematics }: Setup, kappa: number): number => kinematics.energy(kappa) - kinematics.threshold;

function determinantAt(at: CutoffGrid, parts: readonly ScaledVertex[], kappa: number): number {
  const { kinematics, regulator } = at.setup;
  const E = kinematics.threshold - depth(at.setup, kappa);
  const problem = loopWeights(kinematics, regulator, at.grid, { re: E, im: 0 }, false, [], 0);
  const { sign, log } = boundStateDeterminant(potentialMatrix(at.kernels, parts, problem), problem);
  return sign * Math.exp(Math.min(600, log));
}

/** False position, Illinois variant; null where the ends have one sign. */
function zero(f: (x: number) => number, low: number, high: number): number | null {
  let [a, b] = [low, high];
  let [fa, fb] = [f(a), f(b)];
  if (fa > 0 === fb > 0) return null;
  for (let n = 0; n < 80 && Math.abs(b - a) > 1e-13 * Math.abs(b) && fb !== 0; n++) {
    const c = (a * fb - b * fa) / (fb - fa);
    const fc = f(c);
    if (fc > 0 === fb > 0) fa /= 2;
    else [a, fa] = [b, fb];
    [b, fb] = [c, fc];
  }
  return b;
}
