import { expect, test } from 'vitest';
import { growthFormula, growthInWords } from '../../server/src/findings/words/growth';

test.each([
  [1, 0, 'L^1', 'linearly, as L^1'],
  [2, 0, 'L^2', 'quadratically, as L^2'],
  [3, 0, 'L^3', 'cubically, as L^3'],
  [0, 1, 'ln L', 'logarithmically, as ln L'],
  [0, 2, '(ln L)^2', 'as (ln L)^2'],
  [1, 1, 'L^1 ln L', 'as L^1 ln L'],
  [1.5, 0, 'L^1.5', 'as L^1.5'],
  [0, 0, '', 'at a rate that is not known'],
])('power %d, log %d', (power, log, formula, words) => {
  expect(growthFormula({ power, log }, 'L')).toBe(formula);
  expect(growthInWords({ power, log }, 'L')).toBe(words);
});

test('the cutoff keeps its own name, and an unknown growth is a word', () => {
  expect(growthFormula({ power: 2, log: 1 }, 'Λ')).toBe('Λ^2 ln Λ');
  expect(growthInWords({ power: null, log: null }, 'L')).toBe('at a rate that is not known');
});
