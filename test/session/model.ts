import type { ModelSpec } from '../../server/src/core/model/spec';
import type { ModelResults } from '../../server/src/core/results';

/** A model of one contact on a line, as plain data. */
export const contact = (name: string, strength = 0.2): ModelSpec => ({
  name,
  dimension: 1,
  wave: { kind: 'full' },
  units: null,
  mu: 1,
  masses: null,
  kinetic: null,
  couplings: [{ name: 'c0', value: strength, dimension: '1' }],
  interactions: [{ name: 'bump', arguments: 'pk', kernel: { kind: 'symbol', name: 'c0' }, order: 1 }],
  cutoff: { name: 'L', value: 40, shape: { kind: 'sharp' }, declared: true, scan: null },
  series: { order: 2, declared: true, points: [{ p: 0.1, E: null }] },
  counterterms: [],
  expectations: [],
});

/** The same in the language. */
export const contactText = (name: string, strength = 0.2, more = ''): string => `model ${name} {
  dimension 1
  mass reduced 1
  coupling c0 = ${strength}
  interaction bump(p, k) = c0
  cutoff L = 40 sharp
  series to 2 at p = 0.1
${more}}
`;

/** Results that say nothing but `message`. */
export const results = (message: string): ModelResults => ({
  terms: [],
  sum: [],
  series: [],
  counterterms: [],
  couplings: [],
  observables: null,
  expectations: [],
  remarks: [{ code: 'value', message, subject: null }],
});
