import type { ExpectationSpec, Observable } from '../../core/model/spec';
import type { Statement } from '../outline';
import type { Formula, Point, Word } from '../syntax';
import { aLength, anEnergy, product, pure, type Dimension } from '../units';
import { observables } from '../words';
import { pureAmount, realAmount } from './amounts';
import { within, wholeBetween, type BodyOf, type Model } from './model';
import { onShellPoint, type Kinematics } from './points';

type ExpectStatement = Statement<BodyOf<'expect'>>;

/** The expectation as the core wants it, or null where it has a mistake. `order`: that of the model's series, null where unknown. */
export function readExpectation(
  model: Model,
  statement: ExpectStatement,
  kinematics: Kinematics,
  order: number | null,
): ExpectationSpec | null {
  const { expectation } = statement.body;
  switch (expectation.kind) {
    case 'finite': {
      const { to } = expectation;
      if (to === null) return { kind: 'finite', to: null };
      const value = wholeBetween(model.reporter, statement, to, 1, order ?? Infinity, 'The order up to which the series is finite');
      return value === null ? null : { kind: 'finite', to: value };
    }
    case 'converges': {
      const point = onShellPoint(model, statement, expectation.point, kinematics);
      return point && { kind: 'converges', point };
    }
    case 'drift': {
      const percent = positiveAmount(model, statement, expectation.percent, pure, 'The drift');
      const point = onShellPoint(model, statement, expectation.point, kinematics);
      return percent === null || point === null ? null : { kind: 'drift', percent, point };
    }
    case 'observable':
      return readObservable(model, statement, expectation, kinematics);
  }
}

function readObservable(
  model: Model,
  statement: ExpectStatement,
  expectation: Extract<BodyOf<'expect'>['expectation'], { kind: 'observable' }>,
  kinematics: Kinematics,
): ExpectationSpec | null {
  const { observable, within: tolerance, percent } = expectation;
  const measured = measurement(model, statement, observable, expectation.value, expectation.point, kinematics);
  const wanted = percent ? pure : observableDimension(model, observable.name);
  const width = positiveAmount(model, statement, tolerance, wanted, 'The tolerance');
  if (measured === null || width === null) return null;
  const { value, point } = measured;
  if (percent && value === 0) {
    return model.reporter.error(
      'value',
      within(statement, tolerance.span),
      'A percentage of 0 allows nothing; give the tolerance as an amount.',
    );
  }
  return { kind: 'observable', observable: observable.name, value, tolerance: percent ? (Math.abs(value) * width) / 100 : width, point };
}

/** OBS = X [at …]: the value in the model's units and the point it belongs to. */
export function measurement(
  model: Model,
  statement: Statement,
  observable: Word & { readonly name: Observable },
  formula: Formula,
  written: Point | null,
  kinematics: Kinematics,
): { value: number; point: ReturnType<typeof onShellPoint> } | null {
  const { name, span } = observable;
  const { reporter } = model;
  const own = within(statement, span);
  const only1 = name === 'transmission' || name === 'reflection';
  if (only1 && !(model.space === 1 && model.wave.kind === 'full'))
    return reporter.error('value', own, `\`${name}\` belongs to dimension 1 with \`wave full\`.`);
  if (name === 'phase_shift' && model.space === 1 && model.wave.kind === 'full') {
    return reporter.error(
      'value',
      own,
      'A phase shift belongs to a single wave; choose `wave even` or `wave odd`, or expect the transmission.',
    );
  }
  const { at } = observables[name];
  if (at && written === null) return reporter.error('syntax', own, `\`${name}\` depends on the momentum; write \`at p = …\` behind it.`);
  if (!at && written !== null)
    return reporter.error('syntax', within(statement, written.span), `\`${name}\` is one number for all momenta; take the \`at …\` out.`);
  const value = realAmount(model, statement, formula, observableDimension(model, name), sentenceName(name));
  const point = written && onShellPoint(model, statement, written, kinematics);
  if (value === null || (written !== null && point === null)) return null;
  const place = within(statement, formula.span);
  if (name === 'binding_energy' && !(value > 0))
    return reporter.error('value', place, `A binding energy is positive, and this is ${value}.`);
  if (only1 && !(value >= 0 && value <= 1)) return reporter.error('value', place, `A probability is from 0 to 1, and this is ${value}.`);
  return { value, point };
}

function positiveAmount(model: Model, statement: Statement, formula: Formula, wanted: Dimension, what: string): number | null {
  const value = wanted === pure ? pureAmount(model, statement, formula, what) : realAmount(model, statement, formula, wanted, what);
  if (value === null || value > 0) return value;
  return model.reporter.error('value', within(statement, formula.span), `${what} is positive, and this is ${value}.`);
}

const sentenceName = (name: string): string => `The ${name.replaceAll('_', ' ')}`;

/** From p^{2l+1} cot δ = -1/a + r p²/2 in dimension 3; p tan δ = 1/a, p cot δ = -1/a in dimension 1; ln(pa/2) in dimension 2. */
function observableDimension(model: Model, name: Observable): Dimension {
  const { space, wave } = model;
  const l = space === 3 && wave.kind === 'angular' ? wave.number : 0;
  const lengths = (n: number) => product(pure, aLength, n);
  switch (name) {
    case 'scattering_length':
      return lengths(2 * l + 1);
    case 'effective_range':
      return lengths(space === 2 ? 2 : 1 - 2 * l);
    case 'binding_energy':
      return anEnergy;
    case 'amplitude':
      return product(anEnergy, aLength, space);
    case 'cross_section':
      return lengths(space - 1);
    default:
      return pure;
  }
}
