import { NoExpansion } from '../algebra/at-infinity';
import type { Remark } from '../results';
import type { Complex } from '../algebra/expression';
import { divide } from '../linear/solve';
import { contactGrowth, contactSetting, contactsWithOverall, type ContactDivergence, type ContactSetting } from './contact-divergences';
import type { HardBehaviour } from './hard-behaviour';
import { countPowers } from './power-counting';
import type { Setup } from './setup';

/** What power counting says about a bare monomial. */
export interface SymbolicVerdict {
  readonly verdict: 'diverges' | 'converges' | 'oscillates' | 'undecided';
  readonly conditional: boolean;
  readonly power: number | null;
  readonly log: number | null;
  /** All factors are contacts: the answer is exact, with coefficients. */
  readonly contact: boolean;
  /** Degree with all loop momenta large, where not all factors are contacts; below 0 nothing is left overall. */
  readonly overallDegree: number;
  /** The cutoff's own fall-off does not make every loop finite. */
  readonly tooSoft: boolean;
}

export interface SymbolicVerdicts {
  readonly terms: readonly SymbolicVerdict[];
  /** Whether something grows in a monomial once all that is nested in it has been subtracted. */
  readonly leftOver: readonly boolean[];
  /** Null where the kinetic energy has no expansion in whole powers. */
  readonly contacts: ContactSetting | null;
  readonly remarks: readonly Remark[];
}

const UNDECIDED: SymbolicVerdict = {
  verdict: 'undecided',
  conditional: false,
  power: null,
  log: null,
  contact: false,
  overallDegree: NaN,
  tooSoft: false,
};

export function symbolicVerdicts(setup: Setup): SymbolicVerdicts {
  const contacts = contactsOf(setup);
  const { terms, leftOver } = remembered(structureKey(setup), () => {
    const exact = contacts && orNull(() => ({ growth: contactGrowth(contacts), overall: contactsWithOverall(contacts) }));
    const found = setup.list.terms.map((_, n) => verdictOf(setup, n, exact?.growth[n] ?? null));
    return { terms: found, leftOver: found.map((t, n) => exact?.overall[n] ?? (t.overallDegree >= 0 && t.verdict === 'diverges')) };
  });
  return { terms, leftOver, contacts, remarks: remarksOn(setup, terms) };
}

function verdictOf(setup: Setup, n: number, exact: ContactDivergence | null): SymbolicVerdict {
  const term = setup.list.terms[n];
  const used = term.exponents.flatMap((m, i) => (m > 0 ? [i] : []));
  if (setup.fall === null || used.some(i => !setup.behaviours[i])) return UNDECIDED;
  const behaviours = setup.behaviours.map(b => b ?? NO_BEHAVIOUR);
  const count = (fall: number) => countPowers(term, behaviours, setup.kinematics.dimension, fall);
  const tooSoft = Number.isFinite(setup.regulator.strength) && count(setup.fall + setup.regulator.strength).degree >= 0;
  if (exact) {
    const diverges = exact.power > 0 || exact.log > 0;
    return { ...exact, verdict: diverges ? 'diverges' : 'converges', contact: true, overallDegree: NaN, tooSoft };
  }
  const { degree, log, oscillates, overall } = count(setup.fall);
  const shared = { conditional: false, contact: false, overallDegree: overall, tooSoft };
  // A smooth cutoff wipes out what only oscillates.
  if (degree < 0 || (oscillates && setup.regulator.shape.kind !== 'sharp')) return { ...shared, verdict: 'converges', power: 0, log: 0 };
  return { ...shared, verdict: oscillates ? 'oscillates' : 'diverges', power: degree, log };
}

const NO_BEHAVIOUR: HardBehaviour = { right: [], left: [], both: [], diagonal: [] };

type Structural = Pick<SymbolicVerdicts, 'terms' | 'leftOver'>;
const known = new Map<string, Structural>();
const KEPT = 40;

/** Verdicts do not depend on how strong an interaction is, since each carries a symbol of its own: an edit of a strength finds them here. */
function remembered(key: string, compute: () => Structural): Structural {
  const before = known.get(key);
  if (before) return before;
  const found = compute();
  if (known.size >= KEPT) known.clear();
  known.set(key, found);
  return found;
}

/** Everything that `verdictOf` reads, kernels up to a factor. */
function structureKey({ spec, vertices, behaviours, list, size }: Setup): string {
  const kernels = vertices.map((v, i) => v.contact?.map(t => [t.a, t.b, t.e, ...ratio(t, v.contact![0])]) ?? behaviours[i]);
  return JSON.stringify([
    spec.dimension,
    spec.wave,
    spec.kinetic ? [spec.kinetic, spec.mu] : null,
    spec.cutoff.shape,
    kernels,
    list.terms.map(t => t.exponents),
    size,
  ]);
}

function ratio(x: Complex, y: Complex): [number, number] {
  const { re, im } = divide(x, y);
  return [Number(re.toPrecision(12)), Number(im.toPrecision(12))];
}

function remarksOn(setup: Setup, terms: readonly SymbolicVerdict[]): Remark[] {
  return setup.list.terms.flatMap((term, n): Remark[] => {
    if (terms[n].verdict === 'undecided') return [{ code: 'undecided', subject: term.name, message: unknownMessage(setup, n) }];
    if (!terms[n].tooSoft) return [];
    const shape = setup.spec.cutoff.shape;
    const name = shape.kind === 'sharp' ? 'sharp' : `${shape.kind}(${shape.n})`;
    const message = `The cutoff ${name} falls off too slowly to make ${term.name} finite; take a larger number in its parentheses, or a gaussian or sharp one.`;
    return [{ code: 'cutoff-too-soft', subject: term.name, message }];
  });
}

function unknownMessage(setup: Setup, n: number): string {
  const name = setup.list.terms[n].name;
  if (setup.fall === null) return `Whether ${name} diverges is open: the kinetic energy has no expansion in powers of a large momentum.`;
  const unknown = setup.list.terms[n].exponents.findIndex((m, i) => m > 0 && !setup.behaviours[i]);
  return `Whether ${name} diverges is open: the behaviour of ${setup.vertices[unknown].name} at large momenta could not be worked out.`;
}

function contactsOf(setup: Setup): ContactSetting | null {
  if (setup.fall === null || !Number.isInteger(setup.fall)) return null;
  const contacts = setup.vertices.map(v => v.contact);
  const forms = setup.counterterms.flatMap(c => c.vertex.contact ?? []);
  return orNull(() => contactSetting(setup.list, contacts, setup.kinematics, setup.regulator, setup.momentum, setup.size, forms));
}

/** Null where an expansion at large momentum does not exist. */
function orNull<T>(compute: () => T): T | null {
  try {
    return compute();
  } catch (error) {
    if (error instanceof NoExpansion) return null;
    throw error;
  }
}
