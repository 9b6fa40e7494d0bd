/**
 * Error function erf(x) = (2/sqrt(pi)) ∫_0^x exp(-t²) dt, to a few units in the last place.
 * Series of positive terms (Abramowitz and Stegun 7.1.6) up to |x| = 3, continued fraction of the complement (7.1.14) beyond.
 */
export function erf(x: number): number {
  if (Number.isNaN(x)) return NaN;
  const size = Math.abs(x);
  if (size > 6) return Math.sign(x);
  return size <= 3 ? series(x) : Math.sign(x) * (1 - complement(size));
}

function series(x: number): number {
  let term = x;
  let sum = x;
  for (let n = 1; Math.abs(term) > 1e-18 * Math.abs(sum); n++) {
    term *= (2 * x * x) / (2 * n + 1);
    sum += term;
  }
  return (2 / Math.sqrt(Math.PI)) * Math.exp(-x * x) * sum;
}

/** erfc(x) for x > 3, from the tail of its continued fraction upwards. */
function complement(x: number): number {
  let tail = 0;
  for (let n = 40; n >= 1; n--) tail = n / 2 / (x + tail);
  return Math.exp(-x * x) / (Math.sqrt(Math.PI) * (x + tail));
}
