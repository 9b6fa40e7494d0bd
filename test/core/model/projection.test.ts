import { describe, expect, it } from 'vitest';
import large from '../../outside/data/large-momenta.json';
import { at, elementOf } from './potentials';

type Rows = readonly (readonly number[])[];

describe('large and unequal momenta', () => {
  const cases = Object.entries(large.values as Record<string, Record<string, Rows>>).flatMap(([potential, waves]) =>
    Object.entries(waves).map(([l, rows]) => [potential, Number(l), rows] as const),
  );
  it.each(cases)('%s, l = %i', (potential, l, rows) => {
    const element = elementOf(potential, 'r', 3, l);
    for (const [p, k, expected] of rows) {
      const { re } = at(element, p, k);
      // Without a closed form, what cancels between angles is bounded by the s wave's size.
      const size = Math.max(
        Math.abs(expected),
        CLOSED.has(`${potential} ${l}`)
          ? 0
          : Math.abs((large.values as Record<string, Record<string, Rows>>)[potential][0].find(r => r[0] === p && r[1] === k)![2]),
      );
      expect(Math.abs(re - expected), `p = ${p}, k = ${k}: ${re} for ${expected}`).toBeLessThanOrEqual(1e-11 * Math.abs(size) + 1e-300);
    }
  });
});

const CLOSED = new Set(['exp(-r)/r', 'exp(-r)', 'exp(-r^2)'].flatMap(v => [0, 1, 2].map(l => `${v} ${l}`)).concat('r*exp(-r) 0'));
