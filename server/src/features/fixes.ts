import { findingsOf } from '../findings';
import { fixesForAll } from '../findings/counterterms/fixes';
import type { FindingCode, QuickFix } from '../findings/finding';
import { evaluated } from '../findings/rule';
import type { Span } from '../language/document';
import type { CheckedDocument } from '../session/checked';

/**
 * The quick fixes of the findings that touch `span`, each once; and on the word `series` the counterterms of the whole model
 * (`code` null: they belong to no finding there).
 */
export function fixesAt(document: CheckedDocument, span: Span): { fix: QuickFix; code: FindingCode | null }[] {
  const ofFindings = findingsOf(document)
    .filter(finding => touches(finding.span, span))
    .flatMap(({ fixes, code }) => fixes.map(fix => ({ fix, code })));
  const ofSeries = document.models.flatMap(checked => {
    const model = evaluated(document.document.text, checked);
    const keyword = checked.source.places.series?.keyword;
    return model && keyword && touches(keyword, span) ? fixesForAll(model).map(fix => ({ fix, code: null })) : [];
  });
  const key = ({ title, edits }: QuickFix): string => JSON.stringify([title, edits]);
  return [...ofFindings, ...ofSeries].filter(({ fix }, index, all) => all.findIndex(other => key(other.fix) === key(fix)) === index);
}

const touches = (a: Span, b: Span): boolean => a.start <= b.end && b.start <= a.end;
