import { describe, expect, it } from 'vitest';
import type { ModelResults } from '../../server/src/core/results';
import { checkComplete } from '../../server/src/session/check';
import { standardDefaults } from '../../server/src/session/settings';
import nucleons from './data/nucleons.json';

const { masses, deuteron } = nucleons;

/** A separable interaction (Yamaguchi, Phys. Rev. 95 (1954) 1628) with this scattering length and effective range, from text to numbers. */
function channel({ b, c, phaseShifts }: typeof nucleons.singlet | typeof nucleons.triplet): ModelResults {
  const text = `model np {
    units MeV, fm
    dimension 3
    wave l = 0
    mass ${masses.neutron} MeV, ${masses.proton} MeV
    const b = ${b} fm^-1
    coupling c = ${c} fm^-3
    interaction separable(p, k) = c/(2*mu*(p^2 + b^2)*(k^2 + b^2))
    cutoff L = 2000 fm^-1 sharp
    series to 1 at E_lab = ${phaseShifts.map(row => `${row.lab} MeV`).join(', ')}
  }`;
  const hooks = { shouldStop: () => false, budget: Infinity, full: true };
  const { models } = checkComplete(text, standardDefaults, { cutoff: null, order: null }, hooks);
  expect(models[0].source.problems).toEqual([]);
  return models[0].results!;
}

describe.each(['singlet', 'triplet'] as const)('neutron and proton in the %s', name => {
  const expected = nucleons[name];
  const { sum, observables } = channel(expected);

  it('has the phase shifts of the closed form, at momenta from laboratory energies', () => {
    sum.forEach(({ p, phaseShift }, j) => {
      expect(p! / expected.phaseShifts[j].p).toBeCloseTo(1, 9);
      // Modulo 180 degrees, which no solution at one momentum can know.
      expect((phaseShift! + 180) % 180).toBeCloseTo(expected.phaseShifts[j].model, 5);
    });
  });

  // What two numbers say about a force with a range of its own: a degree at 5 MeV, three at 50.
  it('has about the phase shifts measured', () => {
    sum.forEach(({ phaseShift }, j) => {
      const { lab, measured } = expected.phaseShifts[j];
      expect(Math.abs(((phaseShift! + 180) % 180) - measured)).toBeLessThan(lab <= 5 ? 1 : 3.1);
    });
  });

  it('has the scattering length and the effective range that went in', () => {
    expect(observables!.scattering_length! / expected.a).toBeCloseTo(1, 6);
    expect(observables!.effective_range! / expected.r).toBeCloseTo(1, 6);
  });

  it(name === 'singlet' ? 'is not bound' : 'is bound about as the deuteron', () => {
    const energies = observables!.binding_energies!;
    if (name === 'singlet') return expect(energies).toEqual([]);
    expect(energies).toEqual([expect.closeTo(nucleons.triplet.binding, 6)]);
    expect(Math.abs(energies[0] / deuteron.binding - 1)).toBeLessThan(0.01);
  });
});
