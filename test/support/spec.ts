import type { CutoffShape, InteractionSpec, KernelArguments, ModelSpec, Wave } from '../../server/src/core/model/spec';
import { setUp, type Setup } from '../../server/src/core/series/setup';
import { expr } from './expr';

/** An interaction as text: a kernel in (p, k), or its arguments and the kernel. */
export type Kernel = string | readonly [KernelArguments, string];

interface Wishes {
  readonly dimension?: 1 | 2 | 3;
  /** `full`, `even`, `odd`, or the angular momentum; s wave, or `full` in dimension 1, where nothing is said. */
  readonly wave?: 'full' | 'even' | 'odd' | number;
  readonly mu?: number;
  readonly kinetic?: string;
  readonly cutoff?: number;
  readonly shape?: CutoffShape;
  readonly order?: number;
  /** On-shell momenta. */
  readonly momenta?: readonly number[];
  readonly counterterms?: ModelSpec['counterterms'];
}

/** A model for tests of the core, 2μ = 1 and sharp at 10 unless said. */
export function specOf(kernels: Readonly<Record<string, Kernel>>, wishes: Wishes = {}): ModelSpec {
  const { dimension = 3, wave = dimension === 1 ? 'full' : 0, mu = 0.5, kinetic, cutoff = 10, order = 2, momenta = [0.7] } = wishes;
  const chosen: Wave = typeof wave === 'number' ? { kind: 'angular', number: wave } : { kind: wave };
  return {
    name: 'm',
    dimension,
    wave: chosen,
    units: null,
    mu,
    masses: null,
    kinetic: kinetic === undefined ? null : expr(kinetic),
    couplings: [],
    interactions: Object.entries(kernels).map(([name, kernel]): InteractionSpec => {
      const [args, text] = typeof kernel === 'string' ? (['pk', kernel] as const) : kernel;
      return { name, arguments: args, kernel: expr(text), order: 1 };
    }),
    counterterms: wishes.counterterms ?? [],
    expectations: [],
    cutoff: { name: 'L', value: cutoff, shape: wishes.shape ?? { kind: 'sharp' }, declared: true, scan: null },
    series: { order, declared: true, points: momenta.map(p => ({ p, E: null })) },
  };
}

/** The model lowered; throws where that is refused. */
export function setupOf(kernels: Readonly<Record<string, Kernel>>, wishes: Wishes = {}): Setup {
  const { setup, remarks } = setUp(specOf(kernels, wishes));
  if (!setup) throw new Error(remarks.map(r => r.message).join(' '));
  return setup;
}
