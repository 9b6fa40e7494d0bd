import type { ModelSpec } from '../core/model/spec';
import type { ModelResults } from '../core/results';

export type SpecKey = string;

/** The spec as text: equal for two models that physics cannot tell apart, wherever they stand and whatever they are called. */
export function keyOf(spec: ModelSpec): SpecKey {
  return JSON.stringify({ ...spec, name: '' });
}

/** Results by spec, the least recently used dropped first. */
class Recent {
  private readonly entries = new Map<SpecKey, ModelResults>();

  constructor(private readonly capacity: number) {}

  get(key: SpecKey): ModelResults | undefined {
    const found = this.entries.get(key);
    if (found !== undefined) this.set(key, found);
    return found;
  }

  set(key: SpecKey, results: ModelResults): void {
    this.entries.delete(key);
    this.entries.set(key, results);
    if (this.entries.size > this.capacity) this.entries.delete(this.entries.keys().next().value!);
  }

  clear(): void {
    this.entries.clear();
  }
}

/** What has been found out about models so far; `complete` replaces `symbolic`. */
export class ResultsCache {
  readonly symbolic: Recent;
  readonly complete: Recent;

  constructor(capacity = 200) {
    this.symbolic = new Recent(capacity);
    this.complete = new Recent(capacity);
  }
}
