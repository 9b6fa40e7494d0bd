import type { Complex } from '../algebra/expression';
import { growsFaster, LaurentRing } from '../algebra/laurent';
import type { MomentumTerm } from '../model/kernel-shape';
import type { Kinematics } from '../model/kinematics';
import type { Regulator } from '../model/regulator';
import { contactChain, growthOf, minimalCounterterm, type EnergyPoint, type Grid } from './contact-chain';
import { groupIntoForms, type FormWithCoefficient, type LocalCoefficient } from './forms';
import { loopMoments, propagatorFall } from './loop-moments';
import type { MonomialList } from './monomials';

/** What the exact algebra of contacts says about a monomial. */
export interface ContactDivergence {
  readonly power: number;
  readonly log: number;
  readonly conditional: boolean;
}

/** A form left after minimal subtraction of everything nested, with its growth. */
export interface OverallDivergence extends FormWithCoefficient {
  readonly power: number;
  readonly log: number;
}

/** The setting that every contact calculation of a model shares. */
export interface ContactSetting {
  readonly list: MonomialList;
  readonly vertices: readonly (readonly MomentumTerm[] | null)[];
  readonly kinematics: Kinematics;
  readonly regulator: Regulator;
  readonly ring: LaurentRing;
  /** Powers 0..size-1 of p and k occur. */
  readonly size: number;
  /** The powers k^n of loop momenta that occur between two contacts. */
  readonly loopPowers: readonly number[];
  /** A momentum of the size of those looked at. */
  readonly momentum: number;
}

export function contactSetting(
  list: MonomialList,
  vertices: ContactSetting['vertices'],
  kinematics: Kinematics,
  regulator: Regulator,
  momentum: number,
  size: number,
  counterterms: readonly MomentumTerm[],
): ContactSetting {
  const contactTerms = list.terms.filter(t => t.exponents.every((m, i) => m === 0 || vertices[i]));
  const loops = Math.max(1, ...contactTerms.map(t => t.factors - 1));
  const growth = Math.max(1, 2 * (size - 1) + kinematics.dimension - Math.floor(propagatorFall(kinematics)));
  const all = [...vertices, counterterms].flatMap(v => v ?? []);
  const loopPowers = [...new Set(all.flatMap(t => all.map(u => t.b + u.a)))];
  const logs = logarithmsOccur(loopPowers, kinematics, regulator) ? loops + 1 : 0;
  // Six powers below what can still grow, so that the value of a polynomial can be held against numbers at cutoffs of 50 soft momenta.
  const ring = new LaurentRing(-loops * growth - 6, loops * growth, logs);
  return { list, vertices, kinematics, regulator, ring, size, loopPowers, momentum };
}

/** A loop k^n leaves a logarithm where n + D is a multiple of the power g of a pure kinetic energy (and of the steps of the cutoff's shape). */
function logarithmsOccur(loopPowers: readonly number[], { purePower, dimension }: Kinematics, { step }: Regulator): boolean {
  const g = purePower?.exponent;
  if (!g || !Number.isInteger(g) || (Number.isFinite(step) && step % g !== 0)) return true;
  return loopPowers.some(n => (n + dimension) % g === 0);
}

/** A complex energy away from every root and threshold: real and negative where the kinetic energy has a threshold. */
export function energyAway(kinematics: Kinematics, momentum: number, factor: number): Complex {
  const scale = Math.abs(kinematics.energy(momentum)) || 1;
  if (kinematics.threshold === -Infinity) return { re: 0, im: factor * scale };
  return { re: kinematics.threshold - factor * scale, im: 0 };
}

function pointAt(setting: ContactSetting, E: Complex, negativeSide = 1): EnergyPoint {
  return { E, moments: loopMoments(setting.kinematics, setting.regulator, setting.ring, E, setting.loopPowers, negativeSide) };
}

/** Growth of each bare contact monomial at fixed p, k, E; null for monomials that hold another kernel. Throws `NoExpansion`. */
export function contactGrowth(setting: ContactSetting): (ContactDivergence | null)[] {
  const E = energyAway(setting.kinematics, setting.momentum, 0.7310585786);
  const growth = (negativeSide: number) =>
    contactChain(setting.list, setting.vertices, [pointAt(setting, E, negativeSide)], setting.ring, setting.size, null).map(
      grids => grids && growthOf(grids[0], setting.ring),
    );
  const whole = growth(1);
  const weighted = setting.kinematics.signed ? growth(0.6180339887) : whole;
  return whole.map((g, n) => g && { ...g, conditional: growsFaster(weighted[n]!.power, weighted[n]!.log, g.power, g.log) });
}

/** Whether anything grows in each contact monomial once all that is nested has been subtracted; null for other monomials. */
export function contactsWithOverall(setting: ContactSetting): (boolean | null)[] {
  const point = pointAt(setting, energyAway(setting.kinematics, setting.momentum, 0.7310585786));
  const found: boolean[] = [];
  const chain = contactChain(setting.list, setting.vertices, [point], setting.ring, setting.size, (n, [remainder]) => {
    const counterterm = minimalCounterterm(remainder, setting.ring, 1);
    found[n] = setting.list.terms[n].factors > 1 && counterterm.some(c => c);
    return found[n] ? [counterterm] : null;
  });
  return chain.map((grids, n) => grids && found[n]);
}

/** What is left of each contact monomial once all that is nested has been subtracted minimally, logarithms as ln(L / scale). */
export function contactOverall(setting: ContactSetting, scale = 1): ({ forms: OverallDivergence[]; local: boolean } | null)[] {
  const { ring, kinematics, size } = setting;
  const highestE = Math.floor(ring.highest / Math.max(1, propagatorFall(kinematics)));
  const vertexE = Math.max(0, ...setting.vertices.flatMap(v => v ?? []).map(t => t.e));
  const count = Math.min(8, highestE + vertexE * setting.list.terms.reduce((m, t) => Math.max(m, t.factors), 0) + 2);
  const energies = Array.from({ length: count }, (_, j) => energyAway(kinematics, setting.momentum, (j + 1) / count));
  const points = energies.map(E => pointAt(setting, E));
  const found: (readonly Grid[] | null)[] = [];
  contactChain(setting.list, setting.vertices, points, ring, size, (n, remainder) => {
    if (setting.list.terms[n].factors === 1) return null;
    const counterterms = remainder.map(grid => minimalCounterterm(grid, ring, scale));
    found[n] = counterterms;
    return counterterms.some(grid => grid.some(c => c)) ? counterterms : null;
  });
  return setting.list.terms.map((term, n) => {
    if (term.exponents.some((m, i) => m > 0 && !setting.vertices[i])) return null;
    return found[n] ? formsOf(found[n], energies, setting) : { forms: [], local: true };
  });
}

/** The growing part (minus the counterterm) as forms: each coefficient must be a polynomial in E of a degree below the number of energies. */
function formsOf(
  counterterms: readonly Grid[],
  energies: readonly Complex[],
  { ring, size }: ContactSetting,
): { forms: OverallDivergence[]; local: boolean } {
  const byGrowth = new Map<string, { power: number; log: number; coefficients: LocalCoefficient[] }>();
  let local = true;
  for (let s = 0; s < size * size; s++) {
    const samples = new Map<string, Complex[]>();
    counterterms.forEach((grid, at) => {
      for (const t of grid[s] ? ring.terms(grid[s]!) : []) {
        const key = `${t.power},${t.log}`;
        const row = samples.get(key) ?? energies.map(() => ({ re: 0, im: 0 }));
        row[at] = { re: -t.re, im: -t.im };
        samples.set(key, row);
      }
    });
    for (const [key, values] of samples) {
      const [power, log] = key.split(',').map(Number);
      const inE = interpolate(energies, values);
      if (Math.hypot(inE[inE.length - 1].re, inE[inE.length - 1].im) > 0) local = false;
      inE.forEach((c, e) => {
        if (c.re === 0 && c.im === 0) return;
        const group = byGrowth.get(key) ?? { power, log, coefficients: [] };
        group.coefficients.push({ a: Math.floor(s / size), b: s % size, e, c });
        byGrowth.set(key, group);
      });
    }
  }
  const groups = [...byGrowth.values()].sort((x, y) => y.power - x.power || y.log - x.log);
  const forms = groups.flatMap(g => {
    const ordered = [...g.coefficients].sort((s, t) => s.e - t.e || s.a + s.b - t.a - t.b || t.a - s.a);
    return groupIntoForms(ordered).map(f => ({ ...f, power: g.power, log: g.log }));
  });
  return { forms, local };
}

/** Coefficients of the polynomial through (x_j, y_j) by divided differences; those below 1e-8 of the values are 0. */
export function interpolate(x: readonly Complex[], y: readonly Complex[]): Complex[] {
  const n = x.length;
  const divided = y.map(v => ({ ...v }));
  for (let level = 1; level < n; level++) {
    for (let j = n - 1; j >= level; j--) {
      divided[j] = divide(subtract(divided[j], divided[j - 1]), subtract(x[j], x[j - level]));
    }
  }
  let polynomial: Complex[] = [divided[n - 1]];
  for (let j = n - 2; j >= 0; j--) {
    // polynomial * (X - x_j) + divided_j
    const next: Complex[] = [{ re: 0, im: 0 }, ...polynomial];
    polynomial.forEach((c, m) => (next[m] = subtract(next[m], multiply(c, x[j]))));
    next[0] = { re: next[0].re + divided[j].re, im: next[0].im + divided[j].im };
    polynomial = next;
  }
  const largest = Math.max(...y.map(v => Math.hypot(v.re, v.im)));
  const far = Math.max(...x.map(v => Math.hypot(v.re, v.im)));
  return polynomial.map((c, m) => (Math.hypot(c.re, c.im) * far ** m < 1e-8 * largest ? { re: 0, im: 0 } : clean(c)));
}

const subtract = (x: Complex, y: Complex): Complex => ({ re: x.re - y.re, im: x.im - y.im });
const multiply = (x: Complex, y: Complex): Complex => ({ re: x.re * y.re - x.im * y.im, im: x.re * y.im + x.im * y.re });
function divide(x: Complex, y: Complex): Complex {
  const d = y.re * y.re + y.im * y.im;
  return { re: (x.re * y.re + x.im * y.im) / d, im: (x.im * y.re - x.re * y.im) / d };
}
/** Rounding in the smaller of the two parts taken away. */
function clean(c: Complex): Complex {
  const size = Math.hypot(c.re, c.im);
  return { re: Math.abs(c.re) < 1e-9 * size ? 0 : c.re, im: Math.abs(c.im) < 1e-9 * size ? 0 : c.im };
}
