import type { ModelSpec } from '../model/spec';
import type { ConvergenceResult, ObservablesResult } from '../results';
import { CutoffGrid, type OnShellPoint } from '../series/amplitudes';
import type { Evaluation } from '../series/evaluation';
import type { Setup } from '../series/setup';
import { boundStates } from './bound-states';
import { lowEnergy } from './low-energy';
import { convergenceAt, fullAmplitude, potentialParts, type FullAmplitude } from './solution';

/** What is known besides the series, each part computed when first asked for; null where the point has no momentum. */
export interface BeyondTheSeries {
  /** Whether the full solution was asked for. */
  readonly wanted: boolean;
  convergence(point: OnShellPoint | null): ConvergenceResult | null;
  full(point: OnShellPoint | null): (FullAmplitude & { readonly p: number }) | null;
  readonly observables: ObservablesResult | null;
}

/** Whether anything asks for the full solution. */
export const wantsFull = ({ expectations }: ModelSpec, alsoFull: boolean): boolean =>
  alsoFull || expectations.some(e => e.kind === 'observable');

/** The full solution and the eigenvalues, each computed when first asked for. `alsoFull`: also where no expectation needs it. */
export function beyondTheSeries(
  setup: Setup,
  evaluation: Evaluation | null,
  points: readonly OnShellPoint[],
  alsoFull: boolean,
  stop: () => void,
): BeyondTheSeries {
  const { spec } = setup;
  const momenta = [...points, ...(evaluation?.points ?? [])].map(p => p.p);
  const wanted = wantsFull(spec, alsoFull);
  // Eigenvalues alone are wanted to fewer digits.
  const grid = momenta.length ? new CutoffGrid(setup, spec.cutoff.value, momenta, wanted ? 12 : 8) : null;
  const parts = grid && evaluation ? potentialParts(grid, evaluation.at.strengths) : [];
  const memo = <T>(compute: (point: OnShellPoint) => T) => {
    const known = new Map<OnShellPoint, T>();
    return (point: OnShellPoint | null): T | null => {
      if (!point || !grid) return null;
      if (!known.has(point)) {
        stop();
        known.set(point, compute(point));
      }
      return known.get(point)!;
    };
  };
  const convergence = memo((point): ConvergenceResult => convergenceAt(grid!, point));
  const full = memo(point => {
    const solved = fullAmplitude(grid!, parts, point);
    return Number.isFinite(solved.forward.re) ? { ...solved, p: point.p } : null;
  });
  return { wanted, convergence, full, observables: wanted && grid ? observablesOf(setup, parts, stop) : null };
}

function observablesOf(setup: Setup, parts: ReturnType<typeof potentialParts>, stop: () => void): ObservablesResult | null {
  const cutoff = setup.spec.cutoff.value;
  const low = lowEnergy(setup, cutoff, parts, Math.min(setup.momentum, cutoff / 10) / 20);
  const real = parts.every(p => p.vertex.element.real && p.strength.im === 0);
  const bound = real && setup.kinematics.threshold > -Infinity ? boundStates(setup, cutoff, parts, stop) : null;
  if (!low && !bound) return null;
  const finite = low && Number.isFinite(low.scatteringLength) && Number.isFinite(low.scatteringLengthError);
  const range = low && low.effectiveRange !== null && Number.isFinite(low.effectiveRange) && Number.isFinite(low.effectiveRangeError);
  return {
    ...(finite ? { scattering_length: low.scatteringLength } : {}),
    ...(range ? { effective_range: low.effectiveRange } : {}),
    ...(bound ? { binding_energies: bound.map(b => b.energy) } : {}),
    definition: low?.definition ?? 'binding energies from the threshold',
    uncertainties: {
      ...(finite ? { scattering_length: low.scatteringLengthError } : {}),
      ...(range ? { effective_range: low.effectiveRangeError } : {}),
      ...(bound ? { binding_energies: bound.map(b => b.error) } : {}),
    },
  };
}
