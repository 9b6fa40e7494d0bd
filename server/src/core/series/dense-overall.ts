import type { Complex } from '../algebra/expression';
import { leastSquares } from '../linear/solve';
import { growthFit, type Growth } from './growth-fit';
import { groupIntoForms, type LocalCoefficient, type LocalForm } from './forms';
import type { AmplitudePart, ChainEnd, Ladder } from './ladder';
import { partialWave, type Setup } from './setup';
import { vertexValue } from './subtraction';

/** A form fitted to what grows, with its error. */
export interface FittedForm {
  readonly form: LocalForm | { readonly text: string; readonly interaction: number };
  readonly power: number;
  readonly log: number;
  readonly coefficient: Complex;
  readonly uncertainty: number;
}

export interface FittedOverall {
  readonly forms: readonly FittedForm[];
  /** False where what grows is neither a polynomial in p, k, E nor one of the kernels. */
  readonly local: boolean;
}

/** Coefficient of one growth in one part of the amplitude, at each energy, with its error. */
interface PartSample {
  readonly left: ChainEnd;
  readonly right: ChainEnd;
  readonly values: readonly Complex[];
  readonly error: number;
}

/**
 * What grows in R_n (nested divergences already subtracted on the ladder) as forms with coefficients, logarithms as ln(L/scale). The growth is
 * fitted in each part of the amplitude; contacts at its ends give their powers of p and k as they stand, other kernels a polynomial of the
 * degree that power counting leaves, or the kernel itself.
 */
export function fitOverall(setup: Setup, ladder: Ladder, n: number, degree: number, scale: number, logs: number): FittedOverall {
  const { growing, falling } = candidates(setup, degree, logs, ladder.cutoffs.length);
  const fit = growthFit(ladder.cutoffs, growing, falling, scale);
  if (!fit) return { forms: [], local: false };
  const byGrowth = sampleGrowth(ladder, n, growing, fit);
  const last = ladder.cutoffs[ladder.cutoffs.length - 1];
  const reach = growing.map((g, j) => largestOf(ladder, byGrowth[j]) * last ** g.power * Math.log(last) ** g.log);
  const strongest = Math.max(...reach);
  const forms: FittedForm[] = [];
  let local = true;
  growing.forEach((growth, j) => {
    // Nothing there: below its own error, or below the rounding of what outgrows it.
    const samples = byGrowth[j].filter(s => Math.max(...s.values.map(modulus)) > 4 * s.error);
    if (!samples.length || reach[j] < 1e-10 * strongest) return;
    const fitted = asPolynomial(setup, ladder, growth, samples, degree) ?? asKernel(setup, ladder, growth, byGrowth[j], n);
    if (fitted) forms.push(...fitted);
    else local = false;
  });
  return { forms, local };
}

function candidates(setup: Setup, degree: number, logs: number, rungs: number): { growing: Growth[]; falling: Growth[] } {
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

function sampleGrowth(
  ladder: Ladder,
  n: number,
  growing: readonly Growth[],
  fit: NonNullable<ReturnType<typeof growthFit>>,
): PartSample[][] {
  const parts = ladder.energies.map((_, e) => ladder.parts(n, e));
  const sameEnds = (x: AmplitudePart, y: AmplitudePart) => endKey(x.left) === endKey(y.left) && endKey(x.right) === endKey(y.right);
  const fits = parts[0].map(part =>
    ladder.energies.map((_, e) => {
      const values = parts[e].find(other => sameEnds(part, other))?.values ?? [];
      const re = fit(ladder.cutoffs.map((__, j) => values[j]?.re ?? 0));
      const im = fit(ladder.cutoffs.map((__, j) => values[j]?.im ?? 0));
      return { re, im };
    }),
  );
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
function largestOf(ladder: Ladder, samples: readonly PartSample[]): number {
  return Math.max(0, ...samples.map(s => Math.max(...s.values.map(modulus)) * endSize(ladder, s.left) * endSize(ladder, s.right)));
}

const endSize = (ladder: Ladder, end: ChainEnd): number => ('power' in end ? Math.max(...ladder.externals.map(Math.abs)) ** end.power : 1);

/** Worst misfit that still counts as the form, relative to the largest sample. */
const MISFIT = 2e-4;
/** Parts and forms below this share of the largest of their growth are rounding that the error estimate has missed. */
const NEGLIGIBLE = 1e-6;

/** Σ c p^a k^b E^e: the powers of contacts as they stand, the others and E up to the dimension that is left. */
function asPolynomial(setup: Setup, ladder: Ladder, growth: Growth, samples: readonly PartSample[], degree: number): FittedForm[] | null {
  const room = degree - growth.power + 1e-9;
  const unit = Math.max(...ladder.externals.map(Math.abs));
  const energyUnit = Math.abs(setup.kinematics.energy(unit)) || 1;
  const total = new Map<string, { a: number; b: number; e: number; re: number; im: number; error: number }>();
  for (const group of groupByContacts(samples)) {
    const fitted = fitGroup(setup, ladder, group, room, unit, energyUnit, NEGLIGIBLE * largestOf(ladder, samples));
    if (!fitted) return null;
    for (const t of fitted) {
      const key = `${t.a},${t.b},${t.e}`;
      const known = total.get(key) ?? { a: t.a, b: t.b, e: t.e, re: 0, im: 0, error: 0 };
      total.set(key, { ...known, re: known.re + t.c.re, im: known.im + t.c.im, error: known.error + t.error });
    }
  }
  const inUnits = (t: { a: number; b: number; e: number }) => unit ** (t.a + t.b) * energyUnit ** t.e;
  const error = Math.max(...[...total.values()].map(t => t.error * inUnits(t)));
  const largest = Math.max(...[...total.values()].map(t => Math.hypot(t.re, t.im) * inUnits(t)));
  const kept = [...total.values()].filter(
    t => Math.hypot(t.re, t.im) * inUnits(t) > Math.max(3 * t.error * inUnits(t), NEGLIGIBLE * largest),
  );
  const ordered = kept.sort((s, t) => s.e - t.e || s.a + s.b - t.a - t.b || t.a - s.a);
  const terms = symmetrised(
    ordered.map(t => ({ a: t.a, b: t.b, e: t.e, c: clean({ re: t.re, im: t.im }, t.error) })),
    t => error / inUnits(t),
  );
  return groupIntoForms(terms).map(f => {
    const { a, b, e } = f.form.terms[0];
    return { form: f.form, coefficient: f.coefficient, ...growth, uncertainty: total.get(`${a},${b},${e}`)?.error ?? error };
  });
}

/** Samples that differ only in the external momenta of ends that are no contacts. */
function groupByContacts(samples: readonly PartSample[]): PartSample[][] {
  const groups = new Map<string, PartSample[]>();
  for (const s of samples) {
    const key = [s.left, s.right].map(end => ('power' in end ? `p${end.power}` : 'm')).join();
    groups.set(key, [...(groups.get(key) ?? []), s]);
  }
  return [...groups.values()];
}

type FittedTerm = LocalCoefficient & { readonly error: number };

function fitGroup(
  setup: Setup,
  ladder: Ladder,
  group: readonly PartSample[],
  room: number,
  unit: number,
  energyUnit: number,
  negligible: number,
): FittedTerm[] | null {
  const l = partialWave(setup.spec.wave);
  const step = setup.kinematics.signed ? 1 : 2;
  const powersOf = (end: ChainEnd): number[] =>
    'power' in end ? [0] : Array.from({ length: Math.floor(room / step) + 1 }, (_, j) => j * step);
  const basis: { i: number; j: number; e: number }[] = [];
  for (let e = 0; e * setup.fall! <= room && e < ladder.energies.length; e++) {
    for (const i of powersOf(group[0].left))
      for (const j of powersOf(group[0].right)) if (i + j + e * setup.fall! <= room) basis.push({ i, j, e });
  }
  const value = (end: ChainEnd, power: number) => ('power' in end ? 1 : (ladder.externals[end.momentum] / unit) ** (l + power));
  const rows = group.flatMap(s =>
    ladder.energies.map(E => basis.map(t => value(s.left, t.i) * value(s.right, t.j) * ((E.re || E.im) / energyUnit) ** t.e)),
  );
  const values = group.flatMap(s => s.values);
  if (rows.length < basis.length) return null;
  const re = leastSquares(
    rows,
    values.map(v => v.re),
  );
  const im = leastSquares(
    rows,
    values.map(v => v.im),
  );
  if (!re || !im) return null;
  const misfit = Math.max(...rows.map((r, j) => modulus({ re: values[j].re - dot(r, re), im: values[j].im - dot(r, im) })));
  const error = Math.max(...group.map(s => s.error));
  const ends = endSize(ladder, group[0].left) * endSize(ladder, group[0].right);
  if (misfit > MISFIT * Math.max(...values.map(modulus)) + 3 * error + negligible / ends) return null;
  return basis.map((t, at) => {
    const a = 'power' in group[0].left ? group[0].left.power : l + t.i;
    const b = 'power' in group[0].right ? group[0].right.power : l + t.j;
    // Only the powers that were fitted were in units of `unit`.
    const scale = unit ** (('power' in group[0].left ? 0 : a) + ('power' in group[0].right ? 0 : b)) * energyUnit ** t.e;
    return { a, b, e: t.e, c: { re: re[at] / scale, im: im[at] / scale }, error: (misfit + error) / scale };
  });
}

/** Partners p^a k^b and p^b k^a made equal (or opposite) where the fit leaves them so within its error. */
function symmetrised(terms: readonly LocalCoefficient[], errorOf: (t: LocalCoefficient) => number): LocalCoefficient[] {
  return terms.map(t => {
    const mirror = terms.find(u => u.a === t.b && u.b === t.a && u.e === t.e);
    if (!mirror || mirror === t) return t;
    for (const sign of [1, -1]) {
      const gap = Math.hypot(t.c.re - sign * mirror.c.re, t.c.im - sign * mirror.c.im);
      if (gap < Math.max(20 * errorOf(t), 1e-3 * modulus(t.c)))
        return { ...t, c: { re: (t.c.re + sign * mirror.c.re) / 2, im: (t.c.im + sign * mirror.c.im) / 2 } };
    }
    return t;
  });
}

/** The whole as a multiple of the kernel of one of the interactions. */
function asKernel(setup: Setup, ladder: Ladder, growth: Growth, samples: readonly PartSample[], n: number): FittedForm[] | null {
  const pairs = ladder.energies.flatMap((E, e) =>
    ladder.externals.flatMap((p, row) =>
      ladder.externals.map((k, column) => ({ E, p, k, value: wholeSample(ladder, samples, e, row, column) })),
    ),
  );
  const shift = Math.max(...samples.map(s => s.error * endSize(ladder, s.left) * endSize(ladder, s.right)));
  for (let i = 0; i < setup.vertices.length; i++) {
    if (setup.list.terms[n].exponents[i] === 0) continue;
    const rows = pairs.map(({ E, p, k, value }) => ({ value, kernel: vertexValue(setup.vertices[i], p, k, E.re) }));
    const norm = rows.reduce((s, { kernel }) => s + kernel.re ** 2 + kernel.im ** 2, 0);
    const re = rows.reduce((s, { value, kernel }) => s + value.re * kernel.re + value.im * kernel.im, 0) / norm;
    const im = rows.reduce((s, { value, kernel }) => s + value.im * kernel.re - value.re * kernel.im, 0) / norm;
    const misfit = Math.max(
      ...rows.map(({ value, kernel: v }) => modulus({ re: value.re - re * v.re + im * v.im, im: value.im - re * v.im - im * v.re })),
    );
    if (misfit > MISFIT * Math.max(...rows.map(({ value }) => modulus(value))) + 3 * shift) continue;
    const error = (misfit + shift) / Math.sqrt(norm / rows.length);
    return [
      {
        form: { text: `of ${setup.vertices[i].name}`, interaction: i },
        coefficient: clean({ re, im }, error),
        ...growth,
        uncertainty: error,
      },
    ];
  }
  return null;
}

function wholeSample(ladder: Ladder, samples: readonly PartSample[], e: number, row: number, column: number): Complex {
  const weight = (end: ChainEnd, at: number) => ('power' in end ? ladder.externals[at] ** end.power : end.momentum === at ? 1 : 0);
  return samples.reduce(
    (sum, s) => {
      const w = weight(s.left, row) * weight(s.right, column);
      return { re: sum.re + w * s.values[e].re, im: sum.im + w * s.values[e].im };
    },
    { re: 0, im: 0 },
  );
}

const modulus = (x: Complex): number => Math.hypot(x.re, x.im);
const dot = (x: readonly number[], y: readonly number[]): number => x.reduce((s, v, j) => s + v * y[j], 0);
const clean = (c: Complex, error: number): Complex => ({
  re: Math.abs(c.re) < 2 * error ? 0 : c.re,
  im: Math.abs(c.im) < 2 * error ? 0 : c.im,
});
