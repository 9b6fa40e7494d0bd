import type { Complex } from '../algebra/expression';
import type { Kinematics } from '../model/kinematics';
import type { CountertermSpec, Monomial } from '../model/spec';
import type { Vertex } from '../model/vertex';

/** A counterterm of the model with its form lowered. */
export interface Counterterm {
  readonly spec: CountertermSpec;
  readonly vertex: Vertex;
}

/** An energy with the external momentum at which an amplitude is looked at: on shell, or (kappa) below threshold at the same momentum. */
export interface SubtractionPoint {
  readonly E: number;
  readonly momentum: number;
  readonly onShell: boolean;
}

/** Counterterms that are set together: Σ_point weights[row][point] * (block amplitude) = 0 for each row. */
export interface SubtractionGroup {
  readonly counterterms: readonly Counterterm[];
  readonly points: readonly SubtractionPoint[];
  readonly weights: readonly (readonly number[])[];
  readonly block: Block;
}

/** Parity of the outgoing and of the incoming state in dimension 1 (full); `whole` elsewhere. */
export type Block = 'whole' | 'even-even' | 'odd-odd' | 'odd-even' | 'even-odd';

/** Spacing of the stencil in p² for derivatives, relative to X². */
const SPACING = 0.04;

/** Those of `all` that cancel this monomial by a condition at p or kappa, grouped by place and block. */
export function subtractionGroups(all: readonly Counterterm[], monomial: Monomial, kinematics: Kinematics): SubtractionGroup[] {
  const groups = new Map<string, Counterterm[]>();
  for (const counterterm of all) {
    const { scheme, cancels } = counterterm.spec;
    if (scheme.kind === 'minimal' || !cancels.some(m => m.join() === monomial.join())) continue;
    const key = `${scheme.kind}/${scheme.at}/${blockOf(counterterm.vertex, scheme.at, kinematics)}`;
    groups.set(key, [...(groups.get(key) ?? []), counterterm]);
  }
  return [...groups.values()].map(counterterms => {
    const { scheme } = counterterms[0].spec;
    const { nodes, weights } = derivativeStencil(counterterms.length);
    const points = nodes.map(s => {
      const momentum = scheme.at * Math.sqrt(1 + SPACING * s);
      const above = kinematics.energy(momentum);
      return { momentum, onShell: scheme.kind === 'p', E: scheme.kind === 'p' ? above : 2 * kinematics.energy(0) - above };
    });
    return { counterterms, points, weights, block: blockOf(counterterms[0].vertex, scheme.at, kinematics) };
  });
}

/** Nodes (in units of the spacing) and weights of the derivatives 0 … count - 1 of a function of p² at X². */
export function derivativeStencil(count: number): { nodes: number[]; weights: number[][] } {
  if (count === 1) return { nodes: [0], weights: [[1]] };
  const reach = Math.max(2, Math.ceil(count / 2) + 1);
  const nodes = Array.from({ length: 2 * reach + 1 }, (_, j) => j - reach);
  // Derivative d of the interpolating polynomial: d! times the coefficient of s^d of each Lagrange polynomial.
  const lagrange = nodes.map(s => {
    let polynomial = [1];
    for (const t of nodes) {
      if (t === s) continue;
      const next = new Array<number>(polynomial.length + 1).fill(0);
      polynomial.forEach((c, m) => {
        next[m + 1] += c / (s - t);
        next[m] -= (c * t) / (s - t);
      });
      polynomial = next;
    }
    return polynomial;
  });
  let factorial = 1;
  return { nodes, weights: Array.from({ length: count }, (_, d) => ((factorial *= Math.max(1, d)), lagrange.map(l => factorial * l[d]))) };
}

/** External momenta that a block needs: both signs in dimension 1 (full). */
export const externalsAt = (kinematics: Kinematics, momentum: number): number[] => (kinematics.signed ? [-momentum, momentum] : [momentum]);

/** The block of a matrix of amplitudes given as V(row sign, column sign). */
export function blockAmplitude(block: Block, at: (row: 1 | -1, column: 1 | -1) => Complex): Complex {
  if (block === 'whole') return at(1, 1);
  const [out, into] = block.split('-').map(parity => (parity === 'even' ? 1 : -1));
  const sum = { re: 0, im: 0 };
  for (const row of [1, -1] as const) {
    for (const column of [1, -1] as const) {
      const weight = (row < 0 ? out : 1) * (column < 0 ? into : 1) * 0.25;
      const value = at(row, column);
      sum.re += weight * value.re;
      sum.im += weight * value.im;
    }
  }
  return sum;
}

/** The block that a form belongs to: the one in which it is largest at the subtraction momentum. */
export function blockOf(vertex: Vertex, momentum: number, kinematics: Kinematics): Block {
  if (!kinematics.signed) return 'whole';
  const E = kinematics.energy(momentum);
  const blocks: Block[] = ['even-even', 'odd-odd', 'odd-even', 'even-odd'];
  const sizes = blocks.map(block => {
    const v = blockAmplitude(block, (row, column) => vertexValue(vertex, row * momentum, column * momentum, E));
    return Math.hypot(v.re, v.im);
  });
  return blocks[sizes.indexOf(Math.max(...sizes))];
}

export function vertexValue(vertex: Vertex, p: number, k: number, E: number): Complex {
  const re = new Float64Array(1);
  const im = new Float64Array(1);
  vertex.element.fill(Float64Array.of(p), Float64Array.of(k), E, re, im);
  return { re: re[0], im: im[0] };
}

/** The numbers A[row][j]: what counterterm j contributes to condition row per unit strength. */
export function conditionMatrix(group: SubtractionGroup): Complex[][] {
  return group.weights.map(weights =>
    group.counterterms.map(({ vertex }) => {
      const sum = { re: 0, im: 0 };
      group.points.forEach((point, at) => {
        const v = blockAmplitude(group.block, (row, column) => vertexValue(vertex, row * point.momentum, column * point.momentum, point.E));
        sum.re += weights[at] * v.re;
        sum.im += weights[at] * v.im;
      });
      return sum;
    }),
  );
}
