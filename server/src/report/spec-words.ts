import type { CutoffShape, ModelSpec, Wave } from '../core/model/spec';

/** The wave as the language writes it: `full`, `l = 2`. */
export const waveInWords = (wave: Wave, dimension: ModelSpec['dimension']): string =>
  wave.kind === 'angular' ? `${dimension === 2 ? 'm' : 'l'} = ${wave.number}` : wave.kind;

/** The shape of a cutoff as the language writes it: `sharp`, `gaussian(2)`. */
export const shapeInWords = (shape: CutoffShape): string => (shape.kind === 'sharp' ? 'sharp' : `${shape.kind}(${shape.n})`);
