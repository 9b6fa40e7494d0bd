import type { Complex } from '../algebra/expression';
import type { Kinematics } from '../model/kinematics';
import type { MomentumGrid } from '../model/momentum-grid';
import type { Regulator } from '../model/regulator';

/**
 * The propagator at one energy on a grid: ∫ dk (measure) G(k) F(k) = Σ_j g_j F(k_j), j over the nodes and then the on-shell momenta.
 * Above threshold it is the principal value: each pole 1/(E'(p)(p - k)) is subtracted at the nodes and its integral added at p.
 */
export interface LoopWeights {
  readonly E: Complex;
  /** Momenta of the amplitude's rows: the on-shell ones first, then whatever else was asked for. */
  readonly externals: readonly number[];
  /** What stands on the right of the amplitude. */
  readonly columns: readonly Ending[];
  /** Nodes, then externals. */
  readonly points: Float64Array;
  /** One weight for each node and each on-shell momentum. */
  readonly g: { readonly re: Float64Array; readonly im: Float64Array };
  /** Σ_j g_j k_j^n. */
  readonly loopMoments: { readonly re: Float64Array; readonly im: Float64Array };
  /** π norm |p|^(D-1) f²/|E'(p)| of each on-shell momentum: T = K - i K ρ T. */
  readonly density: readonly number[];
}

/**
 * The right end of a chain: an external momentum; or, where the parts are wanted one by one, the power k^n that a contact leaves of it, and a
 * momentum on which only other kernels end.
 */
export type Ending =
  { readonly kind: 'momentum'; readonly k: number; readonly contacts: boolean } | { readonly kind: 'power'; readonly n: number };

/**
 * `onShell`: take the poles at this real E; `others`: further external momenta; `highest`: how many loop moments; `separate`: powers of
 * momentum on which contacts end, each as a column of its own after those of the external momenta.
 */
export function loopWeights(
  kinematics: Kinematics,
  regulator: Regulator,
  grid: MomentumGrid,
  E: Complex,
  onShell: boolean,
  others: readonly number[],
  highest: number,
  separate: readonly number[] = [],
): LoopWeights {
  const roots = onShell ? kinematics.roots(E.re).filter(root => root.p > grid.low && root.p < grid.high) : [];
  const n = grid.nodes.length;
  const re = new Float64Array(n + roots.length);
  const im = new Float64Array(E.im === 0 ? 0 : n + roots.length);
  for (let j = 0; j < n; j++) {
    const x = E.re - grid.energies[j];
    if (E.im === 0) re[j] = grid.measure[j] / x;
    else {
      re[j] = (grid.measure[j] * x) / (x * x + E.im * E.im);
      im[j] = (-grid.measure[j] * E.im) / (x * x + E.im * E.im);
    }
  }
  const density = roots.map((root, s) => {
    const strength =
      (kinematics.norm * Math.abs(root.p) ** (kinematics.dimension - 1) * regulator.leg(root.p / grid.cutoff) ** 2) / root.slope;
    let sum = 0;
    for (let j = 0; j < n; j++) sum += grid.weights[j] / (root.p - grid.nodes[j]);
    re[n + s] = strength * (Math.log((root.p - grid.low) / (grid.high - root.p)) - sum);
    return Math.PI * Math.abs(strength);
  });
  const externals = [...roots.map(root => root.p), ...others];
  const points = new Float64Array(n + externals.length);
  points.set(grid.nodes);
  points.set(externals, n);
  const g = { re, im: im.length ? im : new Float64Array(re.length) };
  const columns: Ending[] = externals.map(k => ({ kind: 'momentum', k, contacts: separate.length === 0 }));
  separate.forEach(n => columns.push({ kind: 'power', n }));
  return { E, externals, columns, points, g, loopMoments: momentsOf(g, points, highest), density };
}

function momentsOf(g: LoopWeights['g'], points: Float64Array, highest: number): LoopWeights['loopMoments'] {
  const re = new Float64Array(highest + 1);
  const im = new Float64Array(highest + 1);
  for (let j = 0; j < g.re.length; j++) {
    let power = 1;
    for (let n = 0; n <= highest; n++) {
      re[n] += g.re[j] * power;
      im[n] += g.im[j] * power;
      power *= points[j];
    }
  }
  return { re, im };
}
