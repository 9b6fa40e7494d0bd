import { KernelError } from './kernel-error';

/** Where a function of r > 0 lives. */
export interface Range {
  readonly from: number;
  readonly to: number;
  /** The octave that carries most of ∫r^(D-1)|V|. */
  readonly typical: number;
}

const OCTAVES = 110;
const POINTS = 12;

/** Looks at r^D |V(r)| octave by octave. Throws KernelError where the integral of the potential does not exist at either end. */
export function findRange(f: (r: Float64Array, out: Float64Array) => void, dimension: 1 | 2 | 3): Range {
  const shares: number[] = [];
  const r = new Float64Array(POINTS);
  const v = new Float64Array(POINTS);
  for (let octave = -OCTAVES; octave <= OCTAVES; octave++) {
    for (let j = 0; j < POINTS; j++) r[j] = 2 ** (octave + (j + 0.37) / POINTS);
    f(r, v);
    let share = 0;
    for (let j = 0; j < POINTS; j++) {
      if (!Number.isFinite(v[j])) throw new KernelError('value', `The potential has no finite value near ${Number(r[j].toPrecision(3))}.`);
      share = Math.max(share, Math.abs(v[j]) * r[j] ** dimension);
    }
    shares.push(share);
  }
  const largest = Math.max(...shares);
  if (largest === 0) return { from: 0, to: 0, typical: 1 };
  if (shares[0] > 1e-10 * largest)
    throw new KernelError(
      'not-evaluated',
      'The potential is too singular at the origin to have a Fourier transform; regulate it there, or use its matrix element (p, k).',
    );
  if (shares[shares.length - 1] > 1e-10 * largest)
    throw new KernelError('not-evaluated', 'The potential does not fall off fast enough at large distances to have a Fourier transform.');
  const negligible = 1e-18 * largest;
  const first = shares.findIndex(s => s > negligible);
  let last = shares.length - 1;
  while (shares[last] <= negligible) last--;
  return { from: 2 ** (first - OCTAVES), to: 2 ** (last + 1 - OCTAVES), typical: 2 ** (shares.indexOf(largest) - OCTAVES) };
}
