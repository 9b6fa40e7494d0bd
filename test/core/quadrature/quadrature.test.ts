import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { integrate } from '../../../server/src/core/quadrature/adaptive';
import { doubleExponential } from '../../../server/src/core/quadrature/double-exponential';
import { gaussLegendre, gaussLegendreOn } from '../../../server/src/core/quadrature/gauss-legendre';
import reference from '../../outside/data/quadrature.json';

describe('Gauss–Legendre', () => {
  it.each(Object.entries(reference.rules))('nodes and weights of %s points', (n, rule) => {
    const { nodes, weights } = gaussLegendre(Number(n));
    rule.nodes.forEach((x, j) => expect(Math.abs(nodes[j] - x)).toBeLessThan(3e-16));
    rule.weights.forEach((w, j) => expect(Math.abs(weights[j] / w - 1)).toBeLessThan(1e-13));
  });
  it('is exact for polynomials of degree 2n - 1, on any interval', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 40 }),
        fc.double({ min: -2, max: 2, noNaN: true }),
        fc.double({ min: 0.1, max: 2, noNaN: true }),
        (n, from, length) => {
          const { nodes, weights } = gaussLegendreOn(n, from, from + length);
          const degree = 2 * n - 1;
          const sum = nodes.reduce((s, x, j) => s + weights[j] * ((x - from) / length) ** degree, 0);
          expect(sum).toBeCloseTo(length / (degree + 1), 12);
        },
      ),
    );
  });
});

const FINITE: Record<string, [(x: number) => number, number, number]> = {
  'exp(x) on [0, 1]': [Math.exp, 0, 1],
  'cos(50 x) / (1 + x^2) on [0, 3]': [x => Math.cos(50 * x) / (1 + x * x), 0, 3],
  'sqrt(x) on [0, 1]': [Math.sqrt, 0, 1],
  'ln(x) on [0, 1]': [Math.log, 0, 1],
  '1 / ((x - 0.3)^2 + 1e-6) on [0, 1]': [x => 1 / ((x - 0.3) ** 2 + 1e-6), 0, 1],
};
const HALF_LINE: Record<string, [(x: number) => number, number]> = {
  'exp(-x) / sqrt(x) from 0': [x => Math.exp(-x) / Math.sqrt(x), 0],
  '1 / (1 + x^2) from 0': [x => 1 / (1 + x * x), 0],
  'x^2 exp(-x^2) from 0': [x => x * x * Math.exp(-x * x), 0],
  'exp(-x) / (1 + x) from 1': [x => Math.exp(-x) / (1 + x), 1],
};

describe('the adaptive driver', () => {
  it.each(Object.entries(reference.finite))('%s', (name, expected) => {
    const [f, from, to] = FINITE[name];
    const { status, value, errorEstimate } = integrate(f, from, to, { relative: 1e-11 });
    expect(status).toBe('converged');
    expect(Math.abs(value - expected)).toBeLessThanOrEqual(Math.max(errorEstimate, 1e-13 * Math.abs(expected)));
  });
  it.each(Object.entries(reference.halfLine))('%s', (name, expected) => {
    const [f, from] = HALF_LINE[name];
    expect(integrate(f, from, Infinity).value).toBeCloseTo(expected, 9);
  });
  it('calls 1/x divergent, and what has no value nonFinite', () => {
    expect(integrate(x => 1 / x, 0, 1).status).toBe('divergent');
    expect(integrate(x => 1 / x ** 1.5, 0, 1).status).toBe('divergent');
    expect(integrate(x => 1 / (x - 0.3) ** 2, 0, 1).status).toBe('divergent');
    expect(integrate(x => Math.abs(x - 0.3) ** -0.4, 0, 1, { relative: 1e-8 }).status).toBe('converged');
    expect(integrate(() => NaN, 0, 1)).toMatchObject({ status: 'nonFinite', value: NaN });
  });
  it('stops at the budget and when asked to', () => {
    const hard = (x: number) => Math.sin(1 / x) / x;
    expect(integrate(hard, 0, 1, { budget: 1000 })).toMatchObject({ status: 'budgetExhausted' });
    expect(integrate(hard, 0, 1, { budget: 1000 }).evaluations).toBeLessThanOrEqual(1000);
    expect(integrate(hard, 0, 1, { shouldStop: () => true }).status).toBe('cancelled');
  });
  it('reports the integral of the modulus, so that cancellation shows', () => {
    const { value, absIntegral } = integrate(x => Math.sin(x), 0, 2 * Math.PI, { absolute: 1e-10 });
    expect(Math.abs(value)).toBeLessThan(1e-10);
    expect(Math.abs(absIntegral - 4)).toBeLessThan(0.1);
  });
});

describe('the double-exponential rule', () => {
  it.each(Object.entries(reference.halfLine))('%s', (name, expected) => {
    const [f, from] = HALF_LINE[name];
    const { status, value } = doubleExponential(f, from);
    expect(status).toBe('converged');
    expect(value).toBeCloseTo(expected, 11);
  });
  it('notices what the half line does not integrate', () => {
    expect(doubleExponential(x => 1 / (1 + x), 0).status).toBe('divergent');
    expect(doubleExponential(() => NaN, 0).status).toBe('nonFinite');
    expect(doubleExponential(x => Math.exp(-x), 0, { shouldStop: () => true }).status).toBe('cancelled');
  });
});
