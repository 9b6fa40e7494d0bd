import type { KernelShape } from './kernel-shape';
import { KernelError } from './kernel-error';
import type { Element } from './element';
import { localElements } from './element-local';
import { contactElement, generalElement } from './element-momentum';
import { bindCouplings } from './recognise-constant';
import { polynomialIn } from './recognise-polynomial';
import type { InteractionSpec, ModelSpec } from './spec';

export { KernelError } from './kernel-error';
export type { KernelShape, LocalShape, MomentumTerm, TailTerm } from './kernel-shape';

/** V(p, k) of one interaction, p out and k in, on the model's wave. hbar = 1, units of the model. */
export interface MatrixElement {
  /** Fills re and im at the points (p[j], k[j]), signed in dimension 1 `full`, >= 0 otherwise. All arrays have one length. */
  fill(p: Float64Array, k: Float64Array, E: number, re: Float64Array, im: Float64Array): void;
  /** im is always 0. */
  readonly real: boolean;
  /** V(p, k) = V(k, p); false: not known to be. */
  readonly symmetric: boolean;
  /** Absolute error bound of the fill, relative to the kernel's size. */
  readonly relativeError: number;
  readonly shape: KernelShape;
}

/**
 * The matrix element of an interaction with these values of the couplings: the Fourier transform of a potential, its projection on the
 * wave, or the kernel as it is given. Conventions: V(q) = ∫d^Dr exp(-iqr) V(r); dimension 1 V(p,k) = V(q = p-k), even and odd
 * ½[V(p,k) ± V(p,-k)]; dimension 2 V_m = (1/2π)∫dφ cos(mφ) V(|p-k|); dimension 3 V_l = ½∫P_l(x) V(|p-k|) dx.
 * Throws KernelError with one sentence where there is none.
 */
export function matrixElement(interaction: InteractionSpec, spec: ModelSpec, couplings: ReadonlyMap<string, number>): MatrixElement {
  const kernel = bindCouplings(interaction.kernel, couplings);
  const elements = elementsOf(interaction, kernel, spec);
  const shapes = elements.map(e => e.shape);
  return {
    fill(p, k, E, re, im) {
      re.fill(0);
      im.fill(0);
      for (const element of elements) element.add(p, k, E, re, im);
    },
    real: elements.every(e => e.real),
    symmetric: elements.every(e => e.symmetric),
    relativeError: Math.max(1e-15, ...elements.map(e => e.relativeError)),
    shape: shapes.length === 1 ? shapes[0] : shapes.length === 0 ? { kind: 'polynomial', terms: [] } : { kind: 'sum', parts: shapes },
  };
}

function elementsOf(interaction: InteractionSpec, kernel: InteractionSpec['kernel'], spec: ModelSpec): readonly Element[] {
  if (interaction.arguments === 'pk' || interaction.arguments === 'pkE') {
    const polynomial = polynomialIn(kernel, ['p', 'k', 'E']);
    if (!polynomial) return [generalElement(kernel, spec)];
    const terms = polynomial.map(({ powers: [a, b, e], coefficient: { re, im } }) => ({ a, b, e, re, im }));
    if (terms.some(t => !Number.isFinite(t.re) || !Number.isFinite(t.im)))
      throw new KernelError('value', 'A coefficient of this kernel is not a finite number.');
    return [contactElement(terms, spec.wave)];
  }
  return localElements(kernel, interaction.arguments, spec);
}
