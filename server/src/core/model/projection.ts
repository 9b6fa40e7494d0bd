import type { ModelSpec } from './spec';
import { closedParity, specialProjection } from './projection-closed';
import type { Projection } from './projection-closed';
import { genericProjection } from './projection-generic';
import { angular } from './projection-polynomial';
import type { LocalPiece } from './transform';

/** Adds a piece's matrix element V(p, k) on the model's wave to re and im. */
export interface Projected {
  add(p: Float64Array, k: Float64Array, re: Float64Array, im: Float64Array): void;
  readonly real: boolean;
  readonly relativeError: number;
}

/** A local piece on the wave of the model. In even and odd waves the potential as a whole must be even in x. */
export function project(piece: LocalPiece, { dimension, wave }: Pick<ModelSpec, 'dimension' | 'wave'>): Projected {
  if (dimension === 1) return wave.kind === 'full' ? full(piece) : parity(piece, wave.kind === 'odd' ? -1 : 1);
  const l = angular(wave);
  const special = specialProjection(piece, dimension, l);
  const { projection, relativeError } = special
    ? { projection: special, relativeError: piece.relativeError }
    : genericProjection(piece, dimension, l);
  return scaled(piece, projection, relativeError);
}

function scaled({ coefficient }: LocalPiece, projection: Projection, relativeError: number): Projected {
  return {
    add(p, k, re, im) {
      const v = new Float64Array(p.length);
      projection(p, k, v);
      for (let j = 0; j < v.length; j++) re[j] += coefficient.re * v[j];
      if (coefficient.im !== 0) for (let j = 0; j < v.length; j++) im[j] += coefficient.im * v[j];
    },
    real: coefficient.im === 0,
    relativeError,
  };
}

/** Signed momenta: coefficient · exp(-i(p-k)·centre) · v(p-k). */
function full(piece: LocalPiece): Projected {
  const { coefficient: c, centre } = piece;
  if (centre === 0)
    return scaled(
      piece,
      (p, k, out) =>
        piece.value(
          p.map((x, j) => x - k[j]),
          out,
        ),
      piece.relativeError,
    );
  return {
    add(p, k, re, im) {
      const q = p.map((x, j) => x - k[j]);
      const v = new Float64Array(q.length);
      piece.value(q, v);
      for (let j = 0; j < v.length; j++) {
        const cosine = Math.cos(q[j] * centre);
        const sine = Math.sin(q[j] * centre);
        re[j] += v[j] * (c.re * cosine + c.im * sine);
        im[j] += v[j] * (c.im * cosine - c.re * sine);
      }
    },
    real: false,
    relativeError: piece.relativeError,
  };
}

/**
 * ½[V(p-k) ± V(p+k)]. A potential that is even in x equals its own even part, so each piece is replaced by that: v(q) cos(q·centre), or
 * -i v(q) sin(q·centre) where v is odd.
 */
function parity(piece: LocalPiece, sign: 1 | -1): Projected {
  const closed = closedParity(piece, sign);
  if (closed) return scaled(piece, closed, piece.relativeError);
  const { centre, odd, coefficient: c } = piece;
  const even = (q: Float64Array) => {
    const v = new Float64Array(q.length);
    piece.value(q, v);
    if (odd) for (let j = 0; j < v.length; j++) v[j] *= Math.sin(q[j] * centre);
    else if (centre !== 0) for (let j = 0; j < v.length; j++) v[j] *= Math.cos(q[j] * centre);
    return v;
  };
  const projection: Projection = (p, k, out) => {
    const near = even(p.map((x, j) => x - k[j]));
    const far = even(p.map((x, j) => x + k[j]));
    for (let j = 0; j < out.length; j++) out[j] += 0.5 * (near[j] + sign * far[j]);
  };
  const coefficient = odd ? { re: c.im, im: -c.re } : c;
  return scaled({ ...piece, coefficient }, projection, piece.relativeError);
}
