import { gaussLegendre } from '../quadrature/gauss-legendre';
import type { MatrixElement } from './matrix-element';
import type { MomentumGrid, Panel } from './momentum-grid';

/**
 * A kernel between the nodes of a grid: applying it to values of a smooth function h at the nodes gives Σ_j V[i][j] weight_j h_j ≈ ∫V(k_i, k) h(k) dk.
 * Where the kernel is narrower than the panels (both momenta large at fixed difference) V[i][j] is not V(k_i, k_j) but what integrates
 * V(k_i, k) times the panel's interpolating polynomial exactly.
 */
export interface KernelOnGrid {
  readonly size: number;
  /** V[row * size + column]. */
  readonly re: Float64Array;
  /** Null for a real kernel. */
  readonly im: Float64Array | null;
}

/** `scale`: the momentum over which the kernel changes when both momenta are large; Infinity: it is smooth on every panel. */
export function kernelOnGrid(element: MatrixElement, grid: MomentumGrid, scale: number, E: number): KernelOnGrid {
  const size = grid.nodes.length;
  const { re, im } = element.symmetric ? symmetricRows(element, grid.nodes, E) : plainRows(element, grid, grid.nodes, E);
  correctRows(element, grid, grid.nodes, scale, E, re, im);
  return { size, re, im: element.real ? null : im };
}

/** V(k_i, k_j) from the half j >= i. */
function symmetricRows(element: MatrixElement, nodes: Float64Array, E: number): { re: Float64Array; im: Float64Array } {
  const n = nodes.length;
  const re = new Float64Array(n * n);
  const im = new Float64Array(n * n);
  const left = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    const [from, to] = [i * n + i, (i + 1) * n];
    element.fill(left.fill(nodes[i]).subarray(i), nodes.subarray(i), E, re.subarray(from, to), im.subarray(from, to));
  }
  mirror(re, n);
  if (!element.real) mirror(im, n);
  return { re, im };
}

/** Copies the upper triangle to the lower one, a tile at a time so that both stay in the processor's cache. */
function mirror(m: Float64Array, n: number): void {
  const tile = 32;
  for (let top = 0; top < n; top += tile) {
    for (let left = top; left < n; left += tile) {
      const [bottom, right] = [Math.min(top + tile, n), Math.min(left + tile, n)];
      for (let i = top; i < bottom; i++) for (let j = Math.max(left, i + 1); j < right; j++) m[j * n + i] = m[i * n + j];
    }
  }
}

/** The rows of `KernelOnGrid` for any momenta p: re[row * nodes + column]. */
export function kernelRows(
  element: MatrixElement,
  grid: MomentumGrid,
  p: Float64Array,
  scale: number,
  E: number,
): { re: Float64Array; im: Float64Array } {
  const rows = plainRows(element, grid, p, E);
  correctRows(element, grid, p, scale, E, rows.re, rows.im);
  return rows;
}

function plainRows(element: MatrixElement, { nodes }: MomentumGrid, p: Float64Array, E: number): { re: Float64Array; im: Float64Array } {
  const n = nodes.length;
  const re = new Float64Array(p.length * n);
  const im = new Float64Array(p.length * n);
  const left = new Float64Array(n);
  for (let i = 0; i < p.length; i++)
    element.fill(left.fill(p[i]), nodes, E, re.subarray(i * n, (i + 1) * n), im.subarray(i * n, (i + 1) * n));
  return { re, im };
}

function correctRows(
  element: MatrixElement,
  grid: MomentumGrid,
  p: Float64Array,
  scale: number,
  E: number,
  re: Float64Array,
  im: Float64Array,
): void {
  if (scale === Infinity) return;
  const n = grid.nodes.length;
  for (let i = 0; i < p.length; i++)
    correctRow(element, grid, p[i], scale, E, re.subarray(i * n, (i + 1) * n), im.subarray(i * n, (i + 1) * n));
}

/** V(k_j, k) at the nodes for one k: a column, without any correction. */
export function kernelColumn(element: MatrixElement, p: Float64Array, k: number, E: number): { re: Float64Array; im: Float64Array } {
  const re = new Float64Array(p.length);
  const im = new Float64Array(p.length);
  element.fill(p, new Float64Array(p.length).fill(k), E, re, im);
  return { re, im };
}

/** Points on a panel refined towards where the kernel is sharp, in panel coordinates (-1..1), and how the panel's nodes feed them. */
interface SubRule {
  readonly x: Float64Array;
  readonly weights: Float64Array;
  /** share[point * nodes + node]: the Lagrange polynomial of the node at the point. */
  readonly share: Float64Array;
}

const POINTS = 10;
const DEEPEST = 32;
/** Beyond this distance (in half panels from the middle) a singularity no longer hurts the panel's own rule. */
const NEAR = 2;

/** Room for the refined points of one row, grown when needed. */
let scratch = { p: new Float64Array(0), k: new Float64Array(0), re: new Float64Array(0), im: new Float64Array(0) };

function correctRow(
  element: MatrixElement,
  grid: MomentumGrid,
  p: number,
  scale: number,
  E: number,
  re: Float64Array,
  im: Float64Array,
): void {
  const near: { panel: Panel; half: number; rule: SubRule; start: number }[] = [];
  let count = 0;
  for (const panel of grid.panels) {
    const half = (panel.to - panel.from) / 2;
    const t = (p - (panel.to + panel.from) / 2) / half;
    if (Math.abs(t) > NEAR || 2 * half <= scale) continue;
    const rule = subRule(panel.count, t, Math.max(2 ** -DEEPEST, scale / half));
    near.push({ panel, half, rule, start: count });
    count += rule.x.length;
  }
  if (!count) return;
  if (scratch.p.length < count)
    scratch = {
      p: new Float64Array(2 * count),
      k: new Float64Array(2 * count),
      re: new Float64Array(2 * count),
      im: new Float64Array(2 * count),
    };
  for (const { panel, half, rule, start } of near) {
    const middle = (panel.to + panel.from) / 2;
    for (let s = 0; s < rule.x.length; s++) scratch.k[start + s] = middle + half * rule.x[s];
  }
  const [vRe, vIm] = [scratch.re.subarray(0, count), scratch.im.subarray(0, count)];
  element.fill(scratch.p.fill(p, 0, count).subarray(0, count), scratch.k.subarray(0, count), E, vRe, vIm);
  for (const { panel, half, rule, start } of near) {
    collect(rule, vRe, start, panel, grid.weights, half, re);
    if (!element.real) collect(rule, vIm, start, panel, grid.weights, half, im);
  }
}

/** Σ over the refined points of weight * V * (Lagrange polynomial of each node), in place of V at the node. */
function collect(
  rule: SubRule,
  v: Float64Array,
  start: number,
  panel: Panel,
  weights: Float64Array,
  half: number,
  row: Float64Array,
): void {
  const m = panel.count;
  row.fill(0, panel.start, panel.start + m);
  for (let s = 0, at = 0; s < rule.x.length; s++) {
    const f = v[start + s] * rule.weights[s] * half;
    for (let j = 0; j < m; j++, at++) row[panel.start + j] += f * rule.share[at];
  }
  for (let j = panel.start; j < panel.start + m; j++) row[j] /= weights[j];
}

/** By node count, then depth of refinement, then place; kept small, since external momenta bring in places of their own. */
const rules = new Map<number, Map<number, SubRule>>();
const KEPT = 6000;

/** Intervals that start with `smallest` at t (or at the end next to it) and double away from it. */
function subRule(nodes: number, t: number, smallest: number): SubRule {
  const finest = 2 ** Math.floor(Math.log2(Math.min(1, smallest)));
  const key = nodes * 64 - Math.log2(finest);
  const places = rules.get(key) ?? new Map<number, SubRule>();
  rules.set(key, places);
  const place = Math.round(t * 1e9);
  const known = places.get(place);
  if (known) return known;
  const breaks = new Set<number>([-1, 1]);
  const at = Math.min(1, Math.max(-1, t));
  breaks.add(at);
  const first = Math.max(finest, Math.abs(t - at));
  for (const side of [-1, 1]) for (let step = first; at + side * step > -1 && at + side * step < 1; step *= 2) breaks.add(at + side * step);
  const ordered = [...breaks].sort((x, y) => x - y);
  const gauss = gaussLegendre(POINTS);
  const count = (ordered.length - 1) * POINTS;
  const x = new Float64Array(count);
  const weights = new Float64Array(count);
  for (let j = 0; j + 1 < ordered.length; j++) {
    const half = (ordered[j + 1] - ordered[j]) / 2;
    for (let g = 0; g < POINTS; g++) {
      x[j * POINTS + g] = (ordered[j + 1] + ordered[j]) / 2 + half * gauss.nodes[g];
      weights[j * POINTS + g] = half * gauss.weights[g];
    }
  }
  const rule = { x, weights, share: lagrange(gaussLegendre(nodes).nodes, x) };
  if (places.size > KEPT) places.clear();
  places.set(place, rule);
  return rule;
}

/** Values at x of the Lagrange polynomials of the nodes, by the barycentric formula. */
function lagrange(nodes: Float64Array, x: Float64Array): Float64Array {
  const m = nodes.length;
  const barycentric = nodes.map((node, j) => {
    let product = 1;
    for (let i = 0; i < m; i++) if (i !== j) product *= (node - nodes[i]) * 2;
    return 1 / product;
  });
  const share = new Float64Array(x.length * m);
  for (let s = 0; s < x.length; s++) {
    let sum = 0;
    let hit = -1;
    for (let j = 0; j < m; j++) {
      const d = x[s] - nodes[j];
      if (Math.abs(d) < 1e-15) hit = j;
      share[s * m + j] = barycentric[j] / d;
      sum += share[s * m + j];
    }
    for (let j = 0; j < m; j++) share[s * m + j] = hit >= 0 ? (j === hit ? 1 : 0) : share[s * m + j] / sum;
  }
  return share;
}
