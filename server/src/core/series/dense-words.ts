import type { Complex } from '../algebra/expression';
import { applyKernel } from '../linear/apply';
import { kernelColumn, kernelOnGrid, kernelRows, type KernelOnGrid } from '../model/kernel-on-grid';
import type { MomentumGrid } from '../model/momentum-grid';
import type { Vertex } from '../model/vertex';
import type { LoopWeights } from './loop-weights';

/** A function of momentum at the points of a problem (nodes, then external momenta); im null where it is real. */
export interface Column {
  readonly re: Float64Array;
  readonly im: Float64Array | null;
}

/** The kernels between nodes, shared by every problem (and every run) on one grid. */
export class GridKernels {
  private readonly known = new Map<Vertex, Map<number, KernelOnGrid>>();
  private readonly knownRows = new Map<Vertex, Map<string, Column>>();

  constructor(readonly grid: MomentumGrid) {}

  of(vertex: Vertex, E: number): KernelOnGrid {
    const at = vertex.dependsOnEnergy ? E : 0;
    const byEnergy = this.known.get(vertex) ?? new Map<number, KernelOnGrid>();
    this.known.set(vertex, byEnergy);
    const kernel = byEnergy.get(at) ?? kernelOnGrid(vertex.element, this.grid, vertex.ridge, E);
    byEnergy.set(at, kernel);
    return kernel;
  }

  /** V(p, k_j) for one external momentum, as it acts on values at the nodes. */
  row(vertex: Vertex, p: number, E: number): Column {
    const key = `${p}/${vertex.dependsOnEnergy ? E : 0}`;
    const rows = this.knownRows.get(vertex) ?? new Map<string, Column>();
    this.knownRows.set(vertex, rows);
    let row = rows.get(key);
    if (!row) {
      const { re, im } = kernelRows(vertex.element, this.grid, Float64Array.of(p), vertex.ridge, E);
      rows.set(key, (row = { re, im: vertex.element.real ? null : im }));
    }
    return row;
  }
}

/** Applies kernels that are no contacts to functions of momentum: (V G f)(k) at the points of each problem. */
export class DenseOperator {
  private readonly edges: Map<Vertex, Edge>[];

  constructor(
    private readonly kernels: GridKernels,
    private readonly problems: readonly LoopWeights[],
  ) {
    this.edges = problems.map(() => new Map<Vertex, Edge>());
  }

  /** V(·, k) at the points of a problem. */
  column(vertex: Vertex, at: number, k: number): Column {
    const problem = this.problems[at];
    const values = kernelColumn(vertex.element, problem.points, k, problem.E.re);
    return { re: values.re, im: vertex.element.real ? null : values.im };
  }

  /** V G f for a list of functions per problem: [problem][function]; at the external momenta alone where `everywhere` is false. */
  apply(vertex: Vertex, functions: readonly (readonly Column[])[], everywhere: boolean): Column[][] {
    const complex = !vertex.element.real || this.problems.some(p => p.E.im !== 0) || functions.some(list => list.some(f => f.im));
    const inputs = functions.map((list, at) => list.map(f => this.timesPropagator(f, at, complex)));
    const outputs = functions.map((list, at) =>
      list.map((): Column => ({
        re: new Float64Array(this.problems[at].points.length),
        im: complex ? new Float64Array(this.problems[at].points.length) : null,
      })),
    );
    if (everywhere) this.applyBetweenNodes(vertex, inputs, outputs);
    this.problems.forEach((problem, at) => this.addEdges(vertex, problem, at, inputs[at], outputs[at]));
    return outputs;
  }

  private applyBetweenNodes(vertex: Vertex, inputs: readonly Column[][], outputs: readonly Column[][]): void {
    const groups = new Map<KernelOnGrid, number[]>();
    this.problems.forEach((p, at) => {
      const kernel = this.kernels.of(vertex, p.E.re);
      groups.set(kernel, [...(groups.get(kernel) ?? []), at]);
    });
    for (const [kernel, members] of groups)
      applyKernel(
        kernel,
        members.flatMap(at => inputs[at]),
        members.flatMap(at => outputs[at]),
      );
  }

  private timesPropagator(f: Column, at: number, complex: boolean): Column {
    const { g } = this.problems[at];
    const n = g.re.length;
    const re = new Float64Array(n);
    if (!complex) {
      for (let j = 0; j < n; j++) re[j] = g.re[j] * f.re[j];
      return { re, im: null };
    }
    const im = new Float64Array(n);
    for (let j = 0; j < n; j++) {
      const y = f.im ? f.im[j] : 0;
      re[j] = g.re[j] * f.re[j] - g.im[j] * y;
      im[j] = g.re[j] * y + g.im[j] * f.re[j];
    }
    return { re, im };
  }

  /** The rows of the external momenta and the columns of the on-shell ones. */
  private addEdges(vertex: Vertex, problem: LoopWeights, at: number, inputs: readonly Column[], outputs: readonly Column[]): void {
    const nodes = this.kernels.grid.nodes.length;
    const edge = this.edgeOf(vertex, at);
    inputs.forEach((x, c) => {
      const y = outputs[c];
      edge.rows.forEach((row, r) => addDot(row, x, nodes, y, nodes + r));
      for (let s = nodes; s < problem.g.re.length; s++) addMultiple(edge.columns[s - nodes], { re: x.re[s], im: x.im ? x.im[s] : 0 }, y);
    });
  }

  private edgeOf(vertex: Vertex, at: number): Edge {
    const known = this.edges[at].get(vertex);
    if (known) return known;
    const problem = this.problems[at];
    const onShell = problem.externals.slice(0, problem.g.re.length - this.kernels.grid.nodes.length);
    const edge = {
      rows: problem.externals.map(p => this.kernels.row(vertex, p, problem.E.re)),
      columns: onShell.map(k => this.column(vertex, at, k)),
    };
    this.edges[at].set(vertex, edge);
    return edge;
  }
}

interface Edge {
  readonly rows: readonly Column[];
  readonly columns: readonly Column[];
}

function addDot(row: Column, x: Column, n: number, y: Column, at: number): void {
  let re = 0;
  let im = 0;
  for (let j = 0; j < n; j++) re += row.re[j] * x.re[j];
  if (x.im) for (let j = 0; j < n; j++) im += row.re[j] * x.im[j];
  if (row.im && x.im) for (let j = 0; j < n; j++) re -= row.im[j] * x.im[j];
  if (row.im) for (let j = 0; j < n; j++) im += row.im[j] * x.re[j];
  y.re[at] += re;
  if (y.im) y.im[at] += im;
}

/** y += s x. */
export function addMultiple(x: Column, s: Complex, y: Column): void {
  for (let j = 0; j < y.re.length; j++) y.re[j] += s.re * x.re[j] - (x.im ? s.im * x.im[j] : 0);
  if (y.im) for (let j = 0; j < y.re.length; j++) y.im[j] += s.im * x.re[j] + (x.im ? s.re * x.im[j] : 0);
}
