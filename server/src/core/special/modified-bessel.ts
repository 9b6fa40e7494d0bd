/** exp(-z) I_n(z), the scaled modified Bessel function of whole order n >= 0, for z >= 0. Relative error below 1e-14. */
export function scaledModifiedBessel(n: number, z: number): number {
  if (z === 0) return n === 0 ? 1 : 0;
  return z > 30 + n * n ? asymptotic(n, z) : downward(n, z);
}

/** Abramowitz and Stegun 9.7.1. */
function asymptotic(n: number, z: number): number {
  const mu = 4 * n * n;
  let term = 1;
  let sum = 1;
  for (let k = 1; Math.abs(term) > 1e-17 && k < 60; k++) {
    term *= -(mu - (2 * k - 1) ** 2) / (8 * k * z);
    sum += term;
  }
  return sum / Math.sqrt(2 * Math.PI * z);
}

/** Backward recurrence normalised by I_0 + 2 I_1 + 2 I_2 + … = exp(z): all terms are positive. */
function downward(n: number, z: number): number {
  let m = n + 20 + Math.ceil(z + Math.sqrt(60 * z));
  let above = 0;
  let value = 1e-250;
  let wanted = 0;
  let norm = 0;
  for (; m > 0; m--) {
    if (m === n) wanted = value;
    norm += 2 * value;
    [above, value] = [value, ((2 * m) / z) * value + above];
    if (value > 1e250) [above, value, wanted, norm] = [above * 1e-250, value * 1e-250, wanted * 1e-250, norm * 1e-250];
  }
  return (n === 0 ? value : wanted) / (norm + value);
}
