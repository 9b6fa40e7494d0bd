import type { Complex } from '../algebra/expression';
import { leastSquares } from '../linear/solve';
import type { MomentumTerm } from '../model/kernel-shape';
import { growthFit, type Growth } from './growth-fit';
import { groupIntoForms, type LocalForm } from './forms';
import type { Ladder } from './ladder';
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

/** Coefficient of one growth at [energy][row][column]. */
interface Samples {
  readonly growth: Growth;
  readonly values: Complex[][][];
  readonly shift: number;
}

/**
 * What grows in R_n (nested divergences already subtracted on the ladder) as forms with coefficients, logarithms as ln(L/scale): fitted at each energy and
 * pair of external momenta, then the coefficients as polynomials of the dimension that power counting leaves them, or as a kernel of the model.
 */
export function fitOverall(setup: Setup, ladder: Ladder, n: number, degree: number, scale: number, logs: number): FittedOverall {
  const { growing, falling } = candidates(setup, degree, logs, ladder.cutoffs.length);
  const samples = sampleGrowth(ladder, n, scale, growing, falling);
  if (!samples) return { forms: [], local: false };
  const largest = (s: Samples) => Math.max(...s.values.flat(2).map(modulus));
  const lastCutoff = ladder.cutoffs[ladder.cutoffs.length - 1];
  const reach = (s: Samples) => largest(s) * lastCutoff ** s.growth.power * Math.log(lastCutoff) ** s.growth.log;
  const strongest = Math.max(...samples.map(reach));
  const forms: FittedForm[] = [];
  let local = true;
  for (const sample of samples) {
    const size = largest(sample);
    // Nothing there: below its own uncertainty, or below the rounding of what outgrows it.
    if (size <= 8 * sample.shift || reach(sample) < 1e-9 * strongest) continue;
    const fitted = asPolynomial(setup, ladder, sample, degree) ?? asKernel(setup, ladder, sample, n);
    if (fitted) forms.push(...fitted);
    else local = false;
  }
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
    if (falling.length + growing.length < rungs - 2 && (setup.kinematics.dimension === 2 || logs > 1)) falling.push({ power: -d - start, log: 1 });
  }
  return { growing, falling };
}

function sampleGrowth(ladder: Ladder, n: number, scale: number, growing: readonly Growth[], falling: readonly Growth[]): Samples[] | null {
  const fit = growthFit(ladder.cutoffs, growing, falling, scale);
  if (!fit) return null;
  const samples = growing.map(growth => ({ growth, values: ladder.energies.map(() => ladder.externals.map(() => [] as Complex[])), shift: 0 }));
  for (let e = 0; e < ladder.energies.length; e++) {
    for (let row = 0; row < ladder.externals.length; row++) {
      for (let column = 0; column < ladder.externals.length; column++) {
        const y = ladder.values(n, e, row, column);
        const re = fit(y.map(v => v.re));
        const im = fit(y.map(v => v.im));
        samples.forEach((s, j) => {
          s.values[e][row].push({ re: re.coefficients[j], im: im.coefficients[j] });
          s.shift = Math.max(s.shift, Math.hypot(re.shift[j], im.shift[j]));
        });
      }
    }
  }
  return samples;
}

/** Worst misfit that still counts as the form, relative to the largest sample. */
const MISFIT = 2e-4;

/** Σ c p^a k^b E^e with a + b + (fall)e <= degree - power beyond the partial wave's own p^l k^l. */
function asPolynomial(setup: Setup, ladder: Ladder, sample: Samples, degree: number): FittedForm[] | null {
  const { kinematics } = setup;
  const l = partialWave(setup.spec.wave);
  const step = kinematics.signed ? 1 : 2;
  const room = degree - sample.growth.power + 1e-9;
  const unit = Math.max(...ladder.externals.map(Math.abs));
  const basis: MomentumTerm[] = [];
  for (let e = 0; e * setup.fall! <= room && e < ladder.energies.length; e++) {
    for (let a = 0; a + e * setup.fall! <= room; a += step) {
      for (let b = 0; a + b + e * setup.fall! <= room; b += step) basis.push({ a: a + l, b: b + l, e, re: 1, im: 0 });
    }
  }
  // Momenta in units of the largest external one, energies of the kinetic energy there.
  const energyUnit = Math.abs(kinematics.energy(unit)) || 1;
  const rows: number[][] = [];
  const values: Complex[] = [];
  ladder.energies.forEach((E, at) =>
    ladder.externals.forEach((p, row) =>
      ladder.externals.forEach((k, column) => {
        // Real energies; an imaginary one (no threshold) is only ever met with forms that do not depend on it.
        rows.push(basis.map(t => (p / unit) ** t.a * (k / unit) ** t.b * ((E.re || E.im) / energyUnit) ** t.e));
        values.push(sample.values[at][row][column]);
      }),
    ),
  );
  if (rows.length < basis.length) return null;
  const re = leastSquares(rows, values.map(v => v.re));
  const im = leastSquares(rows, values.map(v => v.im));
  if (!re || !im) return null;
  const misfit = Math.max(...rows.map((r, j) => modulus({ re: values[j].re - dot(r, re), im: values[j].im - dot(r, im) })));
  const largest = Math.max(...values.map(modulus));
  if (misfit > MISFIT * largest + 3 * sample.shift) return null;
  const error = misfit + sample.shift;
  const kept = basis.flatMap((t, j) => (Math.hypot(re[j], im[j]) > Math.max(4 * error, 1e-6 * largest) ? [{ t, c: clean({ re: re[j], im: im[j] }, error) }] : []));
  const scaled = symmetrised(kept.map(({ t, c }) => ({ ...t, c: divideBy(c, unit ** (t.a + t.b) * energyUnit ** t.e) })), error);
  return groupIntoForms(scaled).map(f => {
    const t = f.form.terms[0];
    return { form: f.form, coefficient: f.coefficient, ...sample.growth, uncertainty: error / (unit ** (t.a + t.b) * energyUnit ** t.e) };
  });
}

/** Partners p^a k^b and p^b k^a made equal (or opposite) where the fit leaves them so within its error. */
function symmetrised<T extends { a: number; b: number; e: number; c: Complex }>(terms: readonly T[], error: number): T[] {
  return terms.map(t => {
    const mirror = terms.find(u => u.a === t.b && u.b === t.a && u.e === t.e);
    if (!mirror || mirror === t) return t;
    for (const sign of [1, -1]) {
      const gap = Math.hypot(t.c.re - sign * mirror.c.re, t.c.im - sign * mirror.c.im);
      if (gap < Math.max(20 * error, 1e-3 * modulus(t.c))) return { ...t, c: { re: (t.c.re + sign * mirror.c.re) / 2, im: (t.c.im + sign * mirror.c.im) / 2 } };
    }
    return t;
  });
}

/** The samples as a multiple of the kernel of one of the interactions. */
function asKernel(setup: Setup, ladder: Ladder, sample: Samples, n: number): FittedForm[] | null {
  for (let i = 0; i < setup.vertices.length; i++) {
    if (setup.list.terms[n].exponents[i] === 0) continue;
    const pairs: { value: Complex; kernel: Complex }[] = [];
    ladder.energies.forEach((E, at) =>
      ladder.externals.forEach((p, row) =>
        ladder.externals.forEach((k, column) => pairs.push({ value: sample.values[at][row][column], kernel: vertexValue(setup.vertices[i], p, k, E.re) })),
      ),
    );
    const norm = pairs.reduce((s, { kernel }) => s + kernel.re ** 2 + kernel.im ** 2, 0);
    const re = pairs.reduce((s, { value, kernel }) => s + value.re * kernel.re + value.im * kernel.im, 0) / norm;
    const im = pairs.reduce((s, { value, kernel }) => s + value.im * kernel.re - value.re * kernel.im, 0) / norm;
    const misfit = Math.max(...pairs.map(({ value, kernel: v }) => modulus({ re: value.re - re * v.re + im * v.im, im: value.im - re * v.im - im * v.re })));
    const largest = Math.max(...pairs.map(({ value }) => modulus(value)));
    if (misfit > MISFIT * largest + 3 * sample.shift) continue;
    const size = Math.sqrt(norm / pairs.length);
    const error = (misfit + sample.shift) / size;
    return [{ form: { text: `of ${setup.vertices[i].name}`, interaction: i }, coefficient: clean({ re, im }, error), ...sample.growth, uncertainty: error }];
  }
  return null;
}

const modulus = (x: Complex): number => Math.hypot(x.re, x.im);
const divideBy = (c: Complex, s: number): Complex => ({ re: c.re / s, im: c.im / s });
const dot = (x: readonly number[], y: readonly number[]): number => x.reduce((s, v, j) => s + v * y[j], 0);
const clean = (c: Complex, error: number): Complex => ({ re: Math.abs(c.re) < 2 * error ? 0 : c.re, im: Math.abs(c.im) < 2 * error ? 0 : c.im });
