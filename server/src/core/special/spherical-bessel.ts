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
