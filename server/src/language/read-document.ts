import { checkModel, type FileView } from './check/check-model';
import { fileNames } from './check/declarations';
import { keyword, Reporter, statementsOf } from './check/model';
import { lineageOf, longestLineage, mergeLineage, modelsByName, type Lineage, type ModelsByName } from './check/variants';
import { Dimensions } from './dimensions';
import type { Defaults, ModelInText, Overrides, Problem, SourceDocument } from './document';
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
  const byName = modelsByName(file.models);
  const models = file.models.map(block => checkVariant(block, byName, view, defaults, overrides));
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

function checkVariant(block: ModelBlock, models: ModelsByName, view: FileView, defaults: Defaults, overrides: Overrides): ModelInText {
  const lineage = lineageOf(block, models);
  const problems = [...block.problems, ...nameProblems(block, lineage, models, view.open)];
  // A variant of an unknown model may hold anything: nothing is missing in it and no name is wrong.
  const seen = lineage.end === 'model' ? view : { ...view, open: true };
  return checkModel({ ...block, problems }, mergeLineage(lineage), seen, defaults, overrides);
}

function nameProblems(block: ModelBlock, lineage: Lineage, models: ModelsByName, open: boolean): readonly Problem[] {
  const reporter = new Reporter(block.span);
  const { name, from } = block;
  const subject = { subject: name.name };
  const first = models.get(name.name)!;
  if (first !== block && name.name !== '') {
    const related = [{ span: first.name.span, message: 'declared here first' }];
    reporter.error('duplicate', name.span, `There is a model \`${shown(name.name)}\` already; choose another name.`, {
      ...subject,
      related,
    });
  }
  if (from === null) return reporter.problems;
  if (!models.has(from.name)) {
    const others = [...models.keys()].filter(other => other !== name.name);
    const message = `There is no model \`${shown(from.name)}\`${suggestion(from.name, others) || ' in this file.'}`;
    if (!open) reporter.error('unknown-name', from.span, message, { subject: from.name });
  } else if (lineage.end === 'circle') {
    reporter.error(
      'value',
      from.span,
      `\`${shown(name.name)}\` varies a model that leads back to itself, or through more than ${longestLineage} others.`,
      subject,
    );
  } else {
    const message = 'A variant of another model is read but not evaluated by this version; write its statements out.';
    reporter.error('not-evaluated', from.span, message, subject);
  }
  return reporter.problems;
}
