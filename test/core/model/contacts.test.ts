import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { at, elementOf } from './potentials';

const terms = (
  kernel: string,
  args: 'pk' | 'pkE' | 'q' | 'x' | 'r',
  dimension: 1 | 2 | 3,
  wave: 'full' | 'even' | 'odd' | number,
  couplings = {},
) => {
  const { shape } = elementOf(kernel, args, dimension, wave, couplings);
  if (shape.kind !== 'polynomial') throw new Error(shape.kind);
  return Object.fromEntries(shape.terms.map(t => [`p${t.a}k${t.b}E${t.e}`, t.im === 0 ? t.re : [t.re, t.im]]));
};

describe('contacts', () => {
  it('are exact polynomials, couplings put in', () => {
    expect(terms('c*(p^2 + k^2) - d*E*p*k/2', 'pkE', 3, 0, { c: 0.5, d: 3 })).toEqual({ p2k0E0: 0.5, p0k2E0: 0.5, p1k1E1: -1.5 });
    expect(terms('(p - k)^2 - (p^2 + k^2)', 'pk', 1, 'full')).toEqual({ p1k1E0: -2 });
    expect(at(elementOf('c*(p^2 + k^2) - E*p*k', 'pkE', 3, 0, { c: 2 }), 3, 5, 0.5).re).toBe(68 - 7.5);
  });
  it('dimension 1: delta and its derivatives', () => {
    expect(terms('c*delta(x)', 'x', 1, 'full', { c: 0.3 })).toEqual({ p0k0E0: 0.3 });
    expect(terms('c*delta1(x)', 'x', 1, 'full', { c: 0.3 })).toEqual({ p1k0E0: [0, 0.3], p0k1E0: [0, -0.3] });
    expect(terms('delta2(x)', 'x', 1, 'even')).toEqual({ p2k0E0: -1, p0k2E0: -1 });
    expect(terms('delta2(x)', 'x', 1, 'odd')).toEqual({ p1k1E0: 2 });
    expect(terms('delta(2*x)', 'x', 1, 'full')).toEqual({ p0k0E0: 0.5 });
  });
  it('dimension 1: f(x) delta^(n)(x) by the product rule', () => {
    expect(terms('(3 + 2*x)*delta1(x)', 'x', 1, 'full')).toEqual({ p1k0E0: [0, 3], p0k1E0: [0, -3], p0k0E0: -2 });
    expect(terms('exp(-x^2)*delta2(x)', 'x', 1, 'even')).toEqual({ p2k0E0: -1, p0k2E0: -1, p0k0E0: -2 });
    expect(terms('cosh(x)*delta(x)', 'x', 1, 'full')).toEqual({ p0k0E0: 1 });
  });
  it('dimension 1: what even and odd waves keep', () => {
    expect(terms('1 + p*k + (p^2 + k^2)', 'pk', 1, 'even')).toEqual({ p0k0E0: 1, p2k0E0: 1, p0k2E0: 1 });
    expect(terms('1 + p*k + (p^2 + k^2)', 'pk', 1, 'odd')).toEqual({ p1k1E0: 1 });
  });
  it('a delta away from the origin is a phase exp(-i(p-k)a)', () => {
    const element = elementOf('c*delta(x - 0.7)', 'x', 1, 'full', { c: 2 });
    const { re, im } = at(element, 1.3, -0.4);
    expect(re).toBeCloseTo(2 * Math.cos(1.7 * 0.7), 14);
    expect(im).toBeCloseTo(-2 * Math.sin(1.7 * 0.7), 14);
    expect(element.real).toBe(false);
    expect(element.shape).toMatchObject({
      kind: 'local',
      tail: [{ coefficient: { re: 2, im: 0 }, power: 0, phase: -0.7 }],
      backwardTail: [{ phase: 0.7 }],
    });
  });
  it('two opposite deltas', () => {
    const { re, im } = at(elementOf('c/a*(delta(x + a/2) - delta(x - a/2))', 'x', 1, 'full', { c: 0.3, a: 0.5 }), 2, 0.7);
    expect(re).toBeCloseTo(0, 14);
    expect(im).toBeCloseTo(2 * 0.6 * Math.sin(1.3 * 0.25), 14);
  });
  it('a symmetric pair of deltas in even and odd waves', () => {
    const pair = 'delta(x - 0.4) + delta(x + 0.4)';
    expect(at(elementOf(pair, 'x', 1, 'even'), 2, 3).re).toBeCloseTo(2 * Math.cos(0.8) * Math.cos(1.2), 14);
    expect(at(elementOf(pair, 'x', 1, 'odd'), 2, 3).re).toBeCloseTo(2 * Math.sin(0.8) * Math.sin(1.2), 14);
  });
  it('powers of the transfer on a wave', () => {
    expect(terms('q^2', 'q', 3, 0)).toEqual({ p2k0E0: 1, p0k2E0: 1 });
    expect(terms('q^2', 'q', 3, 1)).toEqual({ p1k1E0: -2 / 3 });
    expect(terms('q^2', 'q', 2, 1)).toEqual({ p1k1E0: -1 });
    expect(terms('3*delta(r)', 'r', 3, 0)).toEqual({ p0k0E0: 3 });
    expect(terms('3*delta(r)', 'r', 2, 1)).toEqual({});
    expect(terms('i*c*q', 'q', 1, 'full', { c: 2 })).toEqual({ p1k0E0: [0, 2], p0k1E0: [0, -2] });
  });
  it('q^2j on a wave is the mean over angles', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 4 }), fc.integer({ min: 0, max: 3 }), fc.constantFrom<2 | 3>(2, 3), (j, l, dimension) => {
        const element = elementOf(`q^${2 * j}`, 'q', dimension, l);
        const [p, k] = [0.8, 1.7];
        // The rule below is exact for such polynomials: 64 equal steps around the circle, or a fine midpoint rule in x to 1e-6.
        let mean = 0;
        if (dimension === 2)
          for (let n = 0; n < 64; n++)
            mean += ((p * p + k * k - 2 * p * k * Math.cos((Math.PI * n) / 32)) ** j * Math.cos((l * Math.PI * n) / 32)) / 64;
        else
          for (let n = 0; n < 4000; n++) {
            const x = -1 + (n + 0.5) / 2000;
            mean += ((p * p + k * k - 2 * p * k * x) ** j * [1, x, (3 * x * x - 1) / 2, (5 * x ** 3 - 3 * x) / 2][l]) / 4000;
          }
        expect(Math.abs(at(element, p, k).re - mean)).toBeLessThan(1e-5 * (p + k) ** (2 * j));
      }),
    );
  });
});

describe('what has no matrix element is refused in one sentence', () => {
  it.each([
    ['1/r^3', 'r', 3, 0, 'not-evaluated', /too singular/],
    ['exp(-r)/r^3.5', 'r', 3, 0, 'not-evaluated', /too singular/],
    ['r^2', 'r', 3, 0, 'not-evaluated', /does not fall off/],
    ['exp(r)', 'r', 3, 0, 'value', /no finite value/],
    ['delta(r)/r', 'r', 3, 0, 'value', /must be finite where the delta sits/],
    ['delta(r - 1)', 'r', 3, 0, 'value', /at the origin only/],
    ['delta(x)^2', 'x', 1, 'full', 'value', /no meaning/],
    ['delta(x^2 - 1)', 'x', 1, 'full', 'value', /x itself or x shifted/],
    ['1/(q^2 - 2)', 'q', 3, 0, 'value', /infinite at q = 1.414/],
    ['1/(p - k)', 'pk', 1, 'full', 'value', /infinite at real momenta/],
    ['1/(p^2 + k^2 - 3)', 'pk', 3, 0, 'value', /infinite at real momenta/],
    ['delta1(x)', 'x', 1, 'even', 'value', /mixes even and odd waves/],
    ['i*(p - k)', 'pk', 1, 'odd', 'value', /mixes even and odd waves/],
    ['exp(-(x - 1)^2)', 'x', 1, 'even', 'value', /mixes even and odd waves/],
  ] as const)('%s', (kernel, args, dimension, wave, code, message) => {
    expect(() => elementOf(kernel, args, dimension, wave)).toThrow(
      expect.objectContaining({ name: 'KernelError', code, message: expect.stringMatching(message) as string }),
    );
  });
  it('a divisor whose zero is lifted is none', () => {
    expect(at(elementOf('sin(p - k)/(p - k)', 'pk', 1, 'full'), 2, 2).re).toBeCloseTo(1, 9);
    expect(at(elementOf('sin(q)/q', 'q', 1, 'full'), 2, 2).re).toBeCloseTo(1, 9);
    expect(at(elementOf('g/(E - 1)', 'pkE', 3, 0, { g: 2 }), 2, 2, 0.5).re).toBe(-4);
  });
});
