// A worker for the tests of the evaluator: how it behaves is the name of the model.
import process from 'node:process';
import { parentPort, workerData } from 'node:worker_threads';

const wanted = new Int32Array(workerData.wanted);

parentPort.on('message', ({ id, spec, budget }) => {
  parentPort.postMessage({ kind: 'progress', id, done: 0.5, what: `with ${budget} evaluations` });
  if (spec.name === 'crashes') throw new Error('out of paper');
  if (spec.name === 'exits') process.exit(3);
  while (spec.name === 'deaf');
  while (spec.name === 'obedient' && Atomics.load(wanted, 0) === id);
  parentPort.postMessage(spec.name === 'obedient' ? { kind: 'cancelled', id } : { kind: 'finished', id, results: spec.name });
});
