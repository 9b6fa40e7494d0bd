import type { Remark } from '../core/results';
import { placeOfSubject } from './places';
import { onResults, termOf, type Draft, type Evaluated, type FindingRule } from './rule';
import type { Severity } from './finding';

/** What the core remarked under `code`, each at its subject; a subject is spoken of once. */
export const fromRemarks = (code: Remark['code'], severity: (model: Evaluated, remark: Remark) => Severity): FindingRule['raise'] =>
  onResults(model => {
    const remarks = model.results.remarks.filter(remark => remark.code === code);
    const first = remarks.filter(
      (remark, index) => remarks.findIndex(other => other.subject === remark.subject && other.message === remark.message) === index,
    );
    return first.map((remark): Draft => ({
      severity: severity(model, remark),
      message: remark.message,
      span: placeOfSubject(model, remark.subject),
      ...(remark.subject !== null && { subject: remark.subject }),
      ...(remark.p !== undefined && { p: remark.p }),
    }));
  });

/**
 * An error where finiteness or an expectation stays open, since the file is then not known to be good; else a warning.
 * A remark about no monomial in particular leaves open whatever is open in the model.
 */
export function severityWhereOpen(model: Evaluated, { subject }: Pick<Remark, 'subject'>): Severity {
  const { terms, expectations } = model.results;
  const term = termOf(model, subject);
  const expectation = expectations.find(({ text }) => text === subject);
  if (term) return term.status === null ? 'error' : 'warning';
  if (expectation) return expectation.holds === null ? 'error' : 'warning';
  const open = terms.length === 0 || terms.some(({ status }) => status === null) || expectations.some(({ holds }) => holds === null);
  return open ? 'error' : 'warning';
}
