import type { Complex } from '../../../server/src/core/algebra/expression';
import type { ModelSpec } from '../../../server/src/core/model/spec';
import type { ConvergenceResult } from '../../../server/src/core/results';
import { boundStates, type BoundState } from '../../../server/src/core/scattering/bound-states';
import { lowEnergy, type LowEnergy } from '../../../server/src/core/scattering/low-energy';
import { convergenceAt, fullAmplitude, potentialParts, type FullAmplitude } from '../../../server/src/core/scattering/solution';
import { CutoffGrid, seriesAtCutoff } from '../../../server/src/core/series/amplitudes';
import { setupOf, type Kernel } from '../../support/spec';

interface Place {
  readonly dimension?: ModelSpec['dimension'];
  readonly wave?: 'full' | 'even' | 'odd' | number;
  readonly mu?: number;
  readonly cutoff?: number;
  readonly shape?: ModelSpec['cutoff']['shape'];
  readonly order?: number;
}

interface Solved {
  full(): FullAmplitude;
  /** T of each order. */
  orders(): Complex[];
  eigenvalues(): ConvergenceResult;
  /** Null where the wave has no such constants. */
  lowEnergy(momentum: number): LowEnergy | null;
  boundStates(): readonly BoundState[];
}

/** What there is to know about one interaction at one momentum, at its cutoff. */
export function solved(kernel: Kernel, p: number, place: Place = {}): Solved {
  const { cutoff = 40 } = place;
  const setup = setupOf({ v: kernel }, { ...place, cutoff, momenta: [p] });
  const grid = new CutoffGrid(setup, cutoff, [p], 16);
  const parts = potentialParts(grid, []);
  const point = { p, E: setup.kinematics.energy(p) };
  return {
    full: () => fullAmplitude(grid, parts, point),
    orders: () => seriesAtCutoff(grid, [point], []).bare[0].map(t => t.forward),
    eigenvalues: () => convergenceAt(grid, point),
    lowEnergy: (momentum: number) => lowEnergy(setup, cutoff, parts, momentum),
    boundStates: () => boundStates(setup, cutoff, parts, () => {}),
  };
}
