import { gamma } from '../special/gamma';
import type { LocalPiece } from './transform';

/**
 * Fourier transform of r^(2j) exp(-alpha r²), in dimension 1 also of x^(2j+1) exp(-alpha x²) (`odd`), as a polynomial in q² (times -i q)
 * under exp(-q²/(4 alpha)). Null where the power is not of that kind.
 */
export function gaussianPiece(dimension: 1 | 2 | 3, power: number, odd: boolean, alpha: number): LocalPiece | null {
  if (!Number.isInteger(power) || power < 0 || power > 12 || (power % 2 === 1) !== odd || !(alpha > 0)) return null;
  const j = Math.floor(power / 2);
  // Generalised Laguerre polynomial in q²/4 alpha; an odd power in dimension 1 is the transform in three, times q/2 alpha.
  const effective = odd ? 3 : dimension;
  const front = (Math.PI / alpha) ** (dimension / 2) * gamma(j + 1) * alpha ** -j * (odd ? 1 / (2 * alpha) : 1);
  const coefficients: number[] = [];
  for (let n = 0; n <= j; n++) {
    const binomial = gamma(j + effective / 2) / (gamma(j - n + 1) * gamma(n + effective / 2));
    coefficients.push((front * (n % 2 === 0 ? 1 : -1) * binomial) / gamma(n + 1) / (4 * alpha) ** n);
  }
  return gaussianInTransfer(coefficients, alpha, odd, power === 0 ? 1 : 0);
}

/** exp(-q²/(4 alpha)) Σ_j c_j q^(2j + odd); `origin` is the potential at r = 0. */
export function gaussianInTransfer(coefficients: readonly number[], alpha: number, odd: boolean, origin: number): LocalPiece {
  const beta = 1 / (4 * alpha);
  return {
    coefficient: odd ? { re: 0, im: -1 } : { re: 1, im: 0 },
    centre: 0,
    odd,
    value(q, out) {
      for (let n = 0; n < q.length; n++) {
        const square = q[n] * q[n];
        let sum = 0;
        for (let j = coefficients.length - 1; j >= 0; j--) sum = sum * square + coefficients[j];
        out[n] = sum * Math.exp(-beta * square) * (odd ? q[n] : 1);
      }
    },
    family: { kind: 'gaussian', alpha, coefficients },
    scale: 2 * Math.sqrt(alpha),
    tail: [],
    smooth: true,
    origin: { re: origin, im: 0 },
    transfer: null,
    relativeError: 1e-14,
  };
}
