import { Worker } from 'node:worker_threads';
import type { ModelSpec } from '../core/model/spec';
import type { ModelResults } from '../core/results';
import type { Answer, Job, WorkerData } from './messages';

export type Outcome =
  | { readonly kind: 'finished'; readonly results: ModelResults }
  | { readonly kind: 'cancelled' }
  /** The thread broke down: out of memory, or a mistake of ours. */
  | { readonly kind: 'failed'; readonly reason: string };

interface Running {
  readonly id: number;
  readonly end: (outcome: Outcome) => void;
  readonly progress: (done: number, what: string) => void;
  patience?: NodeJS.Timeout;
}

/** Time that a cancelled job has to stop by itself before its thread is ended, in ms. */
const patienceAfterCancel = 2000;

/** Evaluates models one at a time in a thread of its own, which is replaced whenever it breaks down or does not stop when told to. */
export class Evaluator {
  private readonly wanted = new Int32Array(new SharedArrayBuffer(4));
  private worker: Worker | null = null;
  private running: Running | null = null;
  private lastId = 0;

  /** `program` is the path of the bundled worker. */
  constructor(
    private readonly program: string,
    private readonly patience = patienceAfterCancel,
  ) {}

  /** Evaluates `spec`; needs the evaluator to be idle. The promise is never rejected. */
  evaluate(spec: ModelSpec, budget: number, progress: (done: number, what: string) => void): Promise<Outcome> {
    if (this.running) throw new Error('The evaluator takes one model at a time.');
    const id = ++this.lastId;
    Atomics.store(this.wanted, 0, id);
    return new Promise(end => {
      this.running = { id, end, progress };
      this.worker ??= this.start();
      this.worker.postMessage({ id, spec, budget } satisfies Job);
    });
  }

  /** Tells the running job, if there is one, to stop; its promise then gives `cancelled`, at the latest after the patience. */
  cancel(): void {
    const running = this.running;
    if (!running || running.patience) return;
    Atomics.store(this.wanted, 0, 0);
    running.patience = setTimeout(() => this.abandon({ kind: 'cancelled' }), this.patience);
  }

  /** Ends the thread. */
  dispose(): void {
    this.abandon({ kind: 'cancelled' });
  }

  private start(): Worker {
    const worker = new Worker(this.program, { workerData: { wanted: this.wanted.buffer } satisfies WorkerData });
    worker.on('message', (answer: Answer) => {
      if (this.worker === worker) this.hear(answer);
    });
    const fail = (reason: string): void => {
      if (this.worker === worker) this.abandon({ kind: 'failed', reason });
    };
    worker.on('error', error => fail(error instanceof Error ? error.message : String(error)));
    worker.on('exit', code => fail(`its thread ended with code ${code}`));
    // An idle evaluator must not keep the process alive.
    worker.unref();
    return worker;
  }

  private hear(answer: Answer): void {
    const running = this.running;
    if (running?.id !== answer.id) return;
    if (answer.kind === 'progress') running.progress(answer.done, answer.what);
    else this.finish(answer);
  }

  private abandon(outcome: Outcome): void {
    const worker = this.worker;
    this.worker = null;
    void worker?.terminate();
    this.finish(outcome);
  }

  private finish(outcome: Outcome): void {
    const running = this.running;
    if (!running) return;
    clearTimeout(running.patience);
    this.running = null;
    running.end(outcome);
  }
}
