import { substitute, number } from '../algebra/expression';
import type { Expr } from '../algebra/expression';
import { KernelError } from './kernel-error';
import { constantValue } from './recognise-constant';
import { positionTerms } from './recognise-position';
import type { PositionTerm } from './recognise-position';
import type { LocalPiece } from './transform';
import { gaussianPiece } from './transform-gaussian';
import { numericPieces } from './transform-numeric';
import { exponentialPiece, powerPiece } from './transform-poles';
import { wellPiece } from './transform-well';

/** coefficient · exp(-i q centre) · q^power with the coefficient's phases put in: what a delta becomes. */
export interface ContactPower {
  readonly coefficient: { readonly re: number; readonly im: number };
  readonly power: number;
  readonly centre: number;
}

export interface Transformed {
  readonly contacts: readonly ContactPower[];
  readonly pieces: readonly LocalPiece[];
}

/**
 * Fourier transform ∫d^Dr exp(-iqr) V(r) of a potential in `x` (dimension 1) or `r`: in closed form term by term where there is
 * one, what is left by quadrature. Throws KernelError where the transform does not exist.
 */
export function transform(kernel: Expr, dimension: 1 | 2 | 3): Transformed {
  const variable = dimension === 1 ? 'x' : 'r';
  const contacts: ContactPower[] = [];
  const pieces: LocalPiece[] = [];
  const left: PositionTerm[] = [];
  for (const term of positionTerms(kernel, variable, dimension > 1)) {
    if (term.coefficient.re === 0 && term.coefficient.im === 0) continue;
    if (term.delta !== null) contacts.push(...deltaTerm(term, term.delta, variable));
    else {
      const piece = closedPiece(term, dimension);
      if (piece) pieces.push(withCoefficient(piece, term));
      else left.push(term);
    }
  }
  return { contacts, pieces: [...pieces, ...numericPieces(left, variable, dimension)] };
}

function closedPiece(term: PositionTerm, dimension: 1 | 2 | 3): LocalPiece | null {
  if (term.rest) return null;
  const { power, odd, linear, quadratic, from, to } = term;
  const everywhere = to === Infinity && from === (dimension === 1 ? -Infinity : 0);
  if (everywhere && quadratic === 0 && linear < 0) return exponentialPiece(dimension, power, -linear, odd);
  if (everywhere && quadratic === 0 && linear === 0 && !odd) return powerPiece(dimension, power);
  if (everywhere && linear === 0 && quadratic < 0) return gaussianPiece(dimension, power, odd, -quadratic);
  if (power !== 0 || linear !== 0 || quadratic !== 0) return null;
  if (dimension === 1 && Number.isFinite(from) && Number.isFinite(to) && to > from)
    return { ...wellPiece(1, (to - from) / 2), centre: (to + from) / 2 };
  return dimension > 1 && from <= 0 && to > 0 && Number.isFinite(to) ? wellPiece(dimension, to) : null;
}

function withCoefficient(piece: LocalPiece, { coefficient: c, centre }: PositionTerm): LocalPiece {
  const { re, im } = piece.coefficient;
  const times = (x: { re: number; im: number }) => ({ re: x.re * c.re - x.im * c.im + 0, im: x.re * c.im + x.im * c.re + 0 });
  return { ...piece, coefficient: times({ re, im }), centre: piece.centre + centre, origin: piece.origin && times(piece.origin) };
}

/** f(y)·delta^(n)(y) = Σ_j (-1)^j binomial(n, j) f^(j)(0) delta^(n-j)(y); the transform of delta^(n)(y) is (iq)^n. */
function deltaTerm(term: PositionTerm, primes: number, variable: string): readonly ContactPower[] {
  const { power, odd, linear, quadratic, centre, rest } = term;
  let { coefficient } = term;
  if (power < 0 || (odd && power % 2 === 0)) throw new KernelError('value', 'The factor of a delta must be finite where the delta sits.');
  if (rest) {
    const value = primes === 0 ? factorAt(rest, variable) : null;
    if (!value)
      throw new KernelError(
        'not-evaluated',
        "A derivative of delta is taken only with powers as factors; write f(x)*delta'(x) as f(0)*delta'(x) - f'(0)*delta(x).",
      );
    coefficient = { re: coefficient.re * value.re - coefficient.im * value.im, im: coefficient.re * value.im + coefficient.im * value.re };
  }
  if (linear !== 0 && primes > 0)
    throw new KernelError('value', 'The factor of a derivative of delta must be smooth where the delta sits.');
  // y^power exp(quadratic y²) has the Taylor coefficients below; only those up to the derivatives of delta count.
  const taylor = [0, 0, 0];
  if (power < 3) taylor[power] = 1;
  if (power === 0) taylor[2] = quadratic;
  const contacts: ContactPower[] = [];
  for (let j = 0, factor = 1; j <= primes; j++) {
    const remaining = primes - j;
    const size = factor * taylor[j];
    if (size !== 0)
      contacts.push({
        coefficient: timesPowerOfI({ re: coefficient.re * size, im: coefficient.im * size }, remaining),
        power: remaining,
        centre,
      });
    factor *= -(primes - j);
  }
  return contacts;
}

function factorAt(rest: Expr, variable: string) {
  const value = constantValue(substitute(rest, new Map([[variable, number(0)]])));
  if (value && !(Number.isFinite(value.re) && Number.isFinite(value.im)))
    throw new KernelError('value', 'The factor of a delta must be finite where the delta sits.');
  return value;
}

function timesPowerOfI({ re, im }: { re: number; im: number }, n: number): { re: number; im: number } {
  return n === 0 ? { re, im } : timesPowerOfI({ re: -im + 0, im: re + 0 }, n - 1);
}
