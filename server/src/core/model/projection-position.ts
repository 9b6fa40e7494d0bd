import { besselJ } from '../special/bessel-j';
import { sphericalBessel } from '../special/spherical-bessel';
import type { Projection } from './projection-closed';
import type { Panels } from './transform-panels';

const CHUNK = 1024;

/**
 * 4π∫r² j_l(pr) V(r) j_l(kr) dr, in dimension 2 2π∫r J_m(pr) V(r) J_m(kr) dr, for a potential with edges, whose transform oscillates too fast for
 * a rule over angles. Made for points (p, k) that are products of few momenta: the Bessel functions are computed once for each.
 * The effort grows with the largest momentum times the range.
 */
export function positionProjection(panels: Panels, dimension: 2 | 3, l: number): Projection {
  const wave = dimension === 3 ? sphericalBessel : besselJ;
  return (p, k, out) => {
    for (const [highest, points] of byOctave(p, k)) {
      const { r, w } = panels.rule(2 * highest);
      const weights = dimension === 3 ? w.map((x, n) => 4 * Math.PI * x * r[n]) : w.map(x => 2 * Math.PI * x);
      for (let from = 0; from < r.length; from += CHUNK) {
        const here = r.subarray(from, from + CHUNK);
        const known = new Map<number, Float64Array>();
        const row = (momentum: number) => {
          let values = known.get(momentum);
          if (!values) known.set(momentum, (values = here.map(x => wave(l, momentum * x))));
          return values;
        };
        for (const j of points) {
          const left = row(p[j]);
          const right = row(k[j]);
          let sum = 0;
          for (let n = 0; n < here.length; n++) sum += weights[from + n] * left[n] * right[n];
          out[j] += sum;
        }
      }
    }
  };
}

/** Points sorted by the octave of their larger momentum, with the octave's upper end. */
function byOctave(p: Float64Array, k: Float64Array): ReadonlyMap<number, number[]> {
  const groups = new Map<number, number[]>();
  for (let j = 0; j < p.length; j++) {
    const highest = 2 ** Math.ceil(Math.log2(Math.max(p[j], k[j], 1e-9)));
    const group = groups.get(highest);
    if (group) group.push(j);
    else groups.set(highest, [j]);
  }
  return groups;
}
