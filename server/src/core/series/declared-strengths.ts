import { shiftLogs, type LaurentTerm } from '../algebra/laurent';
import { leastSquares } from '../linear/solve';
import type { StrengthLaw } from './contact-declared';
import type { FittedForm, FittedOverall } from './dense-overall';
import type { Setup } from './setup';
import type { Counterterm } from './subtraction';

/** The minimal counterterms of this monomial. */
export function minimalCounterterms(setup: Setup, n: number): Counterterm[] {
  const exponents = setup.list.terms[n].exponents.join();
  return setup.counterterms.filter(c => c.spec.scheme.kind === 'minimal' && c.spec.cancels.some(m => m.join() === exponents));
}

/**
 * Strengths of the minimal counterterms of monomial n from the forms fitted to it with logarithms of L/scale: minus the coefficient of the form
 * that each stands for. A fitted form that is no combination of the declared ones is left alone.
 */
export function fittedStrengths(setup: Setup, n: number, fitted: FittedOverall, scale: number): StrengthLaw[] {
  const counterterms = minimalCounterterms(setup, n).filter(c => c.spec.scheme.at === scale);
  const laws = counterterms.map(counterterm => ({
    counterterm,
    term: n,
    law: [] as LaurentTerm[],
    errors: [] as StrengthLaw['errors'][number][],
  }));
  for (const form of fitted.forms) {
    const share = sharesOf(form, counterterms);
    if (!share) continue;
    share.forEach((z, j) => {
      if (z === 0) return;
      const growing = [{ power: form.power, log: form.log, re: -z * form.coefficient.re, im: -z * form.coefficient.im }];
      laws[j].errors.push({ power: form.power, log: form.log, size: Math.abs(z) * form.uncertainty });
      laws[j].law.push(...shiftLogs(growing, -Math.log(scale)));
    });
  }
  return laws;
}

/** z with form = Σ z_j (form of counterterm j); null where there is no such combination. */
function sharesOf(form: FittedForm, counterterms: readonly Counterterm[]): number[] | null {
  if (!counterterms.length) return null;
  if ('interaction' in form.form) {
    const name = form.form.text.slice(3);
    const at = counterterms.findIndex(c => 'of' in c.spec.form && c.spec.form.of === name);
    return at < 0 ? null : counterterms.map((_, j) => (j === at ? 1 : 0));
  }
  const wanted = form.form.terms;
  const contacts = counterterms.map(c => c.vertex.contact ?? []);
  const keys = [...new Set([...wanted, ...contacts.flat()].map(t => `${t.a},${t.b},${t.e}`))];
  const vector = (terms: readonly { a: number; b: number; e: number; re: number; im: number }[]) =>
    keys.flatMap(key => {
      const t = terms.find(u => `${u.a},${u.b},${u.e}` === key);
      return [t?.re ?? 0, t?.im ?? 0];
    });
  const columns = contacts.map(vector);
  const used = columns.flatMap((c, j) => (c.some(v => v !== 0) ? [j] : []));
  const target = vector(wanted);
  const rows = target.map((_, r) => used.map(j => columns[j][r]));
  if (!used.length || rows.length < used.length) return null;
  const z = leastSquares(rows, target);
  if (!z || rows.some((row, r) => Math.abs(row.reduce((s, v, j) => s + v * z[j], 0) - target[r]) > 1e-9)) return null;
  return counterterms.map((_, j) => (used.includes(j) ? z[used.indexOf(j)] : 0));
}
