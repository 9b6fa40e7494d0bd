import { join } from 'node:path';
import { afterEach, beforeEach, expect, test } from 'vitest';
import { Evaluator } from '../../server/src/session/evaluator';
import { contact } from './model';

const patience = 200;
const nothing = (): void => {};
let evaluator: Evaluator;

beforeEach(() => {
  evaluator = new Evaluator(join(import.meta.dirname, 'obstinate-worker.mjs'), patience);
});
afterEach(() => evaluator.dispose());

const evaluate = (name: string): ReturnType<Evaluator['evaluate']> => evaluator.evaluate(contact(name), 1, nothing);

test('a model comes back evaluated, and its progress before', async () => {
  const heard: unknown[] = [];
  const outcome = await evaluator.evaluate(contact('quick'), 1000, (...news) => heard.push(news));
  expect(outcome).toMatchObject({ kind: 'finished', results: 'quick' });
  expect(heard).toEqual([[0.5, 'with 1000 evaluations']]);
});

test('one model at a time', async () => {
  const first = evaluate('quick');
  expect(() => evaluate('quick')).toThrow('one model at a time');
  await first;
});

test('a cancelled job stops by itself', async () => {
  const cancelled = evaluator.evaluate(contact('obedient'), 1, () => evaluator.cancel());
  expect(await cancelled).toMatchObject({ kind: 'cancelled' });
  expect(await evaluate('quick')).toMatchObject({ kind: 'finished' });
});

test('a job that does not stop is stopped, and the next one runs', async () => {
  let cancelledAt = 0;
  const deaf = evaluator.evaluate(contact('deaf'), 1, () => {
    cancelledAt = performance.now();
    evaluator.cancel();
  });
  expect(await deaf).toEqual({ kind: 'cancelled' });
  expect(performance.now() - cancelledAt).toBeGreaterThanOrEqual(patience - 1);
  expect(await evaluate('quick')).toMatchObject({ kind: 'finished' });
});

test.each([
  ['crashes', 'out of paper'],
  ['exits', 'its thread ended with code 3'],
])('a thread that %s says so, and the next job runs', async (name, reason) => {
  expect(await evaluate(name)).toEqual({ kind: 'failed', reason });
  expect(await evaluate('quick')).toMatchObject({ kind: 'finished' });
});

test('disposing ends what is running', async () => {
  const deaf = evaluate('deaf');
  evaluator.dispose();
  expect(await deaf).toEqual({ kind: 'cancelled' });
});
