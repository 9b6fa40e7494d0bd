import { describe, expect, it } from 'vitest';
import type { Complex } from '../../../server/src/core/algebra/expression';
import { momentumGrid } from '../../../server/src/core/model/momentum-grid';
import type { Vertex } from '../../../server/src/core/model/vertex';
import { gridWishes } from '../../../server/src/core/series/amplitudes';
import { GridKernels } from '../../../server/src/core/series/dense-words';
import { contactStates } from '../../../server/src/core/series/contact-states';
import { GridChain, type ScaledVertex } from '../../../server/src/core/series/grid-chain';
import { loopWeights, type LoopWeights } from '../../../server/src/core/series/loop-weights';
import type { Setup } from '../../../server/src/core/series/setup';
import { setupOf, type Kernel } from '../../support/spec';

/** An interaction, or a counterterm for the part of a monomial that it stands in for. */
interface Letter {
  readonly content: readonly number[];
  readonly parts: readonly ScaledVertex[];
}
/** Loop moments up to this power: p² on either side of a loop, and no more. */
const HIGHEST = 4;
const ONE: Complex = { re: 1, im: 0 };
const plus = (x: Complex, y: Complex): Complex => ({ re: x.re + y.re, im: x.im + y.im });
const times = (x: Complex, y: Complex): Complex => ({ re: x.re * y.re - x.im * y.im, im: x.re * y.im + x.im * y.re });

/** Every sequence of letters that makes up the monomial. */
function* words(exponents: readonly number[], letters: readonly Letter[]): Generator<Letter[]> {
  if (exponents.every(n => n === 0)) yield [];
  for (const letter of letters) {
    const rest = exponents.map((n, i) => n - letter.content[i]);
    if (rest.every(n => n >= 0)) for (const word of words(rest, letters)) yield [letter, ...word];
  }
}

/** V(p, k) of each point with each loop point, element by element. */
function matrixOf({ parts }: Letter, problem: LoopWeights): Complex[][] {
  const one = (vertex: Vertex, p: number, k: number): Complex => {
    const [re, im] = [new Float64Array(1), new Float64Array(1)];
    vertex.element.fill(Float64Array.of(p), Float64Array.of(k), problem.E.re, re, im);
    return { re: re[0], im: im[0] };
  };
  const points = [...problem.points];
  return points.map(p =>
    points.map(k => parts.reduce((sum, { vertex, strength }) => plus(sum, times(strength, one(vertex, p, k))), { re: 0, im: 0 })),
  );
}

/** Σ over words of V G V G … V, one matrix after the other. */
function bruteForce(
  exponents: readonly number[],
  matrices: ReadonlyMap<Letter, Complex[][]>,
  problem: LoopWeights,
  row: number,
  column: number,
): Complex {
  const nodes = problem.points.length - problem.externals.length;
  let sum: Complex = { re: 0, im: 0 };
  for (const word of words(exponents, [...matrices.keys()])) {
    let x = matrices.get(word[word.length - 1])!.map(line => line[nodes + column]);
    for (const letter of word.slice(0, -1).reverse()) {
      const weighted = [...problem.g.re].map((re, j) => times({ re, im: problem.g.im[j] }, x[j]));
      x = matrices.get(letter)!.map(line => weighted.reduce((s, w, j) => plus(s, times(line[j], w)), { re: 0, im: 0 }));
    }
    sum = plus(sum, x[nodes + row]);
  }
  return sum;
}

function problemsOf(setup: Setup, energies: readonly (readonly [Complex, boolean])[], others: readonly number[]) {
  const grid = momentumGrid(setup.kinematics, setup.regulator, 3, { ...gridWishes(setup, 3, [0.7], 3), smallest: 1.5 });
  const problems = energies.map(([E, onShell]) => loopWeights(setup.kinematics, setup.regulator, grid, E, onShell, others, HIGHEST));
  return { kernels: new GridKernels(grid), problems };
}

const models: readonly (readonly [string, Record<string, Kernel>, 1 | 2 | 3])[] = [
  ['two contacts', { c: '0.3', d: '0.2*(p^2 + k^2)' }, 3],
  ['contacts that turn over the sign of i', { c: '0.3', t: 'i*0.4*(p - k)' }, 1],
  ['a contact between form factors', { c: '0.3', s: '1/((1 + p^2)*(2 + k^2)) + 1/((2 + p^2)*(1 + k^2))' }, 3],
  ['form factors that are not symmetric, and complex', { s: 'i*p/(1 + p^2 + k^4)', u: '1/(1 + p^2)', c: '0.1*p*k' }, 2],
  ['deltas away from the origin', { a: ['x', '0.3*delta(x - 1)'], b: ['x', '-0.2*delta(x + 0.4)'], s: '0.2/(1 + p^2 + k^2)' }, 1],
];

describe.each(models)('%s', (_, kernels, dimension) => {
  const setup = setupOf(kernels, { dimension, order: 3, cutoff: 3 });
  const { kinematics, list, vertices } = setup;
  const energy = kinematics.energy(0.7);
  const letters: Letter[] = vertices.map((vertex, i) => ({
    content: vertices.map((__, j) => (i === j ? 1 : 0)),
    parts: [{ vertex, strength: ONE }],
  }));

  const compare = (chain: GridChain, n: number, all: readonly Letter[], problems: readonly LoopWeights[]) =>
    problems.forEach((problem, at) => {
      const matrices = new Map(all.map(letter => [letter, matrixOf(letter, problem)]));
      problem.externals.forEach((__, row) =>
        problem.externals.forEach((___, column) => {
          const found = chain.amplitude(n, at, row, column);
          const wanted = bruteForce(list.terms[n].exponents, matrices, problem, row, column);
          expect(Math.hypot(found.re - wanted.re, found.im - wanted.im)).toBeLessThan(1e-12 * (1 + Math.hypot(wanted.re, wanted.im)));
        }),
      );
    });

  it('the recursion is the sum over all sequences: below threshold, on shell, at a complex energy', () => {
    const energies = [
      [{ re: -energy, im: 0 }, false],
      [{ re: energy, im: 0 }, true],
      [{ re: 0.2, im: 0.9 }, false],
    ] as const;
    const { kernels: shared, problems } = problemsOf(setup, energies, [0.3, 1.1]);
    const chain = new GridChain(list, vertices, shared, problems);
    list.terms.forEach((__, n) => {
      chain.step(n);
      compare(chain, n, letters, problems);
    });
  });

  it('a counterterm stands in later sequences for what it cancels', () => {
    const { kernels: shared, problems } = problemsOf(setup, [[{ re: -energy, im: 0 }, false]], [0.3, 1.1]);
    const counterterm = setupOf({ z: '0.7 + 0.1*p^2*k^2', y: '1/(1.5 + p^2 + k^2)' }, { dimension }).vertices;
    const parts = counterterm.map((vertex, j) => ({ vertex, strength: { re: 0.6, im: 0.2 * j } }));
    const cancelled = list.terms.findIndex(t => t.factors === 2);
    const chain = new GridChain(list, vertices, shared, problems, contactStates(counterterm));
    const all = [...letters, { content: list.terms[cancelled].exponents, parts }];
    list.terms.forEach((__, n) => {
      chain.step(n);
      if (n === cancelled) chain.addCounterterm(n, parts);
      compare(chain, n, all, problems);
    });
  });
});
