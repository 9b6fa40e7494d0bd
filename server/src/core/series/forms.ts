import type { Complex } from '../algebra/expression';
import type { MomentumTerm } from '../model/kernel-shape';

/** A local form, as a polynomial and as an expression of the language. */
export interface LocalForm {
  /** "1", "p^2+k^2", "p*k", "i*(p-k)", "E*p*k": can be pasted into a counterterm. */
  readonly text: string;
  readonly terms: readonly MomentumTerm[];
}

export interface FormWithCoefficient {
  readonly form: LocalForm;
  readonly coefficient: Complex;
}

/** c p^a k^b E^e of an amplitude's growing part. */
export interface LocalCoefficient {
  readonly a: number;
  readonly b: number;
  readonly e: number;
  readonly c: Complex;
}

const SAME = 1e-8;

/**
 * Groups monomials into forms: c (p^a k^b + p^b k^a), c (p^a k^b - p^b k^a), the latter with its i where c is imaginary (then the
 * strength is real, as for a Hermitian vertex), single monomials otherwise.
 */
export function groupIntoForms(coefficients: readonly LocalCoefficient[]): FormWithCoefficient[] {
  const left = new Map(coefficients.map(t => [`${t.a},${t.b},${t.e}`, t]));
  const forms: FormWithCoefficient[] = [];
  for (const t of coefficients) {
    if (!left.delete(`${t.a},${t.b},${t.e}`)) continue;
    const mirror = left.get(`${t.b},${t.a},${t.e}`);
    const scale = Math.hypot(t.c.re, t.c.im) * SAME;
    if (mirror && Math.hypot(mirror.c.re - t.c.re, mirror.c.im - t.c.im) < scale) {
      left.delete(`${t.b},${t.a},${t.e}`);
      forms.push({ form: pairForm(t, 1), coefficient: t.c });
    } else if (mirror && Math.hypot(mirror.c.re + t.c.re, mirror.c.im + t.c.im) < scale) {
      left.delete(`${t.b},${t.a},${t.e}`);
      forms.push(antisymmetric(t));
    } else forms.push({ form: singleForm(t), coefficient: t.c });
  }
  return forms;
}

function antisymmetric(t: LocalCoefficient): FormWithCoefficient {
  // The higher power of p first: p-k, p^2-k^2.
  const [a, b, sign] = t.a > t.b ? [t.a, t.b, 1] : [t.b, t.a, -1];
  const c = { re: sign * t.c.re, im: sign * t.c.im };
  const form = pairForm({ ...t, a, b }, -1);
  if (Math.abs(c.re) > SAME * Math.abs(c.im)) return { form, coefficient: c };
  const terms = form.terms.map(u => ({ ...u, re: 0, im: u.re }));
  return { form: { text: withFactor('i', form.text), terms }, coefficient: { re: c.im, im: 0 } };
}

function pairForm(t: { a: number; b: number; e: number }, sign: 1 | -1): LocalForm {
  const [a, b] = t.a > t.b ? [t.a, t.b] : [t.b, t.a];
  const text = `${product(a, b)}${sign > 0 ? '+' : '-'}${product(b, a)}`;
  const terms = [
    { a, b, e: t.e, re: 1, im: 0 },
    { a: b, b: a, e: t.e, re: sign, im: 0 },
  ];
  return { text: withFactor(powerOf('E', t.e), text), terms };
}

function singleForm(t: { a: number; b: number; e: number }): LocalForm {
  return { text: withFactor(powerOf('E', t.e), product(t.a, t.b)), terms: [{ a: t.a, b: t.b, e: t.e, re: 1, im: 0 }] };
}

const powerOf = (name: string, n: number): string => (n === 0 ? '' : n === 1 ? name : `${name}^${n}`);

function product(a: number, b: number): string {
  return [powerOf('p', a), powerOf('k', b)].filter(Boolean).join('*') || '1';
}

function withFactor(factor: string, text: string): string {
  if (!factor) return text;
  if (text === '1') return factor;
  return /[+-]/.test(text) ? `${factor}*(${text})` : `${factor}*${text}`;
}

/** Is `terms` a multiple of `form`? */
export function isMultipleOf(terms: readonly MomentumTerm[], form: readonly MomentumTerm[]): boolean {
  const key = (t: MomentumTerm) => `${t.a},${t.b},${t.e}`;
  const used = terms.filter(t => t.re !== 0 || t.im !== 0);
  if (used.length !== form.length) return false;
  const other = new Map(used.map(t => [key(t), t]));
  const first = other.get(key(form[0]));
  if (!first) return false;
  // u * form[0] = first * f must hold for each pair.
  return form.every(f => {
    const u = other.get(key(f));
    if (!u) return false;
    const [x, y] = [multiply(u, form[0]), multiply(first, f)];
    return Math.hypot(x.re - y.re, x.im - y.im) <= 1e-12 * Math.hypot(x.re, x.im);
  });
}

const multiply = (x: Complex, y: Complex): Complex => ({ re: x.re * y.re - x.im * y.im, im: x.re * y.im + x.im * y.re });
