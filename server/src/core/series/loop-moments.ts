import type { Complex } from '../algebra/expression';
import { NoExpansion } from '../algebra/at-infinity';
import type { Laurent, LaurentRing } from '../algebra/laurent';
import type { Kinematics } from '../model/kinematics';
import type { Regulator } from '../model/regulator';
import { gaussLegendreOn } from '../quadrature/gauss-legendre';

/** 1/(E - kinetic) = Σ c_m |k|^(-m) for k -> ±infinity: the list holds [m, c_m], m a whole number. */
type PropagatorSeries = readonly { readonly m: number; readonly c: Complex }[];

/**
 * I_n(E) = norm ∫ |k|^(D-1) dk k^n f(k/L)² / (E - kinetic(k)) for the wanted n as Laurent polynomials in L; 0 at every other n.
 * Expanded by regions: k of the order of L gives norm Σ_m c_m M(n + D - m) L^(n+D-m), M the Mellin transform of f²; soft k gives
 * Σ_j t_j L^(-step*j) F_(n+step*j)(E), t_j the Taylor coefficients of f² and F the finite part under a sharp cutoff, logarithms as ln L.
 * Below every threshold (or complex E) the plain integral; above it the principal value. `negativeSide` weighs the loop momenta k < 0 of
 * dimension 1: 1 as they are; another weight tells what vanishes only between k and -k. Throws `NoExpansion`.
 */
export function loopMoments(
  kinematics: Kinematics,
  regulator: Regulator,
  ring: LaurentRing,
  E: Complex,
  wanted: readonly number[],
  negativeSide = 1,
): Laurent[] {
  const highest = Math.max(0, ...wanted);
  const sides = sidesOf(kinematics, E, ring, highest, negativeSide);
  const finite = (n: number) => finitePart(kinematics, E, n, sides);
  return Array.from({ length: highest + 1 }, (_, n) => {
    if (!wanted.includes(n)) return ring.zero;
    ring.clear();
    for (const side of sides) {
      const parity = side.sign < 0 && n % 2 ? -1 : 1;
      for (const { m, c } of side.series) {
        const s = n + kinematics.dimension - m;
        const weight = parity * side.weight * kinematics.norm;
        const hard = regulator.mellin(s) * weight;
        if (s < ring.lowest) continue;
        ring.add(s, 0, c.re * hard, c.im * hard);
        const j = -s / regulator.step;
        const logarithm = s === 0 ? 1 : Number.isInteger(j) && j > 0 ? regulator.taylor(j) : 0;
        if (logarithm) ring.add(s, 1, c.re * logarithm * weight, c.im * logarithm * weight);
      }
    }
    const soft = finite(n);
    ring.add(0, 0, soft.re, soft.im);
    if (Number.isFinite(regulator.step)) {
      for (let j = 1; -regulator.step * j >= ring.lowest; j++) {
        const f = finite(n + regulator.step * j);
        const t = regulator.taylor(j);
        ring.add(-regulator.step * j, 0, f.re * t, f.im * t);
      }
    }
    return ring.take();
  });
}

interface Side {
  readonly sign: 1 | -1;
  readonly weight: number;
  readonly series: PropagatorSeries;
}

function sidesOf(kinematics: Kinematics, E: Complex, ring: LaurentRing, highest: number, negativeSide: number): Side[] {
  const deepest = highest + kinematics.dimension - ring.lowest;
  const positive: Side = { sign: 1, weight: 1, series: propagatorSeries(kinematics, E, 1, deepest) };
  if (!kinematics.signed) return [positive];
  const series = kinematics.purePower ? positive.series : propagatorSeries(kinematics, E, -1, deepest);
  return [positive, { sign: -1, weight: negativeSide, series }];
}

/** How fast the propagator falls: the least m of its series. Throws `NoExpansion`. */
export function propagatorFall(kinematics: Kinematics): number {
  const sides: (1 | -1)[] = kinematics.signed ? [1, -1] : [1];
  return Math.min(...sides.map(sign => kinematics.expansion(sign, 2)[0]?.power ?? 0));
}

/** -Σ_j E^j / kinetic^(j+1), down to k^(-deepest). */
function propagatorSeries(kinematics: Kinematics, E: Complex, sign: 1 | -1, deepest: number): PropagatorSeries {
  const kinetic = kinematics.expansion(sign, deepest + 2);
  const g = kinetic[0]?.power ?? 0;
  if (!(g > 0)) throw new NoExpansion('the kinetic energy does not grow with momentum');
  if (kinetic.some(t => !Number.isInteger(t.power))) throw new NoExpansion('the kinetic energy is not a series in whole powers of k');
  const inverse = inverseSeries(
    kinetic.map(t => ({ m: -t.power, c: t.c })),
    deepest,
  );
  const total = new Map<number, Complex>();
  let power = inverse;
  let factor: Complex = { re: -1, im: 0 };
  for (let j = 0; j * g <= deepest; j++) {
    for (const { m, c } of power) {
      const old = total.get(m) ?? { re: 0, im: 0 };
      total.set(m, { re: old.re + factor.re * c, im: old.im + factor.im * c });
    }
    power = multiplySeries(power, inverse, deepest);
    factor = { re: factor.re * E.re - factor.im * E.im, im: factor.re * E.im + factor.im * E.re };
  }
  return [...total]
    .map(([m, c]) => ({ m, c }))
    .filter(t => t.c.re !== 0 || t.c.im !== 0)
    .sort((s, t) => s.m - t.m);
}

type RealSeries = readonly { readonly m: number; readonly c: number }[];

function multiplySeries(x: RealSeries, y: RealSeries, deepest: number): RealSeries {
  const total = new Map<number, number>();
  for (const s of x) for (const t of y) if (s.m + t.m <= deepest) total.set(s.m + t.m, (total.get(s.m + t.m) ?? 0) + s.c * t.c);
  return [...total].map(([m, c]) => ({ m, c }));
}

/** 1/(Σ c_m k^(-m)) by long division. */
function inverseSeries(x: RealSeries, deepest: number): RealSeries {
  const [leading, ...rest] = x;
  const quotient: { m: number; c: number }[] = [];
  const start = -leading.m;
  const coefficients = new Map<number, number>([[start, 1 / leading.c]]);
  for (let m = start; m <= deepest; m++) {
    const c = coefficients.get(m) ?? 0;
    if (c === 0) continue;
    quotient.push({ m, c });
    for (const t of rest) {
      const target = m + (t.m - leading.m);
      coefficients.set(target, (coefficients.get(target) ?? 0) - (c * t.c) / leading.c);
    }
  }
  return quotient;
}

/** F_n(E): the L^0 (ln L)^0 part of I_n under a sharp cutoff. */
function finitePart(kinematics: Kinematics, E: Complex, n: number, sides: readonly Side[]): Complex {
  const weight = (side: Side) => side.weight * (side.sign < 0 && n % 2 ? -1 : 1);
  const total = sides.reduce((sum, side) => sum + weight(side), 0);
  if (kinematics.purePower && E.im === 0 && E.re !== 0) {
    const value = total === 0 ? 0 : total * kinematics.norm * powerMomentFinite(kinematics.purePower, E.re, n + kinematics.dimension);
    return { re: value, im: 0 };
  }
  const sum = { re: 0, im: 0 };
  for (const side of sides) {
    const part = finitePartByQuadrature(kinematics, E, n, side);
    sum.re += weight(side) * kinematics.norm * part.re;
    sum.im += weight(side) * kinematics.norm * part.im;
  }
  return sum;
}

/**
 * Finite part of ∫₀^L k^(N-1)/(E - c k^g) dk, principal value for E > 0. With |E| = c q^g: for N/g not whole,
 * -(π/cg) q^(N-g)/sin(πN/g) below and (π/cg) q^(N-g) cot(πN/g) above threshold; for N = g*j the logarithm leaves
 * (-1)^(j-1) q^(g(j-1)) ln(q)/c below and q^(g(j-1)) ln(q)/c above.
 */
function powerMomentFinite(kinetic: { coefficient: number; exponent: number }, E: number, N: number): number {
  const { coefficient: c, exponent: g } = kinetic;
  const q = (Math.abs(E) / c) ** (1 / g);
  const j = N / g;
  const whole = Math.abs(j - Math.round(j)) < 1e-12;
  if (E < 0) {
    return whole
      ? ((-1) ** (Math.round(j) - 1) * q ** (N - g) * Math.log(q)) / c
      : (-Math.PI / (c * g)) * (q ** (N - g) / Math.sin(Math.PI * j));
  }
  return whole ? (q ** (N - g) * Math.log(q)) / c : ((Math.PI / (c * g)) * q ** (N - g)) / Math.tan(Math.PI * j);
}

/** The same for any kinetic energy and complex E (or real E below threshold): the integral to K plus the tail beyond its growing terms. */
function finitePartByQuadrature(kinematics: Kinematics, E: Complex, n: number, side: Side): Complex {
  const power = n + kinematics.dimension - 1;
  const far = 64;
  const sum = { re: 0, im: 0 };
  const panel = (from: number, to: number) => {
    const { nodes, weights } = gaussLegendreOn(20, from, to);
    const energies = kinematics.energies(nodes.map(k => side.sign * k));
    nodes.forEach((k, j) => {
      const re = E.re - energies[j];
      const d = re * re + E.im * E.im;
      sum.re += (weights[j] * k ** power * re) / d;
      sum.im -= (weights[j] * k ** power * E.im) / d;
    });
  };
  for (let from = 0, to = far / 2 ** 40; from < far; [from, to] = [to, 2 * to]) panel(from, Math.min(to, far));
  // Beyond `far` the series itself: the growing terms are taken out, each falling one integrates to -far^s/s.
  for (const { m, c } of side.series) {
    const s = power + 1 - m;
    const term = s === 0 ? Math.log(far) : far ** s / s;
    sum.re -= c.re * term;
    sum.im -= c.im * term;
  }
  return sum;
}
