import { evaluate } from '../../core/algebra/evaluate';
import type { Expr } from '../../core/algebra/expression';
import type { SeriesSpec } from '../../core/model/spec';
import type { Statement } from '../outline';
import type { Axis, Formula, Item, Point } from '../syntax';
import { anEnergy, hbarcIn } from '../units';
import { momentum, realAmount } from './amounts';
import { within, wholeBetween, type Model } from './model';

export type OnShellPoint = SeriesSpec['points'][number];

/** What is needed to turn an energy into a momentum. */
export interface Kinematics {
  /** mu/hbar^2; NaN where the model has none. */
  readonly mu: number;
  readonly masses: readonly [number, number] | null;
  /** A function of `k`; null: k^2/(2 mu). */
  readonly kinetic: Expr | null;
  /** Momenta at and above a sharp cutoff do not exist; Infinity where the cutoff is not sharp. */
  readonly edge: number;
}

/** More would keep the editor from answering. */
export const mostPoints = 500;

/** The point of `at p = …`, or null with a problem. */
export function onShellPoint(model: Model, statement: Statement, point: Point, kinematics: Kinematics): OnShellPoint | null {
  const value = coordinate(model, statement, point.axis, point.value);
  return value === null ? null : convert(model, statement, point.axis, value, point.value, kinematics);
}

/** The points of `at p = LIST`, or null with a problem. */
export function onShellPoints(
  model: Model,
  statement: Statement,
  axis: Axis,
  items: readonly Item[],
  kinematics: Kinematics,
): OnShellPoint[] | null {
  const points: (OnShellPoint | null)[] = [];
  for (const item of items) {
    if (item.kind === 'value') {
      const value = coordinate(model, statement, axis, item.value);
      points.push(value === null ? null : convert(model, statement, axis, value, item.value, kinematics));
      continue;
    }
    const from = coordinate(model, statement, axis, item.from);
    const to = coordinate(model, statement, axis, item.to);
    const count =
      item.points === null ? 16 : wholeBetween(model.reporter, statement, item.points, 2, mostPoints, 'The number of points of a range');
    if (from === null || to === null || count === null) points.push(null);
    else if (!(from < to))
      points.push(model.reporter.error('value', within(statement, item.to.span), 'A range goes upwards: its end lies above its start.'));
    else {
      for (let i = 0; i < count; i++) {
        const value = i === count - 1 ? to : from + ((to - from) * i) / (count - 1);
        const point = convert(model, statement, axis, value, i === count - 1 ? item.to : item.from, kinematics);
        points.push(point);
        if (point === null) break;
      }
    }
  }
  if (points.length > mostPoints && !points.includes(null)) {
    const all = {
      start: items[0].kind === 'value' ? items[0].value.span.start : items[0].from.span.start,
      end: statement.span.end - statement.span.start,
    };
    return model.reporter.error(
      'value',
      within(statement, all),
      `A series is looked at in at most ${mostPoints} points, and these are ${points.length}.`,
    );
  }
  return points.includes(null) ? null : (points as OnShellPoint[]);
}

function coordinate(model: Model, statement: Statement, axis: Axis, formula: Formula): number | null {
  if (axis === 'p') return momentum(model, statement, formula, 'The on-shell momentum');
  return realAmount(model, statement, formula, anEnergy, axis === 'E' ? 'The energy' : 'The energy in the laboratory');
}

function convert(
  model: Model,
  statement: Statement,
  axis: Axis,
  value: number,
  formula: Formula,
  kinematics: Kinematics,
): OnShellPoint | null {
  const span = within(statement, formula.span);
  const { reporter } = model;
  if (axis === 'E') {
    if (value === 0) return reporter.error('value', span, 'E = 0 is the threshold itself; take an energy above or below it.');
    if (value < 0) return { p: null, E: value };
    const p = momentumAt(value, kinematics);
    if (p === null)
      return Number.isNaN(kinematics.mu) && kinematics.kinetic === null
        ? null
        : reporter.error('value', span, 'No momentum has this kinetic energy.');
    return belowEdge(p) ? { p, E: value } : beyond();
  }
  if (!(value > 0))
    return reporter.error(
      'value',
      span,
      `${axis === 'p' ? 'An on-shell momentum' : 'An energy in the laboratory'} is positive, and this is ${value}.`,
    );
  const p = axis === 'p' ? value : laboratory(value);
  if (p === null) return null;
  return belowEdge(p) ? { p, E: null } : beyond();

  function belowEdge(momentum: number): boolean {
    return momentum < kinematics.edge;
  }
  function beyond(): null {
    return reporter.error('value', span, `This momentum lies beyond the sharp cutoff, ${kinematics.edge}.`);
  }
  function laboratory(T: number): number | null {
    if (model.system === null)
      return reporter.error('value', span, '`E_lab` needs masses with units: in a natural model give `at p` or `at E`.');
    if (kinematics.masses === null)
      return reporter.error('missing', span, '`E_lab` needs both masses: write `mass A, B`, where A hits B at rest.');
    return laboratoryMomentum(T, kinematics.masses) / hbarcIn(model.system);
  }
}

/**
 * Relative momentum times c when A with kinetic energy `T` hits B at rest: p^2 = B^2 T (T + 2A)/((A + B)^2 + 2 B T), masses as mc^2,
 * all in one energy unit. (Stoks et al., Phys. Rev. C 48 (1993) 792.)
 */
export function laboratoryMomentum(T: number, [A, B]: readonly [number, number]): number {
  return Math.sqrt((B * B * T * (T + 2 * A)) / ((A + B) ** 2 + 2 * B * T));
}

/** The lowest positive momentum whose kinetic energy is `E` > 0, or null. */
function momentumAt(E: number, { mu, kinetic, edge }: Kinematics): number | null {
  if (kinetic === null) return Number.isNaN(mu) ? null : Math.sqrt(2 * mu * E);
  const excess = (k: number) => evaluate(kinetic, new Map([['k', { re: k, im: 0 }]])).re - E;
  const scale = Number.isFinite(edge) ? edge : 1;
  let low = scale * 1e-8;
  for (let exponent = -8; exponent <= 8; exponent += 0.05) {
    const high = scale * 10 ** exponent;
    if (excess(low) === 0) return low;
    if (excess(low) * excess(high) <= 0) return bisect(excess, low, high);
    low = high;
  }
  return null;
}

function bisect(f: (x: number) => number, low: number, high: number): number {
  const rising = f(high) > f(low);
  for (let i = 0; i < 200; i++) {
    const middle = (low + high) / 2;
    if (middle <= low || middle >= high) break;
    if (f(middle) > 0 === rising) high = middle;
    else low = middle;
  }
  return (low + high) / 2;
}
