import type { Complex } from '../algebra/expression';
import { multiply, solveSmall } from '../linear/solve';
import { contactStates, stateAt, stateKey } from '../series/contact-states';
import type { Column } from '../series/dense-words';
import type { ScaledVertex } from '../series/grid-chain';
import type { LoopWeights } from '../series/loop-weights';

/** A potential Σ c_ab |a⟩⟨b| of contact states on the loop points of a problem. */
interface FiniteRank {
  readonly columns: readonly Column[];
  readonly c: readonly (readonly Complex[])[];
}

/** Null where a part is of no finite rank. */
function finiteRank(parts: readonly ScaledVertex[], problem: LoopWeights): FiniteRank | null {
  if (parts.some(({ vertex }) => !vertex.finiteRank)) return null;
  const states = [...new Map(contactStates(parts.map(p => p.vertex)).map(state => [stateKey(state), state])).values()];
  const places = new Map(states.map((state, at) => [stateKey(state), at]));
  const c = states.map(() => states.map((): Complex => ({ re: 0, im: 0 })));
  for (const { vertex, strength } of parts) {
    for (const t of vertex.finiteRank!) {
      const [a, b] = [t.a, t.b].map(power => places.get(stateKey({ power, phase: t.phase }))!);
      const value = multiply(strength, { re: t.re * problem.E.re ** t.e, im: t.im * problem.E.re ** t.e });
      c[a][b] = { re: c[a][b].re + value.re, im: c[a][b].im + value.im };
    }
  }
  return { columns: states.map(state => stateAt(state, problem.points)), c };
}

/** c J, J_ba = ⟨b|G|a⟩ with the propagator g. */
function loopMatrix({ columns, c }: FiniteRank, g: Float64Array, gIm: Float64Array | null): Complex[][] {
  const j = columns.map(left => columns.map(right => moment(left, right, g, gIm)));
  return c.map(row =>
    columns.map((_, b) =>
      dot(
        row,
        j.map(inner => inner[b]),
      ),
    ),
  );
}

/**
 * The standing-wave amplitude between the on-shell momenta, [row][column]: K = Σ |a⟩ M_ab ⟨b| with M = (1 - c J)^-1 c. Null where a part of the
 * potential is of no finite rank.
 */
export function finiteRankStandingWave(parts: readonly ScaledVertex[], problem: LoopWeights): Complex[][] | null {
  const potential = finiteRank(parts, problem);
  if (!potential) return null;
  const { columns, c } = potential;
  const oneMinus = loopMatrix(potential, problem.g.re, null).map((row, a) =>
    row.map((x, b) => ({ re: (a === b ? 1 : 0) - x.re, im: -x.im })),
  );
  const m = c.map((_, b) =>
    solveSmall(
      oneMinus,
      c.map(row => row[b]),
    ),
  );
  const nodes = problem.g.re.length - problem.density.length;
  const at = (column: Column, point: number): Complex => ({ re: column.re[nodes + point], im: column.im?.[nodes + point] ?? 0 });
  return problem.density.map((_, row) =>
    problem.density.map((__, column) => {
      const right = columns.map((___, a) =>
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

/** V G as a small matrix with the same eigenvalues but for zeros, G with its imaginary part on shell; null as above. */
export function finiteRankLoop(parts: readonly ScaledVertex[], problem: LoopWeights, gIm: Float64Array): Complex[][] | null {
  const potential = finiteRank(parts, problem);
  return potential && loopMatrix(potential, problem.g.re, gIm);
}

/** Σ_j g_j (left_j)* right_j over the loop points. */
function moment(left: Column, right: Column, g: Float64Array, gIm: Float64Array | null): Complex {
  let re = 0;
  let im = 0;
  for (let n = 0; n < g.length; n++) {
    const [a, b, x, y] = [left.re[n], left.im?.[n] ?? 0, right.re[n], right.im?.[n] ?? 0];
    const [u, v] = [a * x + b * y, a * y - b * x];
    const w = gIm ? gIm[n] : 0;
    re += g[n] * u - w * v;
    im += g[n] * v + w * u;
  }
  return { re, im };
}

const conjugate = ({ re, im }: Complex): Complex => ({ re, im: -im });
const dot = (x: readonly Complex[], y: readonly Complex[]): Complex =>
  x.reduce(
    (sum, v, n) => {
      const product = multiply(v, y[n]);
      return { re: sum.re + product.re, im: sum.im + product.im };
    },
    { re: 0, im: 0 },
  );
