import { besselJ } from '../special/bessel-j';
import { sphericalBessel } from '../special/spherical-bessel';
import type { Complex } from '../algebra/expression';
import type { TailTerm } from './kernel-shape';
import type { LocalPiece } from './transform';

/** Fourier transform of step(R - r); in dimension 1 of step(R - |x|). */
export function wellPiece(dimension: 1 | 2 | 3, radius: number): LocalPiece {
  const volume = dimension === 1 ? 2 * radius : dimension === 2 ? Math.PI * radius ** 2 : (4 / 3) * Math.PI * radius ** 3;
  // Normalised to 1 at q = 0: j_0(x), 2 J_1(x)/x, 3 j_1(x)/x.
  const shape = (x: number) =>
    dimension === 1 ? sphericalBessel(0, x) : x < 1e-8 ? 1 : dimension === 2 ? (2 * besselJ(1, x)) / x : (3 * sphericalBessel(1, x)) / x;
  return {
    coefficient: { re: 1, im: 0 },
    centre: 0,
    odd: false,
    value(q, out) {
      for (let j = 0; j < q.length; j++) out[j] = volume * shape(Math.abs(q[j]) * radius);
    },
    family: { kind: 'well', radius },
    scale: 2 / radius,
    tail: tailOf(dimension, radius),
    smooth: false,
    origin: { re: 1, im: 0 },
    transfer: null,
    relativeError: 1e-14,
  };
}

function tailOf(dimension: 1 | 2 | 3, radius: number): readonly TailTerm[] {
  if (dimension === 1) return waves({ re: 0, im: -1 }, -1, radius);
  if (dimension === 3)
    return [...waves({ re: -2 * Math.PI * radius, im: 0 }, -2, radius), ...waves({ re: 0, im: -2 * Math.PI }, -3, radius)];
  // 2πR J_1(x)/q by Hankel's expansion: Re sqrt(2/πx) e^{i(x - 3π/4)} Σ (i/x)^n a_n, a_n = Π (4 - (2j-1)²)/(8j).
  const terms: TailTerm[] = [];
  let a = 1;
  for (let n = 0; n < 6; n++) {
    const angle = (-3 * Math.PI) / 4 + (n * Math.PI) / 2;
    const size = Math.PI * radius * Math.sqrt(2 / (Math.PI * radius)) * a * radius ** -n;
    terms.push(...waves({ re: size * Math.cos(angle), im: size * Math.sin(angle) }, -1.5 - n, radius));
    a *= (4 - (2 * n + 1) ** 2) / (8 * (n + 1));
  }
  return terms;
}

/** 2 Re [c exp(i R q)] q^power. */
function waves(c: Complex, power: number, radius: number): readonly TailTerm[] {
  return [
    { coefficient: c, power, log: 0, phase: radius },
    { coefficient: { re: c.re, im: -c.im }, power, log: 0, phase: -radius },
  ];
}
