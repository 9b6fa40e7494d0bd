const NODES = 32;
const REACH = 0.3;

/**
 * Taylor coefficients of f at `centre` up to order `highest`, by Chebyshev interpolation on a symmetric interval around it, whose centre
 * is where derivatives are well conditioned. Null where the interpolation does not converge; those below its noise are 0.
 */
export function taylorCoefficients(f: (x: number) => number, centre: number, highest: number): readonly number[] | null {
  const values = Array.from({ length: NODES }, (_, j) => f(centre + REACH * Math.cos((Math.PI * (j + 0.5)) / NODES)));
  const chebyshev = values.map((_, n) => {
    const sum = values.reduce((s, v, j) => s + v * Math.cos((Math.PI * n * (j + 0.5)) / NODES), 0);
    return ((n === 0 ? 1 : 2) * sum) / NODES;
  });
  const size = Math.max(...chebyshev.map(Math.abs));
  if (!(size > 0) || !chebyshev.slice(-4).every(c => Math.abs(c) < 1e-13 * size)) return null;
  // Powers of t = (x - centre)/REACH: T_(n+1) = 2 t T_n - T_(n-1).
  const powers = new Array<number>(NODES).fill(0);
  const noise = new Array<number>(NODES).fill(0);
  let before: number[] = [];
  let polynomial = [1];
  chebyshev.forEach((c, n) => {
    const kept = Math.abs(c) > 2e-16 * size ? c : 0;
    polynomial.forEach((x, j) => {
      powers[j] += kept * x;
      noise[j] += (kept === 0 ? 0 : 1e-15 * size) * Math.abs(x);
    });
    const next = [0, ...polynomial.map(x => (n === 0 ? 1 : 2) * x)];
    before.forEach((x, j) => (next[j] -= x));
    [before, polynomial] = [polynomial, next];
  });
  return powers.slice(0, highest + 1).map((x, j) => (Math.abs(x) <= noise[j] ? 0 : x / REACH ** j));
}
