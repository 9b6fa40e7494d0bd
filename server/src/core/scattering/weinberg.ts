import type { Complex } from '../algebra/expression';
import { largestEigenvalues } from '../linear/eigenvalues';
import type { LoopWeights } from '../series/loop-weights';
import type { PotentialMatrix } from './potential';

/** Products with the kernel; it is compact, so its large eigenvalues are found within a few. */
const STEPS = 14;
/** At most so many are reported. */
const REPORTED = 6;

/**
 * Eigenvalues η of G₀(E + iε) V (those of V G₀), by falling modulus: the Born series of V converges at E if every |η| < 1
 * (Weinberg, Phys. Rev. 131 (1963) 440). `residual` bounds the error of the largest.
 */
export function weinbergEigenvalues(potential: PotentialMatrix, problem: LoopWeights): { values: Complex[]; residual: number } {
  const { size, re, im } = potential;
  const gRe = problem.g.re;
  const gIm = outgoing(problem);
  const x = { re: new Float64Array(size), im: new Float64Array(size) };
  const found = largestEigenvalues(
    (input, output) => {
      for (let j = 0; j < size; j++) {
        x.re[j] = gRe[j] * input.re[j] - gIm[j] * input.im[j];
        x.im[j] = gRe[j] * input.im[j] + gIm[j] * input.re[j];
      }
      for (let r = 0, at = 0; r < size; r++) {
        let s = 0;
        let t = 0;
        if (im) {
          for (let c = 0; c < size; c++, at++) {
            s += re[at] * x.re[c] - im[at] * x.im[c];
            t += re[at] * x.im[c] + im[at] * x.re[c];
          }
        } else {
          for (let c = 0; c < size; c++, at++) {
            s += re[at] * x.re[c];
            t += re[at] * x.im[c];
          }
        }
        output.re[r] = s;
        output.im[r] = t;
      }
    },
    size,
    STEPS,
    REPORTED,
    1e-6,
  );
  return withoutZeros(found);
}

/** The imaginary part of the propagator on the loop points: -ρ on shell. */
export function outgoing({ g, density }: LoopWeights): Float64Array {
  const nodes = g.re.length - density.length;
  return g.re.map((_, j) => (j < nodes ? 0 : -density[j - nodes]));
}

/** The same from a small matrix that has these eigenvalues. */
export function eigenvaluesOfLoop(matrix: readonly (readonly Complex[])[]): { values: Complex[]; residual: number } {
  const found = largestEigenvalues(
    (x, y) =>
      matrix.forEach((row, r) => {
        y.re[r] = row.reduce((sum, c, k) => sum + c.re * x.re[k] - c.im * x.im[k], 0);
        y.im[r] = row.reduce((sum, c, k) => sum + c.re * x.im[k] + c.im * x.re[k], 0);
      }),
    matrix.length,
    matrix.length,
    REPORTED,
    1e-6,
  );
  return withoutZeros(found);
}

function withoutZeros({ values, residual }: { values: Complex[]; residual: number }): { values: Complex[]; residual: number } {
  const largest = Math.hypot(values[0]?.re ?? 0, values[0]?.im ?? 0);
  return { values: values.filter(v => Math.hypot(v.re, v.im) > 1e-8 * largest), residual };
}
