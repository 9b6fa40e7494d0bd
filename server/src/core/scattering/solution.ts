import type { Complex } from '../algebra/expression';
import type { ConvergenceResult } from '../results';
import { named, nearest, onShellWeights, type CutoffGrid, type OnShellPoint, type Strength } from '../series/amplitudes';
import type { ScaledVertex } from '../series/grid-chain';
import { finiteRankLoop, finiteRankStandingWave } from './finite-rank';
import { amplitudeFromStandingWave, standingWave } from './full';
import { potentialMatrix } from './potential';
import { eigenvaluesOfLoop, outgoing, weinbergEigenvalues } from './weinberg';

const ONE: Complex = { re: 1, im: 0 };

/** The interactions with, where they are given, the counterterms at their strengths at this cutoff. */
export function potentialParts(at: CutoffGrid, strengths: readonly Strength[]): ScaledVertex[] {
  return [
    ...at.setup.vertices.map(vertex => ({ vertex, strength: ONE })),
    ...strengths.map(s => ({ vertex: s.counterterm.vertex, strength: s.value })),
  ];
}

/** The non-perturbative amplitude at one on-shell momentum. */
export interface FullAmplitude {
  /** T(p, p), regulator of the legs included. */
  readonly forward: Complex;
  /** T(-p, p) in dimension 1 (full). */
  readonly backward: Complex | null;
  /** Degrees; null in dimension 1 (full). */
  readonly phaseShift: number | null;
  /** Probabilities; null but in dimension 1 (full). */
  readonly transmission: number | null;
  readonly reflection: number | null;
  /** tan δ = -ρ K of a single channel; NaN in dimension 1 (full). */
  readonly tangent: number;
}

/** Solves T = V + V G T. Every wave but dimension 1 `full`: tan δ = -ρK; there t = 1 - 2iρT(p,p), r = -2iρT(-p,p). */
export function fullAmplitude(at: CutoffGrid, parts: readonly ScaledVertex[], point: OnShellPoint): FullAmplitude {
  const problem = onShellWeights(at, point);
  const k = finiteRankStandingWave(parts, problem) ?? standingWave(potentialMatrix(at.kernels, parts, problem), problem);
  const t = amplitudeFromStandingWave(k, problem.density);
  const column = nearest(problem.externals, point.p);
  const leg = at.setup.regulator.leg(point.p / at.cutoff) ** 2;
  const scaled = (c: Complex): Complex => ({ re: c.re * leg, im: c.im * leg });
  const forward = t[column][column];
  if (point.below)
    return { forward: scaled(forward), backward: null, phaseShift: null, transmission: null, reflection: null, tangent: NaN };
  const density = problem.density[column];
  if (at.setup.kinematics.signed) {
    const backward = t[nearest(problem.externals, -point.p)][column];
    const transmission = (1 + 2 * density * forward.im) ** 2 + (2 * density * forward.re) ** 2;
    const reflection = (2 * density) ** 2 * (backward.re ** 2 + backward.im ** 2);
    return { forward: scaled(forward), backward: scaled(backward), phaseShift: null, transmission, reflection, tangent: NaN };
  }
  const tangent = -density * k[column][column].re;
  return {
    forward: scaled(forward),
    backward: null,
    phaseShift: (Math.atan(tangent) * 180) / Math.PI,
    transmission: null,
    reflection: null,
    tangent,
  };
}

/** Weinberg's eigenvalues of the interactions at one momentum and at this grid's cutoff. */
export function convergenceAt(at: CutoffGrid, point: OnShellPoint): ConvergenceResult {
  const problem = onShellWeights(at, point);
  const parts = potentialParts(at, []);
  const loop = finiteRankLoop(parts, problem, outgoing(problem));
  const { values, residual } = loop ? eigenvaluesOfLoop(loop) : weinbergEigenvalues(potentialMatrix(at.kernels, parts, problem), problem);
  const largest = values[0] ?? { re: 0, im: 0 };
  const size = Math.hypot(largest.re, largest.im);
  const decided = Math.abs(size - 1) > residual && Number.isFinite(size);
  return {
    ...named(point),
    largestEigenvalue: Number.isFinite(size) ? largest : null,
    converges: decided ? size < 1 : null,
    eigenvalues: Number.isFinite(size) ? values : [],
  };
}
