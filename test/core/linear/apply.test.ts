import fc from 'fast-check';
import { Matrix } from 'ml-matrix';
import { expect, it } from 'vitest';
import { applyKernel } from '../../../server/src/core/linear/apply';

const entries = (count: number) => fc.array(fc.double({ min: -2, max: 2, noNaN: true }), { minLength: count, maxLength: count });
const problems = fc
  .record({ size: fc.integer({ min: 1, max: 7 }), vectors: fc.integer({ min: 0, max: 9 }), complex: fc.boolean() })
  .chain(({ size, vectors, complex }) =>
    fc.record({
      size: fc.constant(size),
      re: entries(size * size),
      im: complex ? entries(size * size) : fc.constant(null),
      x: fc.array(fc.tuple(entries(size), entries(size)), { minLength: vectors, maxLength: vectors }),
    }),
  );
const columns = (size: number, list: readonly (readonly number[])[]) => Matrix.from1DArray(list.length, size, list.flat()).transpose();

it('a kernel acts on a batch of vectors as ml-matrix multiplies', () => {
  fc.assert(
    fc.property(problems, fc.integer({ min: 0, max: 3 }), ({ size, re, im, x }, extra) => {
      const v = Matrix.from1DArray(size, size, re);
      const w = im && Matrix.from1DArray(size, size, im);
      // Places beyond the kernel's size are somebody else's.
      const out = x.map(() => ({ re: new Float64Array(size + extra).fill(7), im: new Float64Array(size + extra).fill(7) }));
      applyKernel(
        { size, re: Float64Array.from(re), im: im && Float64Array.from(im) },
        x.map(([a, b]) => ({ re: Float64Array.from(a), im: Float64Array.from(b) })),
        out,
      );
      if (!x.length) return;
      const [a, b] = [0, 1].map(part =>
        columns(
          size,
          x.map(pair => pair[part]),
        ),
      );
      const wantedRe = w ? Matrix.sub(v.mmul(a), w.mmul(b)) : v.mmul(a);
      const wantedIm = w ? Matrix.add(v.mmul(b), w.mmul(a)) : v.mmul(b);
      out.forEach((y, c) => {
        for (let j = 0; j < size; j++) {
          expect(y.re[j]).toBeCloseTo(wantedRe.get(j, c), 12);
          expect(y.im[j]).toBeCloseTo(wantedIm.get(j, c), 12);
        }
        expect([...y.re.slice(size), ...y.im.slice(size)].every(z => z === 7)).toBe(true);
      });
    }),
  );
});

it('real vectors under a real kernel stay real', () => {
  const out = [{ re: new Float64Array(2), im: null }];
  applyKernel({ size: 2, re: Float64Array.of(1, 2, 3, 4), im: null }, [{ re: Float64Array.of(1, -1), im: null }], out);
  expect([...out[0].re]).toEqual([-1, -1]);
});
