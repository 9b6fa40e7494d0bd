import type { CountertermSpec, ModelSpec } from '../../core/model/spec';
import { momentumUnit } from '../words/momenta';
import type { Evaluated } from '../rule';

/** How a counterterm is set: the words after `subtract`, and the momentum on shell, if it is set there. */
export interface Scheme {
  /** `at p = 0.1`, `minimal at 0.1 fm^-1`. */
  readonly words: string;
  readonly onShellAt: number | null;
}

/** The two schemes to offer: on shell at the lowest momentum of the series (below threshold where it has no other), and minimal. */
export function schemesFor(model: Evaluated): { readonly onShell: Scheme; readonly minimal: Scheme } {
  const { spec } = model;
  // A momentum that comes from an energy has digits that nobody would write: four of them will do.
  const momenta = spec.series.points.flatMap(({ p }) => (p !== null && p > 0 ? [p] : []));
  const lowest = Math.min(...momenta);
  const below = spec.series.points.flatMap(({ p, E }) => (p === null && E !== null && E < 0 ? [Math.sqrt(-2 * spec.mu * E)] : []));
  if (momenta.length === 0 && below.length > 0 && Number.isFinite(below[0])) {
    const kappa = Number(Math.min(...below).toPrecision(4));
    const written = inUnit(kappa, spec);
    return {
      onShell: { words: `at kappa = ${written}`, onShellAt: kappa },
      minimal: { words: `minimal at ${written}`, onShellAt: null },
    };
  }
  // A series without momenta: a tenth of the cutoff lies where the theory is meant to hold.
  const at = momenta.length > 0 ? Number(lowest.toPrecision(4)) : Number((spec.cutoff.value / 10).toPrecision(2));
  const written = (momenta.length > 0 && asInText(model, lowest)) || inUnit(at, spec);
  return { onShell: { words: `at p = ${written}`, onShellAt: at }, minimal: { words: `minimal at ${written}`, onShellAt: null } };
}

/** The scheme of a counterterm that is there already, so that what is set together with it is set alike. */
export function schemeOf({ scheme }: CountertermSpec, spec: ModelSpec): Scheme {
  const written = inUnit(scheme.at, spec);
  if (scheme.kind === 'minimal') return { words: `minimal at ${written}`, onShellAt: null };
  return { words: `at ${scheme.kind} = ${written}`, onShellAt: scheme.at };
}

const inUnit = (momentum: number, spec: ModelSpec): string => `${String(momentum).replace('e+', 'e')}${momentumUnit(spec)}`;

/** The first momentum of `series … at p = 10 MeV, …` in the author's own words, where it is a plain number and the lowest one. */
function asInText({ text, source, spec }: Evaluated, lowest: number): string | null {
  const statement = source.places.series?.statement;
  if (!statement || spec.series.points[0]?.p !== lowest) return null;
  const written = /\bat\s+p\s*=\s*([\d.]*\d\.?(?:e[-+]?\d+)?)(?:[ \t]*([A-Za-z]+(?:\^-?\d+)?))?\s*(?=\.\.|,|$)/.exec(
    text.slice(statement.start, statement.end),
  );
  if (!written) return null;
  return written[2] ? `${written[1]} ${written[2]}` : written[1];
}
