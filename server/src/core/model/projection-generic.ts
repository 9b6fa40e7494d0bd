import { gaussLegendre } from '../quadrature/gauss-legendre';
import { legendreP } from '../special/legendre-p';
import type { Projection } from './projection-closed';
import type { LocalPiece } from './transform';

interface Resolution {
  /** Points on a panel, and the panel's width in the graded angle. */
  readonly points: number;
  readonly width: number;
}

const RESOLUTIONS: readonly Resolution[] = [
  { points: 16, width: 1.5 },
  { points: 24, width: 1.5 },
  { points: 32, width: 1.2 },
  { points: 48, width: 1 },
  { points: 64, width: 0.6 },
];
const WANTED = 1e-13;
const MOST_PANELS = 4000;

/**
 * ½∫sinφ P_l(cosφ) v(q) dφ over [0, π] in dimension 3, (1/π)∫cos(mφ) v(q) dφ in dimension 2, q² = (p-k)² + 4pk sin²(φ/2). The angle
 * is graded as φ = φ₀ sinh(u), φ₀ = (scale² + (p-k)²)^½ / (pk)^½, since v may be peaked at small transfer. `extent`: the largest
 * length of v's oscillations in q. Returns the error seen between two resolutions, relative to the kernel's size.
 */
export function genericProjection(piece: LocalPiece, dimension: 2 | 3, l: number): { projection: Projection; relativeError: number } {
  const extent = Math.max(0, ...(piece.tail ?? []).map(t => Math.abs(t.phase)));
  const scale = piece.scale || 1;
  const p = new Float64Array([0.01, 0.3, 1, 1, 3, 3, 10, 30, 300, 300, 1e4].map(x => x * scale));
  const k = new Float64Array([0.02, 0.7, 1, 9, 3.1, 40, 10.5, 30, 300.5, 2, 1e4 + 0.3].map(x => x * scale));
  const evaluate = (resolution: Resolution) => {
    const out = new Float64Array(p.length);
    angleRule(piece, dimension, l, extent, resolution)(p, k, out);
    return out;
  };
  const size = sizes(piece, dimension, p, k);
  let values = evaluate(RESOLUTIONS[0]);
  for (let n = 1; ; n++) {
    const finer = evaluate(RESOLUTIONS[n]);
    let error = 0;
    for (let j = 0; j < p.length; j++) if (size[j] > 0) error = Math.max(error, Math.abs(finer[j] - values[j]) / size[j]);
    if (error < WANTED || n === RESOLUTIONS.length - 1) {
      const resolution = RESOLUTIONS[error < WANTED ? n - 1 : n];
      return { projection: angleRule(piece, dimension, l, extent, resolution), relativeError: Math.max(piece.relativeError, error, 1e-14) };
    }
    values = finer;
  }
}

/** What errors count against: the geometric mean of the mean |v| over angles at (p, p) and at (k, k). */
function sizes(piece: LocalPiece, dimension: 2 | 3, p: Float64Array, k: Float64Array): Float64Array {
  const positive: LocalPiece = {
    ...piece,
    value(q, v) {
      piece.value(q, v);
      for (let j = 0; j < v.length; j++) v[j] = Math.abs(v[j]);
    },
  };
  const [left, right] = [p, k].map(x => {
    const out = new Float64Array(x.length);
    angleRule(positive, dimension, 0, 0, RESOLUTIONS[0])(x, x, out);
    return out;
  });
  return left.map((x, j) => Math.sqrt(x * right[j]));
}

function angleRule(piece: LocalPiece, dimension: 2 | 3, l: number, extent: number, { points, width }: Resolution): Projection {
  const { nodes, weights } = gaussLegendre(points);
  const buffers = new Map<number, { q: Float64Array; w: Float64Array; v: Float64Array }>();
  const buffersFor = (count: number) => {
    let found = buffers.get(count);
    if (!found) buffers.set(count, (found = { q: new Float64Array(count), w: new Float64Array(count), v: new Float64Array(count) }));
    return found;
  };
  return (p, k, out) => {
    for (let j = 0; j < p.length; j++) {
      const difference = p[j] - k[j];
      const product = p[j] * k[j];
      const root = Math.sqrt(product);
      const start = Math.min(1e3, Math.max(Math.sqrt(piece.scale ** 2 + difference * difference), 1e-8 * root) / root || 1e3);
      const reach = Math.asinh(Math.PI / start);
      const turns = (2 * extent * Math.min(p[j], k[j])) / (points / 2);
      const panels = Math.min(MOST_PANELS, Math.ceil(Math.max(reach / width, Math.abs(l) / 4, turns * Math.max(1, reach))));
      const { q, w, v } = buffersFor(panels * points);
      const half = reach / panels / 2;
      for (let panel = 0, n = 0; panel < panels; panel++) {
        for (let i = 0; i < points; i++, n++) {
          const u = half * (2 * panel + 1 + nodes[i]);
          const angle = Math.min(Math.PI, start * Math.sinh(u));
          const sine = Math.sin(angle / 2);
          q[n] = Math.sqrt(difference * difference + 4 * product * sine * sine);
          const wave = dimension === 3 ? 0.5 * Math.sin(angle) * legendreP(l, Math.cos(angle)) : Math.cos(l * angle) / Math.PI;
          w[n] = weights[i] * half * start * Math.cosh(u) * wave;
        }
      }
      piece.value(q, v);
      let sum = 0;
      for (let n = 0; n < v.length; n++) sum += w[n] * v[n];
      out[j] += sum;
    }
  };
}
