import { parentPort, workerData } from 'node:worker_threads';
import { Cancelled } from '../core/analysis';
import { completeResults } from './evaluate';
import type { Answer, Job, WorkerData } from './messages';

// The thread in which models are evaluated, so that the thread of the language server stays free to hear of the next edit.

const wanted = new Int32Array((workerData as WorkerData).wanted);
const answer = (message: Answer): void => parentPort!.postMessage(message);

parentPort!.on('message', ({ id, spec, budget }: Job) => {
  try {
    const results = completeResults(spec, {
      shouldStop: () => Atomics.load(wanted, 0) !== id,
      budget,
      full: false,
      progress: (_, done, what) => answer({ kind: 'progress', id, done, what }),
    });
    answer({ kind: 'finished', id, results });
  } catch (error) {
    if (!(error instanceof Cancelled)) throw error;
    answer({ kind: 'cancelled', id });
  }
});
