import { complexArithmetic, complexFunction, complexPower } from '../algebra/compile';
import { binary, number, symbol } from '../algebra/expression';
import type { Complex, Expr } from '../algebra/expression';
import { KernelError } from './kernel-error';
import { centreOf, lineIn, shifted } from './recognise-centre';
import { constantValue } from './recognise-constant';
import { polynomialIn } from './recognise-polynomial';
import { expandTerms, termExpr } from './recognise-terms';
import type { Factor, Term } from './recognise-terms';

/**
 * One term of a potential, y = position - centre (the radius in dimensions 2 and 3, where centre = 0):
 * coefficient · |y|^power · sign(y)^odd · exp(linear·|y| + quadratic·y²) · rest on [from, to].
 */
export interface PositionTerm {
  readonly coefficient: Complex;
  readonly centre: number;
  readonly power: number;
  readonly odd: boolean;
  readonly linear: number;
  readonly quadratic: number;
  readonly from: number;
  readonly to: number;
  /** Derivatives of delta(y); null without a delta. */
  readonly delta: number | null;
  /** Factors of other forms, the variable standing for y; null where there is none. */
  readonly rest: Expr | null;
  /** The whole term, the variable standing for y. */
  readonly expr: Expr;
}

/** Stands for |y| while arguments are read. */
const SIZE = '|y|';

/** The terms of a potential in `variable`; `radial` where it is r >= 0. Throws KernelError for a misused delta. */
export function positionTerms(kernel: Expr, variable: string, radial: boolean): readonly PositionTerm[] {
  const positive = new Set(radial ? [variable] : []);
  return expandTerms(kernel, positive).flatMap(term => {
    const centre = radial ? 0 : centreOf(term, variable);
    if (centre === 0) return [new Reader(variable, radial, 0, termExpr(term)).read(term)];
    return expandTerms(shifted(termExpr(term), variable, centre), positive).map(t =>
      new Reader(variable, radial, centre, termExpr(t)).read(t),
    );
  });
}

class Reader {
  private coefficient: Complex = { re: 1, im: 0 };
  private power = 0;
  private odd = false;
  private linear = 0;
  private quadratic = 0;
  private from: number;
  private to = Infinity;
  private delta: number | null = null;
  private readonly rest: Factor[] = [];

  constructor(
    private readonly variable: string,
    private readonly radial: boolean,
    private readonly centre: number,
    private readonly expr: Expr,
  ) {
    this.from = radial ? 0 : -Infinity;
  }

  read(term: Term): PositionTerm {
    for (const factor of term) if (!this.take(factor)) this.rest.push(factor);
    return {
      coefficient: this.coefficient,
      centre: this.centre,
      power: this.power,
      odd: this.odd,
      linear: this.linear,
      quadratic: this.quadratic,
      from: this.from,
      to: this.to,
      delta: this.delta,
      rest: this.rest.length > 0 ? termExpr(this.rest) : null,
      expr: this.expr,
    };
  }

  /** Takes a factor into the closed form; false where it belongs to the rest. */
  private take({ base, exponent }: Factor): boolean {
    const constant = constantValue(base);
    if (constant) return this.multiply(complexPower(constant, { re: exponent, im: 0 }));
    if (base.kind === 'symbol') return this.takePower(exponent, !this.radial);
    if (base.kind === 'call') {
      const argument = this.read1(base.arguments[0]);
      if (base.name === 'abs' && argument) return this.takeModulus(argument, exponent);
      if (base.name === 'exp' && argument) return this.takeExponential(argument, exponent);
      if (base.name === 'step' && argument && exponent > 0) return this.takeStep(argument);
      if (base.name === 'delta') return this.takeDelta(base.arguments[0], base.primes, exponent);
    }
    return false;
  }

  private multiply(by: Complex): boolean {
    this.coefficient = complexArithmetic('multiply', this.coefficient, by);
    return true;
  }

  private takePower(exponent: number, signed: boolean): boolean {
    if (signed && !Number.isInteger(exponent)) return false;
    this.power += exponent;
    if (signed && exponent % 2 !== 0) this.odd = !this.odd;
    return true;
  }

  /** An argument as a polynomial in [y, |y|] with y² = |y|², real coefficients, degree at most 2. */
  private read1(expr: Expr): { constant: number; y: number; size: number; square: number } | null {
    const terms = polynomialIn(this.withSize(expr), [this.variable, SIZE]);
    if (!terms) return null;
    const result = { constant: 0, y: 0, size: 0, square: 0 };
    for (const {
      powers: [y, size],
      coefficient,
    } of terms) {
      if (coefficient.im !== 0 || y + size > 2 || (y === 1 && size === 1)) return null;
      const key = y + size === 0 ? 'constant' : y + size === 2 ? 'square' : y === 1 && !this.radial ? 'y' : 'size';
      result[key] += coefficient.re;
    }
    return result;
  }

  /** `expr` with |a·y| written as |a|·SIZE. */
  private withSize(expr: Expr): Expr {
    if (expr.kind === 'number' || expr.kind === 'symbol') return expr;
    if (expr.kind === 'negate') return { ...expr, argument: this.withSize(expr.argument) };
    if (expr.kind !== 'call') return { ...expr, left: this.withSize(expr.left), right: this.withSize(expr.right) };
    const line = expr.name === 'abs' ? lineIn(expr.arguments[0], this.variable) : null;
    const onCentre = line && Math.abs(line.constant) <= 1e-12 * Math.abs(line.slope * this.centre);
    return onCentre ? binary('multiply', number(Math.abs(line.slope)), symbol(SIZE)) : expr;
  }

  private takeModulus(argument: { constant: number; y: number; size: number; square: number }, exponent: number): boolean {
    const slope = argument.y || argument.size;
    if (
      argument.square !== 0 ||
      (argument.y !== 0 && argument.size !== 0) ||
      Math.abs(argument.constant) > 1e-12 * Math.abs(slope * this.centre)
    )
      return false;
    return this.multiply({ re: Math.abs(slope) ** exponent, im: 0 }) && this.takePower(exponent, false);
  }

  private takeExponential(argument: { constant: number; y: number; size: number; square: number }, exponent: number): boolean {
    const negligible = Math.abs(argument.y) <= 1e-12 * Math.abs(argument.square * this.centre);
    if (argument.y !== 0 && !negligible) return false;
    this.linear += argument.size * exponent;
    this.quadratic += argument.square * exponent;
    return this.multiply(complexFunction('exp', { re: argument.constant * exponent, im: 0 }));
  }

  private takeStep({ constant, y, size, square }: { constant: number; y: number; size: number; square: number }): boolean {
    if (square !== 0 || (y !== 0 && size !== 0)) return false;
    const edge = -constant / (y || size);
    if (this.radial) {
      if (size > 0) this.from = Math.max(this.from, edge);
      else this.to = Math.min(this.to, edge);
    } else if (size > 0) {
      return false;
    } else if (size < 0) {
      this.from = Math.max(this.from, -edge);
      this.to = Math.min(this.to, edge);
    } else if (y > 0) this.from = Math.max(this.from, edge);
    else this.to = Math.min(this.to, edge);
    return true;
  }

  private takeDelta(argument: Expr, primes: number, exponent: number): boolean {
    if (exponent !== 1 || this.delta !== null)
      throw new KernelError('value', 'A product or a power of deltas has no meaning; add them instead.');
    const line = lineIn(argument, this.variable);
    if (!line)
      throw new KernelError('value', `The argument of delta must be ${this.variable} itself or ${this.variable} shifted by a constant.`);
    if (this.radial && (line.constant !== 0 || primes > 0))
      throw new KernelError('value', 'A central potential may hold delta(r) at the origin only, without primes.');
    this.delta = primes;
    return this.multiply({ re: 1 / (Math.abs(line.slope) * line.slope ** primes), im: 0 });
  }
}
