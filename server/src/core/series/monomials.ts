import type { InteractionSpec, Monomial } from '../model/spec';

/** A monomial with its place in the list of all monomials up to an order. */
export interface Term {
  readonly exponents: Monomial;
  /** "bump^2*twist": factors in the order of declaration. */
  readonly name: string;
  /** Place in the power counting: Σ exponent * order of the interaction. */
  readonly order: number;
  /** Number of factors: the loops of a term are one less. */
  readonly factors: number;
}

export interface Split {
  readonly inner: number;
  readonly rest: number;
}

export interface MonomialList {
  readonly terms: readonly Term[];
  /** Index of the monomial with these exponents, or -1. */
  indexOf(exponents: Monomial): number;
  /** The ways to split term n into a proper part and what is left: indices of both, by growing part. */
  splits(n: number): readonly Split[];
  /** Whether term n is part of a longer one in the list. */
  readonly continues: readonly boolean[];
  /** Index of term n with one factor i less (-1: there is none, or nothing is left). */
  readonly without: readonly (readonly number[])[];
}

const known = new Map<string, MonomialList>();
const KEPT = 40;

/** All monomials with 1 <= Σ ν_i * order_i <= `order`, by growing order and then as declared (a^2 before a*b before b^2). The list is kept for the next edit. */
export function monomialsUpTo(interactions: readonly Pick<InteractionSpec, 'name' | 'order'>[], order: number): MonomialList {
  const key = JSON.stringify([order, interactions.map(i => [i.name, i.order])]);
  const before = known.get(key);
  if (before) return before;
  const list = buildList(interactions, order);
  if (known.size >= KEPT) known.clear();
  known.set(key, list);
  return list;
}

function buildList(interactions: readonly Pick<InteractionSpec, 'name' | 'order'>[], order: number): MonomialList {
  const found: Monomial[] = [];
  const grow = (prefix: readonly number[], left: number): void => {
    if (prefix.length === interactions.length) {
      if (left < order) found.push(prefix);
      return;
    }
    const cost = interactions[prefix.length].order;
    for (let n = Math.floor(left / cost); n >= 0; n--) grow([...prefix, n], left - n * cost);
  };
  grow([], order);
  const terms = found.map(exponents => ({
    exponents,
    name: nameOf(exponents, interactions),
    order: exponents.reduce((sum, n, i) => sum + n * interactions[i].order, 0),
    factors: exponents.reduce((sum, n) => sum + n, 0),
  }));
  terms.sort((s, t) => s.order - t.order || s.factors - t.factors || compareDeclared(s.exponents, t.exponents));
  const index = new Map(terms.map((t, n) => [t.exponents.join(), n]));
  const indexOf = (exponents: Monomial) => index.get(exponents.join()) ?? -1;
  const without = terms.map(t => t.exponents.map((n, i) => (n === 0 ? -1 : indexOf(t.exponents.map((m, j) => (j === i ? m - 1 : m))))));
  const known: (readonly Split[])[] = [];
  const splits = (n: number): readonly Split[] =>
    (known[n] ??= properParts(terms[n].exponents)
      .map(part => ({ inner: indexOf(part), rest: indexOf(difference(terms[n].exponents, part)) }))
      .sort((s, t) => s.inner - t.inner));
  const cheapest = Math.min(...interactions.map(i => i.order));
  const continues = terms.map(t => t.order + cheapest <= order);
  return { terms, indexOf, splits, continues, without };
}

/** Every monomial that divides this one, except 1 and itself. */
function properParts(exponents: Monomial): Monomial[] {
  const parts = exponents.reduce<number[][]>(
    (some, n) => some.flatMap(part => Array.from({ length: n + 1 }, (_, m) => [...part, m])),
    [[]],
  );
  return parts.slice(1, -1);
}

/** How many monomials there are up to an order, and in how many regions of large loop momenta their sequences are looked at. */
export function countUpTo(orders: readonly number[], order: number): { monomials: number; regions: number } {
  // Monomials of each total order, one interaction after another; then sequences of each length and total order.
  const monomials = new Array<number>(order + 1).fill(0);
  monomials[0] = 1;
  for (const cost of orders) for (let n = cost; n <= order; n++) monomials[n] += monomials[n - cost];
  let sequences = [1, ...new Array<number>(order).fill(0)];
  let regions = 0;
  for (let factors = 1; factors <= order; factors++) {
    const longer = sequences.map((_, n) => orders.reduce((sum, cost) => sum + (n >= cost ? sequences[n - cost] : 0), 0));
    regions += longer.reduce((sum, count) => sum + count, 0) * 2 ** (factors - 1);
    sequences = longer;
  }
  return { monomials: monomials.reduce((sum, count) => sum + count, -1), regions };
}

function compareDeclared(s: Monomial, t: Monomial): number {
  for (let i = 0; i < s.length; i++) if (s[i] !== t[i]) return t[i] - s[i];
  return 0;
}

/** "bump^2*twist" for [2, 1]. */
export function nameOf(exponents: Monomial, interactions: readonly { readonly name: string }[]): string {
  return exponents.flatMap((n, i) => (n === 0 ? [] : [n === 1 ? interactions[i].name : `${interactions[i].name}^${n}`])).join('*');
}

/** Is `inner` a proper part of `outer`: no exponent larger, not equal, not empty? */
export function isProperPart(inner: Monomial, outer: Monomial): boolean {
  return inner.every((n, i) => n <= outer[i]) && inner.some((n, i) => n < outer[i]) && inner.some(n => n > 0);
}

export const difference = (outer: Monomial, inner: Monomial): Monomial => outer.map((n, i) => n - inner[i]);
