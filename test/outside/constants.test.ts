import { expect, it } from 'vitest';
import { hbarcIn, inSystem } from '../../server/src/language/units';
import constants from './data/constants.json';

const { values } = constants;
const nuclear = { energy: 'MeV', length: 'fm' };
const solid = { energy: 'eV', length: 'angstrom' };

// CODATA 2022 as NIST lists it; exact where the SI defines it.
it.each([
  ['hbarc in MeV fm', hbarcIn(nuclear)],
  ['kelvin in eV', inSystem('K', solid)],
  ['hertz in eV', inSystem('Hz', solid)],
  ['dalton in MeV', inSystem('u', nuclear)],
  ['electron mass in MeV', inSystem('me', nuclear)],
  ['bohr in angstrom', inSystem('bohr', solid)],
  ['hartree in eV', inSystem('hartree', solid)],
] as const)('%s', (name, value) => {
  expect(Math.abs(value / values[name] - 1)).toBeLessThan(1e-14);
});
