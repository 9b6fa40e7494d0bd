import { describe, expect, it } from 'vitest';
import { judge } from '../../server/src/core/expectations';

/** Whether a scattering length of 2.00 ± 0.05 is what was expected. */
function lengthOf(value: number, tolerance: number) {
  const [found] = judge([{ kind: 'observable', observable: 'scattering_length', value, tolerance, point: null }], {
    terms: [],
    convergenceAt: () => null,
    driftAt: () => null,
    fullAt: () => null,
    observables: { scattering_length: 2, definition: '', uncertainties: { scattering_length: 0.05 } },
    dimension: 3,
    partialWave: 0,
  });
  return found;
}

describe('an expectation of a number with an error', () => {
  it.each([
    ['holds where the error leaves no doubt', 2.1, 0.3, true],
    ['fails where it leaves none', 2.5, 0.3, false],
    ['is open where the number could lie on either side', 2.28, 0.3, null],
    ['is open where the number could lie on either side', 2.32, 0.3, null],
    ['is open where it is asked for more closely than it is known', 2, 0.01, null],
  ])('%s: 2.00 ± 0.05 for %f within %f', (_, value, tolerance, holds) => {
    expect(lengthOf(value, tolerance).holds).toBe(holds);
  });

  it('shows the error', () => {
    expect(lengthOf(2, 1).measured).toBe('2.00000 ± 0.05');
  });
});
