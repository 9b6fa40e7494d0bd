import type { Span } from '../language/document';
import type { CheckedDocument } from '../session/checked';
import { countertermMarkdown, couplingMarkdown, interactionMarkdown, sections } from './descriptions';
import { seriesMarkdown } from './series-description';
import { targetAt } from './target';

/**
 * What is known about the interaction, coupling, counterterm or series at `offset`, as Markdown; `images`: with plots,
 * which are tables otherwise. Null where there is nothing to say.
 */
export function hoverAt(
  document: CheckedDocument,
  offset: number,
  { images }: { images: boolean },
): { markdown: string; span: Span } | null {
  const target = targetAt(document, offset);
  if (!target) return null;
  const { kind, index, span, model } = target;
  const body =
    kind === 'series'
      ? seriesMarkdown(model, images)
      : kind === 'interaction'
        ? interactionMarkdown(model, index, images)
        : kind === 'coupling'
          ? couplingMarkdown(model, index, images)
          : countertermMarkdown(model, index, images);
  return { markdown: sections([body, model.complete ? '' : '*By power counting; the numbers follow.*']), span };
}
