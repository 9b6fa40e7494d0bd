import {
  type CodeAction,
  CodeActionKind,
  type Diagnostic,
  DiagnosticSeverity,
  type Position,
  type Range,
} from 'vscode-languageserver/node';
import type { TextDocument } from 'vscode-languageserver-textdocument';
import type { Finding, QuickFix, Severity } from '../findings/finding';
import type { Span } from '../language/document';

// Between the protocol's lines and characters and our offsets; both count UTF-16 units.

const severities: Record<Severity, DiagnosticSeverity> = {
  error: DiagnosticSeverity.Error,
  warning: DiagnosticSeverity.Warning,
  information: DiagnosticSeverity.Information,
  hint: DiagnosticSeverity.Hint,
};

export const toRange = (document: TextDocument, span: Span): Range => ({
  start: document.positionAt(span.start),
  end: document.positionAt(span.end),
});

/** The offset of a position; one outside the text (a client may be ahead or behind) is moved to its nearest place. */
export const toOffset = (document: TextDocument, position: Position): number =>
  document.offsetAt({ line: Math.max(position.line, 0), character: Math.max(position.character, 0) });

export function toSpan(document: TextDocument, range: Range): Span {
  const ends = [toOffset(document, range.start), toOffset(document, range.end)];
  return { start: Math.min(...ends), end: Math.max(...ends) };
}

/** `docs` is the URI of the folder that the pages named in findings lie in, without `docs/` and ending in a slash. */
export function toDiagnostic(document: TextDocument, finding: Finding, docs: string): Diagnostic {
  return {
    range: toRange(document, finding.span),
    severity: severities[finding.severity],
    code: finding.code,
    codeDescription: { href: docs + finding.docs },
    source: 'tare',
    message: finding.message,
    relatedInformation: finding.related.map(({ span, message }) => ({
      location: { uri: document.uri, range: toRange(document, span) },
      message,
    })),
  };
}

/** The quick fix as an action that mends those of `diagnostics` whose code it belongs to. */
export function toAction(document: TextDocument, fix: QuickFix, diagnostics: readonly Diagnostic[]): CodeAction {
  const edits = fix.edits.map(({ span, text }) => ({ range: toRange(document, span), newText: text }));
  return {
    title: fix.title,
    kind: CodeActionKind.QuickFix,
    isPreferred: fix.preferred,
    diagnostics: [...diagnostics],
    edit: { changes: { [document.uri]: edits } },
  };
}
