import type { Complex } from '../algebra/expression';
import type { CountertermResult, CouplingResult, ValueResult } from '../results';
import { CutoffGrid, named, seriesAtCutoff, type CutoffResult, type OnShellPoint } from './amplitudes';
import type { StrengthLaw } from './contact-declared';
import { isMultipleOf } from './forms';
import type { Setup } from './setup';
import type { Counterterm } from './subtraction';
import { symbolsOf } from '../algebra/expression';

/** Amplitudes at the model's cutoff and along its scan. */
export interface Evaluation {
  readonly points: readonly OnShellPoint[];
  readonly at: CutoffResult;
  /** The same on a coarser grid: the difference is the error. */
  readonly coarse: CutoffResult;
  /** Cutoffs of the scan in rising order; the first momentum everywhere, all of them at a few in the upper half. */
  readonly scan: readonly CutoffResult[];
}

/** Nodes a panel, and fewer for the error; contacts alone cost so little that they get more. */
const nodesFor = (setup: Setup) => (setup.vertices.every(v => v.contact) ? { fine: 16, coarse: 12 } : { fine: 12, coarse: 9 });

export function evaluateSeries(
  setup: Setup,
  points: readonly OnShellPoint[],
  laws: readonly StrengthLaw[],
  onStep: (done: number) => void,
): Evaluation {
  const momenta = points.map(p => p.p);
  const { cutoff } = setup.spec;
  const run = (L: number, some: readonly OnShellPoint[], nodes: number) =>
    seriesAtCutoff(new CutoffGrid(setup, L, momenta, nodes), some, laws);
  const { fine, coarse: fewer } = nodesFor(setup);
  const cutoffs = scanCutoffs(setup).filter(L => setup.regulator.shape.kind !== 'sharp' || L > 1.02 * points[0].p);
  const at = run(cutoff.value, points, fine);
  const coarse = run(cutoff.value, points, fewer);
  const upper = upperHalf(cutoffs.length);
  const scan = cutoffs.map((L, j) => {
    onStep((j + 1) / (cutoffs.length + 1));
    const all = upper.has(j) && (setup.regulator.shape.kind !== 'sharp' || momenta.every(p => L > 1.02 * p));
    return run(L, all ? points : points.slice(0, 1), fine);
  });
  return { points, at, coarse, scan };
}

/** The indices from the middle of the scan to its end at which every momentum is followed: both ends and two between them. */
function upperHalf(count: number): Set<number> {
  const middle = count >> 1;
  return new Set([0, 1, 2, 3].map(j => Math.round(middle + ((count - 1 - middle) * j) / 3)));
}

export function scanCutoffs(setup: Setup): number[] {
  const scan = setup.spec.cutoff.scan;
  if (!scan) return [];
  return Array.from({ length: scan.points }, (_, j) => scan.from * (scan.to / scan.from) ** (j / Math.max(1, scan.points - 1)));
}

/** Values of monomial n at each momentum, with the error from the second grid, from the kernels and from rounding. */
export function valuesOf(setup: Setup, evaluation: Evaluation, n: number): ValueResult[] {
  const kernelError = Math.max(1e-15, ...setup.vertices.map(v => v.element.relativeError)) * setup.list.terms[n].factors;
  return evaluation.points.map((point, j) => {
    const bare = evaluation.at.bare[j][n];
    const renormalised = evaluation.at.renormalised[j][n];
    const other = evaluation.coarse;
    const pairs = [
      [bare.forward, other.bare[j][n].forward],
      [renormalised.forward, other.renormalised[j][n].forward],
      [bare.backward, other.bare[j][n].backward],
      [renormalised.backward, other.renormalised[j][n].backward],
    ];
    const gap = Math.max(...pairs.map(([x, y]) => (x && y ? distance(x, y) : 0)));
    const size = Math.max(modulus(bare.forward), bare.backward ? modulus(bare.backward) : 0);
    const uncertainty = gap + kernelError * size + 4e-15 * size;
    if (!Number.isFinite(uncertainty)) return { ...named(point), bare: null, renormalised: null, uncertainty: null };
    const backward =
      bare.backward && renormalised.backward ? { backward: { bare: bare.backward, renormalised: renormalised.backward } } : {};
    return { ...named(point), bare: bare.forward, renormalised: renormalised.forward, ...backward, uncertainty };
  });
}

/** Σ over the monomials of each order. */
export function byOrder(setup: Setup, amplitudes: readonly { forward: Complex }[]): { orders: number[]; values: Complex[] } {
  const orders = Array.from({ length: setup.spec.series.order }, (_, j) => j + 1);
  const values = orders.map(order => {
    const sum = { re: 0, im: 0 };
    setup.list.terms.forEach((t, n) => {
      if (t.order !== order) return;
      sum.re += amplitudes[n].forward.re;
      sum.im += amplitudes[n].forward.im;
    });
    return sum;
  });
  return { orders, values };
}

/** Largest |T(L) - T(L_max)|/|T(L_max)| of the renormalised sum over the upper half of the scan; null without one. */
export function driftOf(setup: Setup, evaluation: Evaluation, j: number): number | null {
  const followed = upperHalf(evaluation.scan.length);
  const upper = evaluation.scan.filter((s, at) => followed.has(at) && s.renormalised.length > j);
  if (upper.length < 2) return null;
  const totals = upper.map(s => total(byOrder(setup, s.renormalised[j]).values));
  const last = totals[totals.length - 1];
  const drift = Math.max(...totals.map(t => distance(t, last))) / modulus(last);
  return Number.isFinite(drift) ? drift : null;
}

/** Strength of each counterterm at the model's cutoff and along the scan, summed over the monomials it cancels. */
export function countertermResults(setup: Setup, evaluation: Evaluation): CountertermResult[] {
  return setup.counterterms.map(counterterm => {
    const strength = (result: CutoffResult) => strengthOf(result, counterterm);
    const cancels = counterterm.spec.cancels.map(m => setup.list.terms[setup.list.indexOf(m)]?.name ?? '').filter(Boolean);
    const scan = evaluation.scan.length ? { cutoff: evaluation.scan.map(s => s.cutoff), strength: evaluation.scan.map(strength) } : {};
    return { name: counterterm.spec.name, cancels, at: strength(evaluation.at), ...scan };
  });
}

function strengthOf(result: CutoffResult, counterterm: Counterterm): Complex {
  return total(result.strengths.filter(s => s.counterterm === counterterm).map(s => s.value));
}

/** Each coupling with its bare value along the scan, where counterterms have the form of the one interaction that it multiplies. */
export function couplingResults(setup: Setup, evaluation: Evaluation | null): CouplingResult[] {
  return setup.spec.couplings.map(({ name, value, dimension }) => {
    const plain = { name, value, dimension };
    const using = setup.spec.interactions.flatMap((i, at) => (symbolsOf(i.kernel).has(name) ? [at] : []));
    if (using.length !== 1 || value === 0 || !evaluation?.scan.length) return plain;
    const others = setup.spec.couplings.some(c => c.name !== name && symbolsOf(setup.spec.interactions[using[0]].kernel).has(c.name));
    const absorbing = setup.counterterms.flatMap(c => {
      const share = shareOf(setup, c, using[0]);
      return share === null ? [] : [{ counterterm: c, share }];
    });
    if (others || !absorbing.length) return plain;
    const running = (result: CutoffResult) =>
      value * (1 + total(absorbing.map(a => timesReal(strengthOf(result, a.counterterm), a.share))).re);
    return { ...plain, running: { cutoff: evaluation.scan.map(s => s.cutoff), value: evaluation.scan.map(running) } };
  });
}

/** form = share * kernel of interaction i, or null. */
function shareOf(setup: Setup, counterterm: Counterterm, i: number): number | null {
  const { form } = counterterm.spec;
  if ('of' in form) return form.of === setup.spec.interactions[i].name ? 1 : null;
  const kernel = setup.vertices[i].contact;
  const own = counterterm.vertex.contact?.filter(t => t.re !== 0 || t.im !== 0);
  if (!kernel || !own?.length || !isMultipleOf(kernel, own)) return null;
  const partner = kernel.find(t => t.a === own[0].a && t.b === own[0].b && t.e === own[0].e)!;
  const d = partner.re ** 2 + partner.im ** 2;
  return (own[0].re * partner.re + own[0].im * partner.im) / d;
}

export const modulus = (x: Complex): number => Math.hypot(x.re, x.im);
export const distance = (x: Complex, y: Complex): number => Math.hypot(x.re - y.re, x.im - y.im);
const timesReal = (x: Complex, s: number): Complex => ({ re: x.re * s, im: x.im * s });
export function total(values: readonly Complex[]): Complex {
  return values.reduce((s, v) => ({ re: s.re + v.re, im: s.im + v.im }), { re: 0, im: 0 });
}
