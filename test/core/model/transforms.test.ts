import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import reference from '../../outside/data/transforms.json';
import { at, elementOf } from './potentials';

type Rows = readonly (readonly number[])[];
const radial = reference.radial as unknown as Record<string, Record<string, Rows>>;
const line = reference.line as unknown as Record<string, Record<'full' | 'even' | 'odd', Rows>>;

/** Errors count against the largest value of the table: that is what the reference's own 13 digits refer to. */
const sizeOf = (rows: Rows) => Math.max(...rows.map(row => Math.hypot(...row.slice(2))));

describe('central potentials on a wave against position-space integrals', () => {
  const cases = Object.entries(radial).flatMap(([potential, tables]) =>
    Object.entries(tables).map(([name, rows]) => [potential, name, rows] as const),
  );
  it.each(cases)('%s, dimension and wave %s', (potential, name, rows) => {
    const [dimension, l] = name.split(' ').map(Number) as [2 | 3, number];
    const element = elementOf(potential, 'r', dimension, l);
    for (const [p, k, expected] of rows) {
      const { re, im } = at(element, p, k);
      expect(im).toBe(0);
      expect(Math.abs(re - expected), `p = ${p}, k = ${k}: ${re} for ${expected}`).toBeLessThan(2e-13 * sizeOf(rows));
    }
    expect(element.real).toBe(true);
    // Where there is no closed form this is what two resolutions differ by, which overestimates.
    expect(element.relativeError).toBeLessThan(1e-10);
  });
});

describe('potentials on a line against position-space integrals', () => {
  const cases = Object.entries(line).flatMap(([potential, tables]) =>
    Object.entries(tables).map(([wave, rows]) => [potential, wave as 'full', rows] as const),
  );
  it.each(cases)('%s, %s', (potential, wave, rows) => {
    const element = elementOf(potential, 'x', 1, wave);
    for (const [p, k, re, im = 0] of rows) {
      const value = at(element, p, k);
      expect(Math.hypot(value.re - re, value.im - im), `p = ${p}, k = ${k}: ${value.re}, ${value.im} for ${re}, ${im}`).toBeLessThan(
        2e-13 * sizeOf(rows),
      );
    }
  });
});

describe('laws of the transform', () => {
  const momentum = fc.double({ min: 0.01, max: 30, noNaN: true });
  const potentials = ['g*exp(-r/s/1.4)*s/r', 'g*exp(-(r/s)^2/(2*w^2))', 'g*step(w - r/s)', 'g/(1 + exp((r/s - w)/0.3))', 'g*r/s*exp(-r/s)'];

  it('is symmetric, linear in the coupling, and scales with a length', () => {
    const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });
    fc.assert(
      fc.property(
        fc.constantFrom(...potentials),
        fc.integer({ min: 0, max: 2 }),
        momentum,
        momentum,
        number(0.3, 3),
        number(0.2, 5),
        (v, l, p, k, g, s) => {
          const element = (values: Record<string, number>) => elementOf(v, 'r', 3, l, { w: 1.5, ...values });
          const size = Math.abs(at(elementOf(v, 'r', 3, 0, { w: 1.5, g: 1, s: 1 }), 0.1, 0.1).re);
          const one = at(element({ g: 1, s: 1 }), p, k).re;
          expect(Math.abs(one - at(element({ g: 1, s: 1 }), k, p).re)).toBeLessThan(1e-12 * size);
          expect(Math.abs(g * one - at(element({ g, s: 1 }), p, k).re)).toBeLessThan(1e-12 * g * size);
          expect(Math.abs(s ** 3 * one - at(element({ g: 1, s }), p / s, k / s).re)).toBeLessThan(1e-11 * s ** 3 * size);
        },
      ),
      { numRuns: 25 },
    );
  });

  it('a sum is the sum of its terms, a product is multiplied out', () => {
    const sum = elementOf('exp(-r)*(a/r + b*(1 - r)^2)', 'r', 3, 0, { a: 2, b: -3 });
    const parts = [
      elementOf('2*exp(-r)/r', 'r', 3, 0),
      elementOf('-3*exp(-r)', 'r', 3, 0),
      elementOf('6*r*exp(-r)', 'r', 3, 0),
      elementOf('-3*r^2*exp(-r)', 'r', 3, 0),
    ];
    expect(at(sum, 1.2, 0.4).re).toBeCloseTo(
      parts.reduce((s, x) => s + at(x, 1.2, 0.4).re, 0),
      12,
    );
  });

  it('a shift is a phase', () => {
    const there = at(elementOf('1/cosh(x - 0.8)^2', 'x', 1, 'full'), 1.1, -0.3);
    const here = at(elementOf('1/cosh(x)^2', 'x', 1, 'full'), 1.1, -0.3);
    expect(there.re).toBeCloseTo(here.re * Math.cos(1.4 * 0.8), 12);
    expect(there.im).toBeCloseTo(-here.re * Math.sin(1.4 * 0.8), 12);
  });

  it('even and odd waves add up to the full one', () => {
    for (const v of ['exp(-x^2/3)', 'abs(x)*exp(-abs(x))', 'step(1 - abs(x))', '1/(1 + x^4)']) {
      const full = at(elementOf(v, 'x', 1, 'full'), 0.9, 2.3).re;
      expect(at(elementOf(v, 'x', 1, 'even'), 0.9, 2.3).re + at(elementOf(v, 'x', 1, 'odd'), 0.9, 2.3).re).toBeCloseTo(full, 12);
    }
  });

  it('Coulomb: 4π/q² on every wave is Q_l(z) 2π/pk', () => {
    const z = (1.3 ** 2 + 0.6 ** 2) / (2 * 1.3 * 0.6);
    const q0 = 0.5 * Math.log((z + 1) / (z - 1));
    for (const [l, q] of [q0, z * q0 - 1, (1.5 * z * z - 0.5) * q0 - 1.5 * z].entries()) {
      expect(at(elementOf('1/r', 'r', 3, l), 1.3, 0.6).re).toBeCloseTo((2 * Math.PI * q) / (1.3 * 0.6), 11);
      expect(at(elementOf('4*pi/q^2', 'q', 3, l), 1.3, 0.6).re).toBeCloseTo((2 * Math.PI * q) / (1.3 * 0.6), 11);
    }
  });

  it('a potential that falls like a power: 1/(1 + r²)² is π² exp(-q)', () => {
    const element = elementOf('1/(1 + r^2)^2', 'r', 3, 0);
    for (const [p, k] of [
      [0.3, 0.7],
      [2, 2],
      [5, 0.1],
      [9, 9.5],
    ]) {
      const primitive = (q: number) => (q + 1) * Math.exp(-q);
      const expected = (Math.PI ** 2 * (primitive(Math.abs(p - k)) - primitive(p + k))) / (2 * p * k);
      expect(Math.abs(at(element, p, k).re - expected)).toBeLessThan(1e-11);
    }
  });

  it('given in r or in q, a potential has one matrix element', () => {
    for (const l of [0, 1, 3]) {
      expect(at(elementOf('exp(-m*r)/r', 'r', 3, l, { m: 0.7 }), 2, 3).re).toBeCloseTo(
        at(elementOf('4*pi/(q^2 + m^2)', 'q', 3, l, { m: 0.7 }), 2, 3).re,
        13,
      );
      expect(at(elementOf('exp(-r^2)', 'r', 3, l), 2, 3).re).toBeCloseTo(at(elementOf('pi^1.5*exp(-q^2/4)', 'q', 3, l), 2, 3).re, 13);
      expect(at(elementOf('exp(-m*r)/r', 'r', 2, l, { m: 0.7 }), 2, 3).re).toBeCloseTo(
        at(elementOf('2*pi/sqrt(q^2 + m^2)', 'q', 2, l, { m: 0.7 }), 2, 3).re,
        12,
      );
    }
  });
});

describe('what power counting is told', () => {
  it('tails, smoothness, the value at the origin', () => {
    expect(elementOf('2*exp(-r)/r', 'r', 3, 0).shape).toMatchObject({ kind: 'local', smooth: false, origin: null, scale: 1 });
    expect(elementOf('2*exp(-r)/r', 'r', 3, 0).shape).toHaveProperty('tail.0', {
      coefficient: { re: 8 * Math.PI, im: 0 },
      power: -2,
      log: 0,
      phase: 0,
    });
    expect(elementOf('exp(-r^2)', 'r', 3, 0).shape).toMatchObject({ smooth: true, tail: [], origin: { re: 1, im: 0 } });
    expect(elementOf('3/cosh(r)^2', 'r', 3, 0).shape).toMatchObject({ smooth: true, tail: [], origin: { re: 3, im: 0 } });
    expect(elementOf('i*x*exp(-x^2)', 'x', 1, 'full').shape).toMatchObject({ smooth: true });
    expect(elementOf('exp(-r^2) + 2*delta(r)', 'r', 3, 0).shape).toMatchObject({
      kind: 'sum',
      parts: [{ kind: 'polynomial' }, { kind: 'local' }],
    });
    expect(elementOf('c*exp(-(p^2 + k^2))', 'pk', 3, 0, { c: 2 }).shape.kind).toBe('general');
  });
  it('the tail is what V(q) tends to', () => {
    for (const [v, dimension] of [
      ['exp(-r)*sqrt(r)', 3],
      ['exp(-r)*log(r)', 3],
      ['step(1.5 - r)*r*exp(-r)', 3],
      ['step(1.5 - r)', 2],
      ['r*exp(-r)', 2],
      ['exp(-r)*log(r)', 2],
      ['step(1.2 - r)*exp(-r)', 2],
    ] as const) {
      // At p → 0 the projection on l = 0 is V(q = k) itself.
      const element = elementOf(v, 'r', dimension, 0);
      if (element.shape.kind !== 'local') throw new Error('one piece expected');
      for (const q of [250, 333]) {
        const value = element.shape.tail!.reduce(
          (sum, { coefficient: c, power, log, phase }) =>
            sum + q ** power * Math.log(q) ** log * (c.re * Math.cos(q * phase) - c.im * Math.sin(q * phase)),
          0,
        );
        expect(Math.abs(at(element, 1e-9, q).re / value - 1), `${v} at ${q}`).toBeLessThan(1e-9);
      }
    }
  });
  it('dimension 1: an odd potential changes sign with q, an edge oscillates', () => {
    const { shape } = elementOf('x*exp(-abs(x))', 'x', 1, 'full');
    expect(shape).toHaveProperty('tail.0', { coefficient: { re: 0, im: -4 }, power: -3, log: 0, phase: 0 });
    expect(shape).toHaveProperty('backwardTail.0', { coefficient: { re: 0, im: 4 }, power: -3, log: 0, phase: 0 });
    const well = elementOf('step(x)*step(2 - x)', 'x', 1, 'full').shape;
    if (well.kind !== 'local') throw new Error('one piece expected');
    expect(well.tail!.map(t => Number(t.phase.toFixed(12)) + 0).sort()).toEqual([-2, 0]);
  });
});
