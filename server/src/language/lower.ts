import { applyFunction, combine } from '../core/algebra/evaluate';
import { binary, call, negate, number, symbol, type Complex, type Expr } from '../core/algebra/expression';
import type { Dimensions } from './dimensions';
import type { Problem, Span } from './document';
import { shown, suggestion } from './names';
import type { Formula } from './syntax';
import { aLength, dimensionOfUnit, inSystem, product, pure, type Dimension, type UnitSystem } from './units';
import { functionArity, functionNames, isFunction } from './words';

/** What a name in an expression stands for. */
export type Meaning =
  | { readonly kind: 'value'; readonly value: Complex; readonly dimension: Dimension | null }
  /** `value` is null for a free coupling. */
  | { readonly kind: 'coupling'; readonly value: Complex | null; readonly dimension: Dimension | null }
  /** Its declaration has a mistake, which has its own message. */
  | { readonly kind: 'broken' }
  /** It cannot stand for anything here. */
  | { readonly kind: 'mistake'; readonly code: 'unknown-name' | 'dimension'; readonly message: string };

/** An expression with its names resolved. */
export interface Lowered {
  readonly expr: Expr;
  /** Null: fits any, as 0 does. */
  readonly dimension: Dimension | null;
  /** Null where it depends on an argument or on a free coupling. */
  readonly value: Complex | null;
  /** Built of numbers and constants alone. */
  readonly constant: boolean;
}

export interface Context {
  /** Where the statement starts in the text. */
  readonly offset: number;
  /** Null: natural units. */
  readonly system: UnitSystem | null;
  readonly dimensions: Dimensions;
  readonly arguments: ReadonlyMap<string, Dimension>;
  /** The argument of which `delta` may be taken, and in how many dimensions. */
  readonly delta: { readonly of: 'x' | 'r'; readonly dimension: number } | null;
  readonly lookup: (name: string) => Meaning;
  /** Names that an expression may use here, for suggestions. */
  readonly known: () => Iterable<string>;
  readonly report: (problem: Problem) => void;
}

/**
 * Resolves names, checks dimensions and finiteness. Null where the expression has a mistake; each mistake has been reported once.
 * Numbers come out in the units of `context.system`.
 */
export function lower(formula: Formula, context: Context): Lowered | null {
  switch (formula.kind) {
    case 'number':
      return lowerNumber(formula, context);
    case 'name':
      return lowerName(formula.name, formula.span, context);
    case 'group':
      return lower(formula.of, context);
    case 'quantity':
      return lowerQuantity(formula, context);
    case 'negate': {
      const of = lower(formula.of, context);
      if (of === null) return null;
      const value = of.value && { re: -of.value.re, im: of.value.im === 0 ? 0 : -of.value.im };
      return { ...of, value, expr: of.expr.kind === 'number' ? number(-of.expr.re, of.expr.im === 0 ? 0 : -of.expr.im) : negate(of.expr) };
    }
    case 'call':
      return lowerCall(formula, context);
    default:
      return lowerOperation(formula, context);
  }
}

type Of<K extends Formula['kind']> = Extract<Formula, { kind: K }>;
type Operation = Of<'add' | 'subtract' | 'multiply' | 'divide' | 'power'>;

const error = (context: Context, code: Problem['code'], span: Span, message: string, more: Partial<Problem> = {}): null => {
  context.report({
    code,
    severity: 'error',
    message,
    span: { start: context.offset + span.start, end: context.offset + span.end },
    ...more,
  });
  return null;
};

function lowerNumber(formula: Of<'number'>, context: Context): Lowered | null {
  const { value, text } = formula;
  if (!Number.isFinite(value))
    return error(context, 'value', formula.span, `\`${shown(text)}\` is above 1.8e308, the largest number there is.`);
  if (value === 0 && /[1-9]/.test(text.split(/e/i)[0])) {
    return error(
      context,
      'value',
      formula.span,
      `\`${shown(text)}\` is below 5e-324, the smallest number there is; write 0 if it is meant.`,
    );
  }
  return { expr: number(value), dimension: value === 0 ? null : pure, value: { re: value, im: 0 }, constant: true };
}

function lowerName(name: string, span: Span, context: Context): Lowered | null {
  const argument = context.arguments.get(name);
  if (argument !== undefined) return { expr: symbol(name), dimension: argument, value: null, constant: false };
  const meaning = context.lookup(name);
  switch (meaning.kind) {
    case 'value':
      return { expr: number(meaning.value.re, meaning.value.im), dimension: meaning.dimension, value: meaning.value, constant: true };
    case 'coupling':
      return { expr: symbol(name), dimension: meaning.dimension, value: meaning.value, constant: false };
    case 'broken':
      return null;
    case 'mistake':
      return error(context, meaning.code, span, meaning.message, { subject: name });
  }
}

function lowerQuantity(formula: Of<'quantity'>, context: Context): Lowered | null {
  const of = lower(formula.of, context);
  const first = formula.units[0];
  const last = formula.units[formula.units.length - 1];
  if (context.system === null) {
    const span = { start: first.span.start, end: last.span.end };
    const means = context.known();
    const product = [...means].includes(first.unit) ? `; if the value \`${first.unit}\` is meant, write \`*${first.unit}\`` : '';
    return error(
      context,
      'dimension',
      span,
      `The model is in natural units, where \`${first.unit}\` has no place; declare \`units\` or write a pure number${product}.`,
    );
  }
  const names = formula.units.length > 1 ? new Set(context.known()) : null;
  let factor = 1;
  let dimension: Dimension = pure;
  for (const [i, { unit, power, span }] of formula.units.entries()) {
    factor *= power < 0 ? 1 / inSystem(unit, context.system) ** -power : inSystem(unit, context.system) ** power;
    dimension = product(dimension, dimensionOfUnit(unit), power);
    if (i > 0 && names!.has(unit)) {
      const message = `\`${unit}\` is read as the unit here, not as the value of that name; for the value write it first, as in \`${unit}*3 ${first.unit}\`.`;
      context.report({
        code: 'reading',
        severity: 'hint',
        message,
        span: { start: context.offset + span.start, end: context.offset + span.end },
        subject: unit,
      });
    }
  }
  if (of === null) return null;
  const whole = of.dimension === null ? null : product(of.dimension, dimension);
  const unitless: Lowered = { expr: number(factor), dimension, value: { re: factor, im: 0 }, constant: true };
  if (factor === 1) return { ...of, dimension: whole };
  const value = of.value && combine('multiply', of.value, unitless.value!);
  if (value !== null && !finite(value)) return error(context, 'value', formula.span, 'This quantity is too large for a number.');
  const expr = of.expr.kind === 'number' && value !== null ? number(value.re, value.im) : binary('multiply', of.expr, unitless.expr);
  return { expr, dimension: whole, value, constant: of.constant };
}

function lowerOperation(formula: Operation, context: Context): Lowered | null {
  const left = lower(formula.left, context);
  const right = lower(formula.right, context);
  if (
    formula.kind === 'divide' &&
    formula.left.kind === 'number' &&
    formula.right.kind === 'quantity' &&
    formula.right.of.kind === 'number'
  ) {
    const message =
      'The unit belongs to the number before it: this is read as `a/(b unit)`. Write parentheses around what the unit is meant for.';
    context.report({
      code: 'reading',
      severity: 'hint',
      message,
      span: { start: context.offset + formula.span.start, end: context.offset + formula.span.end },
    });
  }
  if (left === null || right === null) return null;
  const dimension = combineDimensions(formula, left, right, context);
  if (dimension === undefined) return null;
  const expr = binary(formula.kind, left.expr, right.expr);
  const constant = left.constant && right.constant;
  if (formula.kind === 'divide' && right.value !== null && isZero(right.value)) {
    const both = left.value !== null && isZero(left.value);
    return error(context, 'value', formula.span, both ? '0/0 has no value.' : `This divides by zero.`);
  }
  const value = left.value && right.value && combine(formula.kind, left.value, right.value);
  if (value !== null && !finite(value)) return error(context, 'value', formula.span, noValue(formula.kind, left.value!));
  return { expr, dimension, value, constant };
}

const noValue = (kind: string, left: Complex): string =>
  kind === 'power' && isZero(left) ? 'A negative power of zero has no value.' : 'The result is above 1.8e308, the largest number there is.';

function combineDimensions(formula: Operation, left: Lowered, right: Lowered, context: Context): Dimension | null | undefined {
  const at = (span: Span) => ({ start: context.offset + span.start, end: context.offset + span.end });
  const { dimensions } = context;
  switch (formula.kind) {
    case 'add':
    case 'subtract': {
      if (left.dimension === null || right.dimension === null) return left.dimension ?? right.dimension;
      if (dimensions.agree(left.dimension, right.dimension)) return left.dimension;
      const words = formula.kind === 'add' ? 'be added to' : 'be subtracted from';
      context.report({
        code: 'dimension',
        severity: 'error',
        message: `${dimensions.name(right.dimension)} cannot ${words} ${dimensions.name(left.dimension)}.`,
        span: at(formula.right.span),
      });
      return undefined;
    }
    case 'multiply':
      return left.dimension && right.dimension && product(left.dimension, right.dimension);
    case 'divide':
      return left.dimension && product(left.dimension, right.dimension ?? pure, -1);
    case 'power':
      return powerDimension(formula, left, right, context);
  }
}

function powerDimension(formula: Operation, left: Lowered, right: Lowered, context: Context): Dimension | null | undefined {
  const { dimensions } = context;
  if (right.dimension !== null && !dimensions.agree(right.dimension, pure)) {
    error(context, 'dimension', formula.right.span, `An exponent is a pure number, and this is ${dimensions.name(right.dimension)}.`);
    return undefined;
  }
  if (left.dimension === null) return right.value !== null && isZero(right.value) ? pure : null;
  const base = dimensions.resolved(left.dimension);
  if (right.constant && right.value !== null) {
    if (right.value.im === 0) return product(pure, base, right.value.re);
  }
  if (dimensions.agree(base, pure)) return pure;
  error(
    context,
    'dimension',
    formula.right.span,
    `The exponent of a quantity with a unit is a number or a constant; here the base is ${dimensions.name(base)}.`,
  );
  return undefined;
}

function lowerCall(formula: Of<'call'>, context: Context): Lowered | null {
  const { name, span } = formula.function;
  const args = formula.arguments.map(argument => lower(argument, context));
  if (!isFunction(name)) return notAFunction(formula, context);
  if (formula.primes > 0 && name !== 'delta') return error(context, 'syntax', span, `Only \`delta\` takes primes, not \`${name}\`.`);
  if (args.length !== functionArity[name]) {
    const wanted = functionArity[name] === 1 ? 'one argument' : 'two arguments, the order and the argument,';
    return error(context, 'syntax', span, `\`${name}\` takes ${wanted} and has ${args.length} here.`);
  }
  if (args.some(argument => argument === null)) return null;
  const lowered = args as Lowered[];
  if (name === 'delta') return lowerDelta(formula, lowered[0], context);
  const { dimensions } = context;
  const free = name === 'sqrt' || name === 'abs' || name === 'step';
  for (const [i, argument] of lowered.entries()) {
    if (free || argument.dimension === null || dimensions.agree(argument.dimension, pure)) continue;
    return error(
      context,
      'dimension',
      formula.arguments[i].span,
      `The argument of \`${name}\` is a pure number, and this is ${dimensions.name(argument.dimension)}.`,
    );
  }
  const values = lowered.map(argument => argument.value);
  const value = values.every(v => v !== null) ? applyFunction(name, values) : null;
  if (value !== null && !finite(value)) return error(context, 'value', formula.span, `\`${name}\` has no finite value here.`);
  if (functionArity[name] === 2 && values[0] === null) {
    return error(context, 'value', formula.arguments[0].span, `The order of \`${name}\` is a number, not a function of the arguments.`);
  }
  const of = lowered[0].dimension;
  const dimension = name === 'sqrt' ? of && product(pure, dimensions.resolved(of), 0.5) : name === 'abs' ? of : pure;
  return {
    expr: call(
      name,
      lowered.map(argument => argument.expr),
    ),
    dimension,
    value,
    constant: lowered.every(argument => argument.constant),
  };
}

function notAFunction(formula: Of<'call'>, context: Context): null {
  const { name, span } = formula.function;
  const isValue = context.arguments.has(name) || context.lookup(name).kind !== 'mistake';
  if (!isValue)
    return error(context, 'unknown-name', span, `There is no function \`${shown(name)}\`${suggestion(name, functionNames) || '.'}`, {
      subject: name,
    });
  const place = { start: context.offset + span.end, end: context.offset + span.end };
  return error(context, 'syntax', formula.open, `A product needs its sign: write \`${shown(name)}*(…)\`.`, {
    mend: { title: 'Insert `*`', span: place, text: '*' },
  });
}

function lowerDelta(formula: Of<'call'>, argument: Lowered, context: Context): Lowered | null {
  const { delta } = context;
  if (delta === null) return error(context, 'value', formula.function.span, '`delta` stands only in kernels of `(x)` and `(r)`.');
  if (!isShift(formula.arguments[0], argument.expr, delta.of)) {
    const wanted = delta.of === 'x' ? '`x`, `x - a` or `x + a` with a constant `a`' : '`r` alone';
    return error(context, 'value', formula.arguments[0].span, `The argument of \`delta\` is ${wanted}.`);
  }
  if (formula.primes > (delta.of === 'x' ? 2 : 0)) {
    const most = delta.of === 'x' ? 'at most two primes' : 'no primes in a kernel of `(r)`';
    return error(context, 'value', formula.function.span, `\`delta\` takes ${most}.`);
  }
  const dimension = product(pure, aLength, -(delta.of === 'x' ? 1 : delta.dimension) - formula.primes);
  return { expr: call('delta', [argument.expr], formula.primes), dimension, value: null, constant: false };
}

function isShift(formula: Formula, expr: Expr, of: 'x' | 'r'): boolean {
  if (formula.kind === 'group') return isShift(formula.of, expr, of);
  if (expr.kind === 'symbol') return expr.name === of;
  if (of === 'r' || (expr.kind !== 'add' && expr.kind !== 'subtract')) return false;
  return expr.left.kind === 'symbol' && expr.left.name === 'x' && !contains(expr.right, 'x');
}

function contains(expr: Expr, name: string): boolean {
  switch (expr.kind) {
    case 'number':
      return false;
    case 'symbol':
      return expr.name === name;
    case 'negate':
      return contains(expr.argument, name);
    case 'call':
      return expr.arguments.some(argument => contains(argument, name));
    default:
      return contains(expr.left, name) || contains(expr.right, name);
  }
}

const finite = (z: Complex): boolean => Number.isFinite(z.re) && Number.isFinite(z.im);
const isZero = (z: Complex): boolean => z.re === 0 && z.im === 0;
