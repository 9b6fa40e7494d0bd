/** Lanczos coefficients for g = 607/128, n = 15 (P. Godfrey, 2001). */
const G = 607 / 128;
const LANCZOS = [
  0.99999999999999709182, 57.156235665862923517, -59.597960355475491248, 14.136097974741747174, -0.49191381609762019978,
  0.33994649984811888699e-4, 0.46523628927048575665e-4, -0.98374475304879564677e-4, 0.15808870322491248884e-3, -0.21026444172410488319e-3,
  0.2174396181152126432e-3, -0.16431810653676389022e-3, 0.84418223983852743293e-4, -0.2619083840158140867e-4, 0.36899182659531622704e-5,
];

/** Γ(x) for real x, relative error below 1e-14; NaN at the poles 0, -1, -2, …; exact factorials at whole numbers up to 23. */
export function gamma(x: number): number {
  if (Number.isInteger(x)) {
    if (x <= 0) return NaN;
    if (x <= 23) {
      let factorial = 1;
      for (let n = 2; n < x; n++) factorial *= n;
      return factorial;
    }
  }
  if (x < 0.5) return Math.PI / (Math.sin(Math.PI * x) * gamma(1 - x));
  if (x > 172) return Infinity;
  const t = x - 0.5 + G;
  // The power is taken in two halves so that it does not overflow before the exponential brings it down.
  const half = Math.pow(t, (x - 0.5) / 2);
  return Math.sqrt(2 * Math.PI) * half * Math.exp(-t) * half * lanczos(x - 1);
}

/** ln |Γ(x)| for x > 0. */
export function logGamma(x: number): number {
  if (x < 100) return Math.log(Math.abs(gamma(x)));
  // Stirling's series, Abramowitz and Stegun 6.1.41.
  const y = 1 / (x * x);
  return (x - 0.5) * Math.log(x) - x + 0.5 * Math.log(2 * Math.PI) + (1 / 12 - y * (1 / 360 - y / 1260)) / x;
}

function lanczos(x: number): number {
  let sum = LANCZOS[0];
  for (let n = 1; n < LANCZOS.length; n++) sum += LANCZOS[n] / (x + n);
  return sum;
}
