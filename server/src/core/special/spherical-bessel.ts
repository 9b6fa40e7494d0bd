/** Spherical Bessel function j_l(x), l a whole number >= 0, real x. Error below 1e-15 of the local amplitude. */
export function sphericalBessel(l: number, x: number): number {
  if (x < 0) return (l % 2 === 0 ? 1 : -1) * sphericalBessel(l, -x);
  if (l === 0) return x === 0 ? 1 : Math.sin(x) / x;
  if (x * x < 2 * l + 3) return series(l, x);
  return x > l ? upward(l, x) : downward(l, x);
}

/** x^l/(2l+1)!! Σ (-x²/2)^n / (n! (2l+3)(2l+5)…(2l+2n+1)). */
function series(l: number, x: number): number {
  let front = 1;
  for (let n = 1; n <= l; n++) front *= x / (2 * n + 1);
  let term = 1;
  let sum = 1;
  for (let n = 1; Math.abs(term) > 1e-18; n++) {
    term *= (-0.5 * x * x) / (n * (2 * l + 2 * n + 1));
    sum += term;
  }
  return front * sum;
}

function upward(l: number, x: number): number {
  let before = Math.sin(x) / x;
  let value = (before - Math.cos(x)) / x;
  for (let n = 1; n < l; n++) [before, value] = [value, ((2 * n + 1) / x) * value - before];
  return value;
}

/** Backward recurrence from far above l, normalised by the larger of j_0 and j_1. */
function downward(l: number, x: number): number {
  let above = 0;
  let value = 1e-300;
  let wanted = 0;
  for (let n = l + 30 + Math.ceil(Math.sqrt(40 * l)); n > 0; n--) {
    [above, value] = [value, ((2 * n + 1) / x) * value - above];
    if (n - 1 === l) wanted = value;
    if (Math.abs(value) > 1e250) [above, value, wanted] = [above * 1e-250, value * 1e-250, wanted * 1e-250];
  }
  const j0 = Math.sin(x) / x;
  const j1 = (j0 - Math.cos(x)) / x;
  return Math.abs(j0) > Math.abs(j1) ? (wanted / value) * j0 : (wanted / above) * j1;
}

/** j_0(x) … j_top(x) into `out` (length top + 1), x real: upwards where x is large, downwards from far above otherwise. */
export function sphericalBessels(top: number, x: number, out: Float64Array): void {
  const size = Math.abs(x);
  if (size < 1e-150) {
    out.fill(0);
    out[0] = 1;
    return;
  }
  const j0 = Math.sin(size) / size;
  const j1 = size < 0.1 ? series(1, size) : (j0 - Math.cos(size)) / size;
  if (size > top) {
    out[0] = j0;
    if (top > 0) out[1] = j1;
    for (let n = 1; n < top; n++) out[n + 1] = ((2 * n + 1) / size) * out[n] - out[n - 1];
  } else {
    // Ratios j_n/j_(n-1) from the continued fraction; where j_(n-1) is near a zero, the ratio is merely large.
    let ratio = 0;
    for (let n = top + 20 + Math.ceil(Math.sqrt(40 * top)); n > top; n--) ratio = size / (2 * n + 1 - size * ratio);
    let above = ratio;
    let value = 1;
    for (let n = top; n > 0; n--) {
      out[n] = value;
      [above, value] = [value, ((2 * n + 1) / size) * value - above];
      if (Math.abs(value) > 1e200) {
        for (let m = n; m <= top; m++) out[m] *= 1e-200;
        [above, value] = [above * 1e-200, value * 1e-200];
      }
    }
    out[0] = value;
    const norm = top === 0 || Math.abs(j0) > Math.abs(j1) ? j0 / out[0] : j1 / out[1];
    for (let n = 0; n <= top; n++) out[n] *= norm;
  }
  if (x < 0) for (let n = 1; n <= top; n += 2) out[n] = -out[n];
}
