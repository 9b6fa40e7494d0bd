import type { MomentumTerm } from '../model/kernel-shape';
import { growsFaster, type Laurent, type LaurentRing } from '../algebra/laurent';
import { isProperPart, difference, type MonomialList } from './monomials';

/** Coefficients of p^a k^b at [a * size + b]; null where they vanish. */
export type Grid = readonly (Laurent | null)[];

/** An energy at which the chain is followed, with the loop moments I_0..I_(2 size - 2) there. */
export interface EnergyPoint {
  readonly E: { readonly re: number; readonly im: number };
  readonly moments: readonly Laurent[];
}

/**
 * Chooses the counterterm vertex of term `n`, given what is left of it (one grid per energy point) before it is added; null: none.
 * What it returns is one grid per energy point again.
 */
export type CountertermRule = (n: number, remainder: readonly Grid[]) => readonly Grid[] | null;

/**
 * R_ν = W_ν + Σ_{0<α<ν} W_α I R_{ν-α} for contact vertices, exact in L: between two contacts p^a k^b and p^a' k^b' a loop gives I_(b+a')(E).
 * `vertices[i]` are the terms of interaction i, null where it is no contact: monomials with such a factor are left out (null).
 * Returns R at [term][energy point].
 */
export function contactChain(
  list: MonomialList,
  vertices: readonly (readonly MomentumTerm[] | null)[],
  points: readonly EnergyPoint[],
  ring: LaurentRing,
  size: number,
  rule: CountertermRule | null,
): (readonly Grid[] | null)[] {
  const bare = vertices.map(terms => terms && points.map(point => vertexGrid(terms, point, ring, size)));
  const counterterms: { n: number; grids: readonly Grid[] }[] = [];
  const result: (readonly Grid[] | null)[] = [];
  for (let n = 0; n < list.terms.length; n++) {
    const { exponents, factors } = list.terms[n];
    if (exponents.some((m, i) => m > 0 && !vertices[i])) {
      result.push(null);
      continue;
    }
    const links: { vertex: readonly Grid[]; rest: readonly Grid[] }[] = [];
    exponents.forEach((m, i) => {
      const before = m > 0 && factors > 1 ? result[list.without[n][i]] : null;
      if (before) links.push({ vertex: bare[i]!, rest: before });
    });
    for (const z of counterterms) {
      const inner = list.terms[z.n].exponents;
      if (!isProperPart(inner, exponents)) continue;
      const rest = result[list.indexOf(difference(exponents, inner))];
      if (rest) links.push({ vertex: z.grids, rest });
    }
    const single = factors === 1 ? bare[exponents.findIndex(m => m > 0)] : null;
    const remainder = points.map((point, at) => sumOfChains(single?.[at] ?? null, links, at, point, ring, size));
    const added = rule?.(n, remainder) ?? null;
    if (added) counterterms.push({ n, grids: added });
    result.push(added ? remainder.map((grid, at) => addGrids(grid, added[at], ring)) : remainder);
  }
  return result;
}

/** The vertex at one energy. */
export function vertexGrid(terms: readonly MomentumTerm[], point: Pick<EnergyPoint, 'E'>, ring: LaurentRing, size: number): Grid {
  const re = new Float64Array(size * size);
  const im = new Float64Array(size * size);
  for (const t of terms) {
    let power = { re: 1, im: 0 };
    for (let j = 0; j < t.e; j++)
      power = { re: power.re * point.E.re - power.im * point.E.im, im: power.re * point.E.im + power.im * point.E.re };
    re[t.a * size + t.b] += t.re * power.re - t.im * power.im;
    im[t.a * size + t.b] += t.re * power.im + t.im * power.re;
  }
  return Array.from(re, (x, s) => (x === 0 && im[s] === 0 ? null : ring.of([{ power: 0, log: 0, re: x, im: im[s] }])));
}

function sumOfChains(
  single: Grid | null,
  links: readonly { vertex: readonly Grid[]; rest: readonly Grid[] }[],
  at: number,
  point: EnergyPoint,
  ring: LaurentRing,
  size: number,
): Grid {
  // Σ_b W^{ab} I_{b+c} for each link first, so that the triple product costs two double ones.
  const dressed = links.map(link => {
    const grid = Array.from({ length: size * size }, (): Laurent | null => null);
    for (let a = 0; a < size; a++) {
      for (let c = 0; c < size; c++) {
        ring.clear();
        let any = false;
        for (let b = 0; b < size; b++) {
          const w = link.vertex[at][a * size + b];
          if (!w) continue;
          ring.addProduct(w, point.moments[b + c]);
          any = true;
        }
        if (any) grid[a * size + c] = emptyToNull(ring.take());
      }
    }
    return grid;
  });
  return Array.from({ length: size * size }, (_, s) => {
    const a = Math.floor(s / size);
    const d = s % size;
    ring.clear();
    const first = single?.[s];
    if (first) ring.addScaled(first, 1, 0);
    links.forEach((link, l) => {
      for (let c = 0; c < size; c++) {
        const x = dressed[l][a * size + c];
        const y = link.rest[at][c * size + d];
        if (x && y) ring.addProduct(x, y);
      }
    });
    return emptyToNull(ring.take());
  });
}

const emptyToNull = (x: Laurent): Laurent | null => (x.slots.length ? x : null);

function addGrids(x: Grid, y: Grid, ring: LaurentRing): Grid {
  return x.map((c, s) => {
    const d = y[s];
    if (!c || !d) return c ?? d;
    ring.clear();
    ring.addScaled(c, 1, 0);
    ring.addScaled(d, 1, 0);
    return emptyToNull(ring.take());
  });
}

/** The fastest growth among the coefficients of a grid; (0, 0) where nothing grows. */
export function growthOf(grid: Grid, ring: LaurentRing): { power: number; log: number } {
  let best = { power: 0, log: 0 };
  for (const c of grid) {
    if (!c) continue;
    for (const t of ring.terms(c)) if (growsFaster(t.power, t.log, best.power, best.log)) best = { power: t.power, log: t.log };
  }
  return best;
}

/** Minus the growing part of each coefficient: the minimal counterterm, logarithms as ln(L/scale). */
export function minimalCounterterm(grid: Grid, ring: LaurentRing, scale: number): Grid {
  return grid.map(c => {
    if (!c) return null;
    const growing = ring.growing(c, scale);
    return growing.slots.length ? { slots: growing.slots, re: growing.re.map(v => -v), im: growing.im.map(v => -v) } : null;
  });
}
