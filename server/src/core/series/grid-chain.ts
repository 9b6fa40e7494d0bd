import type { Complex } from '../algebra/expression';
import { kernelColumn, kernelOnGrid, kernelRows, type KernelOnGrid } from '../model/kernel-on-grid';
import type { MomentumGrid } from '../model/momentum-grid';
import type { Vertex } from '../model/vertex';
import { applyKernel } from '../linear/apply';
import { isProperPart, difference, type MonomialList } from './monomials';
import type { LoopWeights } from './loop-weights';

/** A vertex times a number. */
export interface ScaledVertex {
  readonly vertex: Vertex;
  readonly strength: Complex;
}

/** Values at [column][point]; points are the nodes, then the external momenta of the problem. */
interface Columns {
  readonly re: Float64Array[];
  readonly im: Float64Array[];
}

/** R_ν of one problem: R(k) = Σ_a u_a k^a + d(k) for each external momentum on the right (column). */
interface Amplitude {
  readonly u: Columns;
  /** What is no polynomial; null where there is nothing. */
  readonly d: Columns | null;
  /** Σ_j g_j k_j^b R(k_j) over the loop. */
  readonly moments: Columns;
}

/** The kernels between nodes, shared by every problem (and every run) on one grid. */
export class GridKernels {
  private readonly known = new Map<Vertex, Map<number, KernelOnGrid>>();

  constructor(readonly grid: MomentumGrid) {}

  of(vertex: Vertex, E: number): KernelOnGrid {
    const at = vertex.dependsOnEnergy ? E : 0;
    const byEnergy = this.known.get(vertex) ?? new Map<number, KernelOnGrid>();
    this.known.set(vertex, byEnergy);
    const kernel = byEnergy.get(at) ?? kernelOnGrid(vertex.element, this.grid, vertex.ridge, E);
    byEnergy.set(at, kernel);
    return kernel;
  }
}

/**
 * The order-by-order recursion R_ν = W_ν + Σ_{0<α<ν} W_α G R_{ν-α} on a momentum grid, for several energies (problems) at once.
 * Contacts act through the moments ∫ G k^b R, everything else through its matrix, so the cost grows with the number of monomials.
 * Call `step(n)` for n = 0, 1, …; before the next step a counterterm may be added to R_n.
 */
export class GridChain {
  private readonly results: Amplitude[][] = [];
  private readonly counterterms: { n: number; parts: readonly ScaledVertex[] }[] = [];
  private readonly powers: Float64Array[][];
  private readonly fixed = new Map<string, Columns>();

  /** `size`: powers 0..size-1 of a momentum occur in contacts. */
  constructor(
    private readonly list: MonomialList,
    private readonly vertices: readonly Vertex[],
    private readonly kernels: GridKernels,
    private readonly problems: readonly LoopWeights[],
    private readonly size: number,
  ) {
    this.powers = problems.map(problem => {
      const rows = [new Float64Array(problem.points.length).fill(1)];
      for (let a = 1; a < 2 * size; a++) rows.push(rows[a - 1].map((v, j) => v * problem.points[j]));
      return rows;
    });
  }

  step(n: number): void {
    const { exponents, factors } = this.list.terms[n];
    const links: { parts: readonly ScaledVertex[]; rest: number }[] = [];
    if (factors > 1) {
      exponents.forEach((m, i) => m > 0 && links.push({ parts: [{ vertex: this.vertices[i], strength: ONE }], rest: this.list.without[n][i] }));
    }
    for (const z of this.counterterms) {
      const inner = this.list.terms[z.n].exponents;
      if (isProperPart(inner, exponents)) links.push({ parts: z.parts, rest: this.list.indexOf(difference(exponents, inner)) });
    }
    const single = factors === 1 ? this.vertices[exponents.findIndex(m => m > 0)] : null;
    const dense = this.denseParts(links);
    this.results[n] = this.problems.map((problem, at) => {
      const u = emptyColumns(problem.externals.length, this.size);
      const d = dense[at];
      if (single) this.addVertex(single, ONE, at, u, d);
      for (const link of links) {
        const moments = this.results[link.rest][at].moments;
        for (const { vertex, strength } of link.parts) if (vertex.contact) addContact(vertex.contact, strength, problem.E, moments, u);
      }
      return this.finish(at, u, d.used ? d : null);
    });
  }

  /** Adds Σ strength * vertex to R_n and to every later monomial that holds it. */
  addCounterterm(n: number, parts: readonly ScaledVertex[]): void {
    this.counterterms.push({ n, parts });
    this.results[n] = this.results[n].map((amplitude, at) => {
      const problem = this.problems[at];
      const d: Dense = { ...emptyColumns(problem.externals.length, problem.points.length), used: amplitude.d !== null };
      if (amplitude.d) for (let c = 0; c < d.re.length; c++) (d.re[c].set(amplitude.d.re[c]), d.im[c].set(amplitude.d.im[c]));
      for (const { vertex, strength } of parts) this.addVertex(vertex, strength, at, amplitude.u, d);
      return this.finish(at, amplitude.u, d.used ? d : null);
    });
  }

  /** R_n(external row, external column) of a problem. */
  amplitude(n: number, at: number, row: number, column: number): Complex {
    const { u, d } = this.results[n][at];
    const point = this.kernels.grid.nodes.length + row;
    let re = d ? d.re[column][point] : 0;
    let im = d ? d.im[column][point] : 0;
    for (let a = 0; a < this.size; a++) {
      re += u.re[column][a] * this.powers[at][a][point];
      im += u.im[column][a] * this.powers[at][a][point];
    }
    return { re, im };
  }

  private finish(at: number, u: Columns, d: Columns | null): Amplitude {
    const { size, problems, powers } = this;
    const { g, loopMoments } = problems[at];
    const moments = emptyColumns(u.re.length, size);
    const loop = g.re.length;
    for (let c = 0; c < u.re.length; c++) {
      for (let b = 0; b < size; b++) {
        let re = 0;
        let im = 0;
        for (let a = 0; a < size; a++) {
          re += loopMoments.re[a + b] * u.re[c][a] - loopMoments.im[a + b] * u.im[c][a];
          im += loopMoments.re[a + b] * u.im[c][a] + loopMoments.im[a + b] * u.re[c][a];
        }
        if (d) {
          const k = powers[at][b];
          for (let j = 0; j < loop; j++) re += k[j] * (g.re[j] * d.re[c][j] - g.im[j] * d.im[c][j]);
          for (let j = 0; j < loop; j++) im += k[j] * (g.re[j] * d.im[c][j] + g.im[j] * d.re[c][j]);
        }
        moments.re[c][b] = re;
        moments.im[c][b] = im;
      }
    }
    return { u, d, moments };
  }

  /** Adds strength * V(·, k) for each external k. */
  private addVertex(vertex: Vertex, strength: Complex, at: number, u: Columns, d: Dense): void {
    const problem = this.problems[at];
    problem.externals.forEach((k, c) => {
      if (vertex.contact) {
        const moments = emptyColumns(1, this.size);
        for (let b = 0; b < this.size; b++) moments.re[0][b] = k ** b;
        addContact(vertex.contact, strength, problem.E, moments, { re: [u.re[c]], im: [u.im[c]] });
        return;
      }
      const key = `${vertex.name}/${at}/${c}`;
      let column = this.fixed.get(key);
      if (!column) {
        const values = kernelColumn(vertex.element, problem.points, k, problem.E.re);
        this.fixed.set(key, (column = { re: [values.re], im: [values.im] }));
      }
      addScaled(column.re[0], column.im[0], strength, d.re[c], d.im[c]);
      d.used = true;
    });
  }

  /** Σ over the links of what the kernels that are no contacts contribute, one set of columns per problem. */
  private denseParts(links: readonly { parts: readonly ScaledVertex[]; rest: number }[]): Dense[] {
    const total: Dense[] = this.problems.map(p => ({ ...emptyColumns(p.externals.length, p.points.length), used: false }));
    for (const link of links) {
      for (const { vertex, strength } of link.parts) {
        if (vertex.contact) continue;
        this.applyDense(vertex, link.rest).forEach((columns, at) => {
          total[at].used = true;
          columns.re.forEach((re, c) => addScaled(re, columns.im[c], strength, total[at].re[c], total[at].im[c]));
        });
      }
    }
    return total;
  }

  /** V G R_rest at all points of each problem. */
  private applyDense(vertex: Vertex, rest: number): Columns[] {
    const nodes = this.kernels.grid.nodes.length;
    const inputs = this.problems.map((_, at) => this.loopInput(rest, at));
    const outputs = this.problems.map(p => emptyColumns(p.externals.length, p.points.length));
    const groups = new Map<KernelOnGrid, number[]>();
    this.problems.forEach((p, at) => {
      const kernel = this.kernels.of(vertex, p.E.re);
      groups.set(kernel, [...(groups.get(kernel) ?? []), at]);
    });
    for (const [kernel, members] of groups) {
      applyKernel(kernel, members.flatMap(at => inputs[at].re), members.flatMap(at => inputs[at].im), members.flatMap(at => outputs[at].re), members.flatMap(at => outputs[at].im));
    }
    this.problems.forEach((problem, at) => {
      const edge = this.edgeOf(vertex, at);
      const rows = problem.externals.length;
      for (let c = 0; c < rows; c++) {
        const [x, y] = [inputs[at].re[c], inputs[at].im[c]];
        const [re, im] = [outputs[at].re[c], outputs[at].im[c]];
        for (let r = 0; r < rows; r++) {
          for (let j = 0; j < nodes; j++) {
            re[nodes + r] += edge.re[0][r * nodes + j] * x[j] - edge.im[0][r * nodes + j] * y[j];
            im[nodes + r] += edge.re[0][r * nodes + j] * y[j] + edge.im[0][r * nodes + j] * x[j];
          }
        }
        for (let s = nodes; s < problem.g.re.length; s++) {
          const column = edge.re[1 + s - nodes];
          const imaginary = edge.im[1 + s - nodes];
          for (let j = 0; j < re.length; j++) {
            re[j] += column[j] * x[s] - imaginary[j] * y[s];
            im[j] += column[j] * y[s] + imaginary[j] * x[s];
          }
        }
      }
    });
    return outputs;
  }

  /** G R at the loop points. */
  private loopInput(rest: number, at: number): Columns {
    const { g } = this.problems[at];
    const { u, d } = this.results[rest][at];
    const input = emptyColumns(u.re.length, g.re.length);
    for (let c = 0; c < u.re.length; c++) {
      for (let j = 0; j < g.re.length; j++) {
        let re = d ? d.re[c][j] : 0;
        let im = d ? d.im[c][j] : 0;
        for (let a = 0; a < this.size; a++) {
          re += u.re[c][a] * this.powers[at][a][j];
          im += u.im[c][a] * this.powers[at][a][j];
        }
        input.re[c][j] = g.re[j] * re - g.im[j] * im;
        input.im[c][j] = g.re[j] * im + g.im[j] * re;
      }
    }
    return input;
  }

  /** [0]: rows from the nodes to the external momenta; [1…]: columns from each on-shell momentum to all points. */
  private edgeOf(vertex: Vertex, at: number): Columns {
    const key = `${vertex.name}/${at}`;
    const known = this.fixed.get(key);
    if (known) return known;
    const problem = this.problems[at];
    const rows = kernelRows(vertex.element, this.kernels.grid, Float64Array.from(problem.externals), vertex.ridge, problem.E.re);
    const onShell = problem.externals.slice(0, problem.g.re.length - this.kernels.grid.nodes.length);
    const columns = onShell.map(k => kernelColumn(vertex.element, problem.points, k, problem.E.re));
    const edge = { re: [rows.re, ...columns.map(c => c.re)], im: [rows.im, ...columns.map(c => c.im)] };
    this.fixed.set(key, edge);
    return edge;
  }
}

interface Dense extends Columns {
  used: boolean;
}

const ONE: Complex = { re: 1, im: 0 };

function emptyColumns(columns: number, length: number): Columns {
  return { re: Array.from({ length: columns }, () => new Float64Array(length)), im: Array.from({ length: columns }, () => new Float64Array(length)) };
}

function addScaled(re: Float64Array, im: Float64Array, s: Complex, intoRe: Float64Array, intoIm: Float64Array): void {
  for (let j = 0; j < intoRe.length; j++) {
    intoRe[j] += s.re * re[j] - s.im * im[j];
    intoIm[j] += s.re * im[j] + s.im * re[j];
  }
}

/** u_a += strength Σ_b c_ab E^e moment_b. */
function addContact(terms: NonNullable<Vertex['contact']>, strength: Complex, E: Complex, moments: Columns, u: Columns): void {
  for (const t of terms) {
    let c: Complex = { re: strength.re * t.re - strength.im * t.im, im: strength.re * t.im + strength.im * t.re };
    for (let j = 0; j < t.e; j++) c = { re: c.re * E.re - c.im * E.im, im: c.re * E.im + c.im * E.re };
    for (let column = 0; column < u.re.length; column++) {
      const re = moments.re[column][t.b];
      const im = moments.im[column][t.b];
      u.re[column][t.a] += c.re * re - c.im * im;
      u.im[column][t.a] += c.re * im + c.im * re;
    }
  }
}
