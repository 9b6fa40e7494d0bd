import type { Complex } from '../algebra/expression';
import { divide, multiply } from './solve';

/** y = A x for complex vectors, y overwritten. */
export type Operator = (x: { re: Float64Array; im: Float64Array }, y: { re: Float64Array; im: Float64Array }) => void;

/**
 * Eigenvalues of largest modulus of an operator on n points, by Arnoldi's method with full orthogonalisation: `steps` products. Of the
 * `wanted` largest those are returned whose residual is below `tolerance` of the largest, by falling modulus; the largest always is, with its residual.
 */
export function largestEigenvalues(
  operator: Operator,
  n: number,
  steps: number,
  wanted: number,
  tolerance: number,
): { values: Complex[]; residual: number } {
  const m = Math.min(steps, n);
  const basis = [startVector(n)];
  const h: Complex[][] = Array.from({ length: m + 1 }, () => Array.from({ length: m }, () => ({ re: 0, im: 0 })));
  let size = m;
  for (let j = 0; j < m; j++) {
    const w = { re: new Float64Array(n), im: new Float64Array(n) };
    operator(basis[j], w);
    const before = norm(w);
    for (let pass = 0; pass < 2; pass++) {
      for (let i = 0; i <= j; i++) {
        const c = inner(basis[i], w);
        subtractScaled(w, basis[i], c);
        h[i][j] = { re: h[i][j].re + c.re, im: h[i][j].im + c.im };
      }
    }
    const length = norm(w);
    h[j + 1][j] = { re: length, im: 0 };
    if (!(length > 1e-13 * before)) {
      size = j + 1;
      break;
    }
    basis.push({ re: w.re.map(v => v / length), im: w.im.map(v => v / length) });
  }
  const matrix = h.slice(0, size).map(row => row.slice(0, size));
  const closing = size < m || m === n ? 0 : h[size][size - 1].re;
  const values = hessenbergEigenvalues(matrix)
    .sort((x, y) => modulus(y) - modulus(x))
    .slice(0, wanted);
  const residuals = values.map(value => closing * lastComponent(matrix, value));
  const scale = modulus(values[0] ?? { re: 0, im: 0 });
  return { values: values.filter((_, j) => j === 0 || residuals[j] <= tolerance * scale), residual: residuals[0] ?? 0 };
}

/** Fixed, without symmetry, so that no eigenvector is missed and every run gives the same bytes. */
function startVector(n: number): { re: Float64Array; im: Float64Array } {
  const re = Float64Array.from({ length: n }, (_, j) => 1 + 0.5 * Math.sin(1.7 * j + 0.3));
  const length = Math.hypot(...re);
  return { re: re.map(v => v / length), im: new Float64Array(n) };
}

const modulus = (x: Complex): number => Math.hypot(x.re, x.im);

function norm(x: { re: Float64Array; im: Float64Array }): number {
  let sum = 0;
  for (let j = 0; j < x.re.length; j++) sum += x.re[j] ** 2 + x.im[j] ** 2;
  return Math.sqrt(sum);
}

function inner(x: { re: Float64Array; im: Float64Array }, y: { re: Float64Array; im: Float64Array }): Complex {
  let re = 0;
  let im = 0;
  for (let j = 0; j < x.re.length; j++) {
    re += x.re[j] * y.re[j] + x.im[j] * y.im[j];
    im += x.re[j] * y.im[j] - x.im[j] * y.re[j];
  }
  return { re, im };
}

function subtractScaled(w: { re: Float64Array; im: Float64Array }, x: { re: Float64Array; im: Float64Array }, c: Complex): void {
  for (let j = 0; j < w.re.length; j++) {
    w.re[j] -= c.re * x.re[j] - c.im * x.im[j];
    w.im[j] -= c.re * x.im[j] + c.im * x.re[j];
  }
}

/** |last component| of the unit eigenvector, by inverse iteration: the Ritz residual per unit closing element. */
function lastComponent(matrix: readonly (readonly Complex[])[], value: Complex): number {
  const n = matrix.length;
  const shift = 1e-10 * (modulus(value) || 1);
  let x: Complex[] = Array.from({ length: n }, (_, j) => ({ re: 1, im: 0.1 * j }));
  for (let round = 0; round < 2; round++) {
    x = solveHessenberg(
      matrix.map((row, i) => row.map((c, j) => (i === j ? { re: c.re - value.re - shift, im: c.im - value.im } : c))),
      x,
    );
    const length = Math.hypot(...x.flatMap(c => [c.re, c.im]));
    x = x.map(c => ({ re: c.re / length, im: c.im / length }));
  }
  return modulus(x[n - 1]);
}

/** Only one element stands below each diagonal one. */
function solveHessenberg(a: Complex[][], b: readonly Complex[]): Complex[] {
  const n = b.length;
  const rows = a.map((row, i) => [...row, b[i]]);
  // A matrix is shifted onto its eigenvalue here: what should vanish is as good as any small number.
  const floor = 1e-30 * Math.max(Number.MIN_VALUE / 1e-30, ...a.flat().map(modulus));
  const pivotAt = (i: number): Complex => (modulus(rows[i][i]) < floor ? { re: floor, im: 0 } : rows[i][i]);
  for (let c = 0; c + 1 < n; c++) {
    if (modulus(rows[c + 1][c]) > modulus(rows[c][c])) [rows[c], rows[c + 1]] = [rows[c + 1], rows[c]];
    const f = divide(rows[c + 1][c], pivotAt(c));
    for (let j = c; j <= n; j++) rows[c + 1][j] = minus(rows[c + 1][j], multiply(f, rows[c][j]));
  }
  const x: Complex[] = new Array<Complex>(n);
  for (let i = n - 1; i >= 0; i--) {
    let sum = rows[i][n];
    for (let j = i + 1; j < n; j++) sum = minus(sum, multiply(rows[i][j], x[j]));
    x[i] = divide(sum, pivotAt(i));
  }
  return x;
}

const minus = (x: Complex, y: Complex): Complex => ({ re: x.re - y.re, im: x.im - y.im });

/** Eigenvalues of a small complex Hessenberg matrix by the shifted QR iteration with Givens rotations and deflation. */
export function hessenbergEigenvalues(matrix: readonly (readonly Complex[])[]): Complex[] {
  const h = matrix.map(row => row.map(c => ({ ...c })));
  const values: Complex[] = [];
  let n = h.length;
  for (let round = 0; n > 0 && round < 400 * matrix.length; round++) {
    let low = n - 1;
    while (low > 0 && modulus(h[low][low - 1]) > 1e-15 * (modulus(h[low][low]) + modulus(h[low - 1][low - 1]))) low--;
    if (low === n - 1) {
      values.push(h[n - 1][n - 1]);
      n--;
      continue;
    }
    const shift = round % 17 === 16 ? { re: h[n - 1][n - 1].re + modulus(h[n - 1][n - 2]), im: h[n - 1][n - 1].im } : wilkinson(h, n);
    qrStep(h, low, n, shift);
  }
  return values;
}

/** The eigenvalue of the trailing 2 by 2 block nearest its last entry. */
function wilkinson(h: Complex[][], n: number): Complex {
  const [a, b, c, d] = [h[n - 2][n - 2], h[n - 2][n - 1], h[n - 1][n - 2], h[n - 1][n - 1]];
  const half = { re: (a.re - d.re) / 2, im: (a.im - d.im) / 2 };
  const bc = multiply(b, c);
  const square = multiply(half, half);
  const root = squareRoot({ re: square.re + bc.re, im: square.im + bc.im });
  const mean = { re: (a.re + d.re) / 2, im: (a.im + d.im) / 2 };
  const plus = { re: mean.re + root.re, im: mean.im + root.im };
  const other = minus(mean, root);
  return modulus(minus(plus, d)) < modulus(minus(other, d)) ? plus : other;
}

function squareRoot(z: Complex): Complex {
  const r = modulus(z);
  const re = Math.sqrt(Math.max(0, (r + z.re) / 2));
  const im = Math.sqrt(Math.max(0, (r - z.re) / 2));
  return { re, im: z.im < 0 ? -im : im };
}

function qrStep(h: Complex[][], low: number, n: number, shift: Complex): void {
  const rotations: { c: number; s: Complex }[] = [];
  for (let j = low; j < n; j++) h[j][j] = minus(h[j][j], shift);
  for (let j = low; j < n - 1; j++) {
    const [a, b] = [h[j][j], h[j + 1][j]];
    const length = Math.hypot(modulus(a), modulus(b));
    const ma = modulus(a);
    const phase = ma === 0 ? { re: 1, im: 0 } : { re: a.re / ma, im: a.im / ma };
    const c = ma / length;
    // s = phase * conj(b) / length, so that [c, s; -conj(s), c] takes (a, b) to (phase * length, 0).
    const s = multiply(phase, { re: b.re / length, im: -b.im / length });
    rotations.push({ c, s });
    for (let k = j; k < n; k++) {
      const [x, y] = [h[j][k], h[j + 1][k]];
      const sy = multiply(s, y);
      const sx = multiply({ re: -s.re, im: s.im }, x);
      h[j][k] = { re: c * x.re + sy.re, im: c * x.im + sy.im };
      h[j + 1][k] = { re: sx.re + c * y.re, im: sx.im + c * y.im };
    }
  }
  rotations.forEach(({ c, s }, r) => {
    const j = low + r;
    for (let i = low; i <= Math.min(j + 1, n - 1); i++) {
      const [x, y] = [h[i][j], h[i][j + 1]];
      const sy = multiply({ re: s.re, im: -s.im }, y);
      const sx = multiply(s, x);
      h[i][j] = { re: c * x.re + sy.re, im: c * x.im + sy.im };
      h[i][j + 1] = { re: -sx.re + c * y.re, im: -sx.im + c * y.im };
    }
  });
  for (let j = low; j < n; j++) h[j][j] = { re: h[j][j].re + shift.re, im: h[j][j].im + shift.im };
}
