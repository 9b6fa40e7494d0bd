import { afterEach, beforeEach, expect, test, vi } from 'vitest';
import type { Connection } from 'vscode-languageserver/node';
import { Progress } from '../../server/src/lsp/progress';

let heard: unknown[][];
let refuse: boolean;
let progress: Progress;

beforeEach(() => {
  vi.useFakeTimers();
  heard = [];
  refuse = false;
  const reporter = {
    begin: (...words: unknown[]) => heard.push(['begin', ...words]),
    report: (...words: unknown[]) => heard.push(['report', ...words]),
    done: () => heard.push(['done']),
  };
  const createWorkDoneProgress = (): Promise<unknown> => (refuse ? Promise.reject(new Error('no')) : Promise.resolve(reporter));
  progress = new Progress({ window: { createWorkDoneProgress } } as unknown as Connection);
});
afterEach(() => {
  vi.useRealTimers();
});

const work = (done: number, what = 'order 2'): { model: string; done: number; what: string } => ({ model: 'wire', done, what });

test('work that is over soon is not spoken of', async () => {
  progress.show(work(0));
  await vi.advanceTimersByTimeAsync(400);
  progress.show(null);
  await vi.advanceTimersByTimeAsync(1000);
  expect(heard).toEqual([]);
});

test('work that takes a while is shown until it is over', async () => {
  progress.show(work(0, ''));
  await vi.advanceTimersByTimeAsync(300);
  progress.show(work(0.1));
  await vi.advanceTimersByTimeAsync(300);
  progress.show(work(0.554));
  await vi.advanceTimersByTimeAsync(1);
  progress.show(null);
  await vi.advanceTimersByTimeAsync(1);
  expect(heard).toEqual([['begin', 'Tare', 10, 'wire: order 2'], ['report', 55, 'wire: order 2'], ['done']]);
});

test('the next work starts a silence of its own', async () => {
  progress.show(work(0));
  await vi.advanceTimersByTimeAsync(600);
  progress.show(null);
  progress.show(work(0));
  await vi.advanceTimersByTimeAsync(400);
  expect(heard.map(([kind]) => kind)).toEqual(['begin', 'done']);
  await vi.advanceTimersByTimeAsync(200);
  expect(heard.map(([kind]) => kind)).toEqual(['begin', 'done', 'begin']);
});

test('a client that refuses goes without', async () => {
  refuse = true;
  progress.show(work(0));
  await vi.advanceTimersByTimeAsync(600);
  progress.show(work(0.5));
  progress.show(null);
  await vi.advanceTimersByTimeAsync(600);
  expect(heard).toEqual([]);
});
