import type { CutoffGrid } from '../series/amplitudes';
import type { ScaledVertex } from '../series/grid-chain';
import { loopWeights } from '../series/loop-weights';
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
 * Zeros of det(1 - V G(E)) below threshold, deepest first: found on the coarse grid, followed on the fine one; the error is what lies between
 * them. States bound by less than E(κ = 1e-4 of the cutoff), and pairs of states between two trials, are not seen. Real potentials only.
 */
export function boundStates(fine: CutoffGrid, coarse: CutoffGrid, parts: readonly ScaledVertex[], stop: () => void): BoundState[] {
  const trials = Array.from({ length: TRIALS }, (_, j) => coarse.cutoff * LOWEST * (2 / LOWEST) ** (j / (TRIALS - 1)));
  const values = trials.map(kappa => {
    stop();
    return determinantAt(coarse, parts, kappa);
  });
  const states: BoundState[] = [];
  for (let j = trials.length - 2; j >= 0; j--) {
    if (values[j] > 0 === values[j + 1] > 0) continue;
    const first = zero(kappa => determinantAt(coarse, parts, kappa), trials[j], trials[j + 1]);
    const second = zero(kappa => determinantAt(fine, parts, kappa), trials[j], trials[j + 1]);
    if (first === null || second === null) continue;
    const energy = depth(fine, second);
    states.push({ energy, error: Math.abs(energy - depth(fine, first)) + 1e-11 * energy });
  }
  return states;
}

/** Binding energy of the trial momentum κ. */
const depth = ({ setup: { kinematics } }: CutoffGrid, kappa: number): number => kinematics.energy(kappa) - kinematics.threshold;

function determinantAt(at: CutoffGrid, parts: readonly ScaledVertex[], kappa: number): number {
  const { kinematics, regulator } = at.setup;
  const E = kinematics.threshold - depth(at, kappa);
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
