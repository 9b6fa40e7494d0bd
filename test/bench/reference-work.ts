import type { MomentumGrid } from '../../server/src/core/model/momentum-grid';
import type { ModelSpec } from '../../server/src/core/model/spec';
import { binary, call, number, symbol } from '../../server/src/core/algebra/expression';
import { gaussLegendre } from '../../server/src/core/quadrature/gauss-legendre';
import { amplitudeFromStandingWave, standingWave } from '../../server/src/core/scattering/full';
import { potentialMatrix } from '../../server/src/core/scattering/potential';
import { GridKernels } from '../../server/src/core/series/dense-words';
import { GridChain } from '../../server/src/core/series/grid-chain';
import { loopWeights } from '../../server/src/core/series/loop-weights';
import { setUp } from '../../server/src/core/series/setup';
import { amplitudesFromStandingWaves } from '../../server/src/core/series/unitarity';

/** The model of reference.py: Yukawa and contact in the l = 0 wave, 2mu = 1. */
const spec: ModelSpec = {
  name: 'reference',
  dimension: 3,
  wave: { kind: 'angular', number: 0 },
  units: null,
  mu: 0.5,
  masses: null,
  kinetic: null,
  couplings: [],
  interactions: [
    {
      name: 'yukawa',
      arguments: 'r',
      order: 1,
      kernel: binary('divide', binary('multiply', number(-1.2), call('exp', [binary('multiply', number(-1), symbol('r'))])), symbol('r')),
    },
    { name: 'contact', arguments: 'pk', order: 1, kernel: number(0.3) },
  ],
  cutoff: { name: 'L', value: 100, shape: { kind: 'sharp' }, declared: true, scan: null },
  series: { order: 4, declared: true, points: [{ p: 0.1, E: null }] },
  counterterms: [],
  expectations: [],
};

const momenta = Array.from({ length: 16 }, (_, j) => 0.1 + j * 0.1);
const cutoffs = Array.from({ length: 24 }, (_, j) => 10 * 100 ** (j / 23));

/** All 14 monomials and the full solution at 16 momenta and 24 cutoffs; returns the sum of all amplitudes, and those at the first momentum and the highest cutoff. */
export function referenceWork(): { sum: { re: number; im: number }; last: { re: number; im: number }[] } {
  const { setup } = setUp(spec);
  if (!setup) throw new Error('the reference model cannot be lowered');
  const { kinematics, regulator, list } = setup;
  const vertices = setup.vertices.map(v => ({ ...v, ridge: Infinity }));
  const sum = { re: 0, im: 0 };
  let last: { re: number; im: number }[] = [];
  for (const cutoff of cutoffs) {
    const kernels = new GridKernels(logarithmicGrid(cutoff));
    const problems = momenta.map(p => loopWeights(kinematics, regulator, kernels.grid, { re: kinematics.energy(p), im: 0 }, true, [], 2));
    const chain = new GridChain(list, vertices, kernels, problems);
    const standing = list.terms.map((_, n) => {
      chain.step(n);
      return problems.map((__, at) => [[chain.amplitude(n, at, 0, 0)]]);
    });
    problems.forEach((problem, at) => {
      const series = amplitudesFromStandingWaves(
        list,
        standing.map(blocks => blocks[at]),
        problem.density,
      ).map(block => block[0][0]);
      const potential = potentialMatrix(
        kernels,
        vertices.map(vertex => ({ vertex, strength: { re: 1, im: 0 } })),
        problem,
      );
      const full = amplitudeFromStandingWave(standingWave(potential, problem), problem.density)[0][0];
      const all = [...series, full];
      for (const t of all) {
        sum.re += t.re;
        sum.im += t.im;
      }
      if (at === 0) last = all;
    });
  }
  return { sum, last };
}

/** 64 points of Gauss-Legendre in u, k = exp(u) - 1, as in reference.py. */
function logarithmicGrid(cutoff: number): MomentumGrid {
  const { nodes: x, weights: w } = gaussLegendre(64);
  const reach = Math.log1p(cutoff);
  const u = x.map(v => (reach * (1 + v)) / 2);
  const nodes = u.map(Math.expm1);
  const weights = u.map((v, j) => ((w[j] * reach) / 2) * Math.exp(v));
  return {
    cutoff,
    low: 0,
    high: cutoff,
    nodes,
    weights,
    measure: nodes.map((k, j) => (weights[j] * k * k) / (2 * Math.PI ** 2)),
    energies: nodes.map(k => k * k),
    panels: [{ from: 0, to: cutoff, start: 0, count: 64 }],
  };
}
