import type { Complex } from '../../core/algebra/expression';
import { lower } from '../lower';
import type { Statement } from '../outline';
import type { Formula } from '../syntax';
import { aReducedMass, anEnergy, anInverseLength, formatDimension, hbarcIn, pure, sameDimension, type Dimension } from '../units';
import { within, type Model } from './model';

/** A value that a statement asks for: no arguments, everything known. Null with a problem where there is none. */
export function amount(
  model: Model,
  statement: Statement,
  formula: Formula,
  what: string,
): { value: Complex; dimension: Dimension | null } | null {
  const lowered = lower(formula, model.scope.context(statement.span.start));
  if (lowered === null) return null;
  if (lowered.value === null) {
    return model.reporter.error(
      'value',
      within(statement, formula.span),
      `${what} needs a known value, and this depends on a free coupling.`,
    );
  }
  return { value: lowered.value, dimension: lowered.value.re === 0 && lowered.value.im === 0 ? null : lowered.dimension };
}

/** A real amount of the dimension `wanted`, in the model's units. `what` begins a sentence: "The scattering length". */
export function realAmount(model: Model, statement: Statement, formula: Formula, wanted: Dimension, what: string): number | null {
  const found = amount(model, statement, formula, what);
  if (found === null) return null;
  if (found.dimension !== null && !model.dimensions.agree(found.dimension, wanted))
    return mismatch(model, statement, formula, found.dimension, wanted, what);
  return realPart(model, statement, formula, found.value, what);
}

/** A pure real number. */
export const pureAmount = (model: Model, statement: Statement, formula: Formula, what: string): number | null =>
  realAmount(model, statement, formula, pure, what);

/** A momentum in 1/length; an energy is read as p*c. */
export function momentum(model: Model, statement: Statement, formula: Formula, what: string): number | null {
  const found = amount(model, statement, formula, what);
  if (found === null) return null;
  const { system, dimensions } = model;
  const value = realPart(model, statement, formula, found.value, what);
  if (value === null || system === null || found.dimension === null) return value;
  const dimension = dimensions.resolved(found.dimension);
  if (sameDimension(dimension, anInverseLength)) return value;
  if (sameDimension(dimension, anEnergy)) return value / hbarcIn(system);
  const span = within(statement, formula.span);
  const own = `${system.length}^-1`;
  if (!sameDimension(dimension, pure)) {
    return model.reporter.error(
      'dimension',
      span,
      `${what} is a momentum, in \`${own}\` or \`${system.energy}\`, and this is ${dimensions.name(dimension)}.`,
    );
  }
  const written = model.text.slice(span.start, span.end);
  const number = formula.kind === 'number' || formula.kind === 'group' ? written : `(${written})`;
  const message = `${what} is a momentum and ${written} has no unit; write \`${number} ${system.energy}\` or \`${number} ${own}\`.`;
  return model.reporter.error('dimension', span, message);
}

/** A mass: its mu/hbar^2, and its mc^2 (NaN in natural units). An energy is read as mc^2. */
export function massAmount(model: Model, statement: Statement, formula: Formula): { mu: number; rest: number } | null {
  const found = amount(model, statement, formula, 'The mass');
  if (found === null) return null;
  const value = realPart(model, statement, formula, found.value, 'The mass');
  if (value === null) return null;
  const span = within(statement, formula.span);
  if (!(value > 0)) return model.reporter.error('value', span, `A mass is positive, and this is ${value}.`);
  const { system } = model;
  if (system === null) return { mu: value, rest: NaN };
  const hbarc = hbarcIn(system);
  const dimension = model.dimensions.resolved(found.dimension ?? pure);
  if (sameDimension(dimension, anEnergy)) return { mu: value / hbarc ** 2, rest: value };
  if (sameDimension(dimension, aReducedMass)) return { mu: value, rest: value * hbarc ** 2 };
  const units = `\`${system.energy}\`, \`u\`, \`me\` or \`${formatDimension(aReducedMass, system)}\``;
  return model.reporter.error(
    'dimension',
    span,
    `A mass is an energy (mc²) or μ/ħ², in ${units}, and this is ${model.dimensions.name(dimension)}.`,
  );
}

function realPart(model: Model, statement: Statement, formula: Formula, value: Complex, what: string): number | null {
  if (value.im === 0) return value.re;
  return model.reporter.error('value', within(statement, formula.span), `${what} is a real number; this has an imaginary part.`);
}

function mismatch(model: Model, statement: Statement, formula: Formula, found: Dimension, wanted: Dimension, what: string): null {
  const { dimensions } = model;
  return model.reporter.error(
    'dimension',
    within(statement, formula.span),
    `${what} is ${dimensions.name(wanted)}, and this is ${dimensions.name(found)}.`,
  );
}
