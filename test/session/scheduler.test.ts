import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import type { ModelSpec } from '../../server/src/core/model/spec';
import type { CheckedDocument } from '../../server/src/session/checked';
import type { Outcome } from '../../server/src/session/evaluator';
import { Scheduler } from '../../server/src/session/scheduler';
import { standardSettings } from '../../server/src/session/settings';
import { contactText, results } from './model';

/** An evaluator in the hands of the test. */
class ByHand {
  readonly asked: string[] = [];
  cancelled = false;
  private end: (outcome: Outcome) => void = () => {};

  evaluate(spec: ModelSpec): Promise<Outcome> {
    this.asked.push(`${spec.name} ${spec.couplings[0].value}`);
    this.cancelled = false;
    return new Promise(end => (this.end = end));
  }
  cancel(): void {
    this.cancelled = true;
  }
  dispose(): void {}

  async conclude(outcome: Outcome): Promise<void> {
    this.end(outcome);
    await vi.advanceTimersByTimeAsync(0);
  }
}

const numbers: Outcome = { kind: 'finished', results: results('by numbers') };
let evaluator: ByHand;
let scheduler: Scheduler;
let published: string[];
let working: unknown;

beforeEach(() => {
  vi.useFakeTimers();
  evaluator = new ByHand();
  published = [];
  scheduler = new Scheduler(evaluator, {
    checked: (uri, version, document) => published.push(`${uri} ${version} ${stages(document)}`),
    working: state => (working = state),
  });
});
afterEach(() => {
  scheduler.dispose();
  vi.useRealTimers();
});

const stages = ({ models }: CheckedDocument): string => models.map(({ source, stage }) => `${source.name}:${stage}`).join(' ');
const settle = (): Promise<unknown> => vi.advanceTimersByTimeAsync(100);

test('verdicts come at once, numbers follow model by model', async () => {
  scheduler.update('f', 1, contactText('a', 1) + contactText('b', 2));
  await settle();
  expect(published).toEqual(['f 1 a:symbolic b:symbolic']);
  expect(working).toEqual({ model: 'a', done: 0, what: '' });
  await evaluator.conclude(numbers);
  await evaluator.conclude(numbers);
  expect(published.slice(1)).toEqual(['f 1 a:complete b:symbolic', 'f 1 a:complete b:complete']);
  expect(working).toBeNull();
});

test('a burst of keystrokes is read once', async () => {
  for (const version of [1, 2, 3]) scheduler.update('f', version, contactText('a', version));
  await settle();
  expect(published).toEqual(['f 3 a:symbolic']);
});

test('who asks before the burst is over gets the latest text', () => {
  scheduler.update('f', 1, contactText('a'));
  expect(stages(scheduler.current('f')!)).toBe('a:symbolic');
  expect(published).toEqual(['f 1 a:symbolic']);
  expect(scheduler.current('another')).toBeNull();
});

test('an edit of the model cancels its evaluation, and the late result is shown nowhere', async () => {
  scheduler.update('f', 1, contactText('a', 1));
  await settle();
  scheduler.update('f', 2, contactText('a', 2));
  await settle();
  expect(evaluator.cancelled).toBe(true);
  await evaluator.conclude({ kind: 'finished', results: results('too late') });
  expect(evaluator.asked).toEqual(['a 1', 'a 2']);
  expect(published).toEqual(['f 1 a:symbolic', 'f 2 a:symbolic']);
});

test('an edit elsewhere in the file leaves the evaluation alone, and its result holds for the new text', async () => {
  scheduler.update('f', 1, contactText('a', 1));
  await settle();
  scheduler.update('f', 2, `# a remark\n${contactText('a', 1)}`);
  await settle();
  expect(evaluator.cancelled).toBe(false);
  await evaluator.conclude(numbers);
  expect(evaluator.asked).toEqual(['a 1']);
  expect(published.at(-1)).toBe('f 2 a:complete');
});

test('going back to an earlier text needs no evaluation', async () => {
  scheduler.update('f', 1, contactText('a', 1));
  await settle();
  await evaluator.conclude(numbers);
  scheduler.update('f', 2, contactText('a', 2));
  await settle();
  await evaluator.conclude({ kind: 'cancelled' });
  scheduler.update('f', 3, contactText('a', 1));
  await settle();
  expect(published.at(-1)).toBe('f 3 a:complete');
});

test('a cancelled model that is wanted again is evaluated again', async () => {
  scheduler.update('f', 1, contactText('a', 1));
  await settle();
  await evaluator.conclude({ kind: 'cancelled' });
  expect(evaluator.asked).toEqual(['a 1', 'a 1']);
});

test('a model whose thread broke down is not tried again', async () => {
  scheduler.update('f', 1, contactText('a', 1));
  await settle();
  await evaluator.conclude({ kind: 'failed', reason: 'out of memory' });
  expect(evaluator.asked).toEqual(['a 1']);
  expect(scheduler.current('f')!.models[0].results!.remarks[0].message).toContain('out of memory');
});

test('the document edited last comes first', async () => {
  scheduler.update('f', 1, contactText('a', 1) + contactText('b', 2));
  await settle();
  scheduler.update('g', 1, contactText('c', 3));
  await settle();
  await evaluator.conclude(numbers);
  expect(evaluator.asked).toEqual(['a 1', 'c 3']);
});

test('closing a document cancels its evaluation', async () => {
  scheduler.update('f', 1, contactText('a', 1));
  await settle();
  scheduler.close('f');
  expect(evaluator.cancelled).toBe(true);
  await evaluator.conclude({ kind: 'cancelled' });
  expect(working).toBeNull();
  expect(published).toEqual(['f 1 a:symbolic']);
});

test('other settings check everything again', async () => {
  scheduler.update('f', 1, contactText('a', 1));
  await settle();
  await evaluator.conclude(numbers);
  scheduler.configure({ ...standardSettings, keystrokeBudget: 5 });
  await settle();
  expect(evaluator.asked).toEqual(['a 1', 'a 1']);
  expect(published.at(-1)).toBe('f 1 a:symbolic');
});

test('a file with more models than the cache holds comes to rest', async () => {
  const models = Array.from({ length: 220 }, (_, index) => contactText(`m${index}`, index + 1));
  scheduler.update('f', 1, models.join(''));
  await settle();
  for (let count = 0; count < models.length; count++) await evaluator.conclude(numbers);
  expect(working).toBeNull();
  expect(evaluator.asked.length).toBe(models.length);
});
