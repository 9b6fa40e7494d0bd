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
  const nodes = size - problem.density.length;
  const gRe = problem.g.re;
  const gIm = Float64Array.from({ length: size }, (_, j) => (j < nodes ? 0 : -problem.density[j - nodes]));
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
  const largest = Math.hypot(found.values[0]?.re ?? 0, found.values[0]?.im ?? 0);
  return { values: found.values.filter(v => Math.hypot(v.re, v.im) > 1e-8 * largest), residual: found.residual };
}
