import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Complex } from '../../../server/src/core/algebra/expression';
import type { CountertermSpec } from '../../../server/src/core/model/spec';
import { CutoffGrid, seriesAtCutoff } from '../../../server/src/core/series/amplitudes';
import { blockAmplitude, derivativeStencil, type Block } from '../../../server/src/core/series/subtraction';
import { expr } from '../../support/expr';
import { setupOf, type Kernel } from '../../support/spec';

const counterterm = (
  name: string,
  form: string,
  cancels: readonly (readonly number[])[],
  scheme: CountertermSpec['scheme'],
): CountertermSpec => ({
  name,
  form: { arguments: 'pk', expr: expr(form) },
  cancels,
  scheme,
});

/** Renormalised amplitudes of every monomial, [momentum][monomial], with the strengths. */
function renormalised(
  kernels: Record<string, Kernel>,
  counterterms: readonly CountertermSpec[],
  { momenta, cutoff = 30, dimension = 3 }: { momenta: readonly number[]; cutoff?: number; dimension?: 1 | 2 | 3 },
) {
  const setup = setupOf(kernels, { counterterms, momenta, cutoff, dimension });
  const points = momenta.map(p => ({ p, E: setup.kinematics.energy(p) }));
  return { ...seriesAtCutoff(new CutoffGrid(setup, cutoff, momenta, 16), points, []), setup };
}

describe('a derivative by differences', () => {
  it('is exact for polynomials', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 2, max: 4 }),
        fc.array(fc.double({ min: -2, max: 2, noNaN: true }), { minLength: 4, maxLength: 4 }),
        (count, c) => {
          const { nodes, weights } = derivativeStencil(count);
          const value = (s: number) => c.reduce((sum, x, j) => sum + x * s ** j, 0);
          weights.forEach((row, d) => {
            const derivative = c[d] * [1, 1, 2, 6][d];
            expect(row.reduce((sum, w, j) => sum + w * value(nodes[j]), 0)).toBeCloseTo(derivative, 9);
          });
        },
      ),
    );
  });
});

describe('blocks of parity on a line', () => {
  const numbers = fc.record({ re: fc.double({ min: -1, max: 1, noNaN: true }), im: fc.double({ min: -1, max: 1, noNaN: true }) });
  const blocks: readonly Block[] = ['even-even', 'odd-odd', 'odd-even', 'even-odd'];
  it('add up to the amplitude, and vanish in the parity that is not theirs', () => {
    fc.assert(
      fc.property(fc.tuple(numbers, numbers, numbers, numbers), ([a, b, c, d]) => {
        const at = (row: 1 | -1, column: 1 | -1): Complex => (row > 0 ? (column > 0 ? a : b) : column > 0 ? c : d);
        const sum = blocks.reduce((s, block) => s + blockAmplitude(block, at).re, 0);
        expect(sum).toBeCloseTo(a.re, 12);
        const even = (row: 1 | -1, column: 1 | -1): Complex => ({ re: a.re, im: row * column * a.im });
        const [both, neither] = [blockAmplitude('even-even', even), blockAmplitude('odd-odd', even)];
        expect(Math.hypot(both.re - a.re, both.im, neither.re, neither.im - a.im)).toBeLessThan(1e-15);
      }),
    );
  });
});

describe('subtraction at a momentum', () => {
  const X = 0.4;
  const contact = 0.7;

  // By hand: what is left is the difference of two loops, which the cutoff has left by 1/Λ.
  it('dimension 3: a contact squared vanishes there but for what unitarity asks for', () => {
    const z = counterterm('z', '1', [[2]], { kind: 'p', at: X });
    const { renormalised: amplitudes, strengths } = renormalised({ c: String(contact) }, [z], { momenta: [X, 1] });
    const loop = (p: number) => -(30 - (p / 2) * Math.log((30 + p) / (30 - p))) / (2 * Math.PI ** 2);
    expect(strengths).toHaveLength(1);
    expect(strengths[0].value.re).toBeCloseTo(-(contact ** 2) * loop(X), 12);
    const [there, elsewhere] = amplitudes.map(a => a[1].forward);
    expect(there.re).toBeCloseTo(0, 13);
    expect(there.im).toBeCloseTo((-(contact ** 2) * X) / (4 * Math.PI), 13);
    expect(elsewhere.re).toBeCloseTo(contact ** 2 * (loop(1) - loop(X)), 12);
  });

  it('dimension 3, below threshold: the amplitude of E = -X²/2μ vanishes', () => {
    const z = counterterm('z', '1', [[2]], { kind: 'kappa', at: X });
    const { strengths } = renormalised({ c: String(contact) }, [z], { momenta: [1] });
    const loop = -(30 - X * Math.atan(30 / X)) / (2 * Math.PI ** 2);
    expect(strengths[0].value.re).toBeCloseTo(-(contact ** 2) * loop, 12);
  });

  it('dimension 1: the twist squared grows as -2μc²Λ/π, and a constant takes that', () => {
    const c = 0.35;
    const z = counterterm('z', '1', [[2]], { kind: 'p', at: X });
    const [near, far] = [30, 3000].map(
      cutoff => renormalised({ twist: `i*${c}*(p - k)` }, [z], { momenta: [1], cutoff, dimension: 1 }).strengths[0].value,
    );
    // 2μ = 1.
    expect((far.re - near.re) / 2970).toBeCloseTo((c * c) / Math.PI, 4);
    expect(near.im).toBe(0);
  });

  it('two counterterms take the value and the slope', () => {
    const zs = [counterterm('z', '1', [[2]], { kind: 'p', at: X }), counterterm('w', 'p^2 + k^2', [[2]], { kind: 'p', at: X })];
    const momenta = [X, 0.99 * X, 1.01 * X];
    const { renormalised: amplitudes, strengths } = renormalised({ d: '0.3*(p^2 + k^2)' }, zs, { momenta });
    expect(strengths.map(s => s.counterterm.spec.name)).toEqual(['z', 'w']);
    const [at, below, above] = amplitudes.map(a => a[1].forward.re);
    const before = renormalised({ d: '0.3*(p^2 + k^2)' }, [], { momenta }).bare.map(a => a[1].forward.re);
    const size = Math.abs(before[0]);
    // The stencil is good to the sixth power of its spacing, the difference here to the third of 2 %.
    expect(Math.abs(at) / size).toBeLessThan(1e-12);
    expect(Math.abs(above - below) / size).toBeLessThan(1e-9);
    expect(Math.abs(before[2] - before[1]) / size).toBeGreaterThan(1e-6);
  });
});

describe('a counterterm among the other factors', () => {
  // The geometric series of c + z, z of second order: c³ I² + 2 c z I in the third.
  it('multiplies the same loops as what it cancels', () => {
    const [c, cutoff, p] = [0.7, 30, 0.9];
    const setup = setupOf(
      { c: String(c) },
      { counterterms: [counterterm('z', '1', [[2]], { kind: 'p', at: 0.4 })], momenta: [p], cutoff, order: 3 },
    );
    const at = new CutoffGrid(setup, cutoff, [p], 16);
    const result = seriesAtCutoff(at, [{ p, E: setup.kinematics.energy(p) }], []);
    const loop = {
      re: -(cutoff - (p / 2) * Math.log((cutoff + p) / (cutoff - p))) / (2 * Math.PI ** 2),
      im: -p / (4 * Math.PI),
    };
    const z = result.strengths[0].value.re;
    const square = { re: loop.re ** 2 - loop.im ** 2, im: 2 * loop.re * loop.im };
    const third = result.renormalised[0][2].forward;
    expect(third.re).toBeCloseTo(c ** 3 * square.re + 2 * c * z * loop.re, 12);
    expect(third.im).toBeCloseTo(c ** 3 * square.im + 2 * c * z * loop.im, 12);
  });
});
