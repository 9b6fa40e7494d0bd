import type { CountertermSpec, InteractionSpec, Monomial } from '../../core/model/spec';
import { lower } from '../lower';
import { shown, suggestion } from '../names';
import type { Statement } from '../outline';
import type { Word, WrittenMonomial } from '../syntax';
import { momentum } from './amounts';
import { kernelContext } from './interactions';
import { within, type BodyOf, type Model } from './model';

type CountertermStatement = Statement<BodyOf<'counterterm'>>;

/** What counterterms refer to. */
export interface Vertices {
  /** Every interaction in the order of declaration; null where it has a mistake of its own. */
  readonly interactions: ReadonlyMap<string, InteractionSpec | null>;
  /** Some interaction could not be read, or comes from elsewhere: an unknown name may be meant for it. */
  readonly open: boolean;
  /** The order that the model declares; null where it is not known. */
  readonly order: number | null;
  readonly mu: number;
  /** The momentum of a sharp cutoff, Infinity for any other. */
  readonly edge: number;
}

/** The counterterm as the core wants it, or null where it has a mistake. */
export function readCounterterm(model: Model, statement: CountertermStatement, vertices: Vertices): CountertermSpec | null {
  const { body } = statement;
  const form = readForm(model, statement, vertices);
  const cancels: Monomial[] = [];
  let sound = true;
  for (const written of body.cancels) {
    const monomial = readMonomial(model, statement, written, vertices);
    if (monomial === null) sound = false;
    else if (cancels.some(other => other.every((n, i) => n === monomial[i]))) {
      model.reporter.error('duplicate', within(statement, written.span), 'This monomial is in the list already; take it out.');
      sound = false;
    } else cancels.push(monomial);
  }
  const at = readScale(model, statement, vertices);
  if (form === null || at === null || !sound) return null;
  return { name: body.name.name, form, cancels, scheme: { kind: body.scheme.kind, at } };
}

function readForm(model: Model, statement: CountertermStatement, vertices: Vertices): CountertermSpec['form'] | null {
  const { form } = statement.body;
  if ('of' in form) return interactionCalled(model, statement, form.of, vertices) === null ? null : { of: form.of.name };
  const lowered = lower(form.value, kernelContext(model, statement, form.words));
  return lowered && { arguments: form.arguments, expr: lowered.expr };
}

function readMonomial(model: Model, statement: CountertermStatement, written: WrittenMonomial, vertices: Vertices): Monomial | null {
  const names = [...vertices.interactions.keys()];
  const exponents = names.map(() => 0);
  let order = 0;
  let known = true;
  for (const { name, power } of written.factors) {
    const found = interactionCalled(model, statement, name, vertices);
    const exponent = power?.value ?? 1;
    if (power !== null && !(exponent >= 1 && Number.isSafeInteger(exponent))) {
      known = false;
      model.reporter.error('value', within(statement, power.span), 'The power of an interaction in a monomial is 1 or more.');
    } else if (found === null) known = false;
    else {
      exponents[names.indexOf(name.name)] += exponent;
      order += exponent * found.order;
    }
  }
  if (!known) return null;
  const place = within(statement, written.span);
  const text = shown(model.text.slice(place.start, place.end));
  if (exponents.reduce((sum, n) => sum + n, 0) === 1) {
    return model.reporter.error(
      'value',
      place,
      `\`${text}\` has no loop and does not diverge; a counterterm cancels a product such as \`${text.split('^')[0]}^2\`.`,
    );
  }
  if (vertices.order !== null && order > vertices.order) {
    return model.reporter.error(
      'value',
      place,
      `\`${text}\` is of order ${order}, and the series goes to ${vertices.order}; write \`series to ${order}\` or take it out.`,
    );
  }
  return exponents;
}

function interactionCalled(model: Model, statement: CountertermStatement, word: Word, vertices: Vertices): InteractionSpec | null {
  const found = vertices.interactions.get(word.name);
  if (found !== undefined) return found;
  if (vertices.open) return null;
  const near = suggestion(word.name, vertices.interactions.keys());
  const isValue = model.scope.has(word.name);
  const why = isValue ? ' is a value, not an interaction' : ' is no interaction of this model';
  return model.reporter.error('unknown-name', within(statement, word.span), `\`${shown(word.name)}\`${why}${near || '.'}`, {
    subject: word.name,
  });
}

function readScale(model: Model, statement: CountertermStatement, vertices: Vertices): number | null {
  const { kind, at } = statement.body.scheme;
  const value = momentum(model, statement, at, 'The subtraction point');
  if (value === null) return null;
  const span = within(statement, at.span);
  if (!(value > 0)) return model.reporter.error('value', span, `The subtraction point is a positive momentum, and this is ${value}.`);
  if (kind === 'p' && value >= vertices.edge)
    return model.reporter.error('value', span, `This subtraction point lies beyond the sharp cutoff, ${vertices.edge}.`);
  return kind === 'kappa' && Number.isNaN(vertices.mu) ? null : value;
}
