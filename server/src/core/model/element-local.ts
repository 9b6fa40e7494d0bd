import type { Expr } from '../algebra/expression';
import type { LocalShape, TailTerm } from './kernel-shape';
import { contactElement } from './element-momentum';
import { KernelError } from './kernel-error';
import type { Element } from './element';
import { project } from './projection';
import { mixedParity, projectedPower } from './projection-polynomial';
import { findPole } from './recognise-poles';
import type { ModelSpec } from './spec';
import type { LocalPiece } from './transform';
import { shiftedContact } from './transform-contact';
import { transform } from './transform-local';
import { transferPieces } from './transform-transfer';

/** The elements of a potential in x or r, or of a function of the momentum transfer q. */
export function localElements(kernel: Expr, argument: 'q' | 'x' | 'r', spec: ModelSpec): readonly Element[] {
  const { dimension, wave } = spec;
  if (argument === 'q') {
    const pole = findPole(kernel, ['q'], dimension === 1);
    if (pole)
      throw new KernelError('value', `The kernel is infinite at ${pole}: such a pole has no meaning without a rule for passing it.`);
  }
  const { contacts, pieces } = argument === 'q' ? transferPieces(kernel, dimension) : transform(kernel, dimension);
  const all = [...pieces, ...contacts.filter(c => c.centre !== 0).map(shiftedContact)];
  const central = contacts.filter(c => c.centre === 0);
  if (wave.kind === 'even' || wave.kind === 'odd') requireEven([...all, ...central.map(shiftedContact)]);
  const terms = central.flatMap(c => {
    const projected = projectedPower(c.coefficient, c.power, dimension, wave);
    if (projected) return projected;
    all.push({ ...shiftedContact(c), scale: 0 });
    return [];
  });
  const elements = all.map(piece => localElement(piece, spec));
  return central.length > 0 && (terms.length > 0 || elements.length === 0) ? [contactElement(terms, wave), ...elements] : elements;
}

function localElement(piece: LocalPiece, spec: ModelSpec): Element {
  const projected = project(piece, spec);
  // A function of |p - k|, projected, or of p - k kept even by the wave.
  const symmetric = spec.dimension > 1 || spec.wave.kind !== 'full';
  return { ...projected, symmetric, add: (p, k, _E, re, im) => projected.add(p, k, re, im), shape: shapeOf(piece) };
}

function shapeOf(piece: LocalPiece): LocalShape {
  const { coefficient: c, centre, odd, tail, smooth, origin, transfer, scale, family } = piece;
  const terms = (direction: 1 | -1): readonly TailTerm[] | null =>
    tail &&
    tail.map(t => {
      const sign = direction < 0 && odd ? -1 : 1;
      const { re, im } = t.coefficient;
      return {
        ...t,
        coefficient: { re: sign * (re * c.re - im * c.im) + 0, im: sign * (re * c.im + im * c.re) + 0 },
        phase: t.phase - direction * centre,
      };
    });
  return { kind: 'local', tail: terms(1), backwardTail: terms(-1), transfer, smooth, origin, scale, contact: family.kind === 'contact' };
}

/** Even and odd waves do not couple only if V(q) = V(-q). */
function requireEven(pieces: readonly LocalPiece[]): void {
  const scale = Math.max(...pieces.map(p => p.scale).filter(Number.isFinite), 1e-6);
  const q = Float64Array.from([-5.1, -1.3, -0.37, -0.11, 0.11, 0.37, 1.3, 5.1], x => x * scale);
  const re = new Float64Array(q.length);
  const im = new Float64Array(q.length);
  let size = 0;
  for (const piece of pieces) {
    const one = { re: new Float64Array(q.length), im: new Float64Array(q.length) };
    project(piece, { dimension: 1, wave: { kind: 'full' } }).add(q, new Float64Array(q.length), one.re, one.im);
    for (let j = 0; j < q.length; j++) {
      re[j] += one.re[j];
      im[j] += one.im[j];
      size = Math.max(size, Math.hypot(one.re[j], one.im[j]));
    }
  }
  for (let j = 0; j < q.length; j++) {
    const mirror = q.length - 1 - j;
    if (Math.hypot(re[j] - re[mirror], im[j] - im[mirror]) > 1e-9 * size) throw mixedParity();
  }
}
