import type { Complex } from '../algebra/expression';

/** Solves A x = b (small, dense, complex) by elimination with pivoting, columns then rows scaled to 1. Null where A is singular to rounding. */
export function solveSmall(a: readonly (readonly Complex[])[], b: readonly Complex[]): Complex[] | null {
  const n = b.length;
  const columnScale = b.map((_, j) => Math.max(...a.map(row => modulus(row[j]))) || 1);
  const rows = a.map((row, i) => {
    const scaled = row.map((c, j) => ({ re: c.re / columnScale[j], im: c.im / columnScale[j] }));
    const rowScale = Math.max(...scaled.map(modulus)) || 1;
    return [...scaled, b[i]].map(c => ({ re: c.re / rowScale, im: c.im / rowScale }));
  });
  for (let column = 0; column < n; column++) {
    let pivot = column;
    for (let i = column + 1; i < n; i++) if (modulus(rows[i][column]) > modulus(rows[pivot][column])) pivot = i;
    if (!(modulus(rows[pivot][column]) > 1e-9)) return null;
    [rows[column], rows[pivot]] = [rows[pivot], rows[column]];
    for (let i = 0; i < n; i++) {
      if (i === column) continue;
      const factor = divide(rows[i][column], rows[column][column]);
      for (let j = column; j <= n; j++) rows[i][j] = subtract(rows[i][j], multiply(factor, rows[column][j]));
    }
  }
  return rows.map((row, i) => {
    const x = divide(row[n], row[i]);
    return { re: x.re / columnScale[i], im: x.im / columnScale[i] };
  });
}

const modulus = (x: Complex): number => Math.hypot(x.re, x.im);
const subtract = (x: Complex, y: Complex): Complex => ({ re: x.re - y.re, im: x.im - y.im });
export const multiply = (x: Complex, y: Complex): Complex => ({ re: x.re * y.re - x.im * y.im, im: x.re * y.im + x.im * y.re });
export function divide(x: Complex, y: Complex): Complex {
  const d = y.re * y.re + y.im * y.im;
  return { re: (x.re * y.re + x.im * y.im) / d, im: (x.im * y.re - x.re * y.im) / d };
}

/** Least-squares solution of a real, tall system with columns scaled to unit size first; null where it is rank-deficient. */
export function leastSquares(rows: readonly (readonly number[])[], rhs: readonly number[]): number[] | null {
  const n = rows[0].length;
  const scale = Array.from({ length: n }, (_, j) => Math.hypot(...rows.map(r => r[j])) || 1);
  const a = rows.map(r => r.map((v, j) => v / scale[j]));
  const b = [...rhs];
  // Householder reflections, column by column.
  for (let j = 0; j < n; j++) {
    const norm = Math.hypot(...a.slice(j).map(r => r[j]));
    if (!(norm > 1e-13)) return null;
    const alpha = a[j][j] > 0 ? -norm : norm;
    const v = a.map((r, i) => (i < j ? 0 : i === j ? r[j] - alpha : r[j]));
    const vv = v.reduce((s, x) => s + x * x, 0);
    for (let c = j; c < n; c++) {
      const f = (2 * a.reduce((s, r, i) => s + v[i] * r[c], 0)) / vv;
      for (let i = j; i < a.length; i++) a[i][c] -= f * v[i];
    }
    const f = (2 * b.reduce((s, x, i) => s + v[i] * x, 0)) / vv;
    for (let i = j; i < a.length; i++) b[i] -= f * v[i];
  }
  const x = new Array<number>(n).fill(0);
  for (let j = n - 1; j >= 0; j--) {
    let sum = b[j];
    for (let c = j + 1; c < n; c++) sum -= a[j][c] * x[c];
    x[j] = sum / a[j][j];
  }
  return x.map((v, j) => v / scale[j]);
}
