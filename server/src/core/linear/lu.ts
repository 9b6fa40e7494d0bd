/** LU factors of a dense matrix with partial pivoting, complex parts beside the real ones; `im` null for a real matrix. Works in place. */
export interface Factored {
  readonly n: number;
  readonly re: Float64Array;
  readonly im: Float64Array | null;
  readonly pivots: Int32Array;
  /** Sign of the permutation. */
  readonly sign: 1 | -1;
  readonly singular: boolean;
}

/** Factors the n by n matrix (row-major) in place. */
export function factor(n: number, re: Float64Array, im: Float64Array | null): Factored {
  return im ? factorComplex(n, re, im) : factorReal(n, re);
}

/** Columns eliminated at a time: each entry of the rest is then read and written once for four of them. */
const BLOCK = 4;

function factorReal(n: number, a: Float64Array): Factored {
  const pivots = new Int32Array(n);
  const state = { sign: 1 as 1 | -1, singular: false };
  for (let start = 0; start < n; start += BLOCK) {
    const end = Math.min(start + BLOCK, n);
    factorPanel(n, a, start, end, pivots, state);
    // The block's rows to the right of it, then everything below those.
    for (let r = start + 1; r < end; r++) {
      for (let c = start; c < r; c++) {
        const f = a[r * n + c];
        for (let j = end; j < n; j++) a[r * n + j] -= f * a[c * n + j];
      }
    }
    if (end - start === BLOCK) updateBelow(n, a, start, end);
  }
  return { n, re: a, im: null, pivots, sign: state.sign, singular: state.singular };
}

/** Gaussian elimination within columns start..end, rows exchanged as a whole. */
function factorPanel(
  n: number,
  a: Float64Array,
  start: number,
  end: number,
  pivots: Int32Array,
  state: { sign: 1 | -1; singular: boolean },
): void {
  for (let c = start; c < end; c++) {
    let p = c;
    let largest = Math.abs(a[c * n + c]);
    for (let r = c + 1; r < n; r++) {
      const v = Math.abs(a[r * n + c]);
      if (v > largest) {
        largest = v;
        p = r;
      }
    }
    pivots[c] = p;
    if (largest === 0 || !Number.isFinite(largest)) {
      state.singular = true;
      continue;
    }
    if (p !== c) {
      state.sign = state.sign === 1 ? -1 : 1;
      swapRows(a, n, p, c);
    }
    const inverse = 1 / a[c * n + c];
    for (let r = c + 1; r < n; r++) {
      const f = (a[r * n + c] *= inverse);
      for (let j = c + 1; j < end; j++) a[r * n + j] -= f * a[c * n + j];
    }
  }
}

/** Two rows at a time, so that each entry of the block serves both. */
function updateBelow(n: number, a: Float64Array, start: number, end: number): void {
  const top = start * n;
  let r = end;
  for (; r + 1 < n; r += 2) {
    const at = r * n + start;
    const [f0, f1, f2, f3] = [a[at], a[at + 1], a[at + 2], a[at + 3]];
    const [g0, g1, g2, g3] = [a[at + n], a[at + n + 1], a[at + n + 2], a[at + n + 3]];
    for (let to = r * n + end, u = top + end, last = r * n + n; to < last; to++, u++) {
      const u0 = a[u];
      const u1 = a[u + n];
      const u2 = a[u + 2 * n];
      const u3 = a[u + 3 * n];
      a[to] -= f0 * u0 + f1 * u1 + f2 * u2 + f3 * u3;
      a[to + n] -= g0 * u0 + g1 * u1 + g2 * u2 + g3 * u3;
    }
  }
  if (r < n) {
    const at = r * n + start;
    const [f0, f1, f2, f3] = [a[at], a[at + 1], a[at + 2], a[at + 3]];
    for (let to = r * n + end, u = top + end, last = r * n + n; to < last; to++, u++)
      a[to] -= f0 * a[u] + f1 * a[u + n] + f2 * a[u + 2 * n] + f3 * a[u + 3 * n];
  }
}

function factorComplex(n: number, a: Float64Array, b: Float64Array): Factored {
  const pivots = new Int32Array(n);
  let sign: 1 | -1 = 1;
  let singular = false;
  for (let c = 0; c < n; c++) {
    let p = c;
    let largest = -1;
    for (let r = c; r < n; r++) {
      const v = Math.abs(a[r * n + c]) + Math.abs(b[r * n + c]);
      if (v > largest) [largest, p] = [v, r];
    }
    pivots[c] = p;
    if (!(largest > 0) || !Number.isFinite(largest)) {
      singular = true;
      continue;
    }
    if (p !== c) {
      sign = sign === 1 ? -1 : 1;
      swapRows(a, n, p, c);
      swapRows(b, n, p, c);
    }
    const d = a[c * n + c] ** 2 + b[c * n + c] ** 2;
    const [ir, ii] = [a[c * n + c] / d, -b[c * n + c] / d];
    for (let r = c + 1; r < n; r++) {
      const at = r * n + c;
      const fr = a[at] * ir - b[at] * ii;
      const fi = a[at] * ii + b[at] * ir;
      a[at] = fr;
      b[at] = fi;
      for (let j = c + 1; j < n; j++) {
        const x = a[c * n + j];
        const y = b[c * n + j];
        a[r * n + j] -= fr * x - fi * y;
        b[r * n + j] -= fr * y + fi * x;
      }
    }
  }
  return { n, re: a, im: b, pivots, sign, singular };
}

function swapRows(a: Float64Array, n: number, p: number, c: number): void {
  for (let j = 0; j < n; j++) {
    const t = a[p * n + j];
    a[p * n + j] = a[c * n + j];
    a[c * n + j] = t;
  }
}

/** Solves A x = b in place. `im` must be given where the matrix is complex. */
export function solve({ n, re, im, pivots }: Factored, x: Float64Array, y: Float64Array | null): void {
  for (let c = 0; c < n; c++) {
    const p = pivots[c];
    if (p === c) continue;
    [x[p], x[c]] = [x[c], x[p]];
    if (y) [y[p], y[c]] = [y[c], y[p]];
  }
  for (let r = 0; r < n; r++) eliminate(re, im, n, r, 0, r, x, y);
  for (let r = n - 1; r >= 0; r--) {
    eliminate(re, im, n, r, r + 1, n, x, y);
    const u = re[r * n + r];
    const v = im ? im[r * n + r] : 0;
    const d = u * u + v * v;
    const [s, t] = [x[r], y ? y[r] : 0];
    x[r] = (s * u + t * v) / d;
    if (y) y[r] = (t * u - s * v) / d;
  }
}

/** x[r] -= Σ_{from<=j<to} A[r][j] x[j]. */
function eliminate(
  re: Float64Array,
  im: Float64Array | null,
  n: number,
  r: number,
  from: number,
  to: number,
  x: Float64Array,
  y: Float64Array | null,
): void {
  let s = 0;
  let t = 0;
  for (let j = from; j < to; j++) s += re[r * n + j] * x[j];
  if (y) {
    for (let j = from; j < to; j++) t += re[r * n + j] * y[j];
    if (im) {
      for (let j = from; j < to; j++) {
        s -= im[r * n + j] * y[j];
        t += im[r * n + j] * x[j];
      }
    }
    y[r] -= t;
  }
  x[r] -= s;
}

/** Sign and natural logarithm of |det| of a real matrix. */
export function determinant({ n, re, sign, singular }: Factored): { sign: number; log: number } {
  let total: number = sign;
  let log = 0;
  for (let j = 0; j < n; j++) {
    const d = re[j * n + j];
    total *= Math.sign(d);
    log += Math.log(Math.abs(d));
  }
  return singular ? { sign: 0, log: -Infinity } : { sign: total, log };
}
