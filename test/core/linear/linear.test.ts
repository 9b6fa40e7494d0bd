import fc from 'fast-check';
import { EVD, Matrix, determinant as determinantByMlMatrix, solve as solveByMlMatrix } from 'ml-matrix';
import { describe, expect, it } from 'vitest';
import { hessenbergEigenvalues, largestEigenvalues } from '../../../server/src/core/linear/eigenvalues';
import { determinant, factor, solve } from '../../../server/src/core/linear/lu';
import { leastSquares, solveSmall } from '../../../server/src/core/linear/solve';

const numbers = (count: number) => fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: count, maxLength: count });
const square = fc
  .integer({ min: 1, max: 23 })
  .chain(n => fc.record({ n: fc.constant(n), a: numbers(n * n), b: numbers(n * n), x: numbers(n), y: numbers(n) }));

/** Diagonally strong, so that no random matrix is nearly singular. */
const strong = (n: number, a: readonly number[], plus: number): Float64Array =>
  Float64Array.from(a, (v, j) => (j % (n + 1) === 0 ? v + plus : v));

describe('linear systems against ml-matrix', () => {
  it('real', () => {
    fc.assert(
      fc.property(square, ({ n, a, x }) => {
        const m = strong(n, a, n);
        const wanted = solveByMlMatrix(Matrix.from1DArray(n, n, Array.from(m)), Matrix.columnVector(x)).to1DArray();
        const found = Float64Array.from(x);
        solve(factor(n, m.slice(), null), found, null);
        wanted.forEach((v, j) => expect(found[j]).toBeCloseTo(v, 10));
      }),
    );
  });

  it('complex, as a real system of twice the size', () => {
    fc.assert(
      fc.property(square, ({ n, a, b, x, y }) => {
        const [re, im] = [strong(n, a, 2 * n), Float64Array.from(b)];
        const block = Matrix.zeros(2 * n, 2 * n);
        for (let r = 0; r < n; r++) {
          for (let c = 0; c < n; c++) {
            block.set(r, c, re[r * n + c]);
            block.set(n + r, n + c, re[r * n + c]);
            block.set(r, n + c, -im[r * n + c]);
            block.set(n + r, c, im[r * n + c]);
          }
        }
        const wanted = solveByMlMatrix(block, Matrix.columnVector([...x, ...y])).to1DArray();
        const [p, q] = [Float64Array.from(x), Float64Array.from(y)];
        solve(factor(n, re.slice(), im.slice()), p, q);
        const complex = x.map((v, j) => ({ re: v, im: y[j] }));
        const rows = Array.from({ length: n }, (_, r) => Array.from({ length: n }, (__, c) => ({ re: re[r * n + c], im: im[r * n + c] })));
        const small = solveSmall(rows, complex)!;
        for (let j = 0; j < n; j++) {
          expect(p[j]).toBeCloseTo(wanted[j], 10);
          expect(q[j]).toBeCloseTo(wanted[n + j], 10);
          expect(small[j].re).toBeCloseTo(wanted[j], 10);
          expect(small[j].im).toBeCloseTo(wanted[n + j], 10);
        }
      }),
    );
  });

  it('determinants', () => {
    fc.assert(
      fc.property(square, ({ n, a }) => {
        const m = strong(n, a, 2);
        const wanted = determinantByMlMatrix(Matrix.from1DArray(n, n, Array.from(m)));
        fc.pre(Math.abs(wanted) > 1e-8);
        const { sign, log } = determinant(factor(n, m.slice(), null));
        expect((sign * Math.exp(log)) / wanted).toBeCloseTo(1, 9);
      }),
    );
  });

  it('least squares leave a remainder at right angles to every column', () => {
    fc.assert(
      fc.property(numbers(24), numbers(8), (a, rhs) => {
        const rows = Array.from({ length: 8 }, (_, r) => a.slice(3 * r, 3 * r + 3).map((v, c) => v + (r === c ? 3 : 0)));
        const x = leastSquares(rows, rhs)!;
        const rest = rows.map((row, r) => row.reduce((s, v, c) => s + v * x[c], 0) - rhs[r]);
        for (let c = 0; c < 3; c++) expect(rows.reduce((s, row, r) => s + row[c] * rest[r], 0)).toBeCloseTo(0, 10);
      }),
    );
  });
});

describe('eigenvalues against ml-matrix', () => {
  const moduli = (m: Matrix) => {
    const { realEigenvalues, imaginaryEigenvalues } = new EVD(m);
    return realEigenvalues.map((re, j) => Math.hypot(re, imaginaryEigenvalues[j])).sort((a, b) => b - a);
  };

  it('the largest of an operator whose others fall off, within what it says of itself', () => {
    // A kernel as smooth as those that come up: its eigenvalues fall geometrically.
    const n = 40;
    const rows = Array.from({ length: n }, (_, i) =>
      Array.from({ length: n }, (__, j) => Math.exp(-(((i - j) / n) ** 2) * 3) * Math.cos(0.1 * i + 0.05 * j)),
    );
    const found = largestEigenvalues(
      (x, y) => {
        for (let i = 0; i < n; i++) {
          y.re[i] = rows[i].reduce((s, v, j) => s + v * x.re[j], 0);
          y.im[i] = rows[i].reduce((s, v, j) => s + v * x.im[j], 0);
        }
      },
      n,
      14,
      6,
      1e-6,
    );
    const wanted = moduli(new Matrix(rows));
    found.values.forEach((v, j) => expect(Math.hypot(v.re, v.im) / wanted[j]).toBeCloseTo(1, 5));
    expect(Math.abs(Math.hypot(found.values[0].re, found.values[0].im) - wanted[0])).toBeLessThanOrEqual(
      found.residual + 1e-12 * wanted[0],
    );
  });

  it('all of a small Hessenberg matrix', () => {
    fc.assert(
      fc.property(numbers(36), a => {
        const rows = Array.from({ length: 6 }, (_, i) =>
          Array.from({ length: 6 }, (__, j) => (i > j + 1 ? 0 : a[6 * i + j] + (i === j ? i : 0))),
        );
        const found = hessenbergEigenvalues(rows.map(row => row.map(re => ({ re, im: 0 }))));
        const trace = rows.reduce((s, row, i) => s + row[i], 0);
        expect(found.reduce((s, v) => s + v.re, 0)).toBeCloseTo(trace, 9);
        expect(found.reduce((s, v) => s + v.im, 0)).toBeCloseTo(0, 9);
        const sizes = found.map(v => Math.hypot(v.re, v.im)).sort((x, y) => y - x);
        moduli(new Matrix(rows)).forEach((v, j) => expect(sizes[j]).toBeCloseTo(v, 5));
      }),
    );
  });

  it('an operator of rank one, and nothing', () => {
    const rankOne = (s: number) =>
      largestEigenvalues(
        (x, y) => {
          const sum = x.re.reduce((t, v) => t + v, 0);
          y.re.fill(s * sum);
          y.im.fill(0);
        },
        5,
        14,
        6,
        1e-6,
      );
    expect(rankOne(2).values[0].re).toBeCloseTo(10, 12);
    expect(rankOne(0).values[0]).toEqual({ re: 0, im: 0 });
    expect(Number.isFinite(rankOne(2).residual)).toBe(true);
  });
});
