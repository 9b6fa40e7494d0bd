import { describe, expect, it } from 'vitest';
import type { Complex } from '../../../server/src/core/algebra/expression';
import { LaurentRing, type Laurent } from '../../../server/src/core/algebra/laurent';
import { kinematicsOf, type Kinematics } from '../../../server/src/core/model/kinematics';
import { regulatorOf } from '../../../server/src/core/model/regulator';
import type { CutoffShape } from '../../../server/src/core/model/spec';
import { loopMoments, propagatorFall } from '../../../server/src/core/series/loop-moments';
import reference from '../../outside/data/loops.json';
import { specOf } from '../../support/spec';

const ring = new LaurentRing(-16, 8, 3);
const [mu, cutoff] = [0.8, 40];
const real = (re: number): Complex => ({ re, im: 0 });
const motion = (dimension: 1 | 2 | 3, wave: 'full' | 'even' | number, kinetic?: string): Kinematics =>
  kinematicsOf(specOf({}, { dimension, wave, mu, kinetic }));
const moments = (kinematics: Kinematics, shape: CutoffShape, E: Complex, wanted: readonly number[], side = 1) =>
  loopMoments(kinematics, regulatorOf(shape), ring, E, wanted, side);
const SHARP: CutoffShape = { kind: 'sharp' };

function valueAt(x: Laurent, L: number): Complex {
  return ring.terms(x).reduce(
    (sum, t) => {
      const size = L ** t.power * Math.log(L) ** t.log;
      return { re: sum.re + t.re * size, im: sum.im + t.im * size };
    },
    { re: 0, im: 0 },
  );
}

describe('a loop between two contacts, expanded in the cutoff, against its integral', () => {
  const shapeOf = (text: string): CutoffShape => {
    const [kind, n] = text.split(' ');
    return kind === 'sharp' ? SHARP : { kind: kind as 'gaussian' | 'pole', n: Number(n) };
  };
  it.each(reference.quadratic)('dimension $dimension, k^$n, $shape', ({ dimension, n, shape, below, above }) => {
    const kinematics = motion(dimension as 1, dimension === 1 ? 'even' : 0);
    const at = (E: number) => valueAt(moments(kinematics, shapeOf(shape), real(E), [n])[n], cutoff).re;
    // What the ring drops is below (1/40)^16 of the rest, and the series of a smooth cutoff is good to that.
    expect(Math.abs(at(-0.7) / below - 1)).toBeLessThan(1e-13);
    expect(Math.abs(at(0.9 ** 2 / (2 * mu)) - above)).toBeLessThan(1e-13 * Math.abs(below));
  });

  it.each(reference.otherEnergies)('kinetic(k) = $kinetic in dimension $dimension, k^$n, E = $E.re + $E.im i', row => {
    const kinematics = motion(row.dimension as 2, 0, row.kinetic);
    const found = valueAt(moments(kinematics, SHARP, row.E, [row.n])[row.n], cutoff);
    const off = Math.hypot(found.re - row.value.re, found.im - row.value.im);
    expect(off / Math.hypot(row.value.re, row.value.im)).toBeLessThan(1e-12);
  });
});

describe('what a loop grows as', () => {
  const growing = (x: Laurent) => ring.terms(x).filter(t => t.power > 0 || (t.power === 0 && t.log > 0));

  // By hand: k^(D-1+n)/(-k²/2μ) integrated to Λ.
  it.each([
    [1, 'even', 2, 1, (-2 * mu) / Math.PI],
    [2, 0, 2, 2, -mu / (2 * Math.PI)],
    [3, 0, 0, 1, -mu / Math.PI ** 2],
    [3, 0, 2, 3, -mu / (3 * Math.PI ** 2)],
  ] as const)('dimension %i (%s), k^%i: Λ^%i', (dimension, wave, n, power, coefficient) => {
    const [leading] = growing(moments(motion(dimension, wave), SHARP, real(-1), [n])[n]).sort((s, t) => t.power - s.power);
    expect(leading).toMatchObject({ power, log: 0, im: 0 });
    expect(leading.re).toBeCloseTo(coefficient, 14);
  });

  it('a logarithm has one coefficient under every cutoff, and no memory of the energy in the plane', () => {
    const shapes: CutoffShape[] = [SHARP, { kind: 'gaussian', n: 1 }, { kind: 'gaussian', n: 3 }, { kind: 'pole', n: 2 }];
    for (const shape of shapes) {
      for (const E of [-3, -0.2]) {
        const [only, ...others] = growing(moments(motion(2, 0), shape, real(E), [0])[0]);
        expect(others).toEqual([]);
        expect(only).toMatchObject({ power: 0, log: 1 });
        expect(only.re).toBeCloseTo(-mu / Math.PI, 14);
      }
    }
  });

  it('does not depend on which of k and -k comes first: odd powers vanish on a line, unless the signs are weighed apart', () => {
    const full = motion(1, 'full');
    expect(ring.terms(moments(full, SHARP, real(-0.4), [1])[1])).toEqual([]);
    expect(growing(moments(full, SHARP, real(-0.4), [1], 0.5)[1])).toMatchObject([{ power: 0, log: 1 }]);
  });

  it('a line counts either sign of k once', () => {
    const [full, even] = [motion(1, 'full'), motion(1, 'even')].map(k => valueAt(moments(k, SHARP, real(-0.4), [2])[2], cutoff).re);
    expect(full).toBeCloseTo(even, 13);
  });
});

it('the propagator falls as the kinetic energy grows', () => {
  expect(propagatorFall(motion(3, 0))).toBe(2);
  expect(propagatorFall(motion(2, 0, 'k'))).toBe(1);
  expect(propagatorFall(motion(2, 0, 'k^2 + k^4/9'))).toBe(4);
});
