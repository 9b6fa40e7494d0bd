/**
 * Legendre function of the second kind Q_l(x), l a whole number >= 0: the principal value on (-1, 1), the decaying
 * solution for |x| > 1; infinite at |x| = 1.
 */
export function legendreQ(l: number, x: number): number {
  if (Math.abs(x) < 1) return upward(l, x, Math.atanh(x));
  return x >= 1 ? legendreQAbove(l, x - 1) : (l % 2 === 0 ? -1 : 1) * legendreQAbove(l, -x - 1);
}

/** Q_l(1 + t), t >= 0: keeps all digits where the argument is close to 1. */
export function legendreQAbove(l: number, t: number): number {
  if (t === 0) return Infinity;
  if (t === Infinity) return 0;
  const q0 = 0.5 * Math.log1p(2 / t);
  if (l === 0) return q0;
  const x = 1 + t;
  // P_l grows and Q_l falls like growth^(±l): recur upwards only while that loses no more than a digit.
  const growth = Math.log1p(t + Math.sqrt(t * (t + 2)));
  return 2 * l * growth < 1 ? upward(l, x, q0) : downward(l, x, q0, l + Math.ceil(20 / growth));
}

function upward(l: number, x: number, q0: number): number {
  if (l === 0) return q0;
  let before = q0;
  let value = x * q0 - 1;
  for (let n = 1; n < l; n++) [before, value] = [value, ((2 * n + 1) * x * value - n * before) / (n + 1)];
  return value;
}

/** Product of the ratios Q_n/Q_(n-1) = n / ((2n+1) x - (n+1) Q_(n+1)/Q_n), started well above l. */
function downward(l: number, x: number, q0: number, start: number): number {
  let ratio = 0;
  let product = q0;
  for (let n = start; n >= 1; n--) {
    ratio = n / ((2 * n + 1) * x - (n + 1) * ratio);
    if (n <= l) product *= ratio;
  }
  return product;
}
