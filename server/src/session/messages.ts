import type { ModelSpec } from '../core/model/spec';
import type { ModelResults } from '../core/results';

/** What the worker is started with. */
export interface WorkerData {
  /** Int32Array of one: the id of the job that is still wanted; any other makes a running job stop. */
  readonly wanted: SharedArrayBuffer;
}

/** To the worker: evaluate one model. */
export interface Job {
  readonly id: number;
  readonly spec: ModelSpec;
  readonly budget: number;
}

/** From the worker. Each job ends with exactly one `finished` or `cancelled`. */
export type Answer =
  | { readonly kind: 'progress'; readonly id: number; readonly done: number; readonly what: string }
  | { readonly kind: 'finished'; readonly id: number; readonly results: ModelResults }
  | { readonly kind: 'cancelled'; readonly id: number };
