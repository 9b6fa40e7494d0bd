import type { Complex } from '../algebra/expression';
import { growsFaster, type Laurent, type LaurentTerm } from '../algebra/laurent';
import { solveSmall } from '../linear/solve';
import type { Monomial } from '../model/spec';
import { contactChain, minimalCounterterm, vertexGrid, type EnergyPoint, type Grid } from './contact-chain';
import { energyAway, type ContactSetting } from './contact-divergences';
import { loopMoments } from './loop-moments';
import { blockAmplitude, conditionMatrix, externalsAt, subtractionGroups, type Counterterm, type SubtractionGroup } from './subtraction';

/** What the declared counterterms do to the contact monomials. */
export interface DeclaredScheme {
  /** Growth of the renormalised on-shell amplitude of each monomial; null: not a matter of contacts alone. */
  readonly growth: readonly ({ power: number; log: number } | null)[];
  /** Strength of each minimal counterterm: Σ (re, im) L^power (ln L)^log, by counterterm and monomial. */
  readonly strengths: readonly StrengthLaw[];
  /** Groups whose counterterms cannot be told apart by the condition that sets them. */
  readonly singular: readonly { readonly group: SubtractionGroup; readonly monomial: Monomial }[];
}

/** The strength of a minimal counterterm for one of the monomials it cancels: Σ (re, im) L^power (ln L)^log. */
export interface StrengthLaw {
  readonly counterterm: Counterterm;
  /** Index of the monomial it cancels. */
  readonly term: number;
  readonly law: readonly LaurentTerm[];
  /** Error of each of its terms, where they have been fitted. */
  readonly errors: readonly { readonly power: number; readonly log: number; readonly size: number }[];
}

/**
 * The recursion of contacts with the counterterms that the model declares, exact in the cutoff: strengths from their own conditions, then
 * the growth of what is left at a generic on-shell momentum.
 */
export function declaredScheme(setting: ContactSetting, counterterms: readonly Counterterm[]): DeclaredScheme {
  const { ring, size, kinematics, list } = setting;
  const groupsOf = list.terms.map(t => subtractionGroups(counterterms, t.exponents, kinematics));
  const points: EnergyPoint[] = [];
  const at = (E: Complex): number => {
    const known = points.findIndex(p => p.E.re === E.re && p.E.im === E.im);
    if (known >= 0) return known;
    return points.push({ E, moments: loopMoments(kinematics, setting.regulator, ring, E, setting.loopPowers) }) - 1;
  };
  const testMomentum = setting.momentum * 0.8660254;
  const test = at({ re: kinematics.energy(testMomentum), im: 0 });
  groupsOf.forEach(groups => groups.forEach(g => g.points.forEach(p => at({ re: p.E, im: 0 }))));
  const minimalOnes = counterterms.filter(c => c.spec.scheme.kind === 'minimal');
  // Enough energies to tell the powers of E in the forms apart, and what they multiply.
  const powersOfEnergy = 2 + Math.max(0, ...minimalOnes.flatMap(c => c.vertex.contact ?? []).map(t => t.e)) + 1;
  const away = minimalOnes.length
    ? Array.from({ length: powersOfEnergy }, (_, j) => at(energyAway(kinematics, setting.momentum, (j + 0.7) / powersOfEnergy)))
    : [];
  const strengths: StrengthLaw[] = [];
  const singular: { group: SubtractionGroup; monomial: Monomial }[] = [];
  const chain = contactChain(list, setting.vertices, points, ring, size, (n, remainder) => {
    const added: { counterterm: Counterterm; strength: Laurent }[] = [];
    for (const group of groupsOf[n]) {
      const solved = solveConditions(setting, group, remainder, at);
      if (solved) solved.forEach((strength, j) => added.push({ counterterm: group.counterterms[j], strength }));
      else singular.push({ group, monomial: list.terms[n].exponents });
    }
    const minimal = counterterms.filter(
      c => c.spec.scheme.kind === 'minimal' && c.spec.cancels.some(m => m.join() === list.terms[n].exponents.join()),
    );
    for (const scale of new Set(minimal.map(c => c.spec.scheme.at))) {
      solveMinimal(setting, minimal, scale, remainder, away, points)?.forEach((strength, j) => {
        if (minimal[j].spec.scheme.at !== scale) return;
        added.push({ counterterm: minimal[j], strength });
        strengths.push({ counterterm: minimal[j], term: n, law: ring.terms(strength), errors: [] });
      });
    }
    if (!added.length) return null;
    return points.map(point => sumOfForms(setting, added, point));
  });
  const growth = chain.map((grids, n) => {
    if (!grids || counterterms.some(c => !c.vertex.contact && c.spec.cancels.some(m => m.every((e, i) => e <= list.terms[n].exponents[i]))))
      return null;
    return onShellGrowth(setting, grids[test], testMomentum);
  });
  return { growth, strengths, singular };
}

function sumOfForms(setting: ContactSetting, added: readonly { counterterm: Counterterm; strength: Laurent }[], point: EnergyPoint): Grid {
  const { ring, size } = setting;
  const forms = added.map(({ counterterm, strength }) => ({
    grid: vertexGrid(counterterm.vertex.contact ?? [], point, ring, size),
    strength,
  }));
  return Array.from({ length: size * size }, (_, s) => {
    ring.clear();
    let any = false;
    for (const { grid, strength } of forms) {
      if (!grid[s]) continue;
      ring.addProduct(grid[s], strength);
      any = true;
    }
    return any ? ring.take() : null;
  });
}

/** Σ_ab R^{ab} p^a k^b. */
function valueAt(setting: ContactSetting, grid: Grid, p: number, k: number): Laurent {
  const { ring, size } = setting;
  ring.clear();
  grid.forEach((c, s) => c && ring.addScaled(c, p ** Math.floor(s / size) * k ** (s % size), 0));
  return ring.take();
}

function onShellGrowth(setting: ContactSetting, grid: Grid, momentum: number): { power: number; log: number } {
  let best = { power: 0, log: 0 };
  for (const p of externalsAt(setting.kinematics, momentum)) {
    for (const k of externalsAt(setting.kinematics, momentum)) {
      for (const t of setting.ring.terms(valueAt(setting, grid, p, k)))
        if (growsFaster(t.power, t.log, best.power, best.log)) best = { power: t.power, log: t.log };
    }
  }
  return best;
}

function solveConditions(
  setting: ContactSetting,
  group: SubtractionGroup,
  remainder: readonly Grid[],
  at: (E: Complex) => number,
): Laurent[] | null {
  const { ring } = setting;
  const rhs = group.weights.map(weights => {
    const parts: { value: Laurent; weight: Complex }[] = [];
    group.points.forEach((point, j) => {
      const grid = remainder[at({ re: point.E, im: 0 })];
      // The block amplitude is a fixed combination of the four signs; collect its weights, then add the Laurent polynomials.
      for (const row of [1, -1] as const) {
        for (const column of [1, -1] as const) {
          const share = blockAmplitude(group.block, (r, c) => ({ re: r === row && c === column ? weights[j] : 0, im: 0 }));
          if (share.re !== 0) parts.push({ value: valueAt(setting, grid, row * point.momentum, column * point.momentum), weight: share });
        }
      }
    });
    ring.clear();
    parts.forEach(({ value, weight }) => ring.addScaled(value, -weight.re, 0));
    return ring.take();
  });
  return solveLaurent(setting, conditionMatrix(group), rhs);
}

/** The strengths whose forms match minus the growing part (logarithms of L/scale), by least squares over all coefficients and energies. */
function solveMinimal(
  setting: ContactSetting,
  minimal: readonly Counterterm[],
  scale: number,
  remainder: readonly Grid[],
  away: readonly number[],
  points: readonly EnergyPoint[],
): Laurent[] | null {
  const { ring, size } = setting;
  const targets = away.map(j => minimalCounterterm(remainder[j], ring, scale));
  const value = (grid: Grid, s: number): Complex => (grid[s] ? { re: grid[s].re[0], im: grid[s].im[0] } : { re: 0, im: 0 });
  const forms = minimal.map(c => away.map(j => vertexGrid(c.vertex.contact ?? [], points[j], ring, size)));
  const cells = away.flatMap((_, j) => Array.from({ length: size * size }, (_, s) => ({ j, s })));
  // Normal equations of a handful of forms.
  const matrix = forms.map(x => forms.map(y => sumOf(cells, ({ j, s }) => conjugateProduct(value(x[j], s), value(y[j], s)))));
  const rhs = forms.map(x => {
    ring.clear();
    for (const { j, s } of cells) {
      const f = value(x[j], s);
      const target = targets[j][s];
      if (target && (f.re !== 0 || f.im !== 0)) ring.addScaled(target, f.re, -f.im);
    }
    return ring.take();
  });
  return solveLaurent(setting, matrix, rhs);
}

const conjugateProduct = (x: Complex, y: Complex): Complex => ({ re: x.re * y.re + x.im * y.im, im: x.re * y.im - x.im * y.re });

function sumOf<T>(items: readonly T[], f: (item: T) => Complex): Complex {
  const sum = { re: 0, im: 0 };
  for (const item of items) {
    const v = f(item);
    sum.re += v.re;
    sum.im += v.im;
  }
  return sum;
}

/** A x = b with numbers in A and Laurent polynomials in b: the inverse of A, applied slot by slot. */
function solveLaurent({ ring }: ContactSetting, a: readonly (readonly Complex[])[], b: readonly Laurent[]): Laurent[] | null {
  const inverse = a.map((_, j) =>
    solveSmall(
      a,
      a.map((_, i) => ({ re: i === j ? 1 : 0, im: 0 })),
    ),
  );
  if (inverse.some(column => column === null)) return null;
  return a.map((_, i) => {
    ring.clear();
    b.forEach((value, j) => ring.addScaled(value, inverse[j]![i].re, inverse[j]![i].im));
    return ring.take();
  });
}
