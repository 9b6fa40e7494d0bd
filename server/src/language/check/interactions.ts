import type { Expr } from '../../core/algebra/expression';
import type { InteractionSpec, KernelArguments } from '../../core/model/spec';
import { lower, type Context } from '../lower';
import { shown } from '../names';
import type { Statement } from '../outline';
import type { Formula, Kernel, Word } from '../syntax';
import { aLength, anEnergy, anInverseLength, product, type Dimension } from '../units';
import { within, wholeBetween, type BodyOf, type Model } from './model';
import { evenIn, hermitian, parityKept, realIn, transferHermitian, type Sampler, type Verdict } from './sampling';

type InteractionStatement = Statement<BodyOf<'interaction'>>;

const argumentDimension: Readonly<Record<string, Dimension>> = {
  p: anInverseLength,
  k: anInverseLength,
  q: anInverseLength,
  x: aLength,
  r: aLength,
  E: anEnergy,
};

/** The highest place in the power counting. */
const highestOrder = 100;

/** The interaction as the core wants it, or null where it has a mistake. */
export function readInteraction(model: Model, statement: InteractionStatement, sampler: Sampler): InteractionSpec | null {
  const { body } = statement;
  const { kernel, name } = body;
  const expr = readKernel(model, statement, kernel.arguments, kernel.words, body.value);
  const order = readOrder(model, statement);
  const placed = fitsSpace(model, statement, kernel);
  if (expr === null || !placed) return null;
  const sound = isSymmetric(model, statement, expr, sampler);
  return order === null || !sound ? null : { name: name.name, arguments: kernel.arguments, kernel: expr, order };
}

/** A kernel's expression, its dimension checked. */
function readKernel(
  model: Model,
  statement: InteractionStatement,
  args: KernelArguments,
  words: readonly Word[],
  formula: Formula,
): Expr | null {
  const inPosition = args === 'x' || args === 'r';
  const delta: Context['delta'] = inPosition ? { of: args, dimension: model.space } : null;
  const lowered = lower(formula, kernelContext(model, statement, words, delta));
  if (lowered === null) return null;
  if (inPosition && !deltaIsLinear(lowered.expr)) {
    return model.reporter.error(
      'value',
      within(statement, formula.span),
      '`delta` stands in a sum or once in a product, not in a power, a denominator or another function.',
    );
  }
  const wanted = inPosition ? anEnergy : product(anEnergy, aLength, model.space);
  if (lowered.dimension !== null && !model.dimensions.agree(lowered.dimension, wanted)) {
    const symbol = inPosition ? `V(${args})` : '⟨p|V|k⟩';
    const message = `${symbol} has the dimension ${model.dimensions.name(wanted)}, and this is ${model.dimensions.name(lowered.dimension)}.`;
    return model.reporter.error('dimension', within(statement, formula.span), message, { subject: statement.body.name.name });
  }
  return lowered.expr;
}

/** The context of an expression in p, k, E, …; says where an argument hides a value of the same name. */
export function kernelContext(model: Model, statement: Statement, words: readonly Word[], delta: Context['delta'] = null): Context {
  for (const { name, span } of words) {
    if (!model.scope.declares(name)) continue;
    const message = `Here \`${name}\` is the argument; it hides the value \`${name}\`.`;
    model.reporter.add({ code: 'reading', severity: 'hint', message, span: within(statement, span), subject: name });
  }
  return model.scope.context(statement.span.start, new Map(words.map(({ name }) => [name, argumentDimension[name]])), delta);
}

function readOrder(model: Model, statement: InteractionStatement): number | null {
  const { order, orderSpan } = statement.body;
  if (order === null) return 1;
  if (order.value === 0) {
    const message =
      'An interaction of order 0, summed to all orders, is read but not evaluated by this version; give it an order of 1 or more.';
    return model.reporter.error('not-evaluated', within(statement, orderSpan), message, { subject: statement.body.name.name });
  }
  return wholeBetween(model.reporter, statement, order, 1, highestOrder, 'The order of an interaction');
}

/** Do the arguments exist in this dimension, and the channels in this wave? */
function fitsSpace(model: Model, statement: InteractionStatement, kernel: Kernel): boolean {
  const { reporter, space, channels } = model;
  const at = within(statement, kernel.words[0].span);
  if (kernel.arguments === 'x' && space !== 1) {
    reporter.error('value', at, `A kernel of \`(x)\` belongs to dimension 1; in dimension ${space} a potential is one of \`(r)\`.`);
    return false;
  }
  if (kernel.arguments === 'r' && space === 1) {
    reporter.error('value', at, 'A kernel of `(r)` belongs to dimensions 2 and 3; in dimension 1 a potential is one of `(x)`.');
    return false;
  }
  const { element } = kernel;
  const ofMomenta = kernel.arguments === 'pk' || kernel.arguments === 'pkE';
  if (element === null) {
    if (channels === 1 || !ofMomenta) return true;
    reporter.error(
      'value',
      within(statement, statement.body.name.span),
      'In coupled channels a kernel of `(p, k)` is an element: write `(p, k)[a, b]`.',
    );
    return false;
  }
  if (!ofMomenta) {
    reporter.error(
      'value',
      within(statement, element.span),
      `A kernel of \`(${kernel.arguments})\` acts in every channel; take the \`[a, b]\` out.`,
    );
    return false;
  }
  return [element.out, element.in].every(
    channel =>
      wholeBetween(reporter, statement, channel, 1, channels, `The number of a channel${channels === 1 ? ' of a single wave' : ''}`) !==
      null,
  );
}

function isSymmetric(model: Model, statement: InteractionStatement, kernel: Expr, sampler: Sampler): boolean {
  const { body } = statement;
  const { reporter, space, wave } = model;
  const { arguments: args, element } = body.kernel;
  const place = within(statement, body.value.span);
  const subject = { subject: body.name.name };
  const own = shown(body.name.name);
  if (element !== null && element.out.value !== element.in.value) return true;
  const verdict = hermiticity(kernel, args, sampler, space === 1);
  if (verdict === 'no-value') {
    reporter.error('value', place, `\`${own}\` has no finite value at any of the points where it was tried.`, subject);
    return false;
  }
  if (verdict === 'fails') {
    reporter.error(
      'not-hermitian',
      place,
      `\`${own}\` is not Hermitian: ${conditions[args === 'q' && space === 1 ? 'q1' : args]}.`,
      subject,
    );
    return false;
  }
  if (wave.kind !== 'even' && wave.kind !== 'odd') return true;
  const kept = args === 'q' || args === 'x' ? evenIn(kernel, args, sampler) : parityKept(kernel, sampler);
  if (kept === 'fails') reporter.error('value', place, `\`${own}\` mixes even and odd waves; look at \`wave full\`.`, subject);
  return kept !== 'fails';
}

const conditions: Readonly<Record<KernelArguments | 'q1', string>> = {
  pk: 'V(p, k) must be the complex conjugate of V(k, p), as in `p^2 + k^2` or `i*(p - k)`',
  pkE: 'V(p, k, E) must be the complex conjugate of V(k, p, E), as in `p^2 + k^2` or `i*(p - k)`',
  q1: 'V(-q) must be the complex conjugate of V(q), as in `q^2` or `i*q`',
  q: 'V(q) must be real',
  x: 'V(x) must be real',
  r: 'V(r) must be real',
};

function hermiticity(kernel: Expr, args: KernelArguments, sampler: Sampler, signed: boolean): Verdict {
  switch (args) {
    case 'q':
      return transferHermitian(kernel, sampler, signed);
    case 'x':
    case 'r':
      return realIn(kernel, args, sampler);
    default:
      return hermitian(kernel, sampler, signed);
  }
}

/** Is every `delta` in a sum, or once in a product? */
const deltaIsLinear = (expr: Expr): boolean => deltaDegree(expr) <= 1;

function deltaDegree(expr: Expr): number {
  switch (expr.kind) {
    case 'number':
    case 'symbol':
      return 0;
    case 'negate':
      return deltaDegree(expr.argument);
    case 'call':
      return expr.name === 'delta' ? 1 : notLinear(Math.max(...expr.arguments.map(deltaDegree)));
    case 'add':
    case 'subtract':
      return Math.max(deltaDegree(expr.left), deltaDegree(expr.right));
    case 'multiply':
      return deltaDegree(expr.left) + deltaDegree(expr.right);
    case 'divide':
      return deltaDegree(expr.left) + notLinear(deltaDegree(expr.right));
    case 'power':
      return notLinear(Math.max(deltaDegree(expr.left), deltaDegree(expr.right)));
  }
}

const notLinear = (degree: number): number => (degree > 0 ? Infinity : 0);
