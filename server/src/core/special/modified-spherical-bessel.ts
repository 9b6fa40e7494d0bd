/** exp(-z) i_l(z), i_l the modified spherical Bessel function of the first kind, z >= 0: ½∫P_l(x) exp(z(x-1)) dx. */
export function scaledModifiedSphericalBessel(l: number, z: number): number {
  if (l === 0) return z < 1e-8 ? 1 - z : -Math.expm1(-2 * z) / (2 * z);
  return z < Math.min(600, 30 + 2 * l * l) ? series(l, z) : asymptotic(l, z);
}

/** All terms positive: no digits are lost. The factor exp(-z) is spread so that neither part overflows. */
function series(l: number, z: number): number {
  let front = Math.exp(-z);
  for (let n = 1; n <= l; n++) front *= z / (2 * n + 1);
  let term = 1;
  let sum = 1;
  for (let n = 1; term > 1e-17 * sum; n++) {
    term *= (0.5 * z * z) / (n * (2 * l + 2 * n + 1));
    sum += term;
  }
  return front * sum;
}

/** (1/2z) Σ (-1)^n (l+n)! / (n! (l-n)! (2z)^n): finite, exact up to exp(-2z). */
function asymptotic(l: number, z: number): number {
  let term = 1;
  let sum = 1;
  for (let n = 1; n <= l; n++) {
    term *= -((l + n) * (l - n + 1)) / (n * 2 * z);
    sum += term;
  }
  return sum / (2 * z);
}
