import { lower } from '../lower';
import { shown, suggestion } from '../names';
import type { Formula, Word } from '../syntax';
import { anEnergy, anInverseLength } from '../units';
import { isObservable, observables } from '../words';
import { measurement } from './expectations';
import { keyword, statementsOf, within, type Model } from './model';
import type { Kinematics } from './points';

/** Statements that are read, with every name looked up, but not evaluated by this version. */
export function reportLater(model: Model, kinematics: Kinematics): void {
  const { block, reporter } = model;
  for (const statement of statementsOf(block, 'propagator')) {
    lower(
      statement.body.value,
      model.scope.context(
        statement.span.start,
        new Map([
          ['k', anInverseLength],
          ['E', anEnergy],
        ]),
      ),
    );
    reporter.error(
      'not-evaluated',
      keyword(statement),
      'A `propagator` of its own is read but not evaluated by this version; take it out to look at 1/(E − kinetic(k)).',
    );
  }
  for (const statement of statementsOf(block, 'fix')) {
    const { name, observable, value, point } = statement.body;
    checkFixed(model, within(statement, name.span), name);
    measurement(model, statement, observable, value, point, kinematics);
    reporter.error('not-evaluated', keyword(statement), '`fix` is read but not evaluated by this version; give the coupling a value.', {
      subject: name.name,
    });
  }
  for (const statement of statementsOf(block, 'data')) {
    for (const { name } of statement.body.columns) checkColumn(model, within(statement, name.span), name);
    reporter.error('not-evaluated', keyword(statement), '`data` is read but not evaluated by this version; give the couplings values.', {
      subject: statement.body.name.name,
    });
  }
}

/** A free coupling is set by a `fix` or by data. */
export function reportUnsetCouplings(model: Model): void {
  const { block } = model;
  const fixed = new Set(statementsOf(block, 'fix').map(statement => statement.body.name.name));
  const anyData = [...block.statements, ...block.broken].some(statement => statement.word === 'data' || statement.word === 'fix');
  for (const statement of statementsOf(block, 'coupling')) {
    const { name, value } = statement.body;
    if (value !== null || fixed.has(name.name) || (anyData && hasDataOrBrokenFix(model))) continue;
    const message = `Nothing sets the free coupling \`${shown(name.name)}\`; give it a value, as in \`coupling ${shown(name.name)} = 1\`, or a \`fix\`.`;
    model.reporter.error('missing', within(statement, name.span), message, { subject: name.name });
  }
}

const hasDataOrBrokenFix = ({ block }: Model): boolean =>
  block.statements.some(statement => statement.word === 'data') || block.broken.some(({ word }) => word === 'data' || word === 'fix');

function checkFixed(model: Model, span: { start: number; end: number }, word: Word): void {
  const declaration = model.scope.names.declarations.get(word.name);
  if (declaration === undefined) {
    if (model.scope.names.broken.has(word.name)) return;
    const free = [...model.scope.names.declarations.values()].filter(isFree).map(({ name }) => name);
    model.reporter.error(
      'unknown-name',
      span,
      `\`${shown(word.name)}\` is no coupling of this model${suggestion(word.name, free) || '.'}`,
      { subject: word.name },
    );
  } else if (!isFree(declaration)) {
    model.reporter.error('value', span, `\`${shown(word.name)}\` has a value already; only a \`free\` coupling can be fixed.`, {
      subject: word.name,
    });
  }
}

const isFree = ({ kind, formula }: { kind: string; formula: Formula | null }): boolean => kind === 'coupling' && formula === null;

const axes = ['p', 'E', 'E_lab'];

function checkColumn(model: Model, span: { start: number; end: number }, word: Word): void {
  if (axes.includes(word.name) || word.name === 'sigma' || isObservable(word.name)) return;
  const near = suggestion(word.name, [...axes, 'sigma', ...Object.keys(observables)]);
  model.reporter.error(
    'unknown-name',
    span,
    `\`${shown(word.name)}\` is no column of data${near || '; there are p, E, E_lab, sigma and the observables.'}`,
    { subject: word.name },
  );
}
