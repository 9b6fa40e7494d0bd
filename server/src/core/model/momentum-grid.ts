import { gaussLegendreOn } from '../quadrature/gauss-legendre';
import type { Kinematics } from './kinematics';
import type { Regulator } from './regulator';

/** A run of nodes that carry one polynomial: Gauss-Legendre on [from, to]. */
export interface Panel {
  readonly from: number;
  readonly to: number;
  readonly start: number;
  readonly count: number;
}

/** Loop momenta at one cutoff. In dimension 1 with the full wave they run over both signs. */
export interface MomentumGrid {
  readonly cutoff: number;
  /** Lower and upper end: (-K or 0, K), K the cutoff or where a smooth one has died out. */
  readonly low: number;
  readonly high: number;
  readonly nodes: Float64Array;
  /** Plain quadrature weights dk. */
  readonly weights: Float64Array;
  /** norm * dk * |k|^(D-1) * f(k/L)²: a loop integral is Σ measure * G * (…). */
  readonly measure: Float64Array;
  readonly energies: Float64Array;
  readonly panels: readonly Panel[];
}

export interface GridWishes {
  /** The smallest momentum that matters: panels below it are as wide as it. */
  readonly smallest: number;
  /** Up to this momentum (the largest on-shell one) panels are no wider than `kernelScale`. */
  readonly external: number;
  /** Momentum over which a local kernel changes; Infinity where there is none. */
  readonly kernelScale: number;
  /** Below a sharp edge panels narrow to this width, since what a local kernel makes of the edge varies over its scale. */
  readonly edgeWidth: number;
  /** Momenta (≥ 0) at which kernels are singular or have a kink: panels end there and narrow towards them. */
  readonly singular: readonly number[];
  readonly pointsPerPanel: number;
  /** Power of momentum with which integrands grow, for the reach of a smooth cutoff. */
  readonly growth: number;
}

/** How many nodes `momentumGrid` would have. */
export function nodeCount(kinematics: Kinematics, regulator: Regulator, cutoff: number, wishes: GridWishes): number {
  const panels = breakpoints(cutoff * regulator.reach(wishes.growth), cutoff, regulator, wishes).length - 1;
  return panels * wishes.pointsPerPanel * (kinematics.signed ? 2 : 1);
}

export function momentumGrid(kinematics: Kinematics, regulator: Regulator, cutoff: number, wishes: GridWishes): MomentumGrid {
  const high = cutoff * regulator.reach(wishes.growth);
  const breaks = breakpoints(high, cutoff, regulator, wishes);
  const all = kinematics.signed
    ? [
        ...breaks
          .slice(1)
          .map(b => -b)
          .reverse(),
        ...breaks,
      ]
    : breaks;
  return gridOn(kinematics, regulator, cutoff, all, wishes.pointsPerPanel);
}

/** The grid with these panels, `points` nodes in each. */
export function gridOn(
  kinematics: Kinematics,
  regulator: Regulator,
  cutoff: number,
  breaks: readonly number[],
  points: number,
): MomentumGrid {
  const count = (breaks.length - 1) * points;
  const nodes = new Float64Array(count);
  const weights = new Float64Array(count);
  const panels: Panel[] = [];
  for (let j = 0; j + 1 < breaks.length; j++) {
    const rule = gaussLegendreOn(points, breaks[j], breaks[j + 1]);
    nodes.set(rule.nodes, j * points);
    weights.set(rule.weights, j * points);
    panels.push({ from: breaks[j], to: breaks[j + 1], start: j * points, count: points });
  }
  const power = kinematics.dimension - 1;
  const measure = nodes.map((k, j) => kinematics.norm * weights[j] * Math.abs(k) ** power * regulator.leg(k / cutoff) ** 2);
  return { cutoff, low: breaks[0], high: breaks[breaks.length - 1], nodes, weights, measure, energies: kinematics.energies(nodes), panels };
}

/** 0, s, 2s, 4s, … , high; divided further where external momenta, the cutoff's fall or a sharp edge ask for it. */
function breakpoints(
  high: number,
  cutoff: number,
  { shape, width }: Regulator,
  { smallest, external, kernelScale, edgeWidth, singular }: GridWishes,
): number[] {
  const doublings = Math.min(60, Math.max(2, Math.ceil(Math.log2(high / Math.min(smallest, kernelScale)))));
  const breaks = [0];
  for (let j = doublings; j >= 0; j--) breaks.push(high / 2 ** j);
  const refined = breaks.slice(0, 1);
  for (let j = 1; j < breaks.length; j++) {
    const [from, to] = [breaks[j - 1], breaks[j]];
    const narrow = from < external && to - from > kernelScale ? 2 ** Math.min(13, Math.ceil(Math.log2((to - from) / kernelScale))) : 1;
    const pieces = Math.max(narrow, to > cutoff / 4 ? Math.ceil((to - from) / (width * cutoff)) : 1);
    for (let i = 1; i <= pieces; i++) refined.push(from + ((to - from) * i) / pieces);
  }
  if (shape.kind === 'sharp' && Number.isFinite(edgeWidth)) {
    for (let width = (high - refined[refined.length - 2]) / 2; width > edgeWidth / 2; width /= 2) refined.splice(-1, 0, high - width);
  }
  if (!singular.length) return refined;
  const levels = Math.max(1, Math.min(10, Math.floor(GRADED / singular.length)));
  const graded = singular.flatMap(p => gradedTo(p, levels)).filter(k => k < high);
  return [...new Set([...refined, ...graded])].sort((x, y) => x - y);
}

/** About so many panels narrow towards singular momenta, on either side of them. */
const GRADED = 24;

/** p and what lies 1/4, 1/16, … of it on either side. */
function gradedTo(p: number, levels: number): number[] {
  const steps = Array.from({ length: levels }, (_, j) => p / 4 ** (j + 1));
  return [...steps.map(s => p - s), p, ...steps.map(s => p + s)].filter(k => k > 0);
}
