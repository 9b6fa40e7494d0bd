import type { Complex } from '../algebra/expression';
import type { MonomialList } from './monomials';

/** A square matrix between on-shell momenta: [row][column]. */
export type Block = readonly (readonly Complex[])[];

/**
 * T of each monomial from the principal-value (standing-wave) K of all of them: T_ν = K_ν - i Σ_{0<α<ν} K_α ρ T_{ν-α}, ρ diagonal over the
 * on-shell momenta. Exact order by order, since G(E + iε) = P G - i π δ(E - H₀).
 */
export function amplitudesFromStandingWaves(list: MonomialList, standing: readonly Block[], density: readonly number[]): Block[] {
  const result: Block[] = [];
  list.terms.forEach((_, n) => {
    const sum = standing[n].map(row => row.map(c => ({ ...c })));
    for (const { inner, rest } of list.splits(n)) addLink(sum, standing[inner], density, result[rest]);
    result.push(sum);
  });
  return result;
}

/** sum += -i K ρ T. */
function addLink(sum: { re: number; im: number }[][], k: Block, density: readonly number[], t: Block): void {
  for (let row = 0; row < sum.length; row++) {
    for (let column = 0; column < sum.length; column++) {
      for (let s = 0; s < density.length; s++) {
        const re = k[row][s].re * t[s][column].re - k[row][s].im * t[s][column].im;
        const im = k[row][s].re * t[s][column].im + k[row][s].im * t[s][column].re;
        sum[row][column].re += density[s] * im;
        sum[row][column].im -= density[s] * re;
      }
    }
  }
}
