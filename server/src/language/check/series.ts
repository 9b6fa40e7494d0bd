import type { CutoffSpec, SeriesSpec } from '../../core/model/spec';
import { highestOrder, type Defaults, type Overrides } from '../document';
import { keyword, statementsOf, wholeBetween, type Model } from './model';
import { onShellPoints, type Kinematics } from './points';

/**
 * The order and the on-shell points of the series. Where the model gives no points, one stands for all: a twentieth of the cutoff.
 * Null where there is a mistake.
 */
export function readSeries(
  model: Model,
  cutoff: CutoffSpec | null,
  kinematics: Kinematics,
  defaults: Defaults,
  overrides: Overrides,
): SeriesSpec | null {
  const statement = statementsOf(model.block, 'series')[0];
  const typical = cutoff === null ? null : [{ p: cutoff.value / 20, E: null }];
  if (overrides.order !== null && !(Number.isInteger(overrides.order) && overrides.order >= 1 && overrides.order <= highestOrder)) {
    const place = statement === undefined ? model.block.name.span : keyword(statement);
    return model.reporter.error(
      'value',
      place,
      `The order that is set over the model is a whole number from 1 to ${highestOrder}, not ${overrides.order}.`,
    );
  }
  if (statement === undefined) return typical && { order: overrides.order ?? defaults.order, declared: false, points: typical };
  const { at, order: written } = statement.body;
  const order = wholeBetween(model.reporter, statement, written, 1, highestOrder, 'The highest order of a series');
  const points = at === null ? typical : onShellPoints(model, statement, at.axis, at.items, kinematics);
  if (order === null || points === null) return null;
  return { order: overrides.order ?? order, declared: overrides.order === null, points };
}
