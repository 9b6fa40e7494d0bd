import { atInfinity, NoExpansion, type Asymptotics } from '../algebra/at-infinity';
import type { Expr } from '../algebra/expression';
import type { KernelShape, LocalShape, TailTerm } from '../model/kernel-shape';
import type { Kinematics } from '../model/kinematics';

/** V ~ |k|^degree (ln|k|)^log e^(i phase |k|) for a large momentum k of this sign (0: of either). */
export interface Degree {
  readonly degree: number;
  readonly log: number;
  readonly phase: number;
  readonly sign: 1 | -1 | 0;
}

/** How a kernel behaves when its momenta are large; empty lists: smaller than every power. */
export interface HardBehaviour {
  /** V(p, k) for k -> ∞ at fixed p. */
  readonly right: readonly Degree[];
  /** V(p, k) for p -> ∞ at fixed k. */
  readonly left: readonly Degree[];
  /** V(λp, λk) for λ -> ∞. */
  readonly both: readonly Degree[];
  /** V(K + u/2, K - u/2) for K -> ∞ at fixed u, where its integral over u is finite. */
  readonly diagonal: readonly Degree[];
}

/** Thrown where the behaviour of a kernel at large momenta could not be worked out. */
export class UnknownBehaviour extends Error {}

/** Throws `UnknownBehaviour`. */
export function hardBehaviour(shape: KernelShape, kinematics: Kinematics, angular: number): HardBehaviour {
  const all = behaviourOf(shape, kinematics, angular);
  return { right: leading(all.right), left: leading(all.left), both: leading(all.both), diagonal: leading(all.diagonal) };
}

/** The largest degree for each phase and sign: what is below it cannot decide a verdict. */
function leading(degrees: readonly Degree[]): Degree[] {
  const best = new Map<string, Degree>();
  for (const d of degrees) {
    const key = `${d.phase}/${d.sign}`;
    const known = best.get(key);
    if (!known || d.degree > known.degree || (d.degree === known.degree && d.log > known.log)) best.set(key, d);
  }
  return [...best.values()];
}

function behaviourOf(shape: KernelShape, kinematics: Kinematics, angular: number): HardBehaviour {
  switch (shape.kind) {
    case 'polynomial':
      return {
        right: shape.terms.map(t => plain(t.b)),
        left: shape.terms.map(t => plain(t.a)),
        both: shape.terms.map(t => plain(t.a + t.b)),
        diagonal: [],
      };
    case 'sum': {
      const parts = shape.parts.map(part => behaviourOf(part, kinematics, angular));
      const all = (key: keyof HardBehaviour) => parts.flatMap(part => part[key]);
      return { right: all('right'), left: all('left'), both: all('both'), diagonal: all('diagonal') };
    }
    case 'local':
      return localBehaviour(shape, kinematics, angular);
    case 'general':
      return generalBehaviour(shape.expr);
  }
}

const plain = (degree: number, log = 0): Degree => ({ degree, log, phase: 0, sign: 0 });

function localBehaviour(shape: LocalShape, { dimension }: Kinematics, angular: number): HardBehaviour {
  const tails = localTails(shape);
  // A transfer k - p grows with the loop momentum; each partial wave of k^γ(1 + …) starts l powers of p/k further down.
  const soft = (terms: readonly TailTerm[], sign: 1 | -1): Degree[] =>
    terms.map(t => ({ degree: t.power - angular, log: t.log, phase: t.phase, sign }));
  const both = [...tails.forward, ...tails.backward];
  const steepest = both.length ? Math.max(...both.map(t => t.power)) : -Infinity;
  return {
    // q = p - k runs against the sign of a large k, and with that of a large p.
    right: [...soft(tails.backward, 1), ...soft(tails.forward, -1)],
    left: [...soft(tails.forward, 1), ...soft(tails.backward, -1)],
    both: both.map(t => plain(t.power, t.log)),
    diagonal: steepest < -dimension ? [plain(1 - dimension)] : [],
  };
}

function localTails(shape: LocalShape): { forward: readonly TailTerm[]; backward: readonly TailTerm[] } {
  if (shape.tail) return { forward: shape.tail, backward: shape.backwardTail ?? shape.tail };
  if (!shape.transfer) throw new UnknownBehaviour('its transform is known by numbers only');
  const along = (sign: 1 | -1) =>
    expand(shape.transfer!, new Map([['q', linear(sign, 0)]])).map(t => ({ coefficient: t.c, power: t.power, log: t.log, phase: 0 }));
  return { forward: along(1), backward: along(-1) };
}

const linear = (slope: number, offset: number): Asymptotics => ({
  terms: [{ power: 1, log: 0, c: { re: slope, im: 0 } }, ...(offset === 0 ? [] : [{ power: 0, log: 0, c: { re: offset, im: 0 } }])],
  truncated: -Infinity,
});
const fixed = (value: number): Asymptotics => ({ terms: [{ power: 0, log: 0, c: { re: value, im: 0 } }], truncated: -Infinity });

const DEPTH = 6;
function expand(expr: Expr, symbols: ReadonlyMap<string, Asymptotics>) {
  try {
    return atInfinity(expr, symbols, DEPTH).terms.slice(0, 1);
  } catch (error) {
    if (error instanceof NoExpansion) throw new UnknownBehaviour(error.message);
    throw error;
  }
}

/** Generic numbers stand for what stays fixed: a degree that holds at them holds almost everywhere. */
function generalBehaviour(expr: Expr): HardBehaviour {
  const energy: [string, Asymptotics] = ['E', fixed(-0.61803)];
  const at = (p: Asymptotics, k: Asymptotics): Degree[] =>
    expand(expr, new Map([['p', p], ['k', k], energy])).map(t => plain(t.power, t.log));
  const both = at(linear(0.7390851, 0), linear(1.1874523, 0));
  const diagonal = at(linear(1, 0.28658), linear(1, -0.28658));
  return {
    right: at(fixed(0.7390851), linear(1, 0)),
    left: at(linear(1, 0), fixed(0.7390851)),
    both,
    // A region of its own only where the kernel is larger along the diagonal than its overall degree says.
    diagonal: diagonal.filter(d => both.every(b => d.degree > b.degree)),
  };
}
