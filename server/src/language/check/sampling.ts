import { evaluate } from '../../core/algebra/evaluate';
import { binary, call, negate, number, type Complex, type Expr } from '../../core/algebra/expression';

/**
 * Symmetries of kernels, seen at a few generic points: what holds there to rounding holds everywhere for the analytic expressions of the
 * language. Momenta are sampled around the cutoff and far below, positions around its inverse and far above.
 */
export interface Sampler {
  readonly couplings: ReadonlyMap<string, Complex>;
  /** A momentum that is typical of the model. */
  readonly scale: number;
  /** An energy that is typical of the model. */
  readonly energy: number;
}

export type Verdict = 'holds' | 'fails' | 'no-value';

const momenta = [
  [0.3127, 0.1371],
  [0.01713, 0.02917],
  [0.7193, 0.4311],
  [0.6407, 0.00531],
] as const;

/** V(p, k) = conj V(k, p). In dimension 1 (`signed`) momenta of both signs. */
export function hermitian(kernel: Expr, sampler: Sampler, signed: boolean): Verdict {
  return compare(pairs(sampler, signed), (at, [p, k, E]) => [at(kernel, { p, k, E }), conjugate(at(kernel, { p: k, k: p, E }))], sampler);
}

/** V(-p, -k) = V(p, k). */
export function parityKept(kernel: Expr, sampler: Sampler): Verdict {
  return compare(pairs(sampler, true), (at, [p, k, E]) => [at(kernel, { p, k, E }), at(kernel, { p: -p, k: -k, E })], sampler);
}

/** V(-q) = conj V(q) where `signed`, otherwise V(q) is real. */
export function transferHermitian(kernel: Expr, sampler: Sampler, signed: boolean): Verdict {
  const points = momenta.flat().map(q => q * sampler.scale);
  return compare(points, (at, q) => [at(kernel, { q }), conjugate(at(kernel, { q: signed ? -q : q }))], sampler);
}

/** V(-q) = V(q), V(-x) = V(x). */
export function evenIn(kernel: Expr, argument: 'q' | 'x', sampler: Sampler): Verdict {
  const smooth = withoutDelta(kernel, sampler.scale);
  const points = argument === 'q' ? momenta.flat().map(q => q * sampler.scale) : positions(sampler);
  return compare(points, (at, y) => [at(smooth, { [argument]: y }), at(smooth, { [argument]: -y })], sampler);
}

/** V(x) or V(r) is real, at both signs of x. */
export function realIn(kernel: Expr, argument: 'x' | 'r' | 'k', sampler: Sampler): Verdict {
  const smooth = withoutDelta(kernel, sampler.scale);
  const positive = argument === 'k' ? momenta.flat().map(k => k * sampler.scale) : positions(sampler);
  const points = argument === 'x' ? [...positive, ...positive.map(x => -x)] : positive;
  return compare(
    points,
    (at, y) => {
      const value = at(smooth, { [argument]: y });
      return [value, conjugate(value)];
    },
    sampler,
  );
}

const positions = (sampler: Sampler): number[] => [0.37, 1.93, 7.3, 41].map(x => x / sampler.scale);

function pairs({ scale, energy }: Sampler, signed: boolean): [number, number, number][] {
  return momenta.flatMap(([p, k], i) => {
    const E = energy * (i === 0 ? -0.41 : 0.0173 * (i + 1));
    const pair: [number, number, number] = [p * scale, k * scale, E];
    return signed ? [pair, [pair[0], -pair[1], E], [-pair[0], pair[1], E]] : [pair];
  });
}

type At = (kernel: Expr, point: Readonly<Record<string, number>>) => Complex;

function compare<P>(points: readonly P[], sides: (at: At, point: P) => [Complex, Complex], { couplings }: Sampler): Verdict {
  const at: At = (kernel, point) => {
    const values = new Map(couplings);
    for (const name of Object.keys(point)) values.set(name, { re: point[name], im: 0 });
    return evaluate(kernel, values);
  };
  let seen = false;
  for (const point of points) {
    const [a, b] = sides(at, point);
    if (![a.re, a.im, b.re, b.im].every(Number.isFinite)) continue;
    seen = true;
    const size = Math.max(Math.hypot(a.re, a.im), Math.hypot(b.re, b.im));
    if (Math.hypot(a.re - b.re, a.im - b.im) > 1e-7 * size) return 'fails';
  }
  return seen ? 'holds' : 'no-value';
}

/** With a Gaussian, which has the same symmetries, and its derivatives in place of every delta. */
function withoutDelta(expr: Expr, scale: number): Expr {
  switch (expr.kind) {
    case 'number':
    case 'symbol':
      return expr;
    case 'negate':
      return negate(withoutDelta(expr.argument, scale));
    case 'call': {
      if (expr.name !== 'delta')
        return call(
          expr.name,
          expr.arguments.map(argument => withoutDelta(argument, scale)),
          expr.primes,
        );
      const y = binary('multiply', expr.arguments[0], number(scale / 3));
      const square = binary('multiply', y, y);
      const gaussian = call('exp', [negate(square)]);
      if (expr.primes === 0) return gaussian;
      return binary('multiply', expr.primes === 1 ? negate(y) : binary('subtract', square, number(0.5)), gaussian);
    }
    default:
      return binary(expr.kind, withoutDelta(expr.left, scale), withoutDelta(expr.right, scale));
  }
}

const conjugate = (z: Complex): Complex => ({ re: z.re, im: -z.im });
