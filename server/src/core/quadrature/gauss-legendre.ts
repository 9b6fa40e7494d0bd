export interface Rule {
  readonly nodes: Float64Array;
  readonly weights: Float64Array;
}

const rules = new Map<number, Rule>();

/** Gauss–Legendre rule with `n` points on [-1, 1], nodes rising; exact for polynomials of degree 2n - 1. */
export function gaussLegendre(n: number): Rule {
  let rule = rules.get(n);
  if (!rule) rules.set(n, (rule = compute(n)));
  return rule;
}

/** The rule moved to [from, to]. */
export function gaussLegendreOn(n: number, from: number, to: number): Rule {
  const { nodes, weights } = gaussLegendre(n);
  const half = (to - from) / 2;
  const middle = (to + from) / 2;
  return { nodes: nodes.map(x => middle + half * x), weights: weights.map(w => half * w) };
}

/** Newton's iteration on P_n from Tricomi's estimate of its zeros. */
function compute(n: number): Rule {
  const nodes = new Float64Array(n);
  const weights = new Float64Array(n);
  for (let i = 0; i < Math.ceil(n / 2); i++) {
    let x = (1 - (n - 1) / (8 * n ** 3)) * Math.cos((Math.PI * (4 * i + 3)) / (4 * n + 2));
    let slope = 0;
    for (let step = Infinity, round = 0; Math.abs(step) > 1e-15 && round < 20; round++) {
      let before = 1;
      let value = x;
      for (let m = 1; m < n; m++) [before, value] = [value, ((2 * m + 1) * x * value - m * before) / (m + 1)];
      slope = (n * (before - x * value)) / (1 - x * x);
      step = value / slope;
      x -= step;
    }
    if (2 * i + 1 === n) x = 0;
    const weight = 2 / ((1 - x * x) * slope * slope);
    nodes[i] = -x;
    nodes[n - 1 - i] = x;
    weights[i] = weights[n - 1 - i] = weight;
  }
  return { nodes, weights };
}
