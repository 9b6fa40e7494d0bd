import type { Complex } from '../algebra/expression';
import { leastSquares } from '../linear/solve';
import { growthFit, type Growth } from './growth-fit';
import { groupIntoForms, type LocalCoefficient, type LocalForm } from './forms';
import { candidates, endSize, largestOf, sampleGrowth, wholeSample, type PartSample } from './growth-samples';
import type { FittingRun } from './ladder';
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

/**
 * What grows in R_n (nested divergences already subtracted on the run) as forms with coefficients, logarithms as ln(L/scale). The growth is
 * fitted in each part of the amplitude; contacts at its ends give their powers of p and k as they stand, other kernels a polynomial of the
 * degree that power counting leaves, or the kernel itself. `bare`: the size of the bare amplitude at each cutoff, which rounding goes by.
 */
export function fitOverall(
  setup: Setup,
  run: FittingRun,
  n: number,
  degree: number,
  scale: number,
  logs: number,
  bare: readonly number[],
): FittedOverall {
  const { growing, falling } = candidates(setup, degree, logs, run.cutoffs.length);
  const fit = growthFit(run.cutoffs, growing, falling, scale);
  if (!fit) return { forms: [], local: false };
  const byGrowth = sampleGrowth(run, n, growing, fit, bare);
  const last = run.cutoffs[run.cutoffs.length - 1];
  const reach = growing.map((g, j) => largestOf(run, byGrowth[j]) * last ** g.power * Math.log(last) ** g.log);
  const strongest = Math.max(...reach);
  const forms: FittedForm[] = [];
  let local = true;
  growing.forEach((growth, j) => {
    // Nothing there: below its own error, or below the rounding of what outgrows it.
    const samples = byGrowth[j].filter(s => Math.max(...s.values.map(modulus)) > 4 * s.error);
    if (!samples.length || reach[j] < 1e-10 * strongest) return;
    const fitted =
      asPolynomial(setup, run, growth, samples, degree, dimensionPrice(setup, n, byGrowth[j])) ??
      asKernel(setup, run, growth, byGrowth[j], n);
    if (fitted) forms.push(...fitted);
    else local = false;
  });
  return { forms, local };
}

/** Worst misfit that still counts as the form, relative to the largest sample. */
const MISFIT = 2e-4;
/** How far a fit moves when a cutoff is dropped understates its error: seen up to eight times, against closed forms. */
const CAUTION = 10;
/** Parts and forms below this share of the largest of their growth are rounding that the error estimate has missed. */
const NEGLIGIBLE = 1e-6;

/** How many powers of the cutoff the powers a of p and b of k cost. */
type Price = (a: number, b: number) => number;

/**
 * Contacts of one degree each: every power at the ends beyond the fewest possible is one less for the loops. Otherwise only what no contact
 * brings along is known to cost anything.
 */
function dimensionPrice(setup: Setup, n: number, samples: readonly PartSample[]): Price {
  const l = partialWave(setup.spec.wave);
  const contacts = setup.list.terms[n].exponents.flatMap((m, i) => (m > 0 && setup.vertices[i].contact ? [setup.vertices[i].contact] : []));
  const ends = samples.map(s => [s.left, s.right].reduce((sum, end) => sum + ('power' in end ? end.power : l), 0));
  const fewest = Math.min(...ends);
  if (contacts.every(terms => new Set(terms.map(t => t.a + t.b)).size === 1)) return (a, b) => a + b - fewest;
  const powers = new Set(contacts.flat().flatMap(t => [t.a, t.b]));
  const single = (power: number) => (powers.has(power) ? 0 : power - l);
  return (a, b) => single(a) + single(b);
}

/**
 * Σ c p^a k^b E^e. Where only contacts stand at the ends their powers are known, and each coefficient is a polynomial in E. Where other kernels
 * do too, only the whole is local (what one part leaves, the counterterm in another takes away): then the whole is fitted in p, k and E.
 */
function asPolynomial(
  setup: Setup,
  run: FittingRun,
  growth: Growth,
  samples: readonly PartSample[],
  degree: number,
  price: Price,
): FittedForm[] | null {
  const room = degree - growth.power + 1e-9;
  const unit = Math.max(...run.externals.map(Math.abs));
  const energyUnit = Math.abs(setup.kinematics.energy(unit)) || 1;
  const fitted = samples.every(s => 'power' in s.left && 'power' in s.right)
    ? inEnergy(setup, run, samples, room, price, energyUnit, NEGLIGIBLE * largestOf(run, samples))
    : inMomenta(setup, run, samples, room, price, unit, energyUnit);
  if (!fitted) return null;
  const inUnits = (t: LocalCoefficient) => unit ** (t.a + t.b) * energyUnit ** t.e;
  const largest = Math.max(...fitted.map(t => modulus(t.c) * inUnits(t)));
  const kept = fitted.filter(t => modulus(t.c) > 3 * t.error && modulus(t.c) * inUnits(t) > NEGLIGIBLE * largest);
  const ordered = kept.map(t => ({ ...t, c: clean(t.c, t.error) })).sort((s, t) => s.e - t.e || s.a + s.b - t.a - t.b || t.a - s.a);
  return groupIntoForms(symmetrised(ordered)).map(f => {
    const { a, b, e } = f.form.terms[0];
    return {
      form: f.form,
      coefficient: f.coefficient,
      ...growth,
      uncertainty: CAUTION * fitted.find(t => t.a === a && t.b === b && t.e === e)!.error,
    };
  });
}

type FittedTerm = LocalCoefficient & { readonly error: number };

/** Powers of E that the dimension left over has room for. */
function energyPowers(setup: Setup, run: FittingRun, room: number): number[] {
  return run.energies.map((_, e) => e).filter(e => e * setup.fall! <= room);
}

/** Each part p^a k^b by itself, a polynomial in E. */
function inEnergy(
  setup: Setup,
  run: FittingRun,
  samples: readonly PartSample[],
  room: number,
  price: Price,
  energyUnit: number,
  negligible: number,
): FittedTerm[] | null {
  const terms: FittedTerm[] = [];
  for (const s of samples) {
    if (!('power' in s.left) || !('power' in s.right)) return null;
    const [a, b] = [s.left.power, s.right.power];
    const powers = energyPowers(setup, run, room - price(a, b));
    const rows = run.energies.map(E => powers.map(e => ((E.re || E.im) / energyUnit) ** e));
    const found = fitLinear(rows, s.values, s.error, negligible / (endSize(run, s.left) * endSize(run, s.right)));
    if (!found) return null;
    powers.forEach((e, j) => {
      const scale = energyUnit ** e;
      terms.push({ a, b, e, c: { re: found.re[j] / scale, im: found.im[j] / scale }, error: found.error / scale });
    });
  }
  return terms;
}

/** The whole amplitude at every pair of external momenta. */
function inMomenta(
  setup: Setup,
  run: FittingRun,
  samples: readonly PartSample[],
  room: number,
  price: Price,
  unit: number,
  energyUnit: number,
): FittedTerm[] | null {
  const l = partialWave(setup.spec.wave);
  const step = setup.kinematics.signed ? 1 : 2;
  const contacts = new Set(samples.flatMap(s => [s.left, s.right]).flatMap(end => ('power' in end ? [end.power] : [])));
  const powers = [...new Set([...contacts, ...Array.from({ length: Math.floor(room / step) + 1 }, (_, j) => l + j * step)])].sort(
    (x, y) => x - y,
  );
  const basis = energyPowers(setup, run, room).flatMap(e =>
    powers.flatMap(a => powers.map(b => ({ a, b, e }))).filter(t => price(t.a, t.b) + t.e * setup.fall! <= room),
  );
  const rows: number[][] = [];
  const values: Complex[] = [];
  run.energies.forEach((E, e) =>
    run.externals.forEach((p, row) =>
      run.externals.forEach((k, column) => {
        rows.push(basis.map(t => (p / unit) ** t.a * (k / unit) ** t.b * ((E.re || E.im) / energyUnit) ** t.e));
        values.push(wholeSample(run, samples, e, row, column));
      }),
    ),
  );
  if (rows.length < basis.length) return null;
  const error = Math.max(...samples.map(s => s.error * endSize(run, s.left) * endSize(run, s.right)));
  const found = fitLinear(rows, values, error, 0);
  if (!found) return null;
  return basis.map((t, j) => {
    const scale = unit ** (t.a + t.b) * energyUnit ** t.e;
    return { ...t, c: { re: found.re[j] / scale, im: found.im[j] / scale }, error: found.error / scale };
  });
}

/** Least squares with its misfit; null where the misfit is more than errors explain. */
function fitLinear(
  rows: readonly (readonly number[])[],
  values: readonly Complex[],
  error: number,
  negligible: number,
): { re: number[]; im: number[]; error: number } | null {
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
  return misfit > MISFIT * Math.max(...values.map(modulus)) + 3 * error + negligible ? null : { re, im, error: misfit + error };
}

/** Partners p^a k^b and p^b k^a made equal (or opposite) where the fit leaves them so within its error. */
function symmetrised(terms: readonly FittedTerm[]): LocalCoefficient[] {
  return terms.map(t => {
    const mirror = terms.find(u => u.a === t.b && u.b === t.a && u.e === t.e);
    if (!mirror || mirror === t) return t;
    for (const sign of [1, -1]) {
      const gap = Math.hypot(t.c.re - sign * mirror.c.re, t.c.im - sign * mirror.c.im);
      if (gap < Math.max(20 * t.error, 1e-3 * modulus(t.c)))
        return { ...t, c: { re: (t.c.re + sign * mirror.c.re) / 2, im: (t.c.im + sign * mirror.c.im) / 2 } };
    }
    return t;
  });
}

/** The whole as a multiple of the kernel of one of the interactions. */
function asKernel(setup: Setup, run: FittingRun, growth: Growth, samples: readonly PartSample[], n: number): FittedForm[] | null {
  const pairs = run.energies.flatMap((E, e) =>
    run.externals.flatMap((p, row) => run.externals.map((k, column) => ({ E, p, k, value: wholeSample(run, samples, e, row, column) }))),
  );
  const shift = Math.max(...samples.map(s => s.error * endSize(run, s.left) * endSize(run, s.right)));
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
    if (Math.hypot(re, im) < 3 * error) return [];
    return [
      {
        form: { text: `of ${setup.vertices[i].name}`, interaction: i },
        coefficient: clean({ re, im }, error),
        ...growth,
        uncertainty: CAUTION * error,
      },
    ];
  }
  return null;
}

const modulus = (x: Complex): number => Math.hypot(x.re, x.im);
const dot = (x: readonly number[], y: readonly number[]): number => x.reduce((s, v, j) => s + v * y[j], 0);
const clean = (c: Complex, error: number): Complex => ({
  re: Math.abs(c.re) < 2 * error ? 0 : c.re,
  im: Math.abs(c.im) < 2 * error ? 0 : c.im,
});
