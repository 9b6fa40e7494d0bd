import { gaussLegendreOn } from '../quadrature/gauss-legendre';
import { besselJ } from '../special/bessel-j';
import { sphericalBessel } from '../special/spherical-bessel';
import type { Projection } from './projection-closed';

/**
 * The well step(R - r) on a wave: 4π∫_0^R r² j_l(pr) j_l(kr) dr in dimension 3, 2π∫_0^R r J_m(pr) J_m(kr) dr in dimension 2, by Lommel's
 * integral (Watson, Theory of Bessel Functions, 5.11). By a rule in r where both momenta are small, since there the two
 * terms of the integral cancel.
 */
export function wellProjection(dimension: 2 | 3, l: number, radius: number): Projection {
  const f = dimension === 3 ? sphericalBessel : besselJ;
  const front = dimension === 3 ? 4 * Math.PI : 2 * Math.PI;
  const weight = dimension - 1;
  // A(x) = x f_(l-1)(xR) and B(x) = f_l(xR); in dimension 3, j_(-1)(y) = cos(y)/y.
  const a = (x: number) =>
    l > 0 ? x * f(l - 1, x * radius) : dimension === 3 ? Math.cos(x * radius) / radius : -x * besselJ(1, x * radius);
  const b = (x: number) => f(l, x * radius);
  // A' = l A/x - xR B and B' = R A/x - (l + D - 2) B/x.
  const slopeA = (x: number) => (l * a(x)) / x - x * radius * b(x);
  const slopeB = (x: number) => (radius * a(x) - (l + dimension - 2) * b(x)) / x;
  const { nodes, weights } = gaussLegendreOn(32, 0, radius);
  const inside = (p: number, k: number) => {
    let sum = 0;
    for (let j = 0; j < nodes.length; j++) sum += weights[j] * nodes[j] ** weight * f(l, p * nodes[j]) * f(l, k * nodes[j]);
    return sum;
  };
  const step = gaussLegendreOn(6, 0, 1);
  const lommel = (p: number, k: number) => {
    if (Math.abs(p - k) * radius > 0.05) {
      return (radius ** weight * (a(k) * b(p) - a(p) * b(k))) / ((p - k) * (p + k));
    }
    // Divided differences [A(k)B(p) - A(p)B(k)]/(p-k) = A(p) B[p,k] - B(p) A[p,k] as means of slopes.
    let meanA = 0;
    let meanB = 0;
    for (let j = 0; j < step.nodes.length; j++) {
      const x = k + step.nodes[j] * (p - k);
      meanA += step.weights[j] * slopeA(x);
      meanB += step.weights[j] * slopeB(x);
    }
    return (radius ** weight * (a(p) * meanB - b(p) * meanA)) / (p + k);
  };
  return (p, k, out) => {
    for (let j = 0; j < p.length; j++) {
      const small = Math.max(p[j], k[j]) * radius < 10 + l;
      out[j] += front * (small ? inside(p[j], k[j]) : lommel(p[j], k[j]));
    }
  };
}
