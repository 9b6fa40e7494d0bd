import { digamma } from '../special/digamma';
import { CutoffGrid } from '../series/amplitudes';
import type { ScaledVertex } from '../series/grid-chain';
import type { Setup } from '../series/setup';
import { fullAmplitude } from './solution';

/** Scattering length and effective range, with errors; null where the wave has no such definition. */
export interface LowEnergy {
  readonly definition: string;
  readonly scatteringLength: number;
  readonly scatteringLengthError: number;
  readonly effectiveRange: number | null;
  readonly effectiveRangeError: number;
}

/** What the linear solver leaves. */
const ROUNDING = 1e-12;

/**
 * From the full solution at a few small momenta: F(p²) = -1/a + r p²/2 by a polynomial through them, F = p^(2l+1) cot δ in dimension 3,
 * p tan δ₊ (with the opposite sign) and p cot δ₋ in dimension 1; in dimension 2 (m = 0) a from cot δ - (2/π)(ln(p/2) + γ).
 */
export function lowEnergy(setup: Setup, cutoff: number, parts: readonly ScaledVertex[], momentum: number): LowEnergy | null {
  const { spec, kinematics } = setup;
  const definition = definitionOf(spec.dimension, spec.wave);
  if (!definition) return null;
  const at = new CutoffGrid(setup, cutoff, [momentum / 2], 12);
  const fit = (unit: number) => {
    const momenta = [1, 2, 3, 4].map(j => unit * j);
    const values = momenta.map(p => {
      const { tangent } = fullAmplitude(at, parts, { p, E: kinematics.energy(p) });
      return effectiveRangeFunction(spec.dimension, spec.wave, p, tangent);
    });
    return newton(
      momenta.map(p => p * p),
      values,
    );
  };
  const [coarse, fine] = [fit(momentum), fit(momentum / 2)];
  if (spec.dimension === 2) {
    const [a, b] = [coarse, fine].map(c => Math.exp((c[0] * Math.PI) / 2));
    return {
      definition,
      scatteringLength: b,
      scatteringLengthError: Math.abs(a - b) + ROUNDING * b,
      effectiveRange: null,
      effectiveRangeError: 0,
    };
  }
  const [a, b] = [coarse, fine].map(c => -1 / c[0]);
  const [r, s] = [coarse, fine].map(c => 2 * c[1]);
  return {
    definition,
    scatteringLength: b,
    scatteringLengthError: Math.abs(a - b) + ROUNDING * Math.abs(b),
    effectiveRange: s,
    effectiveRangeError: Math.abs(r - s) + ROUNDING * Math.abs(s),
  };
}

type Wave = Setup['spec']['wave'];

function definitionOf(dimension: number, wave: Wave): string | null {
  if (dimension === 3 && wave.kind === 'angular')
    return wave.number === 0 ? 'p cot(delta) = -1/a + r p^2/2' : `p^${2 * wave.number + 1} cot(delta) = -1/a + r p^2/2`;
  if (dimension === 2 && wave.kind === 'angular' && wave.number === 0) return 'cot(delta) = (2/pi) (ln(p a/2) + gamma)';
  if (wave.kind === 'even') return 'p tan(delta) = 1/a - r p^2/2';
  if (wave.kind === 'odd') return 'p cot(delta) = -1/a + r p^2/2';
  return null;
}

function effectiveRangeFunction(dimension: number, wave: Wave, p: number, tangent: number): number {
  if (dimension === 2) return 1 / tangent - (2 / Math.PI) * (Math.log(p / 2) - digamma(1));
  if (wave.kind === 'even') return -p * tangent;
  return p ** (wave.kind === 'angular' ? 2 * wave.number + 1 : 1) / tangent;
}

/** Coefficients of the polynomial through (x_j, y_j), lowest first. */
function newton(x: readonly number[], y: readonly number[]): number[] {
  const divided = [...y];
  for (let level = 1; level < x.length; level++) {
    for (let j = x.length - 1; j >= level; j--) divided[j] = (divided[j] - divided[j - 1]) / (x[j] - x[j - level]);
  }
  let polynomial = [divided[x.length - 1]];
  for (let j = x.length - 2; j >= 0; j--) {
    const next = [0, ...polynomial];
    polynomial.forEach((c, m) => (next[m] -= c * x[j]));
    next[0] += divided[j];
    polynomial = next;
  }
  return polynomial;
}
