/**
 * Unit words and dimensions. With hbar = 1 every quantity is energy^e * length^l. Temperatures, frequencies and masses count as the
 * energies k_B T, h nu and m c^2. Values: CODATA 2022 (Mohr, Newell, Taylor, Tiesinga, Rev. Mod. Phys. 97 (2025) 025002).
 */

/** Exponents of energy and length; `free` holds those of couplings whose dimension is not known yet. */
export interface Dimension {
  readonly e: number;
  readonly l: number;
  readonly free?: ReadonlyMap<string, number>;
}

interface Unit {
  readonly of: 'energy' | 'length';
  /** In eV or m, as mantissa * 10^exponent so that powers of ten convert without rounding. */
  readonly mantissa: number;
  readonly exponent: number;
}

const energy = (mantissa: number, exponent: number): Unit => ({ of: 'energy', mantissa, exponent });
const length = (mantissa: number, exponent: number): Unit => ({ of: 'length', mantissa, exponent });

const elementaryCharge = 1.602176634;
const kelvin = 1.380649 / elementaryCharge;
const hertz = 6.62607015 / elementaryCharge;

const table: Readonly<Record<string, Unit>> = {
  MeV: energy(1, 6),
  keV: energy(1, 3),
  eV: energy(1, 0),
  meV: energy(1, -3),
  K: energy(kelvin, -4),
  uK: energy(kelvin, -10),
  nK: energy(kelvin, -13),
  Hz: energy(hertz, -15),
  kHz: energy(hertz, -12),
  hartree: energy(27.211386245981, 0),
  u: energy(931.49410372, 6),
  me: energy(0.51099895069, 6),
  fm: length(1, -15),
  pm: length(1, -12),
  nm: length(1, -9),
  um: length(1, -6),
  angstrom: length(1, -10),
  bohr: length(0.529177210544, -10),
};

export const unitWords = Object.keys(table);

export const isUnitWord = (word: string): boolean => Object.hasOwn(table, word);

export const isEnergyUnit = (word: string): boolean => isUnitWord(word) && table[word].of === 'energy';

export const isLengthUnit = (word: string): boolean => isUnitWord(word) && table[word].of === 'length';

/** hbar*c in eV*m: h*c/(2 pi e), exact in the SI. */
const hbarcMantissa = (6.62607015 * 2.99792458) / (2 * Math.PI * elementaryCharge);
const hbarcExponent = -34 + 8 + 19;

/** The units in which a model's numbers are given. */
export interface UnitSystem {
  readonly energy: string;
  readonly length: string;
}

/** How many of the system's own units one `word` is. */
export function inSystem(word: string, system: UnitSystem): number {
  const unit = table[word];
  const own = table[unit.of === 'energy' ? system.energy : system.length];
  return scaled(unit.mantissa / own.mantissa, unit.exponent - own.exponent);
}

/** hbar*c in the system's energy * length. */
export function hbarcIn(system: UnitSystem): number {
  const [e, l] = [table[system.energy], table[system.length]];
  return scaled(hbarcMantissa / (e.mantissa * l.mantissa), hbarcExponent - e.exponent - l.exponent);
}

/** Powers of ten divide rather than multiply when negative: 12/1000 rounds once, 12*0.001 twice. */
const scaled = (mantissa: number, exponent: number): number => (exponent < 0 ? mantissa / 10 ** -exponent : mantissa * 10 ** exponent);

export const pure: Dimension = { e: 0, l: 0 };
export const anEnergy: Dimension = { e: 1, l: 0 };
export const aLength: Dimension = { e: 0, l: 1 };
export const anInverseLength: Dimension = { e: 0, l: -1 };
/** Of mu = mass/hbar^2. */
export const aReducedMass: Dimension = { e: -1, l: -2 };

export const dimensionOfUnit = (word: string): Dimension => (isEnergyUnit(word) ? anEnergy : aLength);

/** a * b^n */
export function product(a: Dimension, b: Dimension, n = 1): Dimension {
  if (a.free === undefined && b.free === undefined) return { e: a.e + n * b.e, l: a.l + n * b.l };
  const free = new Map(a.free);
  for (const [name, exponent] of b.free ?? []) {
    const total = (free.get(name) ?? 0) + n * exponent;
    if (near(total, 0)) free.delete(name);
    else free.set(name, total);
  }
  const [e, l] = [a.e + n * b.e, a.l + n * b.l];
  return free.size === 0 ? { e, l } : { e, l, free };
}

export const near = (a: number, b: number): boolean => Math.abs(a - b) < 1e-9;

export const sameDimension = (a: Dimension, b: Dimension): boolean => near(a.e, b.e) && near(a.l, b.l);

/** "MeV*fm^3"; "1" for a pure number. */
export function formatDimension(dimension: Dimension, system: UnitSystem): string {
  const parts = [power(system.energy, dimension.e), power(system.length, dimension.l)].filter(part => part !== '');
  return parts.length === 0 ? '1' : parts.join('*');
}

const power = (unit: string, exponent: number): string =>
  near(exponent, 0) ? '' : near(exponent, 1) ? unit : `${unit}^${Number(exponent.toPrecision(6))}`;
