import type { LentFunctions } from '../algebra/compile';
import { besselJ } from './bessel-j';
import { erf } from './erf';
import { gamma } from './gamma';
import { legendreP } from './legendre-p';
import { legendreQ } from './legendre-q';
import { sphericalBessel } from './spherical-bessel';

const ofWholeOrder = (f: (n: number, x: number) => number) => (n: number, x: number) => (Number.isInteger(n) ? f(n, x) : NaN);
const ofDegree = (f: (l: number, x: number) => number) => (l: number, x: number) => (Number.isInteger(l) && l >= 0 ? f(l, x) : NaN);

/** The special functions of the language, for the compiler of expressions. NaN where the order is not a whole number. */
export const specialFunctions: LentFunctions = {
  erf,
  gamma,
  besselj: ofWholeOrder(besselJ),
  sphericalj: ofDegree(sphericalBessel),
  legendrep: ofDegree(legendreP),
  legendreq: ofDegree(legendreQ),
};
