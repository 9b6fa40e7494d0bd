import type { Wave } from '../../core/model/spec';
import type { Span } from '../document';
import type { ModelBlock, Statement } from '../outline';
import { isEnergyUnit, isLengthUnit, type UnitSystem } from '../units';
import { keyword, statementsOf, within, type BodyOf, type Reporter } from './model';

/** What stands at most once in a model: units, dimension, wave. `sound` is false where one of them has a mistake. */
export interface Frame {
  readonly system: UnitSystem | null;
  readonly unitsSound: boolean;
  readonly space: 1 | 2 | 3;
  readonly wave: Wave;
  readonly channels: number;
  readonly sound: boolean;
}

const once = ['units', 'dimension', 'wave', 'mass', 'kinetic', 'propagator', 'cutoff', 'series'] as const;

/** A second statement of what stands at most once is an error at the second. */
export function reportRepeated(block: ModelBlock, reporter: Reporter): void {
  for (const kind of once) {
    const [first, ...others] = statementsOf(block, kind);
    for (const other of others) {
      const related = [{ span: keyword(first), message: 'the first one' }];
      reporter.error('duplicate', keyword(other), `A model has one \`${kind}\`; take this one out.`, { related });
    }
  }
}

/** Reads units, dimension and wave; `units E, L` counts as given in MeV and fm where it has a mistake. */
export function readFrame(block: ModelBlock, reporter: Reporter): Frame {
  const isBroken = (word: string) => block.broken.some(broken => broken.word === word);
  const unitsStatement = statementsOf(block, 'units')[0];
  const system = unitsStatement === undefined ? null : readUnits(unitsStatement, reporter);
  const unitsSound = system !== undefined && !isBroken('units');
  const space = readSpace(statementsOf(block, 'dimension')[0], reporter);
  const spaceSound = space !== null && !isBroken('dimension');
  const waveStatement = statementsOf(block, 'wave')[0];
  const wave = waveStatement === undefined || !spaceSound ? null : readWave(waveStatement, space, reporter);
  const numbers = waveStatement?.body.wave;
  const channels = numbers !== undefined && 'numbers' in numbers ? new Set(numbers.numbers.map(({ value }) => value)).size : 1;
  return {
    system: unitsSound ? system : { energy: 'MeV', length: 'fm' },
    unitsSound,
    space: space ?? 3,
    wave: wave ?? defaultWave(space ?? 3),
    channels,
    sound: unitsSound && spaceSound && !isBroken('wave') && (waveStatement === undefined || wave !== null),
  };
}

const defaultWave = (space: 1 | 2 | 3): Wave => (space === 1 ? { kind: 'full' } : { kind: 'angular', number: 0 });

/** Undefined where it has a mistake. */
function readUnits(statement: Statement<BodyOf<'units'>>, reporter: Reporter): UnitSystem | null | undefined {
  const { system } = statement.body;
  if (system === null) return null;
  const { energy, length } = system;
  if (!isEnergyUnit(energy.name)) {
    reporter.error(
      'dimension',
      within(statement, energy.span),
      `The first unit is one of energy, and \`${energy.name}\` is a length; write for example \`units MeV, fm\`.`,
    );
    return undefined;
  }
  if (!isLengthUnit(length.name)) {
    reporter.error(
      'dimension',
      within(statement, length.span),
      `The second unit is one of length, and \`${length.name}\` is an energy; write for example \`units MeV, fm\`.`,
    );
    return undefined;
  }
  return { energy: energy.name, length: length.name };
}

function readSpace(statement: Statement<BodyOf<'dimension'>> | undefined, reporter: Reporter): 1 | 2 | 3 | null {
  if (statement === undefined) return 3;
  const { value, span } = statement.body.value;
  if (value === 1 || value === 2 || value === 3) return value;
  return reporter.error('value', within(statement, span), 'The dimension of space is 1, 2 or 3.');
}

const highestWave = 100;

function readWave(statement: Statement<BodyOf<'wave'>>, space: 1 | 2 | 3, reporter: Reporter): Wave | null {
  const { wave, span } = statement.body;
  const place = within(statement, span);
  const wanted = { 1: '`full`, `even` or `odd`', 2: '`m = 0` or another whole number', 3: '`l = 0` or another whole number' }[space];
  const fits = space === 1 ? !('numbers' in wave) : wave.kind === (space === 2 ? 'm' : 'l');
  if (!fits) return reporter.error('value', place, `In dimension ${space} a wave is ${wanted}; this one belongs to another dimension.`);
  if (!('numbers' in wave)) return { kind: wave.kind };
  for (const [i, number] of wave.numbers.entries()) {
    const at: Span = within(statement, number.span);
    if (number.value > highestWave) return reporter.error('value', at, `The highest wave is ${highestWave}.`);
    if (wave.numbers.findIndex(other => other.value === number.value) < i)
      return reporter.error('duplicate', at, `The wave ${number.value} is in the list already.`);
  }
  if (wave.numbers.length > 1) {
    return reporter.error('not-evaluated', place, 'Coupled channels are read but not evaluated by this version; give a single wave.');
  }
  return { kind: 'angular', number: wave.numbers[0].value };
}
