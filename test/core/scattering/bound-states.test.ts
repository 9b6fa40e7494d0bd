import { describe, expect, it } from 'vitest';
import reference from '../../outside/data/low-energy.json';
import { solved } from './solve';

const { binding } = reference;

describe('binding energies of potentials', () => {
  const sech = (strength: number) => `-${strength}/cosh`;
  it.each([
    ['sech² in space', `${sech(binding['sech^2 in space'].strength)}(r)^2`, 3, 0, binding['sech^2 in space'].energies, 1e-9],
    ['sech², even', `${sech(binding['sech^2, even'].strength)}(x)^2`, 1, 'even', binding['sech^2, even'].energies, 1e-9],
    ['sech², odd', `${sech(binding['sech^2, odd'].strength)}(x)^2`, 1, 'odd', binding['sech^2, odd'].energies, 1e-9],
    // A kink in position: what the cutoff takes falls as 1/Λ³.
    ['exponential', `-${binding.exponential.depth}*exp(-r)`, 3, 0, binding.exponential.energies, 1e-2],
  ] as const)('%s', (_, potential, dimension, wave, energies, tolerance) => {
    const states = solved([dimension === 1 ? 'x' : 'r', potential], 0.3, { dimension, wave, cutoff: 20 }).boundStates();
    expect(states).toHaveLength(energies.length);
    states.forEach((state, j) => expect(Math.abs(state.energy - energies[j])).toBeLessThan(tolerance * energies[0] + state.error));
  });

  it('a full line has the states of both parities, deepest first', () => {
    const { strength, energies } = binding['sech^2, even'];
    const states = solved(['x', `-${strength}/cosh(x)^2`], 0.3, { dimension: 1, cutoff: 20 }).boundStates();
    const wanted = [...energies, ...binding['sech^2, odd'].energies].sort((x, y) => y - x);
    expect(states.map(s => s.energy)).toEqual(wanted.map(E => expect.closeTo(E, 7) as number));
  });
});

// By hand: 1 = c∫G₀(-κ²/2μ) at the cutoff itself.
describe('the bound state of an attractive contact', () => {
  const [mu, cutoff] = [0.8, 12];
  it('dimension 1: one however weak', () => {
    const c = -0.05;
    const [state, ...others] = solved(String(c), 0.3, { mu, cutoff, dimension: 1 }).boundStates();
    expect(others).toEqual([]);
    const kappa = Math.sqrt(2 * mu * state.energy);
    expect(((2 * mu * -c) / (Math.PI * kappa)) * Math.atan(cutoff / kappa)).toBeCloseTo(1, 9);
  });
  it('dimension 2: at exp(-2π/μ|c|) of the cutoff', () => {
    const c = -1.9;
    const [state] = solved(String(c), 0.3, { mu, cutoff, dimension: 2 }).boundStates();
    const exact = cutoff ** 2 / (2 * mu) / (Math.exp((2 * Math.PI) / (mu * -c)) - 1);
    expect(Math.abs(state.energy - exact)).toBeLessThanOrEqual(state.error);
    expect(state.error).toBeLessThan(1e-8 * exact);
  });
  it('dimension 3: none below -π²/μΛ, one beyond', () => {
    const critical = -(Math.PI ** 2) / (mu * cutoff);
    expect(solved(String(0.98 * critical), 0.3, { mu, cutoff }).boundStates()).toEqual([]);
    const [state, ...others] = solved(String(1.2 * critical), 0.3, { mu, cutoff }).boundStates();
    expect(others).toEqual([]);
    const kappa = Math.sqrt(2 * mu * state.energy);
    expect((1.2 / cutoff) * (cutoff - kappa * Math.atan(cutoff / kappa))).toBeCloseTo(1, 10);
  });
  it('a repulsive one binds nothing', () => {
    for (const dimension of [1, 2, 3] as const) expect(solved('0.5', 0.3, { mu, cutoff, dimension }).boundStates()).toEqual([]);
  });
});
