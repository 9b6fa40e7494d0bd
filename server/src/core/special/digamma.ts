/** ψ(x) = Γ'(x)/Γ(x) for real x; NaN at 0, -1, -2, …. Recurrence up to 10, then the asymptotic series (Abramowitz and Stegun 6.3.18). */
export function digamma(x: number): number {
  if (x <= 0) {
    if (Number.isInteger(x)) return NaN;
    return digamma(1 - x) - Math.PI / Math.tan(Math.PI * x);
  }
  let sum = 0;
  let y = x;
  for (; y < 10; y++) sum -= 1 / y;
  const t = 1 / (y * y);
  const series = t * (1 / 12 - t * (1 / 120 - t * (1 / 252 - t * (1 / 240 - t * (1 / 132 - t * (691 / 32760 - t / 12))))));
  return sum + Math.log(y) - 0.5 / y - series;
}
