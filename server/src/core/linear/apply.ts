import type { KernelOnGrid } from '../model/kernel-on-grid';

/**
 * out[c] = V x[c] for a batch of columns, four at a time so that each matrix element is read once for four of them.
 * x may be longer than the matrix (what follows is ignored); out is overwritten in its first `size` places.
 */
export function applyKernel(kernel: KernelOnGrid, xRe: Float64Array[], xIm: Float64Array[], outRe: Float64Array[], outIm: Float64Array[]): void {
  const complexInput = xIm.some(column => column.some(v => v !== 0));
  multiply(kernel.re, kernel.size, xRe, outRe, 1, false);
  if (complexInput) multiply(kernel.re, kernel.size, xIm, outIm, 1, false);
  if (!kernel.im) return;
  if (complexInput) multiply(kernel.im, kernel.size, xIm, outRe, -1, true);
  multiply(kernel.im, kernel.size, xRe, outIm, 1, complexInput);
}

function multiply(matrix: Float64Array, size: number, x: Float64Array[], out: Float64Array[], sign: number, add: boolean): void {
  let c = 0;
  for (; c + 3 < x.length; c += 4) {
    const [x0, x1, x2, x3] = [x[c], x[c + 1], x[c + 2], x[c + 3]];
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
      out[c][i] = sign * s0 + (add ? out[c][i] : 0);
      out[c + 1][i] = sign * s1 + (add ? out[c + 1][i] : 0);
      out[c + 2][i] = sign * s2 + (add ? out[c + 2][i] : 0);
      out[c + 3][i] = sign * s3 + (add ? out[c + 3][i] : 0);
    }
  }
  for (; c < x.length; c++) {
    const column = x[c];
    for (let i = 0, at = 0; i < size; i++) {
      let sum = 0;
      for (let j = 0; j < size; j++, at++) sum += matrix[at] * column[j];
      out[c][i] = sign * sum + (add ? out[c][i] : 0);
    }
  }
}
