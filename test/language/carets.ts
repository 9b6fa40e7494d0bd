import { expect } from 'vitest';
import { readDocument } from '../../server/src/language';
import type { Defaults, ModelInText, Overrides, Problem, SourceDocument } from '../../server/src/language/document';

export const defaults: Defaults = { cutoff: 30, order: 3 };
export const nothing: Overrides = { cutoff: null, order: null };

export const read = (text: string, overrides: Overrides = nothing): SourceDocument => readDocument(text, defaults, overrides);

export const everyProblem = (document: SourceDocument): Problem[] => [
  ...document.problems,
  ...document.models.flatMap(model => model.problems),
];

/**
 * Reads a text with its expected problems drawn in: a line of carets under the place, then the code and a part of the message. A single
 * `!` stands for an empty place at that column. A missing problem fails, and so does an unexpected one.
 *
 *     coupling c1 = c9
 *                   ^^ unknown-name: did you mean
 */
export function check(drawn: string): SourceDocument {
  const lines: string[] = [];
  const expected: string[] = [];
  const parts: string[] = [];
  for (const line of drawn.split('\n')) {
    const mark = /^( *)(\^+|!) ([a-z-]+)(?:: (.*))?$/.exec(line);
    if (mark === null) {
      lines.push(line);
      continue;
    }
    const width = mark[2] === '!' ? 0 : mark[2].length;
    expected.push(`${lines.length}:${mark[1].length}+${width} ${mark[3]}`);
    parts.push(mark[4] ?? '');
  }
  const text = lines.join('\n');
  const document = read(text);
  const found = everyProblem(document).sort((a, b) => a.span.start - b.span.start || a.span.end - b.span.end);
  const written = found.map(problem => `${place(text, problem)} ${problem.code}`);
  expect(written, found.map(problem => problem.message).join('\n')).toEqual(expected);
  found.forEach((problem, i) => expect(problem.message).toContain(parts[i]));
  return document;
}

function place(text: string, { span }: Problem): string {
  const before = text.slice(0, span.start);
  const column = span.start - before.lastIndexOf('\n') - 1;
  return `${before.split('\n').length}:${column}+${span.end - span.start}`;
}

/** The only model of a text that has no problem of severity error. */
export function sound(text: string, overrides: Overrides = nothing): NonNullable<ModelInText['spec']> {
  const document = read(text, overrides);
  const errors = everyProblem(document).filter(({ severity }) => severity === 'error');
  expect(errors.map(({ message }) => message)).toEqual([]);
  return document.models[0].spec!;
}
