import type { Complex } from '../algebra/expression';
import { leastSquares } from '../linear/solve';

/** How a sequence over a ladder of cutoffs grows, read off the numbers alone. */
export interface NumericalGrowth {
  readonly verdict: 'converges' | 'diverges' | 'unclear';
  /** Of L^power (ln L)^log; 0, 0 where it converges. */
  readonly power: number;
  readonly log: number;
}

/** Relative error of a grid amplitude: what differences may be taken for nothing, and what a fit has to reckon with in each number. */
export const NOISE = 1e-11;
const ROUNDING = 3e-14;

/**
 * Growth from the numbers alone. y(L) at cutoffs in constant ratio: the differences of L^a ln^b L fall or grow as L^a ln^b L themselves
 * (a > 0), as ln^(b-1) L (a = 0), or as the leading correction of a convergent sequence. The power is the slope of their logarithm; the
 * power of the logarithm is how often L^-a y must be differenced before it dies out.
 */
export function growthFromNumbers(cutoffs: readonly number[], y: readonly Complex[]): NumericalGrowth {
  const step = Math.log(cutoffs[1] / cutoffs[0]);
  const size = Math.max(...y.map(modulus));
  const differences = y.slice(1).map((v, j) => subtract(v, y[j]));
  const tail = differences.slice(-4).map(modulus);
  if (Math.max(...tail) <= NOISE * size || size === 0) return { verdict: 'converges', power: 0, log: 0 };
  const slopes = tail.slice(1).map((d, j) => Math.log(d / tail[j]) / step);
  const slope = slopes[slopes.length - 1];
  if (!Number.isFinite(slope) || Math.max(...slopes) - Math.min(...slopes) > 0.35)
    return { verdict: envelopeFalls(differences.map(modulus), step) ? 'converges' : 'unclear', power: 0, log: 0 };
  if (slope < -0.45) return { verdict: 'converges', power: 0, log: 0 };
  // A logarithm adds b/ln L to the slope: it never reaches half a power on the ladder.
  const power = Math.max(0, Math.round(2 * (slope - 0.12)) / 2);
  let scaled = y.map((v, j) => times(v, cutoffs[j] ** -power));
  const logs: number[] = [];
  for (let b = 0; b <= 5 && scaled.length > 3; b++) {
    const last = modulus(scaled[scaled.length - 1]);
    const next = scaled.slice(1).map((v, j) => subtract(v, scaled[j]));
    const ends = next.slice(-3).map(modulus);
    if (ends[2] <= 30 * NOISE * last * 2 ** b || ends[2] < 0.74 * ends[1])
      return { verdict: power > 0 || b > 0 ? 'diverges' : 'converges', power, log: b };
    logs.push(b);
    scaled = next;
  }
  return { verdict: 'unclear', power: 0, log: 0 };
}

/** Do numbers with these errors come to rest as the cutoff is lifted? What shows above the errors must fall and stay away. */
export function settles(cutoffs: readonly number[], y: readonly Complex[], errors: readonly number[]): boolean {
  const differences = y.slice(1).map((v, j) => modulus(subtract(v, y[j])));
  const shows = differences.map((d, j) => d > errors[j] + errors[j + 1]);
  const end = shows.lastIndexOf(true) + 1;
  const sinks = end < shows.length && shows.slice(0, end).every((s, j) => s && (j === 0 || differences[j] < differences[j - 1]));
  return sinks || growthFromNumbers(cutoffs, y).verdict === 'converges';
}

/** An oscillating sequence: does the largest difference fall as a power from each third of the ladder to the next? */
function envelopeFalls(differences: readonly number[], step: number): boolean {
  const count = Math.floor(differences.length / 3);
  const [first, second, third] = [3, 2, 1].map(j => Math.max(...differences.slice(-j * count, differences.length - (j - 1) * count)));
  const fall = Math.exp(-0.45 * step * count);
  return count > 1 && second < fall * first && third < fall * second;
}

/**
 * Do the numbers grow as L^power (ln L)^log? The slope must say the power; with one more logarithm offered to the fit, that one must come
 * out as nothing beside the predicted one.
 */
export function growsAs(cutoffs: readonly number[], y: readonly Complex[], predicted: Growth | null): boolean {
  const seen = growthFromNumbers(cutoffs, y);
  if (!predicted) return seen.verdict === 'converges';
  if (seen.verdict === 'diverges' && seen.power === predicted.power && seen.log === predicted.log) return true;
  if (seen.verdict === 'converges' || Math.abs(seen.power - predicted.power) > (seen.verdict === 'unclear' ? Infinity : 0.5)) return false;
  const { power, log } = predicted;
  const growing = Array.from({ length: log + 2 }, (_, j) => ({ power, log: log + 1 - j }));
  const falling = [1, 2, 3]
    .flatMap(d => (d === 1 ? [2, 1, 0] : [1, 0]).map(b => ({ power: power - d, log: b })))
    .slice(0, cutoffs.length - growing.length - 2);
  const last = Math.log(cutoffs[cutoffs.length - 1]);
  const fit = growthFit(cutoffs, growing, falling);
  if (!fit) return false;
  const sizes = [y.map(v => v.re), y.map(v => v.im)].map(part =>
    fit(part).coefficients.map((c, j) => Math.abs(c) * last ** growing[j].log),
  );
  const unpredicted = Math.hypot(sizes[0][0], sizes[1][0]);
  const wanted = Math.hypot(sizes[0][1], sizes[1][1]);
  return unpredicted < 0.05 * wanted;
}

/** L^power (ln L)^log. */
export interface Growth {
  readonly power: number;
  readonly log: number;
}

/**
 * The least-squares fit of Σ c L^a ln^b(L/scale) to numbers at these cutoffs, as a function of the numbers: coefficients of the wanted
 * growths (terms that fall off are fitted beside them), and their errors: how far each moves when the lowest cutoff is dropped, and no less
 * than what rounding of the numbers makes of it; `sizes`: what they were before anything was subtracted from them. Null where the cutoffs are
 * too few or do not tell the terms apart.
 */
export function growthFit(
  cutoffs: readonly number[],
  growing: readonly Growth[],
  falling: readonly Growth[],
  scale = 1,
): ((y: readonly number[], sizes?: readonly number[]) => { coefficients: number[]; shift: number[] }) | null {
  const all = [...growing, ...falling];
  if (cutoffs.length < all.length + 2) return null;
  const whole = fitMatrix(cutoffs, all, scale);
  const shorter = fitMatrix(cutoffs.slice(1), all, scale);
  if (!whole || !shorter) return null;
  return (y, sizes = y) => {
    const coefficients = growing.map((_, j) => dot(whole[j], y));
    const others = growing.map((_, j) => dot(shorter[j], y.slice(1)));
    const rounding = growing.map(
      (_, j) => ROUNDING * Math.hypot(...whole[j].map((m, i) => m * Math.max(Math.abs(y[i]), Math.abs(sizes[i])))),
    );
    return { coefficients, shift: coefficients.map((c, j) => Math.max(Math.abs(c - others[j]), rounding[j])) };
  };
}

/** [term][cutoff]: coefficient = Σ matrix * y. Rows are weighed by the fastest growth, so that every cutoff counts alike. */
function fitMatrix(cutoffs: readonly number[], all: readonly Growth[], scale: number): number[][] | null {
  const unit = cutoffs[0];
  const highest = Math.max(0, ...all.map(g => g.power));
  const rows = cutoffs.map(L => all.map(g => (L / unit) ** (g.power - highest) * Math.log(L / scale) ** g.log));
  const columns = cutoffs.map((L, j) =>
    leastSquares(
      rows,
      cutoffs.map((_, i) => (i === j ? (L / unit) ** -highest : 0)),
    ),
  );
  if (columns.some(c => c === null)) return null;
  return all.map((g, t) => columns.map(c => c![t] * unit ** -g.power));
}

const dot = (x: readonly number[], y: readonly number[]): number => x.reduce((s, v, j) => s + v * y[j], 0);
const modulus = (x: Complex): number => Math.hypot(x.re, x.im);
const subtract = (x: Complex, y: Complex): Complex => ({ re: x.re - y.re, im: x.im - y.im });
const times = (x: Complex, s: number): Complex => ({ re: x.re * s, im: x.im * s });
