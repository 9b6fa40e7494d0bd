import { binary, number, symbol, type Complex, type Expr } from '../../server/src/core/algebra/expression';
import type { ModelSpec } from '../../server/src/core/model/spec';
import type { ModelResults, OverallForm, TermResult, Ultraviolet } from '../../server/src/core/results';
import type { ModelInText, NamedPlace, Span } from '../../server/src/language/document';
import type { CheckedDocument, CheckedModel } from '../../server/src/session/checked';

/** `defect_in_a_wire`, whose results are known in closed form: T of twist² grows as −2·mu·c1²·L/π. */
export const wireText = (
  counterterm = '  counterterm z0(p, k) = 1 cancels twist^2 subtract at p = 0.1\n',
): string => `model defect_in_a_wire {
  units natural
  dimension 1
  wave full
  mass reduced 1.0

  coupling c0 = 0.20
  coupling c1 = 0.35

  interaction bump(p, k)  = c0             # <p|V|k>, p out, k in
  interaction twist(p, k) = i*c1*(p - k)

  cutoff L = 40 sharp scan 10 .. 400
  series to 3 at p = 0.05 .. 1.0 (12 points)

${counterterm}  expect finite
}
`;

export const c0 = 0.2;
export const c1 = 0.35;
export const cutoffs = [10, 20, 40, 80, 160, 400];

const complex = (re: number, im = 0): Complex => ({ re, im });
const growth = (-2 * c1 * c1) / Math.PI;
const [p, k, i] = [symbol('p'), symbol('k'), number(0, 1)];
const twistKernel: Expr = binary('multiply', binary('multiply', i, symbol('c1')), binary('subtract', p, k));

export const converges: Ultraviolet = {
  verdict: 'converges',
  conditional: false,
  power: 0,
  log: 0,
  nested: false,
  nestedIn: [],
  overall: [],
  confirmed: true,
};

/** One overall form that grows as L^power (ln L)^log. */
export const grows = (form: string, absorbedBy: string | null = null, power = 1, log = 0, coefficient = growth): OverallForm => ({
  form,
  power,
  log,
  absorbedBy,
  coefficient: complex(coefficient),
  uncertainty: 1e-10,
  universal: power === 0,
});

export const diverges = (overall: readonly OverallForm[], nestedIn: readonly string[] = []): Ultraviolet => ({
  ...converges,
  verdict: 'diverges',
  power: overall[0]?.power ?? 1,
  log: overall[0]?.log ?? 0,
  overall,
  nested: nestedIn.length > 0,
  nestedIn,
});

/** A term of (bump, twist), finite unless said otherwise, with a value at one momentum. */
export function termOf(monomial: string, exponents: readonly number[], more: Partial<TermResult> = {}): TermResult {
  const order = exponents.reduce((sum, n) => sum + n, 0);
  const value = {
    p: 0.05,
    E: 0.00125,
    bare: complex(c0 ** exponents[0], -0.01),
    renormalised: complex(c0 ** exponents[0], -0.01),
    uncertainty: 1e-9,
  };
  return {
    monomial,
    exponents,
    order,
    ultraviolet: converges,
    infrared: { verdict: 'converges' },
    status: 'finite',
    cancelledBy: [],
    values: [value],
    ...more,
  };
}

function twistSquared(cancelled: boolean): TermResult {
  const bare = cutoffs.map(L => complex(growth * L + 1e-3 / L, -0.01225));
  const left = cutoffs.map(L => complex(-2.9e-5 - 1e-3 / L, -0.01225));
  return termOf('twist^2', [0, 2], {
    ultraviolet: diverges([grows('1', 'bump')]),
    status: cancelled ? 'cancelled' : 'uncancelled',
    cancelledBy: cancelled ? ['z0'] : [],
    values: [
      {
        p: 0.05,
        E: 0.00125,
        bare: complex(-3.119427136, -0.01225),
        uncertainty: 1e-9,
        renormalised: cancelled ? complex(-0.00002924479696, -0.01225) : complex(-3.119427136, -0.01225),
        backward: { bare: complex(-3.119436885), renormalised: complex(-0.0000389934) },
      },
    ],
    scan: { p: 0.05, E: 0.00125, cutoff: cutoffs, bare, renormalised: cancelled ? left : bare },
  });
}

/** What the core finds out about the wire; `cancelled`: with the counterterm z0. */
export function wireResults(cancelled = true): ModelResults {
  return {
    terms: [
      termOf('bump', [1, 0]),
      termOf('twist', [0, 1]),
      termOf('bump^2', [2, 0]),
      termOf('bump*twist', [1, 1]),
      twistSquared(cancelled),
      termOf('bump^3', [3, 0]),
      termOf('bump^2*twist', [2, 1]),
      termOf('bump*twist^2', [1, 2], {
        ultraviolet: diverges([], ['twist^2']),
        status: cancelled ? 'cancelled' : 'uncancelled',
        cancelledBy: cancelled ? ['z0'] : [],
      }),
      termOf('twist^3', [0, 3]),
    ],
    sum: [{ p: 0.05, E: 0.00125, orders: [1, 2, 3], byOrder: [complex(0.2), complex(-0.0000292, -0.81), complex(0.003)], drift: 0.004 }],
    series: [
      { p: 0.05, E: 0.00125, largestEigenvalue: complex(0.4, 0.1), converges: true, eigenvalues: [complex(0.4, 0.1), complex(-0.02)] },
    ],
    counterterms: cancelled
      ? [{ name: 'z0', cancels: ['twist^2'], at: complex(3.119397892), cutoff: cutoffs, strength: cutoffs.map(L => complex(-growth * L)) }]
      : [],
    couplings: [
      {
        name: 'c0',
        value: c0,
        dimension: '1',
        ...(cancelled && { running: { cutoff: cutoffs, value: cutoffs.map(L => c0 - growth * L) } }),
      },
      { name: 'c1', value: c1, dimension: '1' },
    ],
    observables: null,
    expectations: [
      {
        text: 'finite',
        holds: cancelled,
        measured: cancelled ? 'every monomial to order 3 is finite or cancelled' : 'twist^2 is not cancelled',
      },
    ],
    remarks: [],
  };
}

export function wireSpec(cancelled = true): ModelSpec {
  return {
    name: 'defect_in_a_wire',
    dimension: 1,
    wave: { kind: 'full' },
    units: null,
    mu: 1,
    masses: null,
    kinetic: null,
    couplings: [
      { name: 'c0', value: c0, dimension: '1' },
      { name: 'c1', value: c1, dimension: '1' },
    ],
    interactions: [
      { name: 'bump', arguments: 'pk', kernel: symbol('c0'), order: 1 },
      { name: 'twist', arguments: 'pk', kernel: twistKernel, order: 1 },
    ],
    cutoff: { name: 'L', value: 40, shape: { kind: 'sharp' }, declared: true, scan: { from: 10, to: 400, points: 24 } },
    series: { order: 3, declared: true, points: Array.from({ length: 12 }, (_, n) => ({ p: 0.05 + (0.95 * n) / 11, E: null })) },
    counterterms: cancelled
      ? [{ name: 'z0', form: { arguments: 'pk', expr: number(1) }, cancels: [[0, 2]], scheme: { kind: 'p', at: 0.1 } }]
      : [],
    expectations: [{ kind: 'finite', to: null }],
  };
}

/** The wire as the session hands it on; results and spec may be replaced for the case at hand. */
export function checkedWire(
  options: {
    readonly cancelled?: boolean;
    readonly text?: string;
    readonly stage?: CheckedModel['stage'];
    readonly results?: (results: ModelResults) => ModelResults;
    readonly spec?: (spec: ModelSpec) => ModelSpec;
  } = {},
): CheckedDocument {
  const cancelled = options.cancelled ?? true;
  const text = options.text ?? (cancelled ? wireText() : wireText(''));
  const spec = (options.spec ?? (same => same))(wireSpec(cancelled));
  const results = (options.results ?? (same => same))(wireResults(cancelled));
  const source: ModelInText = { name: spec.name, places: placesIn(text), problems: [], spec };
  return { document: { text, problems: [], models: [source] }, models: [{ source, results, stage: options.stage ?? 'complete' }] };
}

/** The places of a model that is written one statement a line, in the manner of the wire. */
function placesIn(text: string): ModelInText['places'] {
  const statements = (keyword: string): NamedPlace[] =>
    [...text.matchAll(new RegExp(`\\b${keyword} +(\\S+?)(?=[ (])[^#\\r\\n]*`, 'g'))].map(match => ({
      statement: span(match.index, match[0].trimEnd().length),
      name: span(match.index + match[0].indexOf(match[1], keyword.length), match[1].length),
    }));
  const series = text.indexOf('series');
  const name = text.indexOf('defect_in_a_wire');
  return {
    model: span(text.indexOf('model'), text.lastIndexOf('}') + 1 - text.indexOf('model')),
    name: span(name, 'defect_in_a_wire'.length),
    insertAt: text.lastIndexOf('}'),
    couplings: statements('coupling'),
    interactions: statements('interaction'),
    counterterms: statements('counterterm'),
    cutoff: statements('cutoff')[0] ?? null,
    series: { statement: span(series, /^[^#\r\n]*/.exec(text.slice(series))![0].trimEnd().length), keyword: span(series, 6) },
    expectations: [...text.matchAll(/\bexpect +([^#\r\n]*)/g)].map(match => ({
      statement: span(match.index, match[0].trimEnd().length),
      text: match[1].trimEnd(),
    })),
  };
}

const span = (start: number, length: number): Span => ({ start, end: start + length });
