import type { ModelInText, NamedPlace, Span } from '../language/document';
import type { CheckedDocument } from '../session/checked';
import { evaluated, type Evaluated } from '../findings/rule';

/** What stands at a place of the text, as far as the results speak of it. */
export interface Target {
  readonly kind: 'interaction' | 'coupling' | 'counterterm' | 'series';
  /** Its place among those of its kind; 0 for the series. */
  readonly index: number;
  readonly span: Span;
  readonly model: Evaluated;
}

/**
 * The interaction, coupling or counterterm named at `offset`, where it is declared or used, or the word `series`.
 * Null in comments, elsewhere, and in a model that cannot be evaluated.
 */
export function targetAt({ document, models }: CheckedDocument, offset: number): Target | null {
  const checked = models.find(({ source }) => within(source.places.model, offset));
  const model = checked ? evaluated(document.text, checked) : null;
  if (!model) return null;
  const { places } = model.source;
  if (places.series && within(places.series.keyword, offset)) return { kind: 'series', index: 0, span: places.series.keyword, model };
  return declared(model, offset) ?? used(model, offset);
}

const kinds = [
  ['interaction', 'interactions'],
  ['coupling', 'couplings'],
  ['counterterm', 'counterterms'],
] as const;

function declared(model: Evaluated, offset: number): Target | null {
  for (const [kind, list] of kinds) {
    const index = model.source.places[list].findIndex(({ name }) => within(name, offset));
    if (index >= 0) return { kind, index, span: model.source.places[list][index].name, model };
  }
  return null;
}

/** A coupling in an expression; an interaction after `of` or `cancels`. */
function used(model: Evaluated, offset: number): Target | null {
  const { places } = model.source;
  const span = wordAt(model.text, offset);
  if (!span || !statementsOf(places).some(({ statement }) => within(statement, offset))) return null;
  const name = model.text.slice(span.start, span.end).normalize('NFKC');
  const vertex = inVertexPlace(model, span);
  const index = (vertex ? model.spec.interactions : model.spec.couplings).findIndex(one => one.name === name);
  return index < 0 ? null : { kind: vertex ? 'interaction' : 'coupling', index, span, model };
}

const statementsOf = ({ couplings, interactions, counterterms, cutoff }: ModelInText['places']): NamedPlace[] => [
  ...couplings,
  ...interactions,
  ...counterterms,
  ...(cutoff ? [cutoff] : []),
];

/** Between the name of a counterterm's form or its `cancels`, and its `subtract`. */
function inVertexPlace({ text, source }: Evaluated, { start }: Span): boolean {
  const place = source.places.counterterms.find(({ statement }) => within(statement, start));
  if (!place) return false;
  const before = text.slice(place.name.end, start).replace(/#.*/g, '');
  return !/\bsubtract\b/.test(before) && (/\bcancels\b/.test(before) || /^\s*of\s*$/.test(before));
}

function wordAt(text: string, offset: number): Span | null {
  const lineStart = Math.max(text.lastIndexOf('\n', offset - 1), text.lastIndexOf('\r', offset - 1)) + 1;
  if (text.slice(lineStart, offset).includes('#')) return null;
  const before = /[\p{L}\p{N}\p{M}_]*$/u.exec(text.slice(lineStart, offset))![0].length;
  const after = /^[\p{L}\p{N}\p{M}_]*/u.exec(text.slice(offset, offset + 1000))![0].length;
  return before + after > 0 ? { start: offset - before, end: offset + after } : null;
}

const within = ({ start, end }: Span, offset: number): boolean => start <= offset && offset <= end;
