/**
 * Times of the main job as ratios against references measured in the same run. `npm run bench`.
 *  1. from an edit to the symbolic verdicts, against the JSON language service of VS Code on a JSON file of the same size;
 *  2. the whole check of the same model, cold from the shell and warm;
 *  3. series and full solution on a 64-point grid, against the same work in NumPy with one thread (reference.py).
 */
import { spawnSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { getLanguageService, TextDocument } from 'vscode-json-languageservice';
import { ResultsCache } from '../../server/src/session/cache';
import { checkComplete, checkSymbolic } from '../../server/src/session/check';
import { referenceWork } from './reference-work';

const root = join(__dirname, '..');
const text = readFileSync(join(root, 'test/bench/sixty-lines.tare'), 'utf8');
const defaults = { cutoff: 10, order: 3 };
const overrides = { cutoff: null, order: null };

const median = (values: number[]): number => [...values].sort((x, y) => x - y)[values.length >> 1];

type Work = (round: number) => unknown;

/** Median times, without the first quarter of the rounds, in which the compiler of the engine is still at work. */
async function timesByTurns(count: number, works: readonly Work[]): Promise<number[]> {
  const found = works.map((): number[] => []);
  for (let round = 0; round < count; round++) {
    for (const [j, work] of works.entries()) {
      const start = performance.now();
      await work(round);
      found[j].push(performance.now() - start);
    }
  }
  return found.map(all => median(all.slice(count >> 2)));
}

const times = async (count: number, work: Work): Promise<number> => (await timesByTurns(count, [work]))[0];

/** A strength changes with each edit, so that nothing can be taken from the edit before. */
const edited = (round: number): string => text.replace('coupling c = 0.4', `coupling c = 0.4${round + 1}`);
/** A kernel changes. */
const rewritten = (round: number): string => text.replace('d*(p^2 + k^2)', `d*(p^2 + k^2)*1.0${round + 1}`);

function jsonOfTheSameSize(): { json: string; schema: object } {
  const interaction = (name: string) => ({
    name,
    arguments: ['p', 'k'],
    kernel: 'd*(p^2 + k^2)',
    order: 2,
    comment: 'what a finite range of the core adds',
  });
  const items: object[] = [];
  while (JSON.stringify({ interactions: items }, null, 2).length < text.length - 150)
    items.push(interaction(`interaction_${items.length}`));
  const property = { type: 'string', minLength: 1, pattern: '^[^\\n]*$' };
  const item = {
    type: 'object',
    required: ['name', 'kernel'],
    additionalProperties: false,
    properties: {
      name: property,
      kernel: property,
      comment: property,
      order: { type: 'integer', minimum: 1 },
      arguments: { type: 'array', items: { enum: ['p', 'k', 'E', 'q', 'x', 'r'] } },
    },
  };
  return {
    json: JSON.stringify({ interactions: items }, null, 2),
    schema: { type: 'object', properties: { interactions: { type: 'array', items: item } } },
  };
}

async function keystroke(): Promise<void> {
  const { json, schema } = jsonOfTheSameSize();
  const service = getLanguageService({});
  service.configure({ validate: true, schemas: [{ uri: 'memory://model', fileMatch: ['*'], schema }] });
  const validate = async (round: number) => {
    const document = TextDocument.create('file:///model.json', 'json', round, json.replace('interaction_0', `interaction_${round}`));
    await service.doValidation(document, service.parseJSONDocument(document));
  };
  const check = (text: string) => checkSymbolic(text, defaults, overrides, new ResultsCache());
  // By turns, so that what else the machine does slows all of them alike.
  const [reference, strength, kernel] = await timesByTurns(1200, [
    validate,
    round => check(edited(round)),
    round => check(rewritten(round)),
  ]);
  print(
    'edit of a strength to verdicts',
    strength,
    `${(strength / reference).toFixed(2)} times the JSON service's ${reference.toFixed(2)} ms (${json.length} bytes; the model: ${text.length})`,
  );
  print('edit of a kernel to verdicts', kernel, `${(kernel / reference).toFixed(2)} times the JSON service`);
}

async function wholeCheck(): Promise<void> {
  const hooks = { shouldStop: () => false, budget: Infinity, full: false };
  const warm = await times(24, round => checkComplete(edited(round), defaults, overrides, hooks, new ResultsCache()));
  print('whole check, warm', warm, '');
  const cold = await times(6, () =>
    spawnSync(process.execPath, [join(root, 'dist/cli.js'), 'check', join(root, 'test/bench/sixty-lines.tare')]),
  );
  const node = await times(6, () => spawnSync(process.execPath, ['-e', '0']));
  print('whole check, cold from the shell', cold, `${(cold / node).toFixed(1)} times an empty node process`);
}

/** Seconds that NumPy takes; null, with a word on why, where it is not there. */
function numpySeconds(): number | null {
  const { stdout, status, stderr } = spawnSync('/usr/bin/python3', [join(root, 'test/bench/reference.py')], { encoding: 'utf8' });
  if (status === 0) return (JSON.parse(stdout) as { seconds: number }).seconds;
  console.log(`SKIPPED: NumPy is not installed for /usr/bin/python3 (${stderr.trim().split('\n').pop() ?? ''})`);
  return null;
}

/** By turns too: what NumPy takes and what we take right after it. */
async function againstNumpy(): Promise<void> {
  const pairs: { ours: number; numpy: number }[] = [];
  for (let turn = 0; turn < 7; turn++) {
    const seconds = numpySeconds();
    if (seconds === null) return;
    pairs.push({ ours: await times(12, referenceWork), numpy: 1000 * seconds });
  }
  const ratio = median(pairs.slice(1).map(p => p.ours / p.numpy));
  const [ours, numpy] = [median(pairs.map(p => p.ours)), median(pairs.map(p => p.numpy))];
  print('series and LU on 64 points', ours, `${ratio.toFixed(2)} times NumPy's ${numpy.toFixed(0)} ms`);
}

const print = (what: string, milliseconds: number, note: string): void =>
  console.log(`${what.padEnd(34)} ${milliseconds.toFixed(2).padStart(9)} ms   ${note}`);

void (async () => {
  await keystroke();
  await wholeCheck();
  await againstNumpy();
})();
