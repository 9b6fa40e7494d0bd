import { contactChain, type Grid } from './contact-chain';
import type { ContactSetting } from './contact-divergences';
import type { BareRun } from './ladder';
import { loopMoments } from './loop-moments';

/** The exact bare contact monomials at the energy of the run; null for monomials that hold another kernel. */
export function contactsOnLadder(contacts: ContactSetting, run: BareRun): (Grid | null)[] {
  const E = run.energy;
  const point = { E, moments: loopMoments(contacts.kinematics, contacts.regulator, contacts.ring, E, contacts.loopPowers) };
  return contactChain(contacts.list, contacts.vertices, [point], contacts.ring, contacts.size, null).map(grids => grids && grids[0]);
}

/** Rounding of either calculation beside the largest term of the Laurent polynomial. */
const AGREEMENT = 1e-8;

/**
 * The exact Laurent polynomial of monomial n against the recursion on a grid, at every rung and pair of external momenta: two calculations
 * that share no formula.
 */
export function contactAgrees(contacts: ContactSetting, exact: Grid, cutoffs: readonly number[], run: BareRun, n: number): boolean {
  return run.externals.every((p, row) =>
    run.externals.every((k, column) => {
      const numbers = run.values(n, row, column);
      return cutoffs.every((L, j) => {
        const sum = laurentValue(contacts, exact, p, k, L);
        const gap = Math.hypot(sum.re - numbers[j].re, sum.im - numbers[j].im);
        return gap <= AGREEMENT * Math.max(sum.size, Math.hypot(numbers[j].re, numbers[j].im));
      });
    }),
  );
}

/** Σ_ab R^{ab}(L) p^a k^b, with the sum of the moduli. */
function laurentValue(
  { ring, size }: ContactSetting,
  grid: Grid,
  p: number,
  k: number,
  L: number,
): { re: number; im: number; size: number } {
  const sum = { re: 0, im: 0, size: 0 };
  grid.forEach((c, s) => {
    if (!c) return;
    const form = p ** Math.floor(s / size) * k ** (s % size);
    for (const t of ring.terms(c)) {
      const value = form * L ** t.power * Math.log(L) ** t.log;
      sum.re += t.re * value;
      sum.im += t.im * value;
      sum.size += Math.hypot(t.re, t.im) * Math.abs(value);
    }
  });
  return sum;
}
