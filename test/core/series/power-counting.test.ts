import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { contactGrowth } from '../../../server/src/core/series/contact-divergences';
import { countPowers } from '../../../server/src/core/series/power-counting';
import type { Setup } from '../../../server/src/core/series/setup';
import { symbolicVerdicts } from '../../../server/src/core/series/verdicts';
import { setupOf, type Kernel } from '../../support/spec';

function count(setup: Setup, monomial: string) {
  const term = setup.list.terms.find(t => t.name === monomial)!;
  return countPowers(
    term,
    setup.behaviours.map(b => b!),
    setup.kinematics.dimension,
    setup.fall!,
  );
}

// Weinberg, Phys. Rev. 118 (1960) 838: a region's degree is the powers of its loops, its propagators and its vertices.
describe('degrees of contacts', () => {
  it.each([
    [1, 'c^2', -1, null],
    [2, 'c^2', 0, 1],
    [3, 'c^2', 1, 0],
    [1, 'd^2', 3, 0],
    [2, 'd^2', 4, 0],
    [3, 'd^2', 5, 0],
    [1, 'c*d', 1, 0],
    [3, 'c*d', 3, 0],
    [3, 'c^3', 2, 0],
    // Loops that hang together by contacts count each for itself: ln L once for each.
    [2, 'c^3', 0, 2],
    [2, 'c^4', 0, 3],
    // The power takes one logarithm: L² from the loop beside d, ln L from the other.
    [2, 'c^2*d', 2, 1],
  ] as const)('dimension %i: %s', (dimension, monomial, degree, log) => {
    const setup = setupOf({ c: '1', d: 'p^2 + k^2' }, { dimension, wave: dimension === 1 ? 'even' : 0, order: 4 });
    expect(count(setup, monomial)).toMatchObject({ degree, oscillates: false, ...(degree >= 0 && { log }) });
  });

  it('the kinetic energy counts with its power', () => {
    const degree = (kinetic: string) => count(setupOf({ c: '1' }, { dimension: 2, kinetic }), 'c^2');
    expect(degree('k')).toMatchObject({ degree: 1, log: 0 });
    expect(degree('k^4')).toMatchObject({ degree: -2 });
    expect(degree('sqrt(1 + k^2)')).toMatchObject({ degree: 1, log: 0 });
  });

  it('is never below what the exact algebra finds, which also knows what cancels', () => {
    const power = fc.record({ a: fc.integer({ min: 0, max: 2 }), b: fc.integer({ min: 0, max: 2 }) });
    fc.assert(
      fc.property(fc.constantFrom<1 | 2 | 3>(1, 2, 3), fc.array(power, { minLength: 1, maxLength: 3 }), (dimension, powers) => {
        const kernels = Object.fromEntries(powers.map(({ a, b }, i) => [`v${i}`, `p^${a}*k^${b} + p^${b}*k^${a}`]));
        const setup = setupOf(kernels, { dimension, order: 3 });
        contactGrowth(symbolicVerdicts(setup).contacts!).forEach((exact, n) => {
          const { degree, log } = count(setup, setup.list.terms[n].name);
          expect(exact!.power).toBeLessThanOrEqual(Math.max(0, degree));
          if (exact!.power === Math.max(0, degree)) expect(exact!.log).toBeLessThanOrEqual(degree < 0 ? 0 : log);
        });
      }),
      { numRuns: 25 },
    );
  });
});

describe('degrees of other kernels', () => {
  const range = 'p^2 + k^2';
  const models: readonly (readonly [string, Record<string, Kernel>, string, number, number])[] = [
    ['a Gaussian falls faster than every power', { g: ['r', 'exp(-r^2)'] }, 'g^3', -Infinity, 0],
    ['an exchange alone', { y: ['r', 'exp(-r)/r'] }, 'y^2', -3, 0],
    ['an exchange beside a contact', { c: '1', y: ['r', 'exp(-r)/r'] }, 'c*y', -1, 0],
    ['an exchange beside p*k', { y: ['r', 'exp(-r)/r'], w: 'p*k' }, 'y*w', 0, 1],
    ['form factors', { s: '1/((p^2 + 1)*(k^2 + 1))' }, 's^3', -3, 0],
    ['a logarithm in a kernel', { v: 'log(1 + p^2)*log(1 + k^2)' }, 'v^2', 1, 2],
  ];
  it.each(models)('%s', (_, kernels, monomial, degree, log) => {
    expect(count(setupOf(kernels, { order: 3 }), monomial)).toMatchObject({ degree, ...(degree >= 0 && { log }) });
  });

  // Both loops large at fixed difference: missed by a count of hard and soft momenta alone.
  it('a Gaussian between two range terms leaves a cube overall', () => {
    const kernels: Record<string, Kernel> = { d: range, g: ['r', 'exp(-r^2)'] };
    expect(count(setupOf(kernels, { order: 3 }), 'd^2*g')).toMatchObject({ degree: 5, overall: 3 });
  });

  it('an exchange between two contacts leaves no power overall: the linear one is nested', () => {
    const setup = setupOf({ c: '1', y: ['r', 'exp(-r)/r'] }, { order: 3 });
    expect(count(setup, 'c^2*y')).toMatchObject({ degree: 1, overall: 0 });
  });

  it('phases that do not cancel along a loop leave one power less, and no limit', () => {
    const kernels: Record<string, Kernel> = { here: ['x', 'delta2(x)'], there: ['x', 'delta2(x - 0.7)'] };
    const setup = setupOf(kernels, { dimension: 1 });
    expect(count(setup, 'here*there')).toMatchObject({ degree: 2, oscillates: true });
    expect(count(setup, 'there^2')).toMatchObject({ degree: 3, oscillates: false });
    const verdict = (shape: 'sharp' | 'gaussian') =>
      symbolicVerdicts(setupOf(kernels, { dimension: 1, shape: shape === 'sharp' ? { kind: 'sharp' } : { kind: 'gaussian', n: 1 } }))
        .terms[3].verdict;
    // A smooth cutoff averages it out.
    expect([verdict('sharp'), verdict('gaussian')]).toEqual(['oscillates', 'converges']);
  });

  it('a cutoff that falls more slowly than the loops grow is too soft', () => {
    const soft = (n: number) => symbolicVerdicts(setupOf({ v: 'p^2*k^2' }, { shape: { kind: 'pole', n } })).terms.map(t => t.tooSoft);
    // ∫k² k⁴/k² (1 + k²/Λ²)^(-2n) needs 4n > 5.
    expect(soft(1)).toEqual([false, true]);
    expect(soft(2)).toEqual([false, false]);
  });
});

describe('what vanishes', () => {
  const verdicts = (kernels: Record<string, Kernel>) =>
    Object.fromEntries(symbolicVerdicts(setupOf(kernels, { dimension: 1 })).terms.map((t, n) => [monomial(kernels, n), t]));
  const monomial = (kernels: Record<string, Kernel>, n: number) => setupOf(kernels, { dimension: 1 }).list.terms[n].name;

  it('between k and -k is conditional', () => {
    // ∫(k + p')G and ∫(p + k)G: each k/k² is a logarithm for one sign of k, and none for both.
    expect(verdicts({ c: '1', v: 'p + k' })['c*v']).toMatchObject({ verdict: 'converges', conditional: true });
  });
  it('between the orderings is not', () => {
    // ∫i(k - p')G and ∫i(p - k)G.
    expect(verdicts({ c: '1', v: 'i*(p - k)' })['c*v']).toMatchObject({ verdict: 'converges', conditional: false });
  });
});
