import type { Complex } from '../algebra/expression';
import { multiply, solveSmall } from '../linear/solve';
import { contactStates, stateAt, stateKey } from '../series/contact-states';
import type { Column } from '../series/dense-words';
import type { ScaledVertex } from '../series/grid-chain';
import type { LoopWeights } from '../series/loop-weights';

/**
 * The standing-wave amplitude between the on-shell momenta for a potential Σ c_ab |a⟩⟨b| of contact states: K = Σ |a⟩ M_ab ⟨b| with
 * M = (1 - c J)^-1 c, J_ba = ⟨b|G|a⟩ on the grid of `problem`: [row][column]. Null where a part is of no finite rank.
 */
export function finiteRankStandingWave(parts: readonly ScaledVertex[], problem: LoopWeights): Complex[][] | null {
  if (parts.some(({ vertex }) => !vertex.finiteRank)) return null;
  const states = [...new Map(contactStates(parts.map(p => p.vertex)).map(state => [stateKey(state), state])).values()];
  const places = new Map(states.map((state, at) => [stateKey(state), at]));
  const columns = states.map(state => stateAt(state, problem.points));
  const c = states.map(() => states.map((): Complex => ({ re: 0, im: 0 })));
  for (const { vertex, strength } of parts) {
    for (const t of vertex.finiteRank!) {
      const [a, b] = [t.a, t.b].map(power => places.get(stateKey({ power, phase: t.phase }))!);
      const value = multiply(strength, { re: t.re * problem.E.re ** t.e, im: t.im * problem.E.re ** t.e });
      c[a][b] = { re: c[a][b].re + value.re, im: c[a][b].im + value.im };
    }
  }
  const j = columns.map(left => columns.map(right => moment(left, right, problem.g.re)));
  const oneMinus = c.map((row, a) =>
    j.map((_, b) =>
      minus(
        a === b ? 1 : 0,
        dot(
          row,
          j.map(inner => inner[b]),
        ),
      ),
    ),
  );
  const m = c[0].map((_, b) =>
    solveSmall(
      oneMinus,
      c.map(row => row[b]),
    ),
  );
  const nodes = problem.g.re.length - problem.density.length;
  const at = (column: Column, point: number): Complex => ({ re: column.re[nodes + point], im: column.im?.[nodes + point] ?? 0 });
  return problem.density.map((_, row) =>
    problem.density.map((__, column) => {
      const right = states.map((___, a) =>
        dot(
          m.map(solved => solved?.[a] ?? { re: NaN, im: NaN }),
          columns.map(s => conjugate(at(s, column))),
        ),
      );
      return dot(
        columns.map(s => at(s, row)),
        right,
      );
    }),
  );
}

/** Σ_j g_j (left_j)* right_j over the loop points. */
function moment(left: Column, right: Column, g: Float64Array): Complex {
  let re = 0;
  let im = 0;
  for (let n = 0; n < g.length; n++) {
    const [a, b, x, y] = [left.re[n], left.im?.[n] ?? 0, right.re[n], right.im?.[n] ?? 0];
    re += g[n] * (a * x + b * y);
    im += g[n] * (a * y - b * x);
  }
  return { re, im };
}

const conjugate = ({ re, im }: Complex): Complex => ({ re, im: -im });
const minus = (diagonal: number, x: Complex): Complex => ({ re: diagonal - x.re, im: -x.im });
const dot = (x: readonly Complex[], y: readonly Complex[]): Complex =>
  x.reduce(
    (sum, v, n) => {
      const product = multiply(v, y[n]);
      return { re: sum.re + product.re, im: sum.im + product.im };
    },
    { re: 0, im: 0 },
  );
