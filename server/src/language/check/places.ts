import type { NamedPlace, Places } from '../document';
import type { ModelBlock, Statement } from '../outline';
import { keyword, statementsOf, within } from './model';

/** Where the things of a model stand, in the order in which its spec holds them. */
export function placesOf(text: string, block: ModelBlock): Places {
  const named = (kind: 'coupling' | 'interaction' | 'counterterm' | 'cutoff'): NamedPlace[] =>
    statementsOf(block, kind).map(statement => ({ statement: statement.span, name: within(statement, statement.body.name.span) }));
  const series = statementsOf(block, 'series')[0];
  return {
    model: block.span,
    name: block.name.span,
    insertAt: block.insertAt,
    couplings: named('coupling'),
    interactions: named('interaction'),
    counterterms: named('counterterm'),
    cutoff: named('cutoff')[0] ?? null,
    series: series === undefined ? null : { statement: series.span, keyword: keyword(series) },
    expectations: statementsOf(block, 'expect').map(statement => ({ statement: statement.span, text: expectationText(text, statement) })),
  };
}

/** The statement without its first word and comments, white space folded. */
export const expectationText = (text: string, { span, word }: Statement): string =>
  text
    .slice(span.start + word.length, span.end)
    .replace(/#[^\r\n]*/g, ' ')
    .replace(/[ \t\u00a0\r\n]+/g, ' ')
    .trim();
