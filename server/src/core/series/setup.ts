import { NoExpansion } from '../algebra/at-infinity';
import { KernelError, matrixElement } from '../model/matrix-element';
import { kinematicsOf, type Kinematics } from '../model/kinematics';
import { regulatorOf, type Regulator } from '../model/regulator';
import type { InteractionSpec, ModelSpec } from '../model/spec';
import { localParts, vertexOf, type Vertex } from '../model/vertex';
import type { Remark } from '../results';
import { hardBehaviour, UnknownBehaviour, type HardBehaviour } from './hard-behaviour';
import { propagatorFall } from './loop-moments';
import { countUpTo, monomialsUpTo, type MonomialList } from './monomials';
import type { Counterterm } from './subtraction';

/** A model lowered to what the series is made of. */
export interface Setup {
  readonly spec: ModelSpec;
  readonly kinematics: Kinematics;
  readonly regulator: Regulator;
  readonly list: MonomialList;
  readonly vertices: readonly Vertex[];
  readonly counterterms: readonly Counterterm[];
  /** Null where the behaviour of that kernel at large momenta is unknown. */
  readonly behaviours: readonly (HardBehaviour | null)[];
  /** G ~ k^-fall; null where the kinetic energy has no expansion. */
  readonly fall: number | null;
  /** A momentum of the size of those looked at. */
  readonly momentum: number;
  /** Largest power of a momentum in any contact, plus one. */
  readonly size: number;
  readonly remarks: readonly Remark[];
}

/** Lowers the model. Null vertices (with a remark) where a kernel has no matrix element: then nothing can be said about the model. */
export function setUp(spec: ModelSpec): { setup: Setup | null; remarks: readonly Remark[] } {
  const remarks: Remark[] = [];
  const tooMany = tooManyMonomials(spec);
  if (tooMany) return { setup: null, remarks: [tooMany] };
  const couplings = new Map(spec.couplings.map(c => [c.name, c.value]));
  const lower = (interaction: InteractionSpec): Vertex | null => {
    try {
      return vertexOf(interaction.name, matrixElement(interaction, spec, couplings), spec.dimension === 1 && spec.wave.kind === 'full');
    } catch (error) {
      if (!(error instanceof KernelError)) throw error;
      remarks.push({ code: error.code, message: error.message, subject: interaction.name });
      return null;
    }
  };
  const vertices = spec.interactions.map(lower);
  const forms = spec.counterterms.map(c => {
    if ('of' in c.form) return vertices[spec.interactions.findIndex(i => 'of' in c.form && i.name === c.form.of)] ?? null;
    return lower({ name: c.name, arguments: c.form.arguments, kernel: c.form.expr, order: 1 });
  });
  if ([...vertices, ...forms].some(v => v === null)) return { setup: null, remarks };
  const kinematics = kinematicsOf(spec);
  const all = [...vertices, ...forms].map(v => v!);
  const behaviours = vertices.map(v => {
    try {
      return hardBehaviour(v!.element.shape, kinematics, spec.wave.kind === 'angular' ? Math.abs(spec.wave.number) : 0);
    } catch (error) {
      if (!(error instanceof UnknownBehaviour)) throw error;
      return null;
    }
  });
  const setup: Setup = {
    spec,
    kinematics,
    regulator: regulatorOf(spec.cutoff.shape),
    list: monomialsUpTo(spec.interactions, spec.series.order),
    vertices: vertices.map(v => v!),
    counterterms: spec.counterterms.map((c, j) => ({ spec: c, vertex: forms[j]! })),
    behaviours,
    fall: fallOf(kinematics),
    momentum: typicalMomentum(spec, kinematics),
    size: 1 + Math.max(0, ...all.flatMap(v => v.contact ?? []).map(t => Math.max(t.a, t.b))),
    remarks,
  };
  return { setup, remarks };
}

/** What an edit may take to look at: a second or two. */
const MOST_MONOMIALS = 1500;
const MOST_REGIONS = 3e6;

function tooManyMonomials({ interactions, series }: ModelSpec): Remark | null {
  const { monomials, regions } = countUpTo(
    interactions.map(i => i.order),
    series.order,
  );
  if (monomials <= MOST_MONOMIALS && regions <= MOST_REGIONS) return null;
  const many =
    monomials > MOST_MONOMIALS
      ? `${monomials} monomials, and at most ${MOST_MONOMIALS} are looked at`
      : `${regions.toPrecision(2)} regions of large loop momenta, and at most ${MOST_REGIONS.toPrecision(1)} are looked at`;
  return {
    code: 'budget',
    message: `The series to order ${series.order} has ${many}: lower the order, or split the model.`,
    subject: null,
  };
}

function fallOf(kinematics: Kinematics): number | null {
  try {
    const fall = propagatorFall(kinematics);
    return fall > 0 ? fall : null;
  } catch (error) {
    if (error instanceof NoExpansion) return null;
    throw error;
  }
}

/** The median of the momenta asked for. */
function typicalMomentum(spec: ModelSpec, kinematics: Kinematics): number {
  const momenta = spec.series.points
    .map(({ p, E }) => (p !== null ? Math.abs(p) : E !== null ? Math.abs(kinematics.roots(E).at(-1)?.p ?? 0) : 0))
    .filter(p => p > 0)
    .sort((x, y) => x - y);
  return momenta[momenta.length >> 1] ?? spec.cutoff.value / 20;
}

/** Momenta over which the local kernels of a model change, where they do. */
export function kernelScales(vertices: readonly Vertex[]): number[] {
  return vertices
    .flatMap(v => localParts(v.element.shape))
    .map(shape => shape.scale)
    .filter(scale => scale > 0 && Number.isFinite(scale));
}

/** The largest momentum that has to be small beside a cutoff on a ladder. */
export function softMomentum({ momentum, vertices }: Setup): number {
  return Math.max(momentum, ...kernelScales(vertices).filter(s => s < 1e3 * momentum));
}

/** Largest length of an oscillation e^(i phase k) of a kernel; 0 where there is none. Two of them meet in a loop. */
export function oscillationLength(vertices: readonly Vertex[]): number {
  const lengths = vertices
    .flatMap(v => localParts(v.element.shape))
    .flatMap(shape => [...(shape.tail ?? []), ...(shape.backwardTail ?? [])].map(t => Math.abs(t.phase)));
  return Math.max(0, ...lengths);
}

/** Singular, or with a kink, where the momentum transfer vanishes. */
export const isSingular = (vertex: Vertex): boolean => !vertex.finiteRank && vertex.ridge === 0;

/** l, |m|, or 1 for the odd wave: amplitudes start with p^l k^l. */
export function partialWave(wave: ModelSpec['wave']): number {
  return wave.kind === 'angular' ? Math.abs(wave.number) : wave.kind === 'odd' ? 1 : 0;
}
