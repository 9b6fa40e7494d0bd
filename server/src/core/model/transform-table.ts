/** Chebyshev series of a function of q on panels, found by bisection. */
export interface Table {
  /** v at q >= 0 below the end of the table. */
  at(q: number): number;
  readonly end: number;
  /** What the last coefficients left open, at most. */
  readonly error: number;
}

const DEGREE = 24;
const NODES = Float64Array.from({ length: DEGREE }, (_, j) => Math.cos((Math.PI * (j + 0.5)) / DEGREE));
const MOST_PANELS = 3000;

interface Panel {
  readonly from: number;
  readonly to: number;
  readonly coefficients: Float64Array;
}

/** Tabulates f on the panels between `breaks` (rising, from 0), to `tolerance(q)`, an absolute error. */
export function tabulate(f: (q: number) => number, breaks: readonly number[], tolerance: (q: number) => number): Table {
  const panels: Panel[] = [];
  let error = 0;
  const refine = (from: number, to: number, depth: number): void => {
    const coefficients = expand(f, from, to);
    const last = Math.max(...coefficients.subarray(DEGREE - 4).map(Math.abs));
    const peak = Math.max(...coefficients.map(Math.abs));
    if (last <= Math.max(tolerance(to), 1e-14 * peak) || depth > 14 || panels.length > MOST_PANELS) {
      if (last > tolerance(to)) error = Math.max(error, last);
      panels.push({ from, to, coefficients });
      return;
    }
    const middle = (from + to) / 2;
    refine(from, middle, depth + 1);
    refine(middle, to, depth + 1);
  };
  for (let j = 1; j < breaks.length; j++) refine(breaks[j - 1], breaks[j], 0);
  const starts = Float64Array.from(panels, p => p.from);
  return {
    at(q) {
      let low = 0;
      let high = starts.length;
      while (high - low > 1) {
        const middle = (low + high) >> 1;
        if (starts[middle] <= q) low = middle;
        else high = middle;
      }
      return clenshaw(panels[low], q);
    },
    end: breaks[breaks.length - 1],
    error,
  };
}

function expand(f: (q: number) => number, from: number, to: number): Float64Array {
  const values = NODES.map(x => f((from + to) / 2 + ((to - from) / 2) * x));
  return Float64Array.from({ length: DEGREE }, (_, n) => {
    let sum = 0;
    for (let j = 0; j < DEGREE; j++) sum += values[j] * Math.cos((Math.PI * n * (j + 0.5)) / DEGREE);
    return ((n === 0 ? 1 : 2) * sum) / DEGREE;
  });
}

function clenshaw({ from, to, coefficients }: Panel, q: number): number {
  const t = (2 * q - from - to) / (to - from);
  let above = 0;
  let value = 0;
  for (let n = DEGREE - 1; n > 0; n--) [above, value] = [value, coefficients[n] + 2 * t * value - above];
  return coefficients[0] + t * value - above;
}
