import { NoExpansion } from '../algebra/at-infinity';
import type { Remark } from '../results';
import { contactGrowth, contactSetting, type ContactSetting } from './contact-divergences';
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
  /** Degree with all loop momenta large; below 0 nothing is left overall. */
  readonly overallDegree: number;
  /** The cutoff's own fall-off does not make every loop finite. */
  readonly tooSoft: boolean;
}

export interface SymbolicVerdicts {
  readonly terms: readonly SymbolicVerdict[];
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
  const remarks: Remark[] = [];
  const contacts = contactsOf(setup);
  const exact = contacts ? growthOfContacts(contacts) : null;
  const terms = setup.list.terms.map((term, n): SymbolicVerdict => {
    if (setup.fall === null) return UNDECIDED;
    const used = term.exponents.flatMap((m, i) => (m > 0 ? [i] : []));
    if (used.some(i => !setup.behaviours[i])) return UNDECIDED;
    const behaviours = setup.behaviours.map(b => b ?? { right: [], left: [], both: [], diagonal: [] });
    const count = countPowers(term, behaviours, setup.kinematics.dimension, setup.fall);
    const fallWithCutoff = setup.fall + setup.regulator.strength;
    const tooSoft =
      Number.isFinite(fallWithCutoff) && countPowers(term, behaviours, setup.kinematics.dimension, fallWithCutoff).degree >= 0;
    const shared = { overallDegree: count.overall, tooSoft };
    const contact = exact?.[n];
    if (contact) {
      const diverges = contact.power > 0 || contact.log > 0;
      return { ...shared, ...contact, verdict: diverges ? 'diverges' : 'converges', contact: true };
    }
    if (count.degree < 0) return { ...shared, verdict: 'converges', conditional: false, power: 0, log: 0, contact: false };
    const oscillates = count.oscillates && setup.regulator.shape.kind === 'sharp';
    if (count.oscillates && !oscillates) return { ...shared, verdict: 'converges', conditional: false, power: 0, log: 0, contact: false };
    return {
      ...shared,
      verdict: oscillates ? 'oscillates' : 'diverges',
      conditional: false,
      power: count.degree,
      log: count.log,
      contact: false,
    };
  });
  setup.list.terms.forEach((term, n) => {
    if (terms[n].verdict === 'undecided') remarks.push({ code: 'undecided', subject: term.name, message: unknownMessage(setup, n) });
    else if (terms[n].tooSoft) {
      const shape = setup.spec.cutoff.shape;
      const name = shape.kind === 'sharp' ? 'sharp' : `${shape.kind}(${shape.n})`;
      remarks.push({
        code: 'cutoff-too-soft',
        subject: term.name,
        message: `The cutoff ${name} falls off too slowly to make ${term.name} finite; take a larger number in its parentheses, or a gaussian or sharp one.`,
      });
    }
  });
  return { terms, contacts, remarks };
}

function unknownMessage(setup: Setup, n: number): string {
  const name = setup.list.terms[n].name;
  if (setup.fall === null) return `Whether ${name} diverges is open: the kinetic energy has no expansion in powers of a large momentum.`;
  const unknown = setup.list.terms[n].exponents.findIndex((m, i) => m > 0 && !setup.behaviours[i]);
  return `Whether ${name} diverges is open: the behaviour of ${setup.vertices[unknown].name} at large momenta could not be worked out.`;
}

function contactsOf(setup: Setup): ContactSetting | null {
  if (setup.fall === null || !Number.isInteger(setup.fall)) return null;
  try {
    return contactSetting(
      setup.list,
      setup.vertices.map(v => v.contact),
      setup.kinematics,
      setup.regulator,
      setup.momentum,
      setup.size,
    );
  } catch (error) {
    if (error instanceof NoExpansion) return null;
    throw error;
  }
}

function growthOfContacts(contacts: ContactSetting): ReturnType<typeof contactGrowth> | null {
  try {
    return contactGrowth(contacts);
  } catch (error) {
    if (error instanceof NoExpansion) return null;
    throw error;
  }
}
