import type { Complex } from '../algebra/expression';
import type { growthFit, Growth } from './growth-fit';
import type { AmplitudePart, ChainEnd, FittingRun } from './ladder';
import type { Setup } from './setup';

/** Coefficient of one growth in one part of the amplitude, at each energy, with its error. */
export interface PartSample {
  readonly left: ChainEnd;
  readonly right: ChainEnd;
  readonly values: readonly Complex[];
  readonly error: number;
}

export function candidates(setup: Setup, degree: number, logs: number, rungs: number): { growing: Growth[]; falling: Growth[] } {
  const growing: Growth[] = [];
  for (let power = degree; power >= 0; power--) {
    const highest = power === 0 ? Math.max(1, logs) : logs - 1;
    for (let log = highest; log >= 0; log--) if (power > 0 || log > 0) growing.push({ power, log });
  }
  const start = Math.ceil(degree) - degree;
  const falling: Growth[] = [{ power: -start, log: 0 }];
  for (let d = 1; falling.length + growing.length < rungs - 2 && d <= 4; d++) {
    falling.push({ power: -d - start, log: 0 });
    if (falling.length + growing.length < rungs - 2 && (setup.kinematics.dimension === 2 || logs > 1))
      falling.push({ power: -d - start, log: 1 });
  }
  return { growing, falling };
}

export function sampleGrowth(
  run: FittingRun,
  n: number,
  growing: readonly Growth[],
  fit: NonNullable<ReturnType<typeof growthFit>>,
  bare: readonly number[],
): PartSample[][] {
  const parts = run.energies.map((_, e) => run.parts(n, e));
  const sameEnds = (x: AmplitudePart, y: AmplitudePart) => endKey(x.left) === endKey(y.left) && endKey(x.right) === endKey(y.right);
  const fits = parts[0].map(part => {
    const sizes = bare.map(size => size / (endSize(run, part.left) * endSize(run, part.right)));
    return run.energies.map((_, e) => {
      const values = parts[e].find(other => sameEnds(part, other))?.values ?? [];
      const re = fit(
        run.cutoffs.map((__, j) => values[j]?.re ?? 0),
        sizes,
      );
      const im = fit(run.cutoffs.map((__, j) => values[j]?.im ?? 0));
      return { re, im };
    });
  });
  return growing.map((_, j) =>
    parts[0].map((part, at) => ({
      left: part.left,
      right: part.right,
      values: fits[at].map(({ re, im }) => ({ re: re.coefficients[j], im: im.coefficients[j] })),
      error: Math.max(...fits[at].map(({ re, im }) => Math.hypot(re.shift[j], im.shift[j]))),
    })),
  );
}

const endKey = (end: ChainEnd): string => ('power' in end ? `p${end.power}` : `m${end.momentum}`);

/** Size of a sample in the whole amplitude, momenta in units of the largest external one. */
export function largestOf(run: FittingRun, samples: readonly PartSample[]): number {
  return Math.max(0, ...samples.map(s => Math.max(...s.values.map(modulus)) * endSize(run, s.left) * endSize(run, s.right)));
}

export const endSize = (run: FittingRun, end: ChainEnd): number =>
  'power' in end ? Math.max(...run.externals.map(Math.abs)) ** end.power : 1;

/** The whole amplitude at one pair of external momenta. */
export function wholeSample(run: FittingRun, samples: readonly PartSample[], e: number, row: number, column: number): Complex {
  const weight = (end: ChainEnd, at: number) => ('power' in end ? run.externals[at] ** end.power : end.momentum === at ? 1 : 0);
  return samples.reduce(
    (sum, s) => {
      const w = weight(s.left, row) * weight(s.right, column);
      return { re: sum.re + w * s.values[e].re, im: sum.im + w * s.values[e].im };
    },
    { re: 0, im: 0 },
  );
}

const modulus = (x: Complex): number => Math.hypot(x.re, x.im);
