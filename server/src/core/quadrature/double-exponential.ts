import type { Limits, Outcome } from './outcome';

/**
 * ∫f over [from, ∞) by the exp-sinh rule x = from + exp((π/2) sinh t) (Takahasi and Mori, Publ. RIMS 9 (1974) 721): for integrands
 * that fall like a power or an exponential and may be singular, but integrable, at `from`. The step is halved until two
 * values agree; the error estimate is their difference, which overestimates the error of the last.
 */
export function doubleExponential(f: (x: number) => number, from: number, limits: Limits = {}): Outcome {
  const { relative = 1e-10, absolute = 0, budget = 100_000, shouldStop = () => false } = limits;
  const reach = 4.6;
  let evaluations = 0;
  let sum = 0;
  let abs = 0;
  const add = (t: number) => {
    const y = Math.exp((Math.PI / 2) * Math.sinh(t));
    const slope = (Math.PI / 2) * Math.cosh(t) * y;
    const value = f(from + y) * slope;
    evaluations++;
    sum += value;
    abs += Math.abs(value);
  };
  let step = 0.5;
  for (let n = Math.ceil(-reach / step); n * step <= reach; n++) add(n * step);
  let value = sum * step;
  let error = Infinity;
  let edges = Infinity;
  for (;;) {
    const outcome = (status: Outcome['status']): Outcome => ({ status, value, errorEstimate: error, absIntegral: abs * step, evaluations });
    if (!Number.isFinite(value)) return { ...outcome('nonFinite'), value: NaN };
    if (error <= Math.max(absolute, relative * Math.abs(value), 2e-15 * abs * step))
      return outcome(edges > 1e-6 * abs * step ? 'divergent' : 'converged');
    if (shouldStop()) return outcome('cancelled');
    if (evaluations * 2 > budget) return outcome(edges > 1e-6 * abs * step ? 'divergent' : 'budgetExhausted');
    step /= 2;
    for (let n = Math.ceil(-reach / step); n * step <= reach; n++) if (n % 2 !== 0) add(n * step);
    // What the outermost points still carry: a convergent integrand has none left there.
    const first = f(from + Math.exp((Math.PI / 2) * Math.sinh(-reach))) * Math.exp((Math.PI / 2) * Math.sinh(-reach));
    const last = f(from + Math.exp((Math.PI / 2) * Math.sinh(reach))) * Math.exp((Math.PI / 2) * Math.sinh(reach));
    edges = Math.max(Math.abs(first), Math.abs(last)) * Math.cosh(reach);
    const before = value;
    value = sum * step;
    error = Math.abs(value - before);
  }
}
