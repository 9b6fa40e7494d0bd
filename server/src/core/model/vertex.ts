import { symbolsOf, type Expr } from '../algebra/expression';
import type { KernelShape, LocalShape, MomentumTerm } from './kernel-shape';
import type { MatrixElement } from './matrix-element';

/** A kernel as the series uses it: an interaction, or the form of a counterterm. */
export interface Vertex {
  readonly name: string;
  /** Σ c p^a k^b E^e where the kernel is a contact; null otherwise. */
  readonly contact: readonly MomentumTerm[] | null;
  readonly element: MatrixElement;
  /** Momentum over which the kernel changes when both momenta are large at fixed difference; Infinity: no such narrow ridge. */
  readonly ridge: number;
  readonly dependsOnEnergy: boolean;
}

export function vertexOf(name: string, element: MatrixElement): Vertex {
  return {
    name,
    contact: contactTerms(element.shape),
    element,
    ridge: ridgeOf(element.shape),
    dependsOnEnergy: energyOccurs(element.shape),
  };
}

export function contactTerms(shape: KernelShape): readonly MomentumTerm[] | null {
  if (shape.kind === 'polynomial') return shape.terms;
  if (shape.kind !== 'sum') return null;
  const parts = shape.parts.map(contactTerms);
  return parts.every(part => part !== null) ? parts.flatMap(part => part) : null;
}

/** Every local part of a kernel. */
export function localParts(shape: KernelShape): readonly LocalShape[] {
  if (shape.kind === 'local') return [shape];
  return shape.kind === 'sum' ? shape.parts.flatMap(localParts) : [];
}

function ridgeOf(shape: KernelShape): number {
  if (shape.kind === 'sum') return Math.min(...shape.parts.map(ridgeOf));
  if (shape.kind === 'local') return isShiftedContact(shape) ? Infinity : shape.scale;
  return shape.kind === 'general' && dependsOnDifference(shape.expr) ? 0 : Infinity;
}

/** A contact away from the origin: it oscillates along both momenta, but has no ridge. */
const isShiftedContact = (shape: LocalShape): boolean =>
  shape.scale === 0 && Boolean(shape.tail?.length && shape.tail.every(t => t.phase !== 0));

function energyOccurs(shape: KernelShape): boolean {
  if (shape.kind === 'sum') return shape.parts.some(energyOccurs);
  if (shape.kind === 'polynomial') return shape.terms.some(t => t.e > 0);
  return shape.kind === 'general' && symbolsOf(shape.expr).has('E');
}

/** Does p - k (or k - p) occur inside a function, a denominator or a root: may the kernel be narrow along p = k? */
function dependsOnDifference(expr: Expr): boolean {
  switch (expr.kind) {
    case 'number':
    case 'symbol':
      return false;
    case 'negate':
      return dependsOnDifference(expr.argument);
    case 'call':
      return expr.arguments.some(mixesMomenta);
    case 'divide':
      return dependsOnDifference(expr.left) || mixesMomenta(expr.right);
    case 'power':
      return (
        dependsOnDifference(expr.left) ||
        (mixesMomenta(expr.left) && !(expr.right.kind === 'number' && Number.isInteger(expr.right.re) && expr.right.re > 0))
      );
    default:
      return dependsOnDifference(expr.left) || dependsOnDifference(expr.right);
  }
}

/** A sum of terms in p and terms in k is narrow along p = k only where it is odd in one of them: a difference of the two, not p^2 + k^2. */
function mixesMomenta(expr: Expr): boolean {
  const names = symbolsOf(expr);
  if (!names.has('p') || !names.has('k')) return false;
  if (expr.kind === 'subtract') return true;
  if (expr.kind === 'negate') return mixesMomenta(expr.argument);
  if (expr.kind === 'call') return expr.arguments.some(mixesMomenta);
  return expr.kind !== 'number' && expr.kind !== 'symbol' && (mixesMomenta(expr.left) || mixesMomenta(expr.right));
}
