import { nodeCount } from '../model/momentum-grid';
import { gridWishes } from './amplitudes';
import { scanCutoffs } from './evaluation';
import { ladderCutoffs, rungWishes, type LadderWishes } from './ladder';
import type { Setup } from './setup';
import { statusCutoffs } from './statuses';

export interface Cost {
  /** About how many multiplications the numbers of a model take: an order of magnitude, but the same on every machine. */
  readonly evaluations: number;
  /** How many numbers of kernels are kept at once. */
  readonly held: number;
}

/** `full`: the solution beyond the series is asked for, whose bound states are looked for at 160 energies. */
export function cost(setup: Setup, wishes: LadderWishes, full: boolean): Cost {
  const { list, vertices, spec, counterterms, size, kinematics, regulator } = setup;
  const terms = list.terms.length;
  const links = list.terms.reduce((sum, t) => sum + t.exponents.reduce((product, n) => product * (n + 1), 1), 0);
  const dense = vertices.filter(v => !v.finiteRank).length;
  const kept = vertices.filter(v => !v.finiteRank).reduce((n, v) => n + (v.element.real ? 1 : 2), 0);
  const words = list.terms.filter(t => t.exponents.every((m, i) => m === 0 || !vertices[i].finiteRank)).length;
  const momenta = spec.series.points.length + spec.expectations.length;
  const runs = counterterms.length ? 2 : 1;

  const rungs = ladderCutoffs(setup, wishes).map(cutoff => nodeCount(kinematics, regulator, cutoff, rungWishes(setup, cutoff, wishes)));
  const asked = [setup.momentum, ...spec.series.points.flatMap(({ p }) => (p ? [p] : []))];
  const grids = [
    ...scanCutoffs(setup),
    ...Array.from({ length: 3 }, () => spec.cutoff.value),
    ...(counterterms.length ? statusCutoffs(setup) : []),
  ].map(cutoff => nodeCount(kinematics, regulator, cutoff, gridWishes(setup, cutoff, asked, 12)));
  const columns = wishes.energies * (size + wishes.powers.length + 2 * wishes.momenta);
  const points = runs * (1 + (5 * momenta) / grids.length);

  const algebra = links * size ** 3 * 25_000;
  const kernels = dense * sum([...rungs, ...grids].map(n => n * (20 * n + 15_000)));
  const products = words * (columns * sum(rungs.map(n => n * n)) + points * (size + 1) * sum(grids.map(n => n * n)));
  const small = terms * (columns * (size + wishes.powers.length) * sum(rungs) + points * sum(grids)) + points * grids.length * links * 50;
  const largest = nodeCount(kinematics, regulator, spec.cutoff.value, gridWishes(setup, spec.cutoff.value, asked, 8));
  // Potentials of finite rank are solved by small matrices.
  const solutions = full && dense > 0 ? (160 + 4 * (momenta + 8)) * (largest ** 3 / 3) : 0;
  return { evaluations: algebra + kernels + products + small + solutions, held: kept * sum(rungs.map(n => n * n)) };
}

const sum = (values: readonly number[]): number => values.reduce((total, v) => total + v, 0);
