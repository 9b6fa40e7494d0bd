import type { Degree, HardBehaviour } from './hard-behaviour';
import type { Term } from './monomials';

/** Growth of a bare monomial by its regions of large loop momenta. */
export interface PowerCount {
  /** Largest degree over all regions, -Infinity where nothing is large: below 0 the monomial converges. */
  readonly degree: number;
  /** Power of ln L that goes with it. */
  readonly log: number;
  /** The largest degree is met only by terms that oscillate with the cutoff (sharp cutoff). */
  readonly oscillates: boolean;
  /** Degree of the region where all loop momenta are large: what is left overall grows at most like this. */
  readonly overall: number;
}

interface Region {
  readonly degree: number;
  readonly log: number;
  readonly oscillates: boolean;
}

const NOWHERE: Region = { degree: -Infinity, log: 0, oscillates: false };

/**
 * For every ordering of the factors and every subset R of large loop momenta: ω(R) = Σ over runs of neighbouring large loops of
 * (length)(D - g) + the soft degrees of the two vertices at its ends + for each vertex inside the larger of γ (both momenta large) and
 * δ - 1 (large at fixed difference, one integration less). `fall`: G ~ k^-fall, with what the regulator adds where that is asked for.
 */
export function countPowers(term: Term, behaviours: readonly HardBehaviour[], dimension: number, fall: number): PowerCount {
  let best: Region = NOWHERE;
  let overall = -Infinity;
  for (const sequence of orderings(term.exponents)) {
    const loops = sequence.length - 1;
    if (loops === 0) continue;
    const regions: Region[] = [];
    for (let subset = 1; subset < 1 << loops; subset++) regions[subset] = regionOf(sequence, subset, behaviours, dimension, fall);
    const all = regions[(1 << loops) - 1];
    if (all.degree > overall) overall = all.degree;
    const degree = Math.max(...regions.slice(1).map(r => r.degree));
    if (degree === -Infinity) continue;
    const largest = regions.flatMap((r, subset) => (r && r.degree === degree ? [{ subset, ...r }] : []));
    const steady = largest.filter(r => !r.oscillates);
    const oscillates = steady.length === 0;
    // No logarithm comes out of an oscillating integral, nor out of the last power.
    const regionsOfLog = oscillates ? largest : steady;
    const log =
      Math.max(...regionsOfLog.map(r => r.log)) + longestChain(regionsOfLog.map(r => r.subset)) - (degree > 0 || oscillates ? 1 : 0);
    if (degree > best.degree || (degree === best.degree && (log > best.log || !oscillates)))
      best = { degree, log: degree === best.degree ? Math.max(log, best.log) : log, oscillates };
  }
  return { ...best, overall };
}

/** ω of one subset: its runs of neighbouring loops add up. */
function regionOf(
  sequence: readonly number[],
  subset: number,
  behaviours: readonly HardBehaviour[],
  dimension: number,
  fall: number,
): Region {
  let total: Region = { degree: 0, log: 0, oscillates: false };
  const loops = sequence.length - 1;
  for (let start = 0; start < loops; start++) {
    if (!(subset & (1 << start))) continue;
    let end = start;
    while (end + 1 < loops && subset & (1 << (end + 1))) end++;
    const run = runOf(
      sequence.slice(start, end + 2).map(i => behaviours[i]),
      dimension - fall,
    );
    total = { degree: total.degree + run.degree, log: total.log + run.log, oscillates: total.oscillates || run.oscillates };
    start = end;
  }
  return total;
}

/** A run of large loops between vertices[0] and the last one. */
function runOf(vertices: readonly HardBehaviour[], perLoop: number): Region {
  let inside: Region = { degree: perLoop * (vertices.length - 1), log: 0, oscillates: false };
  for (const vertex of vertices.slice(1, -1)) {
    const choices = [...vertex.both, ...vertex.diagonal.map(d => ({ ...d, degree: d.degree - 1 }))];
    if (!choices.length) return NOWHERE;
    const largest = choices.reduce((x, y) => (y.degree > x.degree || (y.degree === x.degree && y.log > x.log) ? y : x));
    inside = { degree: inside.degree + largest.degree, log: inside.log + largest.log, oscillates: inside.oscillates };
  }
  let best = NOWHERE;
  for (const left of vertices[0].right) {
    for (const right of vertices[vertices.length - 1].left) {
      if (vertices.length === 2 && left.sign * right.sign < 0) continue;
      const end = endsOf(left, right, vertices.length === 2);
      const degree = inside.degree + end.degree;
      const log = inside.log + end.log;
      if (degree > best.degree || (degree === best.degree && best.oscillates && !end.oscillates))
        best = { degree, log, oscillates: end.oscillates };
    }
  }
  return best;
}

/** The two ends of a run; a phase that is left over costs one power, the boundary term of an oscillating integral. */
function endsOf(left: Degree, right: Degree, sameLoop: boolean): Region {
  const phases = sameLoop ? [left.phase + right.phase] : [left.phase, right.phase];
  const open = phases.filter(phase => Math.abs(phase) > 1e-12).length;
  return { degree: left.degree + right.degree - open, log: left.log + right.log, oscillates: open > 0 };
}

/** Length of the longest chain R₁ ⊂ R₂ ⊂ … among the subsets. */
function longestChain(subsets: readonly number[]): number {
  const ordered = [...subsets].sort((x, y) => bits(x) - bits(y));
  const length = new Map<number, number>();
  for (const s of ordered) {
    let longest = 0;
    for (const [inner, n] of length) if ((inner & s) === inner && inner !== s) longest = Math.max(longest, n);
    length.set(s, longest + 1);
  }
  return Math.max(...length.values());
}

function bits(x: number): number {
  let count = 0;
  for (; x; x &= x - 1) count++;
  return count;
}

/** All different orderings of the factors, as indices of interactions. */
export function* orderings(exponents: readonly number[]): Generator<number[]> {
  if (exponents.every(n => n === 0)) {
    yield [];
    return;
  }
  for (let i = 0; i < exponents.length; i++) {
    if (exponents[i] === 0) continue;
    const rest = exponents.map((n, j) => (j === i ? n - 1 : n));
    for (const tail of orderings(rest)) yield [i, ...tail];
  }
}
