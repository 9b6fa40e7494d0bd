import { beforeEach, describe, expect, test, vi } from 'vitest';
import { Cancelled, analyse, symbolicResults } from '../../server/src/core/analysis';
import { ResultsCache } from '../../server/src/session/cache';
import { checkComplete, checkSymbolic } from '../../server/src/session/check';
import { contactText, results } from './model';

vi.mock(import('../../server/src/core/analysis'), async original => ({
  ...(await original()),
  symbolicResults: vi.fn(),
  analyse: vi.fn(),
}));

const defaults = { cutoff: 10, order: 3 };
const overrides = { cutoff: null, order: null };
const hooks = { shouldStop: () => false, budget: 1000, full: false };

beforeEach(() => {
  vi.mocked(symbolicResults).mockReset().mockReturnValue(results('by counting'));
  vi.mocked(analyse).mockReset().mockReturnValue(results('by numbers'));
});

describe('verdicts at once', () => {
  test('each model that can be evaluated has its results, the others none', () => {
    const { models } = checkSymbolic(contactText('a') + 'model b { }\n', defaults, overrides);
    expect(models.map(({ source, stage }) => [source.name, stage])).toEqual([
      ['a', 'symbolic'],
      ['b', 'text'],
    ]);
    expect(models[0].results).toEqual(results('by counting'));
    expect(models[1].results).toBeNull();
  });

  test('an edit elsewhere costs a model nothing', () => {
    const cache = new ResultsCache();
    checkSymbolic(contactText('a', 0.2) + contactText('b', 0.3), defaults, overrides, cache);
    expect(symbolicResults).toHaveBeenCalledTimes(2);
    checkSymbolic(`# a remark\n${contactText('renamed', 0.2)}${contactText('b', 0.4)}`, defaults, overrides, cache);
    expect(symbolicResults).toHaveBeenCalledTimes(3);
  });

  test('what is known completely is shown completely', () => {
    const cache = new ResultsCache();
    checkComplete(contactText('a'), defaults, overrides, hooks, cache);
    const { models } = checkSymbolic(contactText('a'), defaults, overrides, cache);
    expect(models[0]).toMatchObject({ stage: 'complete', results: results('by numbers') });
    expect(symbolicResults).not.toHaveBeenCalled();
  });
});

describe('everything', () => {
  test('budget and progress are handed on', () => {
    vi.mocked(analyse).mockImplementation((_spec, options) => {
      options.progress?.(0.5, 'halfway');
      return results(`${options.budget} ${options.full}`);
    });
    const progress = vi.fn();
    const { models } = checkComplete(contactText('a'), defaults, overrides, { ...hooks, progress });
    expect(models[0].results).toEqual(results('1000 false'));
    expect(progress).toHaveBeenCalledExactlyOnceWith('a', 0.5, 'halfway');
  });

  test('expectations bear the words of the file', () => {
    const expectation = { text: '', holds: true, measured: 'finite' };
    vi.mocked(analyse).mockReturnValue({ ...results(''), expectations: [expectation] });
    const { models } = checkComplete(contactText('a', 0.2, '  expect finite to 2\n'), defaults, overrides, hooks);
    expect(models[0].results?.expectations).toEqual([{ ...expectation, text: 'finite to 2' }]);
  });

  test('a model that breaks the evaluation does not hide the next one', () => {
    vi.mocked(analyse).mockImplementationOnce(() => {
      throw new RangeError('Invalid array length');
    });
    const { models } = checkComplete(contactText('a', 0.2, '  expect finite\n') + contactText('b', 0.3), defaults, overrides, hooks);
    expect(models[0].results?.remarks).toEqual([
      { code: 'undecided', subject: null, message: expect.stringContaining('(Invalid array length). Please report it') as string },
    ]);
    expect(models[0].results?.expectations).toEqual([{ text: 'finite', holds: null, measured: 'not evaluated' }]);
    expect(models[1].results).toEqual(results('by numbers'));
  });

  test('being told to stop ends the whole check', () => {
    vi.mocked(analyse).mockImplementation(() => {
      throw new Cancelled();
    });
    expect(() => checkComplete(contactText('a'), defaults, overrides, hooks)).toThrow(Cancelled);
  });
});
