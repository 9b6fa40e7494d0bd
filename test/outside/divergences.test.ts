import { describe, expect, it } from 'vitest';
import { analyse } from '../../server/src/core/analysis';
import type { CutoffShape, InteractionSpec, KernelArguments, ModelSpec } from '../../server/src/core/model/spec';
import type { ModelResults } from '../../server/src/core/results';
import { modelIn } from '../core/model/potentials';
import { expr } from '../support/expr';

const options = { shouldStop: () => false, budget: Infinity, full: false };

/** An interaction as [arguments, kernel]. */
type Kernel = readonly [KernelArguments, string];

function results(
  base: ModelSpec,
  kernels: Readonly<Record<string, Kernel>>,
  { order = 2, shape = { kind: 'sharp' }, p = 0.5 }: { order?: number; shape?: CutoffShape; p?: number } = {},
): ModelResults {
  const interactions = Object.entries(kernels).map(([name, [args, kernel]]): InteractionSpec => ({
    name,
    arguments: args,
    kernel: expr(kernel),
    order: 1,
  }));
  const cutoff = { ...base.cutoff, value: 40, shape };
  return analyse({ ...base, interactions, cutoff, series: { order, declared: true, points: [{ p, E: null }] } }, options);
}

/** The coefficient of one form of what is left of a monomial. */
function coefficient({ terms }: ModelResults, monomial: string, form: string, power: number, log = 0) {
  const { ultraviolet } = terms.find(t => t.monomial === monomial)!;
  expect(ultraviolet.confirmed).toBe(true);
  return ultraviolet.overall.find(f => f.form === form && f.power === power && f.log === log)!;
}

describe('dimension 1', () => {
  const mu = 1.7;
  const line = { ...modelIn(1, 'full'), mu };

  // Common practice; the coefficient by hand: ∫dk/2π (p'-k)(k-p)/(E - k²/2μ).
  it('an odd contact diverges linearly in second order, -2μc²/π', () => {
    const c = 0.35;
    const found = results(line, { twist: ['pk', `i*${c}*(p - k)`] });
    expect(coefficient(found, 'twist^2', '1', 1).coefficient.re).toBeCloseTo((-2 * mu * c * c) / Math.PI, 10);
    expect(found.terms[1].ultraviolet.overall).toHaveLength(1);
  });

  // Common practice.
  it('an even contact converges', () => {
    expect(results(line, { bump: ['pk', '0.4'] }, { order: 4 }).terms.map(t => t.ultraviolet.verdict)).toEqual(Array(4).fill('converges'));
  });
});

describe('dimension 3', () => {
  const space = modelIn(3, 0);

  // By hand: V(0)/6π² from both loops hard at fixed difference; a sharp edge adds -1/(2π^(5/2)) L². 2μ = 1.
  it('a Gaussian between two range terms diverges as L³', () => {
    const [d, g] = [0.3, -0.7];
    const found = results(space, { range: ['pk', `${d}*(p^2 + k^2)`], soft: ['r', `${g}*exp(-r^2)`] }, { order: 3 });
    const cubic = coefficient(found, 'range^2*soft', '1', 3);
    const square = coefficient(found, 'range^2*soft', '1', 2);
    expect(cubic.coefficient.re / ((d * d * g) / (6 * Math.PI ** 2))).toBeCloseTo(1, 6);
    expect(square.coefficient.re / ((-d * d * g) / (2 * Math.PI ** 2.5))).toBeCloseTo(1, 5);
    for (const [form, exact] of [
      [cubic, (d * d * g) / (6 * Math.PI ** 2)],
      [square, (-d * d * g) / (2 * Math.PI ** 2.5)],
    ] as const)
      expect(Math.abs(form.coefficient.re - exact)).toBeLessThanOrEqual(form.uncertainty);
  });

  // Kong and Ravndal, Nucl. Phys. A 665 (2000) 137: the logarithm of an exchange between two contacts, c²αμ²/π, whatever the screening and the cutoff.
  it.each([{ kind: 'sharp' }, { kind: 'gaussian', n: 2 }, { kind: 'pole', n: 3 }] as CutoffShape[])(
    'a long-range exchange between two contacts leaves a universal logarithm ($kind)',
    shape => {
      const [c, alpha, mu] = [0.8, 0.4, 0.5];
      const found = results({ ...space, mu }, { contact: ['pk', String(c)], exchange: ['r', `${alpha}*exp(-r)/r`] }, { order: 3, shape });
      const form = coefficient(found, 'contact^2*exchange', '1', 0, 1);
      const exact = (c * c * alpha * mu * mu) / Math.PI;
      expect(form.universal).toBe(true);
      expect(Math.abs(form.coefficient.re - exact)).toBeLessThanOrEqual(Math.max(form.uncertainty, 1e-6 * exact));
      expect(form.coefficient.re / exact).toBeCloseTo(1, 4);
    },
  );

  // Yamaguchi, Phys. Rev. 95 (1954) 1628: with g(k)² beside a constant loop the separable interaction is finite in every order.
  it('a separable interaction is finite', () => {
    const found = results(space, { separable: ['pk', '-2/((p^2 + 1)*(k^2 + 1))'] }, { order: 3 });
    expect(found.terms.map(t => t.ultraviolet.verdict)).toEqual(Array(3).fill('converges'));
  });
});

// Renaming, splitting and scaling interactions are no physics.
describe('what cannot matter', () => {
  const space = modelIn(3, 0);
  const p = 0.6;
  const byName = (found: ModelResults) => new Map(found.terms.map(t => [t.monomial, t]));

  it('an interaction in two halves gives the same sum in each order', () => {
    const whole = results(space, { v: ['r', '-0.8*exp(-r)/r'] }, { order: 3, p });
    const halves = results(space, { a: ['r', '-0.5*exp(-r)/r'], b: ['r', '-0.3*exp(-r)/r'] }, { order: 3, p });
    whole.sum[0].byOrder.forEach(({ re, im }, n) => {
      expect(halves.sum[0].byOrder[n].re).toBeCloseTo(re, 11);
      expect(halves.sum[0].byOrder[n].im).toBeCloseTo(im, 11);
    });
  });

  it('a coupling twice as strong multiplies each monomial, and its forms, by its power of two', () => {
    const kernels = (s: number): Record<string, Kernel> => ({ c: ['pk', String(0.2 * s)], d: ['pk', '0.1*(p^2 + k^2)'] });
    const [once, twice] = [1, 2].map(s => byName(results(space, kernels(s), { order: 3, p })));
    for (const [name, { exponents, values, ultraviolet }] of once) {
      const factor = 2 ** exponents[0];
      const other = twice.get(name)!;
      expect(other.values[0].bare!.re).toBeCloseTo(factor * values[0].bare!.re, 9);
      expect(other.ultraviolet.overall.map(f => [f.form, f.power, f.log])).toEqual(ultraviolet.overall.map(f => [f.form, f.power, f.log]));
      ultraviolet.overall.forEach((f, j) =>
        expect(other.ultraviolet.overall[j].coefficient.re / (factor * f.coefficient.re)).toBeCloseTo(1, 9),
      );
    }
  });
});
