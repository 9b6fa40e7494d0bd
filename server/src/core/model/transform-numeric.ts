import { KernelError } from './kernel-error';
import type { PositionTerm } from './recognise-position';
import type { LocalPiece } from './transform';

export function numericPieces(terms: readonly PositionTerm[], _variable: string, _dimension: 1 | 2 | 3): readonly LocalPiece[] {
  if (terms.length === 0) return [];
  throw new KernelError('not-evaluated', 'numeric transforms are not there yet');
}
