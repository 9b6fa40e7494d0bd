import type { TermResult } from '../../core/results';
import { unknown } from './numbers';

interface Growth {
  readonly power: number | null;
  readonly log: number | null;
}

const plain = (power: number): string => String(Number(power.toFixed(3)));

/** `L^1`, `ln L`, `L^2 (ln L)^3`, with the cutoff's own name; empty where nothing grows. */
export function growthFormula({ power, log }: Growth, cutoff: string): string {
  if (power === null || log === null) return unknown;
  const logs = log === 0 ? '' : log === 1 ? `ln ${cutoff}` : `(ln ${cutoff})^${plain(log)}`;
  const powers = power === 0 ? '' : `${cutoff}^${plain(power)}`;
  return [powers, logs].filter(Boolean).join(' ');
}

const adverbs: Readonly<Record<number, string>> = { 1: 'linearly', 2: 'quadratically', 3: 'cubically', 4: 'quartically', 5: 'quintically' };

/** `linearly, as L^1`, `logarithmically, as ln L`, `as L^1.5`. */
export function growthInWords(growth: Growth, cutoff: string): string {
  const formula = growthFormula(growth, cutoff);
  if (formula === '' || formula === unknown) return 'at a rate that is not known';
  const adverb =
    growth.power === 0 ? (growth.log === 1 ? 'logarithmically' : undefined) : growth.log === 0 ? adverbs[growth.power!] : undefined;
  return adverb === undefined ? `as ${formula}` : `${adverb}, as ${formula}`;
}

/** The growth of a monomial as a column shows it: `–` where it converges. */
export function growthOf(term: TermResult, cutoff: string): string {
  if (term.ultraviolet.verdict === 'converges') return '–';
  return growthFormula(term.ultraviolet, cutoff) || (term.ultraviolet.verdict === 'oscillates' ? 'bounded' : '–');
}
