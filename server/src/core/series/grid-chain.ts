import type { Complex } from '../algebra/expression';
import type { Monomial } from '../model/spec';
import type { RankTerm, Vertex } from '../model/vertex';
import { contactStates, endOn, stateAt, stateKey, type ContactState } from './contact-states';
import { addMultiple, DenseOperator, type Column, type GridKernels } from './dense-words';
import type { LoopWeights } from './loop-weights';
import { difference, type MonomialList } from './monomials';

/** A vertex times a number. */
export interface ScaledVertex {
  readonly vertex: Vertex;
  readonly strength: Complex;
}

/** A vertex with the part of a monomial that it stands for: one factor for an interaction, all of it for a counterterm. */
interface Placed<V> {
  readonly content: Monomial;
  readonly part: V;
}

interface Contact {
  readonly terms: readonly RankTerm[];
  readonly strength: Complex;
}

/** Complex numbers side by side. */
interface Numbers {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/** One problem's share of one monomial. `basis` are the contact states. */
interface Share {
  /** Σ over orderings of kernels that are no contacts, (V G)(V G)… applied to each contact state; null where there is none. */
  readonly dressed: readonly Column[] | null;
  /** The same ending in V(·, external k): [external]; null where there is none. */
  readonly ending: readonly Column[] | null;
  /** Moments ∫ (state b)* G (state a dressed): [a * basis + b]. */
  readonly dressedMoments: Numbers | null;
  /** What stands behind the leftmost contact: coefficient of each state, [column * basis + state]. */
  readonly u: Numbers;
  /** ∫ (state b)* G R: [column * basis + b]. */
  readonly moments: Numbers;
}

/**
 * The order-by-order recursion R_ν = W_ν + Σ_{0<α<ν} W_α G R_{ν-α} on a momentum grid, for several energies (problems) at once.
 * Contacts are of finite rank, so a chain falls into runs of other kernels between them: only those act on functions of momentum, each run
 * once; everything else is small matrices of loop moments. Call `step(n)` for n = 0, 1, …; before the next step a counterterm may be added.
 * `more`: contact states that counterterms bring in.
 */
export class GridChain {
  private readonly shares: Share[][] = [];
  private readonly operator: DenseOperator;
  private readonly contacts: Placed<Contact>[] = [];
  private readonly dense: Placed<ScaledVertex>[] = [];
  private readonly basis: readonly ContactState[];
  /** The contact states without a phase. */
  private readonly central: readonly number[];
  private readonly places: ReadonlyMap<string, number>;
  /** Moments ∫ (state b)* G (state a) of each problem: [a * basis + b]. */
  private readonly loops: readonly Numbers[];
  private readonly nodes: number;
  /** The contact states at the points: [problem][state]. */
  private readonly states: Column[][];

  constructor(
    private readonly list: MonomialList,
    vertices: readonly Vertex[],
    kernels: GridKernels,
    private readonly problems: readonly LoopWeights[],
    more: readonly ContactState[] = [],
  ) {
    this.nodes = kernels.grid.nodes.length;
    this.operator = new DenseOperator(kernels, problems);
    this.basis = [...new Map([...contactStates(vertices), ...more].map(state => [stateKey(state), state])).values()].sort(
      (x, y) => x.phase - y.phase || x.power - y.power,
    );
    this.central = this.basis.flatMap(({ phase }, j) => (phase === 0 ? [j] : []));
    this.places = new Map(this.basis.map((state, at) => [stateKey(state), at]));
    this.states = problems.map(p => this.basis.map(state => stateAt(state, p.points)));
    this.loops = problems.map((_, at) => this.momentsBetween(at));
    vertices.forEach((vertex, i) =>
      this.place(
        vertices.map((_, j) => (i === j ? 1 : 0)),
        vertex,
        { re: 1, im: 0 },
      ),
    );
  }

  step(n: number): void {
    const { exponents } = this.list.terms[n];
    const runs = this.dense.filter(d => isPart(d.content, exponents)).map(d => ({ ...d.part, rest: this.rest(exponents, d.content) }));
    const goesOn = this.list.continues[n];
    const none = this.problems.map((): Column[] => []);
    const rests = (key: 'dressed' | 'ending') => (rest: number) => this.problems.map((_, at) => this.shares[rest][at][key] ?? []);
    // What no longer term contains is wanted at the external momenta only.
    const dressed = goesOn ? this.sumOfRuns(runs, rest => (rest < 0 ? this.states : rests('dressed')(rest)), null, true) : none;
    const ending = this.sumOfRuns(runs, rest => (rest < 0 ? null : rests('ending')(rest)), this.problems, goesOn);
    this.shares[n] = this.problems.map((problem, at) => {
      const u = zeros(problem.columns.length * this.basis.length);
      for (const { content, part } of this.contacts)
        if (isPart(content, exponents)) this.addContact(part, at, this.rest(exponents, content), u);
      return this.finish(n, at, emptyToNull(dressed[at]), emptyToNull(ending[at]), u);
    });
  }

  /** Adds Σ strength * vertex to R_n and to every later monomial that holds it. `more` must have named the states of its contacts. */
  addCounterterm(n: number, parts: readonly ScaledVertex[]): void {
    const { exponents } = this.list.terms[n];
    for (const { vertex, strength } of parts) this.place(exponents, vertex, strength);
    const newRuns = parts.filter(p => !p.vertex.finiteRank).map(p => ({ ...p, rest: -1 }));
    const goesOn = this.list.continues[n];
    const dressed = goesOn ? this.sumOfRuns(newRuns, () => this.states, null, true) : this.problems.map((): Column[] => []);
    const ending = this.sumOfRuns(newRuns, () => null, this.problems, goesOn);
    this.shares[n] = this.shares[n].map((share, at) => {
      const u = { re: share.u.re.slice(), im: share.u.im.slice() };
      for (const { vertex, strength } of parts) if (vertex.finiteRank) this.addContact({ terms: vertex.finiteRank, strength }, at, -1, u);
      return this.finish(n, at, joined(share.dressed, dressed[at]), joined(share.ending, ending[at]), u);
    });
  }

  /** R_n(external row, column) of a problem. */
  amplitude(n: number, at: number, row: number, column: number): Complex {
    const sum = this.dressedAmplitude(n, at, row, column);
    this.contactEnd(n, at, column).forEach((c, j) => {
      const state = this.states[at][this.central[j]].re[this.nodes + row];
      sum.re += state * c.re;
      sum.im += state * c.im;
    });
    return sum;
  }

  /** The powers that contacts at the origin leave of the external momenta. */
  get powers(): readonly number[] {
    return this.central.map(j => this.basis[j].power);
  }

  /** The powers that have columns of their own, after those of the external momenta. */
  get endPowers(): readonly number[] {
    return this.problems[0].columns.flatMap(c => (c.kind === 'power' ? [c.n] : []));
  }

  /** Chains with a contact at the origin on the left: coefficients of p^power, in the order of `powers`. */
  contactEnd(n: number, at: number, column: number): Complex[] {
    const { u } = this.shares[n][at];
    return this.central.map(a => ({ re: u.re[column * this.basis.length + a], im: u.im[column * this.basis.length + a] }));
  }

  /** Chains with anything else on the left, at an external row. */
  dressedAmplitude(n: number, at: number, row: number, column: number): { re: number; im: number } {
    const point = this.nodes + row;
    const size = this.basis.length;
    const end = this.shares[n][at].ending?.[column];
    const sum = { re: end?.re[point] ?? 0, im: end?.im?.[point] ?? 0 };
    const add = (f: Column, v: Numbers, a: number) => {
      const [x, y] = [f.re[point], f.im?.[point] ?? 0];
      const s = column * size + a;
      sum.re += x * v.re[s] - y * v.im[s];
      sum.im += x * v.im[s] + y * v.re[s];
    };
    for (let a = 0; a < size; a++) if (this.basis[a].phase !== 0) add(this.states[at][a], this.shares[n][at].u, a);
    this.forEachDressing(n, at, (share, behind) => share.dressed!.forEach((f, a) => add(f, behind.u, a)));
    return sum;
  }

  private place(content: Monomial, vertex: Vertex, strength: Complex): void {
    if (vertex.finiteRank) this.contacts.push({ content, part: { terms: vertex.finiteRank, strength } });
    else this.dense.push({ content, part: { vertex, strength } });
  }

  /** Index of what is left of a monomial; -1 where nothing is. */
  private rest(exponents: Monomial, content: Monomial): number {
    return this.list.indexOf(difference(exponents, content));
  }

  /** Σ strength V G (functions of the rest), plus strength V(·, k) where the run ends on an external momentum. */
  private sumOfRuns(
    runs: readonly (ScaledVertex & { rest: number })[],
    functionsOf: (rest: number) => readonly (readonly Column[])[] | null,
    ends: readonly LoopWeights[] | null,
    everywhere: boolean,
  ): Column[][] {
    const total: Column[][] = this.problems.map(() => []);
    for (const { vertex, strength, rest } of runs) {
      const functions = functionsOf(rest);
      const values = functions ? (functions.some(f => f.length) ? this.operator.apply(vertex, functions, everywhere) : null) : null;
      const columns = values ?? (ends && rest < 0 ? ends.map((p, at) => p.externals.map(k => this.operator.column(vertex, at, k))) : null);
      columns?.forEach((list, at) => {
        total[at] = list.map((x, c) => scaledSum(total[at][c] ?? null, x, strength));
      });
    }
    return total;
  }

  /** u_a += strength Σ_b c_ab E^e moment_b of the rest (k^b of the external momentum where nothing is left). */
  private addContact({ terms, strength }: Contact, at: number, rest: number, u: Numbers): void {
    const { E, columns } = this.problems[at];
    const size = this.basis.length;
    const moments = rest < 0 ? null : this.shares[rest][at].moments;
    for (const t of terms) {
      let c: Complex = { re: strength.re * t.re - strength.im * t.im, im: strength.re * t.im + strength.im * t.re };
      for (let j = 0; j < t.e; j++) c = { re: c.re * E.re - c.im * E.im, im: c.re * E.im + c.im * E.re };
      const a = this.places.get(stateKey({ power: t.a, phase: t.phase }))!;
      const b = this.places.get(stateKey({ power: t.b, phase: t.phase }))!;
      for (let column = 0; column < columns.length; column++) {
        const end = moments ? null : endOn(columns[column], this.basis[b]);
        const re = end ? end.re : moments!.re[column * size + b];
        const im = end ? end.im : moments!.im[column * size + b];
        u.re[column * size + a] += c.re * re - c.im * im;
        u.im[column * size + a] += c.re * im + c.im * re;
      }
    }
  }

  private finish(n: number, at: number, dressed: readonly Column[] | null, ending: readonly Column[] | null, u: Numbers): Share {
    const problem = this.problems[at];
    const size = this.basis.length;
    const columns = problem.columns.length;
    const dressedMoments = dressed && this.momentsOf(dressed, at);
    const moments = zeros(columns * size);
    if (ending) {
      const ends = this.momentsOf(ending, at);
      moments.re.set(ends.re);
      moments.im.set(ends.im);
    }
    const through = (j: Numbers, behind: Numbers) => {
      for (let column = 0; column < columns; column++) {
        for (let b = 0; b < size; b++) {
          for (let a = 0; a < size; a++)
            addProduct(moments, column * size + b, j.re[a * size + b], j.im[a * size + b], behind, column * size + a);
        }
      }
    };
    through(this.loops[at], u);
    this.forEachDressing(n, at, (share, behind) => through(share.dressedMoments!, behind.u));
    return { dressed, ending, dressedMoments, u, moments };
  }

  /** Each proper part δ of monomial n that has a run of other kernels, with what is left behind it. */
  private forEachDressing(n: number, at: number, visit: (share: Share, behind: Share) => void): void {
    if (!this.dense.length || !this.basis.length) return;
    for (const { inner, rest } of this.list.splits(n)) {
      const share = this.shares[inner][at];
      if (share.dressed) visit(share, this.shares[rest][at]);
    }
  }

  /** ∫ (state a) G (state b)*, from the moments of powers where their phases are the same. */
  private momentsBetween(at: number): Numbers {
    const { loopMoments } = this.problems[at];
    const size = this.basis.length;
    const result = zeros(size * size);
    this.basis.forEach((left, a) =>
      this.basis.forEach((right, b) => {
        const same = left.phase === right.phase;
        const direct = same ? null : this.momentsOf([this.states[at][a]], at, [b]);
        result.re[a * size + b] = direct ? direct.re[0] : loopMoments.re[left.power + right.power];
        result.im[a * size + b] = direct ? direct.im[0] : loopMoments.im[left.power + right.power];
      }),
    );
    return result;
  }

  /** ∫ (state)* G f for each function and each of the states named: [function * states + state]. */
  private momentsOf(functions: readonly Column[], at: number, states = this.basis.map((_, b) => b)): Numbers {
    const { g, E } = this.problems[at];
    const result = zeros(functions.length * states.length);
    functions.forEach((f, c) =>
      states.forEach((b, s) => {
        const { re: k, im: oscillation } = this.states[at][b];
        const complex = f.im !== null || oscillation !== null || E.im !== 0;
        let re = 0;
        let im = 0;
        if (!complex) for (let j = 0; j < g.re.length; j++) re += k[j] * g.re[j] * f.re[j];
        else {
          for (let j = 0; j < g.re.length; j++) {
            const y = f.im ? f.im[j] : 0;
            const x = g.re[j] * f.re[j] - g.im[j] * y;
            const z = g.re[j] * y + g.im[j] * f.re[j];
            const o = oscillation ? -oscillation[j] : 0;
            re += k[j] * x - o * z;
            im += k[j] * z + o * x;
          }
        }
        result.re[c * states.length + s] = re;
        result.im[c * states.length + s] = im;
      }),
    );
    return result;
  }
}

const isPart = (inner: Monomial, outer: Monomial): boolean => inner.every((m, i) => m <= outer[i]);
const zeros = (n: number): Numbers => ({ re: new Float64Array(n), im: new Float64Array(n) });
const emptyToNull = (columns: readonly Column[]): readonly Column[] | null => (columns.length ? columns : null);

function addProduct(into: Numbers, at: number, re: number, im: number, x: Numbers, from: number): void {
  into.re[at] += re * x.re[from] - im * x.im[from];
  into.im[at] += re * x.im[from] + im * x.re[from];
}

/** total + strength * x. */
function scaledSum(total: Column | null, x: Column, strength: Complex): Column {
  if (!total && strength.re === 1 && strength.im === 0) return x;
  const complex = Boolean(x.im) || strength.im !== 0 || Boolean(total?.im);
  const sum = {
    re: total ? total.re.slice() : new Float64Array(x.re.length),
    im: complex ? (total?.im?.slice() ?? new Float64Array(x.re.length)) : null,
  };
  addMultiple(x, strength, sum);
  return sum;
}

function joined(before: readonly Column[] | null, added: readonly Column[]): readonly Column[] | null {
  if (!added.length) return before;
  return added.map((x, c) => (before ? scaledSum(before[c], x, { re: 1, im: 0 }) : x));
}
