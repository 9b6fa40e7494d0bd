import { describe, expect, it } from 'vitest';
import reference from '../../outside/data/low-energy.json';
import type { Kernel } from '../../support/spec';
import { solved } from './solve';

// A sharp cutoff at 20 takes exp(-30) of a smooth potential, about (range/cutoff)³ of exp(-r), about 1/cutoff² of an edge.
describe('scattering length and effective range of potentials in space', () => {
  it.each([
    ...reference.sech2.map(row => ['sech²', row.strength, ['r', `-${row.strength}/cosh(r)^2`] as Kernel, row, 1e-7] as const),
    ...reference.exponential.map(row => ['exponential', row.depth, ['r', `-${row.depth}*exp(-r)`] as Kernel, row, 1e-3] as const),
    ...reference.squareWell.map(row => ['square well', row.depth, ['r', `-${row.depth}*step(1 - r)`] as Kernel, row, 1e-2] as const),
  ])('%s of strength %f', (_, __, kernel, exact, tolerance) => {
    const found = solved(kernel, 0.1, { cutoff: 20 }).lowEnergy(0.02)!;
    expect(Math.abs(found.scatteringLength / exact.scatteringLength - 1)).toBeLessThan(tolerance);
    expect(Math.abs(found.effectiveRange! / exact.effectiveRange - 1)).toBeLessThan(10 * tolerance);
  });
  it('says how far they are off: what halving the momenta changes covers the error of the fit', () => {
    for (const row of reference.sech2.slice(1, 3)) {
      const found = solved(['r', `-${row.strength}/cosh(r)^2`], 0.1, { cutoff: 20 }).lowEnergy(0.1)!;
      expect(Math.abs(found.scatteringLength - row.scatteringLength)).toBeLessThanOrEqual(found.scatteringLengthError);
      expect(Math.abs(found.effectiveRange! - row.effectiveRange)).toBeLessThanOrEqual(found.effectiveRangeError);
    }
  });
});

describe('scattering lengths of wells on a line and in the plane', () => {
  it.each(reference.lineWell)('line, depth $depth', ({ depth, even, odd }) => {
    for (const [wave, exact] of [
      ['even', even],
      ['odd', odd],
    ] as const) {
      const found = solved(['x', `-${depth}*step(1 - abs(x))`], 0.1, { dimension: 1, wave, cutoff: 20 }).lowEnergy(0.05)!;
      expect(Math.abs(found.scatteringLength / exact - 1), wave).toBeLessThan(1e-2);
    }
  });
  it.each(reference.planeWell)('plane, depth $depth', ({ depth, scatteringLength }) => {
    const found = solved(['r', `-${depth}*step(1 - r)`], 0.1, { dimension: 2, cutoff: 10 }).lowEnergy(0.1)!;
    expect(Math.abs(found.scatteringLength / scatteringLength - 1)).toBeLessThan(1e-2);
  });
});

// By hand: 1/K = 1/c - P∫G₀, the loop elementary, at the cutoff itself.
describe('a contact under a sharp cutoff', () => {
  const [c, mu, cutoff] = [0.6, 1.3, 8];
  it('dimension 3', () => {
    const found = solved(String(c), 0.1, { mu, cutoff }).lowEnergy(0.05)!;
    // p cot δ = -(2π/μ)/K and P∫G₀ = -(μ/π²)(Λ - p²/Λ + …).
    expect(found.scatteringLength).toBeCloseTo(mu / (2 * Math.PI) / (1 / c + (mu * cutoff) / Math.PI ** 2), 9);
    expect(found.effectiveRange).toBeCloseTo(4 / (Math.PI * cutoff), 6);
  });
  it('dimension 2', () => {
    const found = solved(String(c), 0.1, { mu, cutoff, dimension: 2 }).lowEnergy(0.01)!;
    // cot δ = -(2/μ)/K, P∫G₀ = -(μ/2π) ln(Λ²/p² - 1).
    const a = (2 / cutoff) * Math.exp(-Math.PI / (mu * c) - 0.5772156649015329);
    expect(found.scatteringLength / a).toBeCloseTo(1, 6);
    expect(found.effectiveRange).toBeNull();
  });
  it('dimension 1, even', () => {
    const found = solved(String(c), 0.1, { mu, cutoff, dimension: 1, wave: 'even' }).lowEnergy(0.05)!;
    // p tan δ = -μK, P∫G₀ = (2μ/π)(1/Λ + p²/3Λ³ + …).
    const inverse = 1 / c - (2 * mu) / (Math.PI * cutoff);
    expect(found.scatteringLength).toBeCloseTo(-inverse / mu, 9);
    expect(found.effectiveRange).toBeCloseTo((4 * mu ** 2) / (3 * Math.PI * cutoff ** 3 * inverse ** 2), 6);
  });
  it('dimension 1, odd', () => {
    const found = solved(`${c}*p*k`, 0.1, { mu, cutoff, dimension: 1, wave: 'odd' }).lowEnergy(0.05)!;
    // p cot δ = -p²/(μ K), K = p²/(1/c - P∫k²G₀), P∫k²G₀ = -(2μ/π)(Λ - p²/Λ + …).
    expect(found.scatteringLength).toBeCloseTo(mu / (1 / c + (2 * mu * cutoff) / Math.PI), 9);
  });
  it('has no such constants where waves mix, nor above the s wave of the plane', () => {
    expect(solved(String(c), 0.1, { dimension: 1 }).lowEnergy(0.05)).toBeNull();
    expect(solved(`${c}*p*k`, 0.1, { dimension: 2, wave: 1 }).lowEnergy(0.05)).toBeNull();
  });
});
