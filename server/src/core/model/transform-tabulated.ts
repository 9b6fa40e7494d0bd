import { NoExpansion } from '../algebra/at-infinity';
import { binary, number, symbol } from '../algebra/expression';
import type { Expr } from '../algebra/expression';
import { expandAt } from './expand-at';
import { KernelError } from './kernel-error';
import type { TailTerm } from './kernel-shape';
import type { LocalPiece } from './transform';
import { findEdges } from './transform-edges';
import { Panels } from './transform-panels';
import { findRange } from './transform-range';
import type { Range } from './transform-range';
import { tabulate } from './transform-table';
import { edgeSeries, FRONTS, mergeTail, originTail, realPart, tailValue, timesPowerOfI } from './transform-tail';

export interface HalfLineFunction {
  /** Real values at r > 0. */
  readonly f: (r: Float64Array, out: Float64Array) => void;
  readonly expr: Expr;
  readonly variable: string;
  /** The part of the expression that f is. */
  readonly part: 're' | 'im';
  readonly dimension: 1 | 2 | 3;
  /** Dimension 1: sine transform. */
  readonly odd: boolean;
}

/**
 * ∫_0^∞ f cos(qr) dr or f sin(qr) (dimension 1), 2π∫r f J_0(qr) dr, (4π/q)∫r f sin(qr) dr by quadrature: a table in q up to where the
 * asymptotic series from the origin and from the edges takes over.
 */
export function tabulatedPiece(half: HalfLineFunction): LocalPiece {
  const { f, dimension, odd } = half;
  const range = findRange(f, dimension);
  if (range.to === 0) return { ...EMPTY, odd };
  const edges = findEdges(half.expr, half.variable, range);
  const weighted =
    dimension === 1
      ? f
      : (r: Float64Array, out: Float64Array) => {
          f(r, out);
          for (let j = 0; j < r.length; j++) out[j] *= r[j];
        };
  const panels = new Panels(weighted, breaksOf(range, edges, weighted));
  const direct = (q: number) => {
    if (dimension === 2) return 2 * Math.PI * panels.hankel(q);
    const { cosine, sine } = panels.fourier(q);
    return dimension === 3 ? (4 * Math.PI * sine) / q : odd ? sine : cosine;
  };
  const { tail, smooth, origin } = asymptotics(half, edges);
  const algebraic = range.to / range.typical > 1e5;
  const unit = 1 / range.typical;
  const largest = Math.abs(direct(1e-3 * unit)) + Math.abs(direct(unit));
  const noise = (q: number) =>
    dimension === 3 ? (2e-16 * 4 * Math.PI * panels.size) / Math.max(q, unit) : 4e-16 * panels.size * (dimension === 2 ? 2 * Math.PI : 1);
  // The rule for the plane takes longer the larger q is.
  const end = takeover(direct, tail, noise, unit, (dimension === 2 ? 2e3 : 1e5) * unit);
  const first = unit * (algebraic ? 1e-7 : 0.1);
  const breaks = [0, ...octaves(first, end)];
  // sin(qr)/q wants a point away from 0.
  const table = tabulate(q => direct(Math.max(q, 1e-4 * first)), breaks, noise);
  return {
    coefficient: { re: 1, im: 0 },
    centre: 0,
    odd,
    value(q, out) {
      for (let j = 0; j < q.length; j++) {
        const size = Math.abs(q[j]);
        const v = size < end ? table.at(size) : tailValue(tail, size);
        out[j] = odd && q[j] < 0 ? -v : v;
      }
    },
    family: dimension > 1 && edges.length > 0 ? { kind: 'edged', panels } : { kind: 'other' },
    scale: algebraic ? 0 : unit,
    tail,
    smooth,
    origin,
    transfer: null,
    relativeError: Math.max(1e-13, (noise(unit) + table.error) / largest),
  };
}

const EMPTY: LocalPiece = {
  coefficient: { re: 1, im: 0 },
  centre: 0,
  odd: false,
  value: (_, out) => void out.fill(0),
  family: { kind: 'other' },
  scale: 1,
  tail: [],
  smooth: true,
  origin: { re: 0, im: 0 },
  transfer: null,
  relativeError: 0,
};

function breaksOf({ from, to, typical }: Range, edges: readonly number[], f: (r: Float64Array, out: Float64Array) => void): number[] {
  const start = new Float64Array(2);
  f(Float64Array.of(from * 1e-6, typical), start);
  const bounded = Math.abs(start[0]) <= 10 * Math.abs(start[1]);
  return [bounded ? 0 : from, ...edges, ...octaves(bounded ? typical / 4 : from * 2, to)]
    .sort((x, y) => x - y)
    .filter((x, j, all) => j === 0 || x > all[j - 1]);
}

function octaves(from: number, to: number): number[] {
  const points: number[] = [];
  for (let x = from; x < to; x *= 2) points.push(x);
  return [...points, to];
}

/** The smallest momentum from which the asymptotic series is as good as the quadrature. */
function takeover(
  direct: (q: number) => number,
  tail: readonly TailTerm[],
  noise: (q: number) => number,
  unit: number,
  highest: number,
): number {
  for (let q = 8 * unit; q < highest; q *= 1.5) {
    const agrees = [1, 1.07, 1.19, 1.33].every(x => {
      const value = direct(q * x);
      return Math.abs(value - tailValue(tail, q * x)) <= 4 * noise(q * x) + 1e-13 * Math.abs(value);
    });
    if (agrees) return q;
  }
  throw new KernelError(
    'not-evaluated',
    `The transform of this potential does not settle into its asymptotic form; give its matrix element (p, k) instead.`,
  );
}

function asymptotics({ expr, variable, part, dimension, odd }: HalfLineFunction, edges: readonly number[]) {
  const power = (n: number) => binary('multiply', expr, binary('power', symbol(variable), number(n)));
  try {
    const local = expandAt(expr, variable, 0, 1);
    const at = (exponent: number) => local.find(t => t.power === exponent && t.log === 0)?.c[part] ?? 0;
    const singular = local.some(t => (t.power < 0 || (t.power === 0 && t.log > 0)) && t.c[part] !== 0);
    const bends = local.some(t => t.c[part] !== 0 && (t.log > 0 || t.power % 2 !== (odd ? 1 : 0)));
    const fromOrigin =
      dimension === 2
        ? originTail(local, FRONTS.plane, 2, part)
        : dimension === 3
          ? originTail(
              local.map(t => ({ ...t, power: t.power + 1 })),
              FRONTS.sine,
              2,
              part,
            ).map(t => ({ ...t, coefficient: { re: 4 * Math.PI * t.coefficient.re, im: 0 } }))
          : originTail(local, odd ? FRONTS.sine : FRONTS.cosine, 1, part);
    const fromEdges = edges.flatMap(edge => {
      const series = (e: Expr) => edgeSeries(expandAt(e, variable, edge, 1), expandAt(e, variable, edge, -1), part);
      if (dimension === 2) return planeEdge(n => series(power(0.5 - n)), edge);
      const trig = (z: { re: number; im: number }) => (dimension === 1 && !odd ? z : { re: z.im, im: -z.re });
      const front = dimension === 3 ? 4 * Math.PI : 1;
      return series(dimension === 3 ? power(1) : expr).flatMap(({ z, power: n }) =>
        realPart({ z: { re: front * trig(z).re, im: front * trig(z).im }, power: dimension === 3 ? n - 1 : n }, edge),
      );
    });
    return {
      tail: mergeTail([...fromOrigin, ...fromEdges]),
      smooth: !bends && fromEdges.length === 0,
      // In dimension 1 the even part was V(x) + V(-x).
      origin: singular ? null : { re: dimension === 1 ? (odd ? 0 : at(0) / 2) : at(0), im: 0 },
    };
  } catch (error) {
    if (!(error instanceof NoExpansion)) throw error;
    throw new KernelError('not-evaluated', `The behaviour of the potential at the origin or at an edge is not a power: ${error.message}.`);
  }
}

/** J_0(x) = sqrt(2/πx) Re [exp(i(x - π/4)) Σ i^n a_n x^-n], a_n = Π_(j ≤ n) -(2j-1)²/8j. */
function planeEdge(series: (n: number) => ReturnType<typeof edgeSeries>, edge: number): readonly TailTerm[] {
  const terms: TailTerm[] = [];
  for (let n = 0, a = 1; n < 6; n++, a *= -((2 * n - 1) ** 2) / (8 * n)) {
    const turn = timesPowerOfI(2 * Math.PI * Math.sqrt(2 / Math.PI) * a, n);
    const front = { re: (turn.re + turn.im) * Math.SQRT1_2, im: (turn.im - turn.re) * Math.SQRT1_2 };
    for (const { z, power } of series(n)) {
      terms.push(
        ...realPart({ z: { re: z.re * front.re - z.im * front.im, im: z.re * front.im + z.im * front.re }, power: power - n - 0.5 }, edge),
      );
    }
  }
  return terms;
}
