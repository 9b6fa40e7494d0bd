import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { counted, formatComplex, formatNumber, listed, unknown } from '../../server/src/findings/words/numbers';

describe('a number for people', () => {
  test.each([
    [1.23454, 0.0006, '1.2345(6)'],
    [1.23454, 0.00051, '1.2345(6)'],
    [-3.119427136, 2e-9, '−3.1194 ± 2e-9'],
    [-0.0779859221, 1e-6, '−0.077986(1)'],
    [2.345e-7, 5e-9, '2.34(5)e-7'],
    [2.345e-7, 5e-10, '2.345(5)e-7'],
    [5, 20, '5 ± 2e1'],
    [0, 3e-12, '0 ± 3e-12'],
    [0.2, undefined, '0.2'],
    [0.2, 0, '0.2'],
    [123456.7, undefined, '123460'],
    [6.02e23, undefined, '6.02e23'],
    [1.5e-7, undefined, '1.5e-7'],
    [-0, undefined, '0'],
  ])('%d with an uncertainty of %s is %s', (value, uncertainty, wanted) => {
    expect(formatNumber(value, uncertainty)).toBe(wanted);
  });

  test.each([null, undefined, NaN, Infinity, -Infinity])('%s is a word', value => expect(formatNumber(value)).toBe(unknown));

  test('is within its own uncertainty of the value, whatever the two are', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e6, max: 1e6, noNaN: true }),
        fc.double({ min: 1e-12, max: 10, noNaN: true }),
        (value, uncertainty) => {
          const shown = formatNumber(value, uncertainty);
          expect(shown).not.toMatch(/NaN|undefined|null|Infinity|e\+/);
          const [, mantissa, digit, power = 'e0'] = /^(−?[\d.]+)\((\d)\)(e-?\d+)?$/.exec(shown) ?? [];
          if (mantissa === undefined) return;
          const decimals = mantissa.split('.')[1]?.length ?? 0;
          const bound = Number(`${digit}e${-decimals}`) * Number(`1${power}`);
          expect(bound).toBeGreaterThanOrEqual(uncertainty * (1 - 1e-9));
          expect(Math.abs(Number(mantissa.replace('−', '-') + power) - value)).toBeLessThanOrEqual(bound / 2 + 1e-15);
        },
      ),
    );
  });
});

describe('a complex number for people', () => {
  test.each([
    [{ re: -3.119427136, im: -0.01225 }, 1e-9, '−3.1194 − 0.01225i ± 1e-9'],
    [{ re: 0.4, im: 0.1 }, undefined, '0.4 + 0.1i'],
    [{ re: 0, im: -1 }, undefined, '−i'],
    [{ re: 0, im: 0.35 }, undefined, '0.35i'],
    [{ re: 3.119397892, im: 0 }, undefined, '3.1194'],
    [{ re: 1, im: 1e-17 }, 1e-4, '1.0000(1)'],
    [{ re: NaN, im: 0 }, undefined, unknown],
    [null, 1e-3, unknown],
  ])('%o with %s is %s', (value, uncertainty, wanted) => expect(formatComplex(value, uncertainty)).toBe(wanted));
});

test('lists are read as a sentence', () => {
  expect([listed([]), listed(['a']), listed(['a', 'b']), listed(['a', 'b', 'c']), listed(['a', 'b', 'c', 'd'], 2)]).toEqual([
    '',
    'a',
    'a and b',
    'a, b and c',
    'a, b and 2 more',
  ]);
  expect([counted(1, 'error'), counted(0, 'model')]).toEqual(['1 error', '0 models']);
});
