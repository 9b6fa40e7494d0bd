import { kronrod, KRONROD_POINTS } from './gauss-kronrod';
import type { Estimate } from './gauss-kronrod';
import type { Limits, Outcome } from './outcome';

interface Panel extends Estimate {
  readonly from: number;
  readonly to: number;
  readonly depth: number;
}

/** Bisections after which a panel that still carries the error is taken to sit on a singularity. */
const DEEPEST = 110;
/** The share of the integral that sits there is compared with that so many bisections earlier. */
const LOOK_BACK = 20;

/**
 * ∫f over [from, to]; `to` may be Infinity (then x = from + t/(1 - t)). Bisects the panel with the largest error.
 * `divergent`: panels shrink onto a point without their share of the integral falling, as with 1/x at 0.
 */
export function integrate(f: (x: number) => number, from: number, to: number, limits: Limits = {}): Outcome {
  if (to === Infinity) {
    return integrate(t => (t === 1 ? 0 : f(from + t / (1 - t)) / (1 - t) ** 2), 0, 1, limits);
  }
  const { relative = 1e-10, absolute = 0, budget = 100_000, shouldStop = () => false } = limits;
  const panels: Panel[] = [{ from, to, depth: 0, ...kronrod(f, from, to) }];
  const shares: number[] = [];
  let evaluations = KRONROD_POINTS;
  const outcome = (status: Outcome['status']): Outcome => {
    const value = total(panels, 'value');
    return {
      status,
      value: status === 'nonFinite' ? NaN : value,
      errorEstimate: total(panels, 'error'),
      absIntegral: total(panels, 'abs'),
      evaluations,
    };
  };
  for (;;) {
    const value = total(panels, 'value');
    if (!Number.isFinite(value)) return outcome('nonFinite');
    if (total(panels, 'error') <= Math.max(absolute, relative * Math.abs(value), 2e-15 * total(panels, 'abs'))) return outcome('converged');
    if (shouldStop()) return outcome('cancelled');
    if (evaluations + 2 * KRONROD_POINTS > budget) return outcome('budgetExhausted');
    const [worst] = panels.splice(largest(panels), 1);
    const middle = (worst.from + worst.to) / 2;
    const halves = [
      { from: worst.from, to: middle, depth: worst.depth + 1, ...kronrod(f, worst.from, middle) },
      { from: middle, to: worst.to, depth: worst.depth + 1, ...kronrod(f, middle, worst.to) },
    ];
    if (worst.depth > LOOK_BACK && halves.some(half => !Number.isFinite(half.value))) {
      // Bisection has run into a point where f is infinite.
      panels.push(worst);
      return outcome(shares[worst.depth] > 0.5 * shares[worst.depth - LOOK_BACK] ? 'divergent' : 'budgetExhausted');
    }
    panels.push(...halves);
    evaluations += 2 * KRONROD_POINTS;
    const deepest = halves[0].error > halves[1].error ? halves[0] : halves[1];
    shares[deepest.depth] = Math.max(shares[deepest.depth] ?? 0, deepest.abs);
    const { depth } = deepest;
    const atRoundOff = depth > LOOK_BACK && (deepest.from + deepest.to) / 2 - deepest.from < 4e-16 * Math.abs(deepest.to);
    if (depth >= DEEPEST || atRoundOff) return outcome(shares[depth] > 0.5 * shares[depth - LOOK_BACK] ? 'divergent' : 'budgetExhausted');
  }
}

function total(panels: readonly Panel[], key: 'value' | 'error' | 'abs'): number {
  let sum = 0;
  for (const panel of panels) sum += panel[key];
  return sum;
}

function largest(panels: readonly Panel[]): number {
  let best = 0;
  for (let i = 1; i < panels.length; i++) if (panels[i].error > panels[best].error) best = i;
  return best;
}
