import { symbolsOf, type Expr } from '../algebra/expression';
import type { KernelShape, LocalShape, MomentumTerm, TailTerm } from './kernel-shape';
import type { MatrixElement } from './matrix-element';

/** c p^a e^(iθp) k^b e^(-iθk) E^e: a contact, away from the origin of position space where θ (`phase`) is not 0. */
export interface RankTerm extends MomentumTerm {
  readonly phase: number;
}

/** A kernel as the series uses it: an interaction, or the form of a counterterm. */
export interface Vertex {
  readonly name: string;
  /** Σ c p^a k^b E^e where the kernel is a contact; null otherwise. */
  readonly contact: readonly MomentumTerm[] | null;
  /** The same for contacts that need not sit at the origin; null where the kernel is not of finite rank. */
  readonly finiteRank: readonly RankTerm[] | null;
  readonly element: MatrixElement;
  /** Momentum over which the kernel changes when both momenta are large at fixed difference; Infinity: no such narrow ridge. */
  readonly ridge: number;
  readonly dependsOnEnergy: boolean;
}

/** `signed`: dimension 1, full wave. */
export function vertexOf(name: string, element: MatrixElement, signed: boolean): Vertex {
  return {
    name,
    contact: contactTerms(element.shape),
    finiteRank: rankTerms(element.shape, signed),
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

function rankTerms(shape: KernelShape, signed: boolean): readonly RankTerm[] | null {
  if (shape.kind === 'polynomial') return shape.terms.map(t => ({ ...t, phase: 0 }));
  if (shape.kind === 'local') return signed && shape.contact && shape.tail ? shape.tail.flatMap(expandTransfer) : null;
  if (shape.kind !== 'sum') return null;
  const parts = shape.parts.map(part => rankTerms(part, signed));
  return parts.every(part => part !== null) ? parts.flatMap(part => part) : null;
}

/** c (p - k)^n e^(iθ(p - k)), from how it looks for p - k > 0. */
function expandTransfer({ coefficient, power, phase }: TailTerm): RankTerm[] {
  let binomial = 1;
  return Array.from({ length: power + 1 }, (_, b) => {
    const c = b % 2 ? -binomial : binomial;
    binomial *= (power - b) / (b + 1);
    return { a: power - b, b, e: 0, re: c * coefficient.re, im: c * coefficient.im, phase };
  });
}

/** Every local part of a kernel. */
export function localParts(shape: KernelShape): readonly LocalShape[] {
  if (shape.kind === 'local') return [shape];
  return shape.kind === 'sum' ? shape.parts.flatMap(localParts) : [];
}

function ridgeOf(shape: KernelShape): number {
  if (shape.kind === 'sum') return Math.min(...shape.parts.map(ridgeOf));
  // A contact away from the origin oscillates along both momenta, but is nowhere narrow.
  if (shape.kind === 'local') return shape.contact ? Infinity : shape.scale;
  return shape.kind === 'general' && dependsOnDifference(shape.expr) ? 0 : Infinity;
}

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
