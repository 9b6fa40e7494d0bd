import { compile } from '../../core/algebra/compile';
import type { Complex, Expr } from '../../core/algebra/expression';
import { readDocument } from '../../language';

type Point = { readonly p: number; readonly k: number; readonly E: number };

const read = new Map<string, Expr | null>();

/** A form of the results as an expression, read by the language itself; null for `of NAME`, which is no expression. */
export function readForm(form: string): Expr | null {
  if (form.startsWith('of ')) return null;
  if (!read.has(form)) {
    const text = `model m { mass reduced 1 interaction v(p, k) = 1 counterterm z(p, k, E) = ${form} cancels v^2 subtract minimal at 1 }`;
    const parsed = readDocument(text, { cutoff: 1, order: 2 }, { cutoff: null, order: null }).models[0]?.spec?.counterterms[0]?.form;
    read.set(form, parsed && 'expr' in parsed ? parsed.expr : null);
  }
  return read.get(form)!;
}

/** `form` at each of `points`. */
export function evaluate(form: Expr, points: readonly Point[]): Complex[] {
  const re = new Float64Array(points.length);
  const im = new Float64Array(points.length);
  const column = (pick: (point: Point) => number): Float64Array => Float64Array.from(points, pick);
  compile(form)({ p: column(({ p }) => p), k: column(({ k }) => k), E: column(({ E }) => E) }, re, im);
  return Array.from(re, (value, index) => ({ re: value, im: im[index] }));
}

/** Whether the rows are linearly independent (Gaussian elimination, pivots above 1e-9 of the row's size). */
export function independent(rows: readonly (readonly Complex[])[]): boolean {
  const left = rows.map(row => row.map(z => ({ ...z })));
  const scales = left.map(row => Math.max(...row.map(modulus)));
  const used = new Set<number>();
  return left.every((row, index) => {
    const column = row.reduce((best, z, at) => (!used.has(at) && (best < 0 || modulus(z) > modulus(row[best])) ? at : best), -1);
    const pivot = row[column];
    if (!pivot || !(modulus(pivot) > 1e-9 * scales[index])) return false;
    used.add(column);
    for (const other of left.slice(index + 1)) {
      const factor = quotient(other[column], pivot);
      row.forEach((z, at) => {
        other[at] = { re: other[at].re - factor.re * z.re + factor.im * z.im, im: other[at].im - factor.re * z.im - factor.im * z.re };
      });
    }
    return true;
  });
}

/** Whether two forms differ by a factor only. */
export function proportional(a: Expr, b: Expr): boolean {
  const points = [
    [0.7, 1.3, 0.4],
    [1.1, 0.6, 2.3],
    [-0.9, 1.7, 1.2],
    [1.9, -0.3, -0.8],
  ].map(([p, k, E]) => ({ p: p, k: k, E: E }));
  const rows = [evaluate(a, points), evaluate(b, points)];
  return rows.every(row => row.some(z => modulus(z) > 0)) && !independent(rows);
}

export const modulus = ({ re, im }: Complex): number => Math.hypot(re, im);

function quotient(a: Complex, b: Complex): Complex {
  const size = b.re * b.re + b.im * b.im;
  return { re: (a.re * b.re + a.im * b.im) / size, im: (a.im * b.re - a.re * b.im) / size };
}
