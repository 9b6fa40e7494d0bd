import type { Setup } from './setup';

/** Nodes of a grid, roughly. */
const NODES = 200;

/** About how many multiplications the numbers of a model take: an order of magnitude, but a reproducible one. */
export function cost(setup: Setup): number {
  const { list, vertices, spec, counterterms, size } = setup;
  const terms = list.terms.length;
  const links = list.terms.reduce((sum, t) => sum + t.exponents.reduce((product, n) => product * (n + 1), 1), 0);
  const dense = vertices.filter(v => !v.contact).length;
  const cutoffs = 20 + (spec.cutoff.scan?.points ?? 0);
  const momenta = spec.series.points.length + spec.expectations.length;
  const runs = counterterms.length ? 2 : 1;
  const algebra = links * size ** 3 * 400;
  const grids = cutoffs * dense * NODES * NODES * 30;
  const products = runs * cutoffs * (momenta / 2 + 1) * (terms * vertices.length * (dense ? NODES * NODES : NODES) + links * 10);
  return algebra + grids + products;
}
