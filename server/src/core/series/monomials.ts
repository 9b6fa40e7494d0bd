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
    (known[n] ??= terms
      .slice(0, n)
      .flatMap((t, inner) =>
        isProperPart(t.exponents, terms[n].exponents) ? [{ inner, rest: indexOf(difference(terms[n].exponents, t.exponents)) }] : [],
      ));
  const cheapest = Math.min(...interactions.map(i => i.order));
  const continues = terms.map(t => t.order + cheapest <= order);
  return { terms, indexOf, splits, continues, without };
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
