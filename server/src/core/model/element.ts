import type { KernelShape } from './kernel-shape';

/** One summand of a matrix element: adds itself to what is there. */
export interface Element {
  add(p: Float64Array, k: Float64Array, E: number, re: Float64Array, im: Float64Array): void;
  readonly real: boolean;
  /** V(p, k) = V(k, p), as it stands in its formula. */
  readonly symmetric: boolean;
  readonly relativeError: number;
  readonly shape: KernelShape;
}
