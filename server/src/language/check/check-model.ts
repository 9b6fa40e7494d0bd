import type { Complex } from '../../core/algebra/expression';
import type { CouplingSpec, InteractionSpec, ModelSpec } from '../../core/model/spec';
import { Dimensions } from '../dimensions';
import type { Defaults, ModelInText, Overrides, Problem } from '../document';
import { shown } from '../names';
import type { ModelBlock } from '../outline';
import { Scope, type Names } from '../scope';
import { readCounterterm } from './counterterms';
import { readCutoff } from './cutoff';
import { modelNames, reportRepeatedNames } from './declarations';
import { readExpectation } from './expectations';
import { readFrame, reportRepeated } from './frame';
import { readInteraction } from './interactions';
import { reportLater, reportUnsetCouplings } from './later';
import { ReducedMass, readKinetic } from './mass';
import { Reporter, statementsOf, type Model } from './model';
import { placesOf } from './places';
import type { Kinematics } from './points';
import type { Sampler } from './sampling';
import { readSeries } from './series';

/** What a model sees of its file. */
export interface FileView {
  readonly text: string;
  readonly constants: Names;
  /** The file's constants as the file itself sees them, for models in natural units. */
  readonly scope: Scope;
  /** Names may come from a file that this version doesn't read. */
  readonly open: boolean;
}

/**
 * Checks one model and lowers it. `block` is the model as written; `merged` has the statements of the model that it varies in it (the
 * same block where it varies none). Every mistake gives one problem at its place.
 */
export function checkModel(block: ModelBlock, merged: ModelBlock, file: FileView, defaults: Defaults, overrides: Overrides): ModelInText {
  const reporter = new Reporter(block.span);
  reporter.problems.push(...block.problems);
  reportRepeated(merged, reporter);
  const { model, mass, sound } = openModel(merged, file, reporter);
  reportRepeatedNames(merged, reporter);
  const spec = readModel(model, mass, file, defaults, overrides);
  // Where the units themselves are wrong, no other dimension can be judged.
  const units = statementsOf(merged, 'units')[0]?.span;
  const judged = ({ code, span }: Problem) =>
    code !== 'dimension' || (units !== undefined && span.start >= units.start && span.end <= units.end);
  const problems = sound.units ? reporter.problems : reporter.problems.filter(judged);
  const healthy = sound.frame && !problems.some(({ severity }) => severity === 'error') && merged.broken.length === 0;
  return { name: block.name.name, places: placesOf(file.text, block), problems: inOrder(problems), spec: healthy ? spec : null };
}

const inOrder = (problems: readonly Problem[]): Problem[] =>
  [...problems].sort((a, b) => a.span.start - b.span.start || a.span.end - b.span.end);

function openModel(merged: ModelBlock, file: FileView, reporter: Reporter) {
  const frame = readFrame(merged, reporter);
  const { system } = frame;
  const dimensions = new Dimensions(system);
  const mass = new ReducedMass(() => model);
  const outside = { system, dimensions: new Dimensions(system), report: () => undefined, outer: null, mu: null, open: file.open };
  const outer = system === null ? file.scope : new Scope(file.constants, outside);
  const around = { system, dimensions, report: reporter.add, outer, mu: () => mass.meaning(), open: file.open };
  const scope = new Scope(modelNames(merged, reporter), around);
  const model: Model = {
    text: file.text,
    block: merged,
    system,
    dimensions,
    scope,
    space: frame.space,
    wave: frame.wave,
    channels: frame.channels,
    reporter,
  };
  return { model, mass, sound: { units: frame.unitsSound, frame: frame.sound } };
}

function readModel(model: Model, mass: ReducedMass, file: FileView, defaults: Defaults, overrides: Overrides): ModelSpec | null {
  const { block, scope } = model;
  for (const name of scope.names.declarations.keys()) scope.lookup(name);
  const reduced = mass.read();
  const mu = reduced?.mu ?? NaN;
  const cutoff = readCutoff(model, defaults, overrides);
  const scale = cutoff?.value ?? defaults.cutoff;
  const sampler: Sampler = { couplings: couplingValues(model), scale, energy: Number.isNaN(mu) ? scale : scale ** 2 / (2 * mu) };
  const kinetic = readKinetic(model, sampler);
  const kinematics: Kinematics = {
    mu,
    masses: reduced?.masses ?? null,
    kinetic: kinetic ?? null,
    edge: cutoff?.shape.kind === 'sharp' ? cutoff.value : Infinity,
  };
  const series = readSeries(model, cutoff, kinematics, defaults, overrides);
  const interactions = readInteractions(model, sampler);
  const isBroken = (word: string) => block.broken.some(broken => broken.word === word);
  const order = declaredOrder(model, defaults);
  const open = file.open || isBroken('interaction');
  const counterterms = statementsOf(block, 'counterterm').map(statement =>
    readCounterterm(model, statement, { interactions, open, order, mu, edge: kinematics.edge }),
  );
  const expectations = statementsOf(block, 'expect').map(statement =>
    readExpectation(model, statement, kinematics, overrides.order === null ? order : null),
  );
  reportLater(model, kinematics);
  reportUnsetCouplings(model);
  reportMissing(model, mass, kinetic !== null, file.open);
  const couplings = readCouplings(model);
  if (cutoff === null || series === null || kinetic === undefined || couplings === null) return null;
  const parts = [...interactions.values(), ...counterterms, ...expectations];
  const constantsBroken = [...scope.names.declarations.keys()].some(name => scope.lookup(name).kind === 'broken');
  if (parts.includes(null) || constantsBroken || (reduced === null && statementsOf(block, 'mass').length > 0)) return null;
  return {
    name: block.name.name,
    dimension: model.space,
    wave: model.wave,
    units: model.system,
    mu,
    masses: reduced?.masses ?? null,
    kinetic,
    couplings,
    interactions: [...interactions.values()] as InteractionSpec[],
    cutoff,
    series,
    counterterms: counterterms.filter(counterterm => counterterm !== null),
    expectations: expectations.filter(expectation => expectation !== null),
  };
}

function couplingValues({ scope }: Model): Map<string, Complex> {
  const values = new Map<string, Complex>();
  for (const { kind, name } of scope.names.declarations.values()) {
    const meaning = scope.lookup(name);
    // A free coupling has no value yet; any will do to see a kernel's symmetry.
    if (kind === 'coupling' && meaning.kind === 'coupling') values.set(name, meaning.value ?? { re: 1, im: 0 });
  }
  return values;
}

function readCouplings({ scope, dimensions }: Model): CouplingSpec[] | null {
  const couplings: CouplingSpec[] = [];
  for (const { kind, name } of scope.names.declarations.values()) {
    if (kind !== 'coupling') continue;
    const meaning = scope.lookup(name);
    if (meaning.kind !== 'coupling' || meaning.value === null) return null;
    couplings.push({ name, value: meaning.value.re, dimension: meaning.dimension === null ? '1' : dimensions.format(meaning.dimension) });
  }
  return couplings;
}

/** By name; elements of a matrix share theirs. Null for one that has a mistake. */
function readInteractions(model: Model, sampler: Sampler): Map<string, InteractionSpec | null> {
  const interactions = new Map<string, InteractionSpec | null>();
  const orders = new Map<string, number>();
  for (const statement of statementsOf(model.block, 'interaction')) {
    const { name } = statement.body.name;
    const read = readInteraction(model, statement, sampler);
    if (!interactions.has(name) || read === null) interactions.set(name, read);
    const order = statement.body.order?.value ?? 1;
    const first = orders.get(name) ?? order;
    orders.set(name, first);
    if (statement.body.kernel.element === null || first === order) continue;
    const span = { start: statement.span.start + statement.body.orderSpan.start, end: statement.span.start + statement.body.orderSpan.end };
    model.reporter.error('value', span, `All elements of \`${shown(name)}\` have the same order; its first one has order ${first}.`, {
      subject: name,
    });
  }
  return interactions;
}

/** The order that a counterterm or an expectation may speak of; null where the series has a mistake. */
function declaredOrder({ block }: Model, defaults: Defaults): number | null {
  if (block.broken.some(({ word }) => word === 'series')) return null;
  return statementsOf(block, 'series')[0]?.body.order.value ?? defaults.order;
}

function reportMissing({ block, reporter }: Model, mass: ReducedMass, hasKinetic: boolean, open: boolean): void {
  const has = (word: string) => [...block.statements, ...block.broken].some(statement => statement.word === word);
  const own = `\`${shown(block.name.name)}\``;
  if (!has('interaction') && !(open && block.from !== null)) {
    reporter.error(
      'missing',
      block.name.span,
      `The model ${own} has no interaction; write for example \`interaction contact(p, k) = c0\`.`,
    );
  }
  const usesMu = mass.asked || statementsOf(block, 'counterterm').some(statement => statement.body.scheme.kind === 'kappa');
  if (has('mass') || (hasKinetic && !usesMu) || (open && block.from !== null)) return;
  const why = hasKinetic ? ', and uses `mu`' : '';
  reporter.error('missing', block.name.span, `The model ${own} has no mass${why}; write \`mass reduced X\` or \`mass A, B\`.`);
}
