import type { Complex } from '../algebra/expression';
import type { Vertex } from '../model/vertex';
import type { Column } from './dense-words';
import type { Ending } from './loop-weights';

/** What a contact leaves on its left: k^power e^(i phase k); on its right it takes the moment with the conjugate. */
export interface ContactState {
  readonly power: number;
  readonly phase: number;
}

/** The states of the contacts among these vertices. */
export function contactStates(vertices: readonly Vertex[]): ContactState[] {
  return vertices
    .flatMap(v => v.finiteRank ?? [])
    .flatMap(({ a, b, phase }) => [
      { power: a, phase },
      { power: b, phase },
    ]);
}

export const stateKey = ({ power, phase }: ContactState): string => `${power}/${phase}`;

/** A state at the points k. */
export function stateAt({ power, phase }: ContactState, k: Float64Array): Column {
  const size = k.map(x => x ** power);
  if (phase === 0) return { re: size, im: null };
  return { re: size.map((v, j) => v * Math.cos(phase * k[j])), im: size.map((v, j) => v * Math.sin(phase * k[j])) };
}

/** (state)* at the external momentum, as a contact meets it. */
export function endOn(column: Ending, { power, phase }: ContactState): Complex {
  if (column.kind === 'power') return { re: column.n === power && phase === 0 ? 1 : 0, im: 0 };
  if (phase === 0) return { re: column.contacts ? column.k ** power : 0, im: 0 };
  return { re: column.k ** power * Math.cos(phase * column.k), im: -(column.k ** power) * Math.sin(phase * column.k) };
}
