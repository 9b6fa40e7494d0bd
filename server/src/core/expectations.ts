import type { ExpectationSpec } from './model/spec';
import type { ConvergenceResult, ExpectationResult, ObservablesResult, TermResult } from './results';
import type { FullAmplitude } from './scattering/solution';

/** What expectations are held against; each looked up only where one asks for it. */
export interface Evidence {
  readonly terms: readonly Pick<TermResult, 'order' | 'status' | 'monomial'>[];
  convergenceAt(point: { p: number | null; E: number | null }): ConvergenceResult | null;
  driftAt(point: { p: number | null; E: number | null }): number | null;
  fullAt(point: { p: number | null; E: number | null }): (FullAmplitude & { readonly p: number }) | null;
  readonly observables: ObservablesResult | null;
  readonly dimension: number;
  readonly partialWave: number;
}

/** Whether each expectation holds; null where that could not be decided. The text is filled in by whoever knows the file. */
export function judge(expectations: readonly ExpectationSpec[], evidence: Evidence): ExpectationResult[] {
  return expectations.map(e => {
    switch (e.kind) {
      case 'finite':
        return finite(e.to, evidence);
      case 'converges': {
        const found = evidence.convergenceAt(e.point);
        const size = found?.largestEigenvalue ? Math.hypot(found.largestEigenvalue.re, found.largestEigenvalue.im) : null;
        return {
          text: '',
          holds: found?.converges ?? null,
          measured: size === null ? 'not evaluated' : `largest eigenvalue ${size.toPrecision(4)}`,
          ...(size === null ? {} : { value: size, wanted: 1 }),
        };
      }
      case 'drift': {
        const drift = evidence.driftAt(e.point);
        if (drift === null)
          return { text: '', holds: null, measured: 'no scan of the cutoff to tell by: write `scan A .. B` after its shape' };
        return {
          text: '',
          holds: drift * 100 < e.percent,
          measured: `${(drift * 100).toPrecision(3)} %`,
          value: drift * 100,
          wanted: e.percent,
        };
      }
      case 'observable':
        return observable(e, evidence);
    }
  });
}

function finite(to: number | null, { terms }: Evidence): ExpectationResult {
  const asked = terms.filter(t => to === null || t.order <= to);
  const bad = asked.filter(t => t.status === 'uncancelled').map(t => t.monomial);
  const open = asked.filter(t => t.status === null).map(t => t.monomial);
  if (bad.length) return { text: '', holds: false, measured: `uncancelled: ${bad.join(', ')}` };
  if (open.length) return { text: '', holds: null, measured: `undecided: ${open.join(', ')}` };
  return { text: '', holds: true, measured: `finite in all ${asked.length} monomials` };
}

function observable(e: Extract<ExpectationSpec, { kind: 'observable' }>, evidence: Evidence): ExpectationResult {
  const { observables } = evidence;
  const compare = (value: number | null | undefined, error = 0): ExpectationResult => {
    if (value === null || value === undefined || !Number.isFinite(value))
      return { text: '', holds: null, measured: 'not evaluated in this dimension and wave' };
    const off = Math.abs(value - e.value);
    return {
      text: '',
      // Within its own error of the edge of what is allowed it could be either.
      holds: Math.abs(off - e.tolerance) < error ? null : off <= e.tolerance,
      measured: value.toPrecision(6) + (error > 1e-6 * Math.abs(value) ? ` ± ${error.toPrecision(1)}` : ''),
      value,
      wanted: e.value,
      tolerance: e.tolerance,
    };
  };
  const errorOf = (name: string, at = 0): number | undefined => [observables?.uncertainties[name] ?? 0].flat()[at];
  switch (e.observable) {
    case 'scattering_length':
      return compare(observables?.scattering_length, errorOf('scattering_length'));
    case 'effective_range':
      return compare(observables?.effective_range, errorOf('effective_range'));
    case 'binding_energy': {
      const energies = observables?.binding_energies;
      if (!energies) return compare(null);
      if (!energies.length) return { text: '', holds: false, measured: 'no bound state', wanted: e.value, tolerance: e.tolerance };
      const nearest = energies.reduce((x, y) => (Math.abs(y - e.value) < Math.abs(x - e.value) ? y : x));
      return compare(nearest, errorOf('binding_energies', energies.indexOf(nearest)));
    }
    default: {
      const full = e.point && evidence.fullAt(e.point);
      if (!full) return compare(null);
      if (e.observable === 'phase_shift') return compare(full.phaseShift === null ? null : nearestBranch(full.phaseShift, e.value));
      if (e.observable === 'transmission') return compare(full.transmission);
      if (e.observable === 'reflection') return compare(full.reflection);
      if (e.observable === 'amplitude') return compare(Math.hypot(full.forward.re, full.forward.im));
      return compare(crossSection(full, evidence));
    }
  }
}

/** A phase shift is known up to 180 degrees: the branch nearest to what is expected. */
const nearestBranch = (degrees: number, wanted: number): number => degrees + 180 * Math.round((wanted - degrees) / 180);

/** Partial cross section: 4π(2l+1) sin²δ/p² in dimension 3; (4/p) sin²δ, twice that for m ≠ 0, in dimension 2; none in dimension 1. */
function crossSection({ tangent, p }: { tangent: number; p: number }, { dimension, partialWave }: Evidence): number | null {
  const sine2 = (tangent * tangent) / (1 + tangent * tangent);
  if (dimension === 3) return (4 * Math.PI * (2 * partialWave + 1) * sine2) / (p * p);
  return dimension === 2 ? ((partialWave === 0 ? 4 : 8) / p) * sine2 : null;
}
