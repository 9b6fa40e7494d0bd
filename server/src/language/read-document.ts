import { checkModel, type FileView } from './check/check-model';
import { fileNames } from './check/declarations';
import { keyword, Reporter, statementsOf } from './check/model';
import { merge } from './check/variants';
import { Dimensions } from './dimensions';
import type { Defaults, ModelInText, Overrides, SourceDocument } from './document';
import { shown, suggestion } from './names';
import { outline, type ModelBlock, type Outline } from './outline';
import { Scope } from './scope';

/**
 * Reads a text of the language: every statement parsed, names resolved, values evaluated, dimensions checked, and each model lowered to
 * its spec where nothing is wrong with it. `defaults` stand in for what a model doesn't declare, `overrides` go over what it does.
 * Never throws, whatever the text: each mistake is one problem at its place, and the rest is still checked.
 */
export function readDocument(text: string, defaults: Defaults, overrides: Overrides): SourceDocument {
  const file = outline(text);
  const reporter = new Reporter({ start: 0, end: text.length });
  for (const problem of file.problems) reporter.add(problem);
  for (const use of statementsOf(file, 'use')) {
    reporter.error('not-evaluated', keyword(use), '`use` is read but not followed by this version; write what it brings into this file.');
  }
  const view = viewOf(text, file, reporter);
  const models = file.models.map(block => checkVariant(block, file, view, defaults, overrides));
  return { text, problems: [...reporter.problems].sort((a, b) => a.span.start - b.span.start), models };
}

/** The file's constants stand in MeV and fm here, which only their dimensions depend on. */
const fileUnits = { energy: 'MeV', length: 'fm' };

function viewOf(text: string, file: Outline, reporter: Reporter): FileView {
  const open = statementsOf(file, 'use').length > 0 || file.broken.some(({ word }) => word === 'use');
  const constants = fileNames(file, reporter);
  const around = { system: fileUnits, dimensions: new Dimensions(fileUnits), report: reporter.add, outer: null, mu: null, open };
  const scope = new Scope(constants, around);
  for (const name of constants.declarations.keys()) scope.lookup(name);
  return { text, constants, scope, open };
}

function checkVariant(block: ModelBlock, file: Outline, view: FileView, defaults: Defaults, overrides: Overrides): ModelInText {
  const problems = [...block.problems, ...nameProblems(block, file, view.open)];
  const base = withBase(block, file, []);
  // A variant of an unknown model may hold anything: nothing is missing in it and no name is wrong.
  const seen = base === null ? { ...view, open: true } : view;
  return checkModel({ ...block, problems }, base ?? block, seen, defaults, overrides);
}

/** The model with the statements of what it varies; null where that is unknown or leads back to itself. */
function withBase(block: ModelBlock, file: Outline, under: readonly ModelBlock[]): ModelBlock | null {
  if (block.from === null) return block;
  const base = file.models.find(model => model.name.name === block.from!.name);
  if (base === undefined || base === block || under.includes(base) || under.length > deepestVariant) return null;
  const whole = withBase(base, file, [...under, block]);
  return whole && merge(whole, block);
}

/** Variants of variants: enough for anyone, and short of the stack. */
const deepestVariant = 100;

function nameProblems(block: ModelBlock, file: Outline, open: boolean): SourceDocument['problems'] {
  const reporter = new Reporter(block.span);
  const { name, from } = block;
  const first = file.models.find(model => model.name.name === name.name)!;
  if (first !== block && name.name !== '') {
    const related = [{ span: first.name.span, message: 'declared here first' }];
    reporter.error('duplicate', name.span, `There is a model \`${shown(name.name)}\` already; choose another name.`, { subject: name.name, related });
  }
  if (from === null) return reporter.problems;
  const isKnown = file.models.some(model => model.name.name === from.name);
  if (!isKnown && !open) {
    const near = suggestion(from.name, file.models.map(model => model.name.name).filter(other => other !== name.name));
    reporter.error('unknown-name', from.span, `There is no model \`${shown(from.name)}\`${near || ' in this file.'}`, { subject: from.name });
  } else if (leadsBack(block, file)) {
    reporter.error('value', from.span, `\`${shown(name.name)}\` is a variant of itself.`, { subject: name.name });
  } else {
    reporter.error('not-evaluated', from.span, 'A variant of another model is read but not evaluated by this version; write its statements out.', { subject: name.name });
  }
  return reporter.problems;
}

function leadsBack(block: ModelBlock, file: Outline): boolean {
  const seen = new Set<ModelBlock>();
  let current: ModelBlock | undefined = block;
  while (current?.from && !seen.has(current)) {
    seen.add(current);
    const { name }: { name: string } = current.from;
    current = file.models.find(model => model.name.name === name);
    if (current === block) return true;
  }
  return false;
}
