/** Legendre polynomial P_l(x), l a whole number >= 0, by its three-term recurrence. */
export function legendreP(l: number, x: number): number {
  if (l === 0) return 1;
  let before = 1;
  let value = x;
  for (let n = 1; n < l; n++) [before, value] = [value, ((2 * n + 1) * x * value - n * before) / (n + 1)];
  return value;
}
