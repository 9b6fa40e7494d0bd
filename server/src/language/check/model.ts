import type { Wave } from '../../core/model/spec';
import type { Dimensions } from '../dimensions';
import type { Problem, ProblemCode, Span } from '../document';
import type { ModelBlock, Statement } from '../outline';
import type { Scope } from '../scope';
import type { StatementBody, StatementKind, Whole } from '../syntax';
import type { UnitSystem } from '../units';

export type BodyOf<K extends StatementKind> = Extract<StatementBody, { kind: K }>;

/** What the checks of one model share. */
export interface Model {
  readonly text: string;
  readonly block: ModelBlock;
  /** Null: natural units. */
  readonly system: UnitSystem | null;
  readonly dimensions: Dimensions;
  readonly scope: Scope;
  readonly space: 1 | 2 | 3;
  readonly wave: Wave;
  /** How many coupled channels; 1 where there is no coupling. */
  readonly channels: number;
  readonly reporter: Reporter;
}

/** Collects problems; a mistake that stands outside `within` belongs to another model and has been told there. */
export class Reporter {
  readonly problems: Problem[] = [];

  constructor(private readonly within: Span) {}

  readonly add = (problem: Problem): void => {
    if (problem.span.start >= this.within.start && problem.span.end <= this.within.end) this.problems.push(problem);
  };

  /** Returns null, so that a check can report and give up in one step. */
  error(code: ProblemCode, span: Span, message: string, more: Partial<Problem> = {}): null {
    this.add({ code, severity: 'error', message, span, ...more });
    return null;
  }
}

/** A span of a statement as one of the text. */
export const within = (statement: Statement, span: Span): Span => ({
  start: statement.span.start + span.start,
  end: statement.span.start + span.end,
});

/** The reserved word of a statement. */
export const keyword = (statement: Statement): Span => ({ start: statement.span.start, end: statement.span.start + statement.word.length });

/** The statements of one kind, in the order of the text. */
export function statementsOf<K extends StatementKind>(
  block: { readonly statements: readonly Statement[] },
  kind: K,
): Statement<BodyOf<K>>[] {
  return block.statements.filter((statement): statement is Statement<BodyOf<K>> => statement.body.kind === kind);
}

/** A whole number between `least` and `most`, or null with a problem that says `what` it is. */
export function wholeBetween(
  reporter: Reporter,
  statement: Statement,
  whole: Whole,
  least: number,
  most: number,
  what: string,
): number | null {
  if (whole.value >= least && whole.value <= most) return whole.value;
  const limit = whole.value < least ? `at least ${least}` : `at most ${most}`;
  return reporter.error('value', within(statement, whole.span), `${what} is ${limit}.`);
}
