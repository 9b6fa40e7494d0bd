import type { Complex } from '../algebra/expression';
import { kernelColumn } from '../model/kernel-on-grid';
import type { Column, GridKernels } from '../series/dense-words';
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
    for (let row = 0; row < nodes; row++) accumulate(inner, row * nodes, nodes, strength, re, im, row * size, 1);
    for (let s = 0; s < onShell.length; s++) {
      accumulate(kernels.row(vertex, onShell[s], problem.E.re), 0, nodes, strength, re, im, (nodes + s) * size, 1);
      const column = kernelColumn(vertex.element, loop, onShell[s], problem.E.re);
      accumulate({ re: column.re, im: vertex.element.real ? null : column.im }, 0, size, strength, re, im, nodes + s, size);
    }
  }
  return { size, re, im };
}

/** Adds s times x[from … from + count] to every `stride`-th place from `to` on. */
function accumulate(
  x: Column,
  from: number,
  count: number,
  s: Complex,
  re: Float64Array,
  im: Float64Array | null,
  to: number,
  stride: number,
): void {
  const y = x.im;
  if (!y && s.im === 0) {
    for (let j = 0, at = to; j < count; j++, at += stride) re[at] += s.re * x.re[from + j];
    return;
  }
  for (let j = 0, at = to; j < count; j++, at += stride) {
    re[at] += s.re * x.re[from + j] - (y ? s.im * y[from + j] : 0);
    if (im) im[at] += s.im * x.re[from + j] + (y ? s.re * y[from + j] : 0);
  }
}
