import type { Expr } from '../../core/algebra/expression';
import { lower, type Meaning } from '../lower';
import { aReducedMass, anEnergy, anInverseLength } from '../units';
import { massAmount } from './amounts';
import { keyword, statementsOf, within, type Model } from './model';
import { realIn, type Sampler } from './sampling';

/** The reduced mass, read from the `mass` statement when `mu` is first asked for. */
export class ReducedMass {
  /** Did anything ask for `mu`? */
  asked = false;
  private state: 'unread' | 'busy' | 'read' = 'unread';
  private found: { mu: number; masses: readonly [number, number] | null } | null = null;

  constructor(private readonly model: () => Model) {}

  /** What `mu` means in an expression. */
  meaning(): Meaning {
    this.asked = true;
    const found = this.read();
    return found === null ? { kind: 'broken' } : { kind: 'value', value: { re: found.mu, im: 0 }, dimension: aReducedMass };
  }

  /** mu/hbar^2 and the two masses as mc^2; null where there is no mass or it has a mistake. */
  read(): { mu: number; masses: readonly [number, number] | null } | null {
    const model = this.model();
    const statement = statementsOf(model.block, 'mass')[0];
    if (this.state === 'read' || statement === undefined) return this.found;
    if (this.state === 'busy') {
      this.state = 'read';
      return model.reporter.error('value', keyword(statement), 'The mass depends on itself: `mu` is made of it.');
    }
    this.state = 'busy';
    const { reduced, masses } = statement.body;
    if (reduced !== null) {
      const mass = massAmount(model, statement, reduced);
      if (mass !== null && Number.isFinite(mass.mu)) this.found = { mu: mass.mu, masses: null };
    } else {
      const [a, b] = masses.map(formula => massAmount(model, statement, formula));
      if (a !== null && b !== null) {
        this.found = { mu: a.mu / (1 + a.mu / b.mu), masses: model.system === null ? null : [a.rest, b.rest] };
      }
    }
    this.state = 'read';
    return this.found;
  }
}

/** `kinetic(k) = …`: null for the default, undefined where it has a mistake. */
export function readKinetic(model: Model, sampler: Sampler): Expr | null | undefined {
  const statement = statementsOf(model.block, 'kinetic')[0];
  if (statement === undefined) return null;
  const { value } = statement.body;
  const lowered = lower(value, model.scope.context(statement.span.start, new Map([['k', anInverseLength]])));
  if (lowered === null) return undefined;
  const place = within(statement, value.span);
  if (lowered.dimension !== null && !model.dimensions.agree(lowered.dimension, anEnergy)) {
    const { dimensions } = model;
    const message = `A kinetic energy has the dimension ${dimensions.name(anEnergy)}, and this is ${dimensions.name(lowered.dimension)}.`;
    return model.reporter.error('dimension', place, message) ?? undefined;
  }
  const verdict = realIn(lowered.expr, 'k', sampler);
  if (verdict === 'holds') return lowered.expr;
  const message =
    verdict === 'fails' ? 'A kinetic energy is real.' : 'The kinetic energy has no finite value at any of the points where it was tried.';
  return model.reporter.error('value', place, message) ?? undefined;
}
