import { matrixElement } from '../../../server/src/core/model/matrix-element';
import type { MatrixElement } from '../../../server/src/core/model/matrix-element';
import type { KernelArguments, ModelSpec } from '../../../server/src/core/model/spec';
import { expr } from '../../support/expr';
import { specOf } from '../../support/spec';

/** A model of nothing but a dimension and a wave: `full`, `even`, `odd`, or the angular momentum. */
export const modelIn = (dimension: 1 | 2 | 3, wave: 'full' | 'even' | 'odd' | number): ModelSpec =>
  specOf({}, { dimension, wave, momenta: [] });

export function elementOf(
  kernel: string,
  args: KernelArguments,
  dimension: 1 | 2 | 3,
  wave: 'full' | 'even' | 'odd' | number,
  couplings: Record<string, number> = {},
): MatrixElement {
  return matrixElement(
    { name: 'v', arguments: args, kernel: expr(kernel), order: 1 },
    modelIn(dimension, wave),
    new Map(Object.entries(couplings)),
  );
}

/** V(p, k) at one point. */
export function at(element: MatrixElement, p: number, k: number, E = 0): { re: number; im: number } {
  const re = new Float64Array(1);
  const im = new Float64Array(1);
  element.fill(Float64Array.of(p), Float64Array.of(k), E, re, im);
  return { re: re[0], im: im[0] };
}
