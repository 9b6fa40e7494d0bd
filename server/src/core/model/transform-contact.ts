import type { ContactPower } from './transform-local';
import type { LocalPiece } from './transform';

/** A delta or its derivative away from the origin of x (dimension 1): q^power with a phase. */
export function shiftedContact({ coefficient, power, centre }: ContactPower): LocalPiece {
  return {
    coefficient,
    centre,
    odd: power % 2 === 1,
    value(q, out) {
      for (let j = 0; j < q.length; j++) out[j] = q[j] ** power;
    },
    family: { kind: 'contact' },
    scale: 1 / Math.abs(centre),
    tail: [{ coefficient: { re: 1, im: 0 }, power, log: 0, phase: 0 }],
    smooth: false,
    origin: null,
    transfer: null,
    relativeError: 1e-15,
  };
}
