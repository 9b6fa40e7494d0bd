import type { Complex } from '../core/algebra/expression';
import type { Dimensions } from './dimensions';
import type { Problem, Span } from './document';
import { lower, type Context, type Meaning } from './lower';
import { shown, suggestion } from './names';
import type { Formula } from './syntax';
import { hbarcIn, pure, sameDimension, type Dimension, type UnitSystem } from './units';

/** A declared value: a constant or a coupling. */
export interface Declaration {
  readonly kind: 'const' | 'coupling';
  readonly name: string;
  /** Null for a free coupling. */
  readonly formula: Formula | null;
  /** Where its statement starts. */
  readonly offset: number;
  readonly nameSpan: Span;
}

export interface Names {
  readonly declarations: ReadonlyMap<string, Declaration>;
  /** Names whose declaration could not be read. */
  readonly broken: ReadonlySet<string>;
  /** The cutoff: a value like the others, which no expression may use. */
  readonly cutoff: string | null;
}

/** Whatever of a scope lies outside its declarations. */
export interface Surroundings {
  readonly system: UnitSystem | null;
  readonly dimensions: Dimensions;
  readonly report: (problem: Problem) => void;
  /** The scope around this one: the file's constants, in the units of this one. */
  readonly outer: Scope | null;
  /** The meaning of `mu`; null where it has none. */
  readonly mu: (() => Meaning) | null;
  /** Names may come from another file, so an unknown one is no mistake here. */
  readonly open: boolean;
}

const silent: Meaning = { kind: 'broken' };

/** The values that expressions see, each evaluated when it is first asked for. */
export class Scope {
  private readonly known = new Map<string, Meaning>();
  private readonly busy: string[] = [];

  constructor(
    readonly names: Names,
    private readonly around: Surroundings,
  ) {}

  lookup(name: string): Meaning {
    if (this.names.declarations.has(name)) return this.meaning(name);
    if (this.names.broken.has(name)) return silent;
    if (name === this.names.cutoff) {
      return {
        kind: 'mistake',
        code: 'unknown-name',
        message: `\`${shown(name)}\` is the cutoff, which no expression may depend on; declare a \`const\`.`,
      };
    }
    const predefined = this.predefined(name);
    if (predefined !== null) return predefined;
    const { outer, system } = this.around;
    if (outer?.has(name)) return this.fromOutside(name, outer.lookup(name));
    if (name === 'hbarc' && outer !== null && system !== null)
      return { kind: 'value', value: real(hbarcIn(system)), dimension: { e: 1, l: 1 } };
    if (this.around.open) return silent;
    return { kind: 'mistake', code: 'unknown-name', message: this.unknownMessage(name) };
  }

  has(name: string): boolean {
    return this.names.declarations.has(name) || this.names.broken.has(name);
  }

  /** Is `name` a value that someone declared, here or around? */
  declares(name: string): boolean {
    return this.has(name) || (this.around.outer?.has(name) ?? false);
  }

  /** Every name an expression may use. */
  *all(): Iterable<string> {
    yield* this.names.declarations.keys();
    if (this.around.outer) yield* this.around.outer.names.declarations.keys();
    yield* this.around.mu === null ? ['pi', 'i'] : ['mu', 'pi', 'i'];
    if (this.around.outer && this.around.system !== null) yield 'hbarc';
  }

  /** The context in which a statement's expressions are read. */
  context(offset: number, args: ReadonlyMap<string, Dimension> = noArguments, delta: Context['delta'] = null): Context {
    const { system, dimensions, report } = this.around;
    return {
      offset,
      system,
      dimensions,
      arguments: args,
      delta,
      report,
      lookup: name => this.lookup(name),
      known: () => [...args.keys(), ...this.all()],
    };
  }

  /** In a natural model a constant of the file that has a unit has no place. */
  private fromOutside(name: string, meaning: Meaning): Meaning {
    if (this.around.system !== null || meaning.kind !== 'value' || meaning.dimension === null || sameDimension(meaning.dimension, pure))
      return meaning;
    const message = `The model is in natural units, and the constant \`${shown(name)}\` has a unit; declare \`units\`, or a pure number in its place.`;
    return { kind: 'mistake', code: 'dimension', message };
  }

  private predefined(name: string): Meaning | null {
    if (name === 'pi') return { kind: 'value', value: real(Math.PI), dimension: pure };
    if (name === 'i') return { kind: 'value', value: { re: 0, im: 1 }, dimension: pure };
    return name === 'mu' && this.around.mu !== null ? this.around.mu() : null;
  }

  private meaning(name: string): Meaning {
    const known = this.known.get(name);
    if (known !== undefined) return known;
    const declaration = this.names.declarations.get(name)!;
    const at = this.busy.indexOf(name);
    if (at >= 0) {
      const chain = [...this.busy.slice(at), name].map(n => `\`${shown(n)}\``).join(' → ');
      this.around.report({
        code: 'value',
        severity: 'error',
        message: `\`${shown(name)}\` depends on itself: ${chain}.`,
        span: declaration.nameSpan,
        subject: name,
      });
      return silent;
    }
    if (this.busy.length >= longestChain) {
      const message = `\`${shown(name)}\` is needed through a chain of more than ${longestChain} values; declare them in the order in which they depend on each other.`;
      this.around.report({ code: 'value', severity: 'error', message, span: declaration.nameSpan, subject: name });
      this.known.set(name, silent);
      return silent;
    }
    this.busy.push(name);
    const meaning = this.evaluate(declaration);
    this.busy.pop();
    this.known.set(name, meaning);
    return meaning;
  }

  private evaluate(declaration: Declaration): Meaning {
    const { name, formula, offset } = declaration;
    if (formula === null) return { kind: 'coupling', value: null, dimension: this.around.dimensions.free(name) };
    const lowered = lower(formula, this.context(offset));
    if (lowered === null) return silent;
    if (lowered.value === null)
      return this.mistake(declaration, formula, `\`${shown(name)}\` needs a known value, and this depends on a free coupling.`);
    const dimension = isZero(lowered.value) ? null : lowered.dimension;
    if (declaration.kind === 'const') return { kind: 'value', value: lowered.value, dimension };
    if (lowered.value.im === 0) return { kind: 'coupling', value: lowered.value, dimension };
    return this.mistake(declaration, formula, 'A coupling is a real number; write the `i` into the kernel.');
  }

  private mistake(declaration: Declaration, formula: Formula, message: string): Meaning {
    const span = { start: declaration.offset + formula.span.start, end: declaration.offset + formula.span.end };
    this.around.report({ code: 'value', severity: 'error', message, span, subject: declaration.name });
    return silent;
  }

  private unknownMessage(name: string): string {
    if (name === 'hbarc') return '`hbarc` is predefined only in models with units; declare it as a `const`, or the `units` of the model.';
    if (name === 'E') return '`E` is not declared; a kernel that depends on the energy has the arguments `(p, k, E)`.';
    const near = suggestion(name, this.all());
    return `\`${shown(name)}\` is not declared${near || '; declare it as a `const` or a `coupling`.'}`;
  }
}

/** How far values may lead from one to the next before any of them is known: the evaluation is recursive. */
const longestChain = 200;

const noArguments: ReadonlyMap<string, Dimension> = new Map();
const real = (re: number): Complex => ({ re, im: 0 });
const isZero = (z: Complex): boolean => z.re === 0 && z.im === 0;
