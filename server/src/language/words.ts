import type { FunctionName } from '../core/algebra/expression';
import type { Observable } from '../core/model/spec';

/** The words that begin a statement. They stand nowhere else and are never names. */
export const reservedWords = [
  'const',
  'use',
  'model',
  'units',
  'dimension',
  'wave',
  'mass',
  'kinetic',
  'propagator',
  'coupling',
  'interaction',
  'cutoff',
  'series',
  'counterterm',
  'fix',
  'data',
  'expect',
] as const;

export type ReservedWord = (typeof reservedWords)[number];

const reserved: ReadonlySet<string> = new Set(reservedWords);

export const isReserved = (word: string): word is ReservedWord => reserved.has(word);

/** Words that mean something only in their place in the grammar and are free names elsewhere. */
export const placeWords = [
  'from',
  'natural',
  'full',
  'even',
  'odd',
  'm',
  'l',
  'reduced',
  'k',
  'E',
  'p',
  'q',
  'x',
  'r',
  'free',
  'order',
  'sharp',
  'gaussian',
  'pole',
  'scan',
  'to',
  'at',
  'E_lab',
  'points',
  'of',
  'cancels',
  'subtract',
  'minimal',
  'kappa',
  'with',
  'by',
  'columns',
  'deg',
  'finite',
  'converges',
  'drift',
  'within',
] as const;

export type PlaceWord = (typeof placeWords)[number];

/** How many arguments each function takes. */
export const functionArity: Readonly<Record<FunctionName, 1 | 2>> = {
  sqrt: 1,
  exp: 1,
  log: 1,
  sin: 1,
  cos: 1,
  tan: 1,
  asin: 1,
  acos: 1,
  atan: 1,
  sinh: 1,
  cosh: 1,
  tanh: 1,
  erf: 1,
  abs: 1,
  step: 1,
  gamma: 1,
  delta: 1,
  besselj: 2,
  sphericalj: 2,
  legendrep: 2,
  legendreq: 2,
};

export const functionNames = Object.keys(functionArity) as FunctionName[];

export const isFunction = (word: string): word is FunctionName => Object.hasOwn(functionArity, word);

/** What can be measured; `at` tells whether it belongs to a momentum. */
export const observables: Readonly<Record<Observable, { readonly at: boolean }>> = {
  scattering_length: { at: false },
  effective_range: { at: false },
  binding_energy: { at: false },
  phase_shift: { at: true },
  amplitude: { at: true },
  transmission: { at: true },
  reflection: { at: true },
  cross_section: { at: true },
};

export const isObservable = (word: string): word is Observable => Object.hasOwn(observables, word);
