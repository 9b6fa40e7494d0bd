import { describe, expect, it } from 'vitest';
import { atInfinity, NoExpansion, type Asymptotics } from '../../../server/src/core/algebra/at-infinity';
import { evaluate } from '../../../server/src/core/algebra/evaluate';
import { expr } from '../../support/expr';

const variable: Asymptotics = { terms: [{ power: 1, log: 0, c: { re: 1, im: 0 } }], truncated: -Infinity };
const expand = (text: string) => atInfinity(expr(text), new Map([['k', variable]]), 8);
const valueAt = (text: string, k: number) => evaluate(expr(text), new Map([['k', { re: k, im: 0 }]])).re;
const sumAt = ({ terms }: Asymptotics, k: number) => terms.reduce((sum, t) => sum + t.c.re * k ** t.power * Math.log(k) ** t.log, 0);

describe('expansions for a large argument', () => {
  // What is left out falls as the first power that is: ten times the argument leaves 10^-truncated less.
  it.each([
    ['1/(k^2 + 1)'],
    ['k^3/(2*k^2 - k + 5)'],
    ['sqrt(k^2 + 4)'],
    ['(1 + k^2)^(-3/2)'],
    ['log(k^2 + 3)'],
    ['log(1 + 1/k)*k'],
    ['(k + 1)^2/(k - 0.5) - k'],
  ])('%s', text => {
    const found = expand(text);
    const misses = [20, 40].map(k => Math.abs(sumAt(found, k) - valueAt(text, k)) / Math.abs(valueAt(text, k)));
    expect(misses[1]).toBeLessThan(1e-9);
    if (misses[0] > 1e-13) expect(misses[1]).toBeLessThan(misses[0] / 16);
  });

  it('leading terms have the power, the logarithm and the coefficient of the function', () => {
    const leading = (text: string) => expand(text).terms[0];
    expect(leading('3*k^2/(k^5 + 1)')).toMatchObject({ power: -3, log: 0, c: { re: 3 } });
    expect(leading('k*log(k)')).toMatchObject({ power: 1, log: 1, c: { re: 1 } });
    expect(leading('sqrt(4*k^2 + 1) - 2*k')).toMatchObject({ power: -1, c: { re: 0.25 } });
  });

  it('what falls faster than every power leaves nothing, what oscillates or explodes has no expansion', () => {
    expect(expand('exp(-k^2)').terms).toEqual([]);
    expect(expand('k^7*exp(-k)').terms).toEqual([]);
    expect(() => expand('sin(k)')).toThrow(NoExpansion);
    expect(() => expand('exp(k)')).toThrow(NoExpansion);
  });
});
