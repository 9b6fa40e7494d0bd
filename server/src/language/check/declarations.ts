import type { ModelBlock, Statement } from '../outline';
import type { Declaration, Names } from '../scope';
import type { Word } from '../syntax';
import { shown } from '../names';
import { statementsOf, within, type Reporter } from './model';

/** The constants of a file. */
export function fileNames(block: Pick<ModelBlock, 'statements' | 'broken'>, reporter: Reporter): Names {
  return collect(block, reporter, ['pi', 'i']);
}

/** The values of a model: constants, couplings, the cutoff. */
export function modelNames(block: ModelBlock, reporter: Reporter): Names {
  return collect(block, reporter, ['pi', 'i', 'mu']);
}

function collect(block: Pick<ModelBlock, 'statements' | 'broken'>, reporter: Reporter, predefined: readonly string[]): Names {
  const declarations = new Map<string, Declaration>();
  const places = new Map<string, Word>();
  let cutoff: string | null = null;
  for (const statement of block.statements) {
    const { body } = statement;
    if (body.kind !== 'const' && body.kind !== 'coupling' && body.kind !== 'cutoff') continue;
    const span = within(statement, body.name.span);
    const { name } = body.name;
    if (predefined.includes(name)) {
      reporter.error('duplicate', span, `\`${name}\` is predefined and cannot be declared; choose another name.`, { subject: name });
      continue;
    }
    if (!isFirst(places, { name, span }, reporter)) continue;
    if (body.kind === 'cutoff') cutoff ??= name;
    else declarations.set(name, { kind: body.kind, name, formula: body.value, offset: statement.span.start, nameSpan: span });
  }
  const broken = new Set(
    block.broken.flatMap(({ word, name }) => (name !== null && (word === 'const' || word === 'coupling') ? [name] : [])),
  );
  return { declarations, broken, cutoff };
}

/** Interactions and counterterms, data: a name twice is an error at the second place; an element of a matrix goes by its channels too. */
export function reportRepeatedNames(block: ModelBlock, reporter: Reporter): void {
  const vertices = new Map<string, Word>();
  const elements = new Map<string, Word>();
  for (const statement of block.statements) {
    const { body } = statement;
    if (body.kind === 'counterterm') isFirst(vertices, placed(statement, body.name), reporter);
    if (body.kind !== 'interaction') continue;
    const { element } = body.kernel;
    const word = placed(statement, body.name);
    if (element === null) isFirst(vertices, word, reporter);
    else if (isFirst(elements, word, reporter, `${word.name}[${element.out.value}, ${element.in.value}]`) && !elements.has(word.name)) {
      elements.set(word.name, word);
      isFirst(vertices, word, reporter);
    }
  }
  const data = new Map<string, Word>();
  for (const statement of statementsOf(block, 'data')) isFirst(data, placed(statement, statement.body.name), reporter);
}

const placed = (statement: Statement, word: Word): Word => ({ name: word.name, span: within(statement, word.span) });

function isFirst(places: Map<string, Word>, word: Word, reporter: Reporter, key = word.name): boolean {
  const first = places.get(key);
  if (first === undefined) {
    places.set(key, word);
    return true;
  }
  const related = [{ span: first.span, message: 'declared here first' }];
  reporter.error('duplicate', word.span, `\`${shown(key)}\` is declared already; choose another name.`, { subject: word.name, related });
  return false;
}
