import type { Remark, TermResult } from '../results';
import type { Setup } from './setup';
import { vertexValue } from './subtraction';

/** Kernels that are infinite on shell (a massless exchange at p = k) make every monomial that holds them diverge in the infrared. */
export function infraredVerdicts(setup: Setup): { verdicts: TermResult['infrared']['verdict'][]; remarks: Remark[] } {
  const p = setup.momentum;
  const singular = setup.vertices.map(v => {
    const value = vertexValue(v, p, p, setup.kinematics.energy(p));
    return !Number.isFinite(value.re) || !Number.isFinite(value.im);
  });
  const remarks = setup.vertices.flatMap((v, i): Remark[] =>
    singular[i]
      ? [
          {
            code: 'infrared-divergence',
            subject: v.name,
            message: `${v.name} is infinite on shell, at p = k: a range without end. Give the exchange a mass (a screening scale) and follow the result as it is lowered.`,
          },
        ]
      : [],
  );
  return { verdicts: setup.list.terms.map(t => (t.exponents.some((m, i) => m > 0 && singular[i]) ? 'diverges' : 'converges')), remarks };
}
