import { compile } from '../algebra/compile';
import { symbolsOf } from '../algebra/expression';
import type { Expr } from '../algebra/expression';
import { specialFunctions } from '../special';
import type { Range } from './transform-range';

/** Places r > 0 in or at the ends of the range where the argument of a step or a modulus changes sign: the potential may jump or bend there. */
export function findEdges(expr: Expr, variable: string, { from, to }: Range): readonly number[] {
  // A little wider than the range, whose ends may be edges themselves.
  const grid = Float64Array.from({ length: 4000 }, (_, j) => 0.7 * from * ((2 * to) / from) ** (j / 3999));
  const edges = new Set<number>();
  for (const argument of switches(expr)) {
    if (!symbolsOf(argument).has(variable)) continue;
    const compiled = compile(argument, specialFunctions);
    const evaluate = (r: Float64Array) => {
      const re = new Float64Array(r.length);
      compiled({ [variable]: r }, re, new Float64Array(r.length));
      return re;
    };
    const values = evaluate(grid);
    for (let j = 1; j < grid.length; j++) {
      if (values[j - 1] === 0 || values[j] * values[j - 1] >= 0) {
        if (values[j] === 0) edges.add(grid[j]);
        continue;
      }
      let [low, high] = [grid[j - 1], grid[j]];
      for (let n = 0; n < 60; n++) {
        const middle = (low + high) / 2;
        if (evaluate(Float64Array.of(middle))[0] * values[j - 1] > 0) low = middle;
        else high = middle;
      }
      // An edge written as a round number is met exactly.
      const round = Number(high.toPrecision(14));
      edges.add(evaluate(Float64Array.of(round))[0] === 0 ? round : high);
    }
  }
  return merge([...edges].sort((x, y) => x - y));
}

function merge(sorted: readonly number[]): readonly number[] {
  return sorted.filter((x, j) => j === 0 || x - sorted[j - 1] > 1e-12 * x);
}

function switches(expr: Expr, into: Expr[] = []): Expr[] {
  if (expr.kind === 'number' || expr.kind === 'symbol') return into;
  if (expr.kind === 'negate') return switches(expr.argument, into);
  if (expr.kind === 'call') {
    if (expr.name === 'step' || expr.name === 'abs') into.push(expr.arguments[0]);
    for (const argument of expr.arguments) switches(argument, into);
    return into;
  }
  return switches(expr.right, switches(expr.left, into));
}
