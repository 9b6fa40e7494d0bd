import type { LadderWishes } from './ladder';
import { partialWave, type Setup } from './setup';
import type { SymbolicVerdict, SymbolicVerdicts } from './verdicts';

/** Beyond this degree the lower powers of a remainder drown in the rounding of the leading one: nothing is fitted. */
export const STEEPEST_REMAINDER = 8;

/** A monomial that only numbers on the ladder can confirm, since a factor of it is no contact. */
export const needsNumbers = (t: SymbolicVerdict): boolean => !t.contact && t.verdict !== 'undecided' && !t.tooSoft;

/** One that may leave something overall. */
export const leavesSomething = (t: SymbolicVerdict): boolean => needsNumbers(t) && t.overallDegree >= 0 && t.verdict === 'diverges';

/** The ladder that the monomials of a model ask for. */
export function ladderWishes(setup: Setup, symbolic: SymbolicVerdicts): LadderWishes {
  const terms = symbolic.terms.filter(needsNumbers);
  const steepest = Math.max(0, ...terms.map(t => t.power ?? 0));
  const degree = Math.max(-1, ...terms.map(t => t.overallDegree).filter(d => d <= STEEPEST_REMAINDER));
  if (degree < 0) {
    const some = terms.length > 0;
    return { rungs: some ? 9 : 6, energies: 1, momenta: 2, pointsPerPanel: some ? 12 : 16, powers: [], steepest };
  }
  const powers = Array.from({ length: Math.floor(degree) + 1 }, (_, a) => a)
    .filter(a => setup.kinematics.signed || a % 2 === 0)
    .map(a => a + partialWave(setup.spec.wave));
  return {
    rungs: 11 + Math.ceil(degree / 2),
    energies: 1 + Math.floor(degree / 2),
    momenta: 2 + Math.floor(degree / 2),
    pointsPerPanel: steepest > 3 ? 16 : 12,
    powers,
    steepest,
  };
}
