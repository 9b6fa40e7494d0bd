import { GRADED } from '../model/momentum-grid';
import { ladderCutoffs, type LadderWishes } from './ladder';
import { isSingular, oscillationLength, type Setup } from './setup';

/** Nodes of a grid: about so many panels of so many points. */
const NODES = 250;

/** About how many multiplications the numbers of a model take: an order of magnitude, but the same on every machine. */
export function cost(setup: Setup, { rungs, energies, momenta: externals, powers }: LadderWishes): number {
  const { list, vertices, spec, counterterms, size, kinematics } = setup;
  const terms = list.terms.length;
  const links = list.terms.reduce((sum, t) => sum + t.exponents.reduce((product, n) => product * (n + 1), 1), 0);
  const dense = vertices.map((v, i) => ({ v, i })).filter(({ v }) => !v.finiteRank);
  const words = list.terms.filter(t => t.exponents.every((m, i) => m === 0 || !vertices[i].finiteRank)).length;
  const nodes = nodesOf(setup, rungs) * (kinematics.signed ? 2 : 1);
  const scan = spec.cutoff.scan?.points ?? 0;
  const momenta = spec.series.points.length + spec.expectations.length;
  const runs = counterterms.length ? 2 : 1;
  const algebra = links * size ** 3 * 25_000;
  const grids = (rungs + scan + 3) * dense.length * nodes * (20 * nodes + 15_000);
  const columns = rungs * energies * (size + powers.length + 2 * externals) + runs * (scan + 5 * momenta) * (size + 1);
  const fitting = rungs * energies * terms * nodes * (size + powers.length) ** 2;
  const small = runs * (scan + 5 * momenta) * (terms * nodes + links * 50);
  return algebra + grids + words * columns * nodes * nodes + fitting + small;
}

/** An oscillating kernel needs panels as narrow as its oscillation all the way to the cutoff, a singular one more where it is singular. */
function nodesOf(setup: Setup, rungs: number): number {
  const length = oscillationLength(setup.vertices);
  const plain = NODES + (setup.vertices.some(isSingular) ? 24 * GRADED : 0);
  if (length === 0) return plain;
  const { value, scan } = setup.spec.cutoff;
  return plain + 2.4 * length * Math.max(value, scan?.to ?? 0, ...ladderCutoffs(setup, { rungs, steepest: 0 }));
}
