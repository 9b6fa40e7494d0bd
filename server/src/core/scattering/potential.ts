import type { Complex } from '../algebra/expression';
import { kernelColumn } from '../model/kernel-on-grid';
import type { GridKernels } from '../series/dense-words';
import type { ScaledVertex } from '../series/grid-chain';
import type { LoopWeights } from '../series/loop-weights';

/** The whole potential between the loop points (nodes, then on-shell momenta) of a problem: [row * size + column]. */
export interface PotentialMatrix {
  readonly size: number;
  readonly re: Float64Array;
  /** Null for a real potential. */
  readonly im: Float64Array | null;
}

/** Σ strength * vertex on the loop points of `problem`. Cost: size² times the number of vertices. */
export function potentialMatrix(kernels: GridKernels, parts: readonly ScaledVertex[], problem: LoopWeights): PotentialMatrix {
  const nodes = kernels.grid.nodes.length;
  const size = problem.g.re.length;
  const complex = parts.some(p => !p.vertex.element.real || p.strength.im !== 0);
  const re = new Float64Array(size * size);
  const im = complex ? new Float64Array(size * size) : null;
  const onShell = problem.points.subarray(nodes, size);
  const loop = problem.points.subarray(0, size);
  for (const { vertex, strength } of parts) {
    const inner = kernels.of(vertex, problem.E.re);
    for (let row = 0; row < nodes; row++) {
      accumulate(
        inner.re.subarray(row * nodes, (row + 1) * nodes),
        inner.im?.subarray(row * nodes, (row + 1) * nodes) ?? null,
        strength,
        re,
        im,
        row * size,
        1,
      );
    }
    for (let s = 0; s < onShell.length; s++) {
      const row = kernels.row(vertex, onShell[s], problem.E.re);
      accumulate(row.re, row.im, strength, re, im, (nodes + s) * size, 1);
      const column = kernelColumn(vertex.element, loop, onShell[s], problem.E.re);
      accumulate(column.re, vertex.element.real ? null : column.im, strength, re, im, nodes + s, size);
    }
  }
  return { size, re, im };
}

function accumulate(
  x: Float64Array,
  y: Float64Array | null,
  s: Complex,
  re: Float64Array,
  im: Float64Array | null,
  start: number,
  stride: number,
): void {
  if (!y && s.im === 0) {
    for (let j = 0, at = start; j < x.length; j++, at += stride) re[at] += s.re * x[j];
    return;
  }
  for (let j = 0, at = start; j < x.length; j++, at += stride) {
    re[at] += s.re * x[j] - (y ? s.im * y[j] : 0);
    if (im) im[at] += s.im * x[j] + (y ? s.re * y[j] : 0);
  }
}
