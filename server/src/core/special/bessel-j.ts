/** Bessel function J_n(x) of whole order n, real x. Error below 1e-15 of the local amplitude where |x| < 1e3. */
export function besselJ(n: number, x: number): number {
  if (n < 0) return (n % 2 === 0 ? 1 : -1) * besselJ(-n, x);
  if (x < 0) return (n % 2 === 0 ? 1 : -1) * besselJ(n, -x);
  if (x === 0) return n === 0 ? 1 : 0;
  return x > 25 && x > n ? upward(n, x) : downward(n, x);
}

function upward(n: number, x: number): number {
  let value = hankel(0, x);
  if (n === 0) return value;
  let before = value;
  value = hankel(1, x);
  for (let m = 1; m < n; m++) [before, value] = [value, ((2 * m) / x) * value - before];
  return value;
}

/** Hankel's asymptotic series, Abramowitz and Stegun 9.2.5, for x > 25. */
function hankel(n: number, x: number): number {
  const mu = 4 * n * n;
  let term = 1;
  let cosine = 1;
  let sine = 0;
  for (let k = 1; Math.abs(term) > 1e-17 && k < 40; k++) {
    term *= (mu - (2 * k - 1) ** 2) / (8 * k * x);
    if (k % 2 === 1) sine += k % 4 === 1 ? term : -term;
    else cosine += k % 4 === 0 ? term : -term;
  }
  // cos and sin of x - nπ/2 - π/4 without rounding the phase.
  const c = Math.cos(x);
  const s = Math.sin(x);
  const [phaseCosine, phaseSine] = n === 0 ? [c + s, s - c] : [s - c, -(c + s)];
  return (cosine * phaseCosine - sine * phaseSine) / Math.sqrt(Math.PI * x);
}

/** Backward recurrence normalised by J_0 + 2 J_2 + 2 J_4 + … = 1. */
function downward(n: number, x: number): number {
  const top = Math.max(n, Math.ceil(x));
  let m = top + 20 + Math.ceil(Math.sqrt(60 * top));
  m += m % 2;
  let above = 0;
  let value = 1e-300;
  let wanted = 0;
  let norm = 0;
  for (; m > 0; m--) {
    if (m === n) wanted = value;
    if (m % 2 === 0) norm += 2 * value;
    [above, value] = [value, ((2 * m) / x) * value - above];
    if (Math.abs(value) > 1e250) [above, value, wanted, norm] = [above * 1e-250, value * 1e-250, wanted * 1e-250, norm * 1e-250];
  }
  return (n === 0 ? value : wanted) / (norm + value);
}
