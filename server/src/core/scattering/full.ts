import type { Complex } from '../algebra/expression';
import { determinant, factor, solve } from '../linear/lu';
import type { LoopWeights } from '../series/loop-weights';
import type { PotentialMatrix } from './potential';

/** The standing-wave amplitude between the on-shell momenta, K = V + V G K with the principal value: [row][column]. */
export function standingWave(potential: PotentialMatrix, problem: LoopWeights): Complex[][] {
  const { size } = potential;
  const onShell = problem.density.length;
  const nodes = size - onShell;
  const factored = factor(size, ...oneMinusLoop(potential, problem));
  return transpose(
    Array.from({ length: onShell }, (_, column) => {
      const x = Float64Array.from({ length: size }, (__, r) => potential.re[r * size + nodes + column]);
      const y = potential.im ? Float64Array.from({ length: size }, (__, r) => potential.im![r * size + nodes + column]) : null;
      solve(factored, x, y);
      return Array.from({ length: onShell }, (__, row) => ({ re: x[nodes + row], im: y ? y[nodes + row] : 0 }));
    }),
  );
}

/** ln|det(1 - V G)| with its sign, at an energy below threshold: it vanishes at bound states. Real potentials only. */
export function boundStateDeterminant(potential: PotentialMatrix, problem: LoopWeights): { sign: number; log: number } {
  return determinant(factor(potential.size, ...oneMinusLoop(potential, problem)));
}

/** 1 - V g, column by column. */
function oneMinusLoop({ size, re, im }: PotentialMatrix, { g }: LoopWeights): [Float64Array, Float64Array | null] {
  return [minusLoop(size, re, g.re, 1), im && minusLoop(size, im, g.re, 0)];
}

function minusLoop(size: number, v: Float64Array, g: Float64Array, diagonal: number): Float64Array {
  const a = new Float64Array(size * size);
  for (let r = 0, at = 0; r < size; r++) {
    for (let c = 0; c < size; c++, at++) a[at] = -v[at] * g[c];
    a[r * size + r] += diagonal;
  }
  return a;
}

const transpose = (m: Complex[][]): Complex[][] => m.map((_, row) => m.map(column => column[row]));

/** T = K - i K ρ T, that is (1 + i K ρ) T = K, for one or two on-shell momenta. */
export function amplitudeFromStandingWave(k: readonly (readonly Complex[])[], density: readonly number[]): Complex[][] {
  const n = k.length;
  const a = { re: new Float64Array(n * n), im: new Float64Array(n * n) };
  for (let r = 0; r < n; r++) {
    for (let c = 0; c < n; c++) {
      a.re[r * n + c] = (r === c ? 1 : 0) - k[r][c].im * density[c];
      a.im[r * n + c] = k[r][c].re * density[c];
    }
  }
  const factored = factor(n, a.re, a.im);
  const columns = k.map((_, column) => {
    const x = Float64Array.from(k, row => row[column].re);
    const y = Float64Array.from(k, row => row[column].im);
    solve(factored, x, y);
    return k.map((__, r) => ({ re: x[r], im: y[r] }));
  });
  return transpose(columns);
}
