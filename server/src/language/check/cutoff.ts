import type { CutoffSpec } from '../../core/model/spec';
import type { Defaults, Overrides } from '../document';
import { momentum } from './amounts';
import { keyword, statementsOf, within, wholeBetween, type BodyOf, type Model } from './model';
import type { Statement } from '../outline';
import { mostPoints } from './points';

/** Exponents above make a sharp edge for every practical purpose, and overflow. */
const largestExponent = 50;

/** The cutoff of a model: declared, or the default; the override's value in its place. Null where it has a mistake. */
export function readCutoff(model: Model, defaults: Defaults, overrides: Overrides): CutoffSpec | null {
  const statement = statementsOf(model.block, 'cutoff')[0];
  const override = overrides.cutoff;
  if (override !== null && !(override > 0 && Number.isFinite(override))) {
    const place = statement === undefined ? model.block.name.span : keyword(statement);
    return model.reporter.error('value', place, `The cutoff that is set over the model is positive and finite, not ${override}.`);
  }
  if (statement === undefined) {
    return { name: 'L', value: override ?? defaults.cutoff, shape: { kind: 'sharp' }, declared: false, scan: null };
  }
  const { body } = statement;
  const value = positive(model, statement, body.value, 'The cutoff');
  const scan = body.scan === null ? null : readScan(model, statement, body.scan);
  if (body.shape.kind !== 'sharp' && !(body.shape.n >= 1 && body.shape.n <= largestExponent)) {
    return model.reporter.error(
      'value',
      within(statement, body.shapeSpan),
      `The exponent of \`${body.shape.kind}(n)\` is from 1 to ${largestExponent}.`,
    );
  }
  if (value === null || (body.scan !== null && scan === null)) return null;
  return { name: body.name.name, value: override ?? value, shape: body.shape, declared: override === null, scan };
}

function positive(model: Model, statement: Statement, formula: BodyOf<'cutoff'>['value'], what: string): number | null {
  const value = momentum(model, statement, formula, what);
  if (value === null || value > 0) return value;
  return model.reporter.error('value', within(statement, formula.span), `${what} is a positive momentum, and this is ${value}.`);
}

function readScan(model: Model, statement: Statement, range: NonNullable<BodyOf<'cutoff'>['scan']>): CutoffSpec['scan'] {
  const from = positive(model, statement, range.from, 'The start of a scan');
  const to = positive(model, statement, range.to, 'The end of a scan');
  const points =
    range.points === null ? 24 : wholeBetween(model.reporter, statement, range.points, 2, mostPoints, 'The number of points of a scan');
  if (from === null || to === null || points === null) return null;
  if (from < to) return { from, to, points };
  return model.reporter.error('value', within(statement, range.to.span), 'A scan goes upwards: its end lies above its start.');
}
