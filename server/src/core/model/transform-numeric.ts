import { binary, negate, substitute, symbol } from '../algebra/expression';
import type { Complex, Expr } from '../algebra/expression';
import { compile } from '../algebra/compile';
import { specialFunctions } from '../special';
import type { PositionTerm } from './recognise-position';
import type { LocalPiece } from './transform';
import { tabulatedPiece } from './transform-tabulated';

/** The transforms of terms without a closed form: those about one centre together, their real and imaginary, even and odd parts apart. */
export function numericPieces(terms: readonly PositionTerm[], variable: string, dimension: 1 | 2 | 3): readonly LocalPiece[] {
  const centres = [...new Set(terms.map(t => t.centre))];
  return centres.flatMap(centre => {
    const sum = terms
      .filter(t => t.centre === centre)
      .map(t => t.expr)
      .reduce((left, right) => binary('add', left, right));
    if (dimension > 1) return parts(sum, variable, dimension, false);
    const mirrored = substitute(sum, new Map([[variable, negate(symbol(variable))]]));
    // ∫V exp(-iqx) dx = ∫_0^∞ [V(x) + V(-x)] cos(qx) dx - i ∫_0^∞ [V(x) - V(-x)] sin(qx) dx.
    const pieces = [
      ...parts(binary('add', sum, mirrored), variable, 1, false),
      ...parts(binary('subtract', sum, mirrored), variable, 1, true),
    ];
    return pieces.map(piece => ({ ...piece, centre }));
  });
}

function parts(expr: Expr, variable: string, dimension: 1 | 2 | 3, odd: boolean): readonly LocalPiece[] {
  const compiled = compile(expr, specialFunctions);
  const evaluate = (r: Float64Array) => {
    const re = new Float64Array(r.length);
    const im = new Float64Array(r.length);
    compiled({ [variable]: r }, re, im);
    return { re, im };
  };
  const probe = evaluate(Float64Array.from({ length: 600 }, (_, j) => 1.0371 * 10 ** ((j - 300) / 30)));
  const units: Readonly<Record<'re' | 'im', Complex>> = { re: { re: 1, im: 0 }, im: { re: 0, im: 1 } };
  return (['re', 'im'] as const)
    .filter(part => probe[part].some(x => x !== 0))
    .map(part => {
      const f = (r: Float64Array, out: Float64Array) => out.set(evaluate(r)[part]);
      const unit = odd ? { re: units[part].im, im: -units[part].re } : units[part];
      return { ...tabulatedPiece({ f, expr, variable, part, dimension, odd }), coefficient: unit };
    });
}
