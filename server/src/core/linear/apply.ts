import type { KernelOnGrid } from '../model/kernel-on-grid';

interface Vector {
  readonly re: Float64Array;
  readonly im: Float64Array | null;
}

/** out[c] = V x[c] in the first `size` places, for a batch of vectors; im null where all of them and the kernel are real. */
export function applyKernel(kernel: KernelOnGrid, x: readonly Vector[], out: readonly Vector[]): void {
  const xRe = x.map(v => v.re);
  const outRe = out.map(v => v.re);
  multiply(kernel.re, kernel.size, xRe, outRe, 1, false);
  if (out.length === 0 || !out[0].im) return;
  const xIm = x.map(v => v.im!);
  const outIm = out.map(v => v.im!);
  multiply(kernel.re, kernel.size, xIm, outIm, 1, false);
  if (!kernel.im) return;
  multiply(kernel.im, kernel.size, xIm, outRe, -1, true);
  multiply(kernel.im, kernel.size, xRe, outIm, 1, true);
}

/** Four vectors at a time, so that each matrix element is read once for four products. */
function multiply(
  matrix: Float64Array,
  size: number,
  x: readonly Float64Array[],
  out: readonly Float64Array[],
  sign: number,
  add: boolean,
): void {
  let c = 0;
  for (; c + 3 < x.length; c += 4) {
    const [x0, x1, x2, x3] = [x[c], x[c + 1], x[c + 2], x[c + 3]];
    const [y0, y1, y2, y3] = [out[c], out[c + 1], out[c + 2], out[c + 3]];
    for (let i = 0, at = 0; i < size; i++) {
      let s0 = 0;
      let s1 = 0;
      let s2 = 0;
      let s3 = 0;
      for (let j = 0; j < size; j++, at++) {
        const v = matrix[at];
        s0 += v * x0[j];
        s1 += v * x1[j];
        s2 += v * x2[j];
        s3 += v * x3[j];
      }
      y0[i] = sign * s0 + (add ? y0[i] : 0);
      y1[i] = sign * s1 + (add ? y1[i] : 0);
      y2[i] = sign * s2 + (add ? y2[i] : 0);
      y3[i] = sign * s3 + (add ? y3[i] : 0);
    }
  }
  for (; c < x.length; c++) {
    const [column, y] = [x[c], out[c]];
    for (let i = 0, at = 0; i < size; i++) {
      let s0 = 0;
      let s1 = 0;
      let j = 0;
      for (; j + 1 < size; j += 2, at += 2) {
        s0 += matrix[at] * column[j];
        s1 += matrix[at + 1] * column[j + 1];
      }
      if (j < size) s0 += matrix[at++] * column[j];
      y[i] = sign * (s0 + s1) + (add ? y[i] : 0);
    }
  }
}
