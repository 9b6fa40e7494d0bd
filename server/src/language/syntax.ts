import type { CutoffShape, KernelArguments, Observable } from '../core/model/spec';
import type { Span } from './document';
import type { ReservedWord } from './words';

/**
 * What the text of one statement says, before any name is looked up. Every span counts from the start of the statement, so that a
 * parsed statement can be kept and used again wherever the same text stands.
 */
export interface Word {
  readonly name: string;
  readonly span: Span;
}

export interface Whole {
  readonly value: number;
  readonly span: Span;
}

export interface UnitPower {
  readonly unit: string;
  /** Negative where the unit stands behind `/`. */
  readonly power: number;
  readonly span: Span;
}

/** An expression as written; `span` includes the parentheses around it. */
export type Formula = { readonly span: Span } & (
  | { readonly kind: 'number'; readonly value: number; readonly text: string }
  | { readonly kind: 'name'; readonly name: string }
  | { readonly kind: 'quantity'; readonly of: Formula; readonly units: readonly UnitPower[] }
  | { readonly kind: 'group'; readonly of: Formula }
  | { readonly kind: 'negate'; readonly of: Formula }
  | { readonly kind: 'add' | 'subtract' | 'multiply' | 'divide' | 'power'; readonly left: Formula; readonly right: Formula }
  | { readonly kind: 'call'; readonly function: Word; readonly primes: number; readonly arguments: readonly Formula[]; readonly open: Span }
);

export interface Range {
  readonly from: Formula;
  readonly to: Formula;
  readonly points: Whole | null;
}

export type Item = { readonly kind: 'value'; readonly value: Formula } | ({ readonly kind: 'range' } & Range);

export type Axis = 'p' | 'E' | 'E_lab';

export interface Point {
  readonly axis: Axis;
  readonly axisSpan: Span;
  readonly value: Formula;
  readonly span: Span;
}

export interface Factor {
  readonly name: Word;
  readonly power: Whole | null;
}

export interface WrittenMonomial {
  readonly factors: readonly Factor[];
  readonly span: Span;
}

export interface Kernel {
  readonly arguments: KernelArguments;
  readonly words: readonly Word[];
  /** Coupled channels: a (out), b (in). */
  readonly element: { readonly out: Whole; readonly in: Whole; readonly span: Span } | null;
}

export type WaveWords = { readonly kind: 'full' | 'even' | 'odd' } | { readonly kind: 'm' | 'l'; readonly numbers: readonly Whole[] };

export type Scheme = { readonly kind: 'minimal' | 'p' | 'kappa'; readonly at: Formula };

export type Expectation =
  | { readonly kind: 'finite'; readonly to: Whole | null }
  | { readonly kind: 'converges'; readonly point: Point }
  | { readonly kind: 'drift'; readonly percent: Formula; readonly point: Point }
  | {
      readonly kind: 'observable';
      readonly observable: Word & { readonly name: Observable };
      readonly value: Formula;
      readonly within: Formula;
      readonly percent: boolean;
      readonly point: Point | null;
    };

export interface Column {
  readonly name: Word;
  readonly units: readonly UnitPower[] | 'deg' | null;
}

export type StatementBody =
  | { readonly kind: 'use'; readonly path: string }
  | { readonly kind: 'const'; readonly name: Word; readonly value: Formula }
  | { readonly kind: 'model'; readonly name: Word; readonly from: Word | null }
  | { readonly kind: 'units'; readonly system: { readonly energy: Word; readonly length: Word } | null }
  | { readonly kind: 'dimension'; readonly value: Whole }
  | { readonly kind: 'wave'; readonly wave: WaveWords; readonly span: Span }
  | { readonly kind: 'mass'; readonly reduced: Formula; readonly masses: null }
  | { readonly kind: 'mass'; readonly reduced: null; readonly masses: readonly [Formula, Formula] }
  | { readonly kind: 'kinetic'; readonly arguments: readonly Word[]; readonly value: Formula }
  | { readonly kind: 'propagator'; readonly arguments: readonly Word[]; readonly value: Formula }
  | { readonly kind: 'coupling'; readonly name: Word; readonly value: Formula | null }
  | {
      readonly kind: 'interaction';
      readonly name: Word;
      readonly kernel: Kernel;
      readonly value: Formula;
      readonly order: Whole | null;
      readonly orderSpan: Span;
    }
  | {
      readonly kind: 'cutoff';
      readonly name: Word;
      readonly value: Formula;
      readonly shape: CutoffShape;
      readonly shapeSpan: Span;
      readonly scan: Range | null;
    }
  | {
      readonly kind: 'series';
      readonly order: Whole;
      readonly at: { readonly axis: Axis; readonly axisSpan: Span; readonly items: readonly Item[] } | null;
    }
  | {
      readonly kind: 'counterterm';
      readonly name: Word;
      readonly form: { readonly arguments: 'pk' | 'pkE'; readonly words: readonly Word[]; readonly value: Formula } | { readonly of: Word };
      readonly cancels: readonly WrittenMonomial[];
      readonly scheme: Scheme;
    }
  | {
      readonly kind: 'fix';
      readonly name: Word;
      readonly observable: Word & { readonly name: Observable };
      readonly value: Formula;
      readonly point: Point | null;
    }
  | { readonly kind: 'data'; readonly name: Word; readonly path: string; readonly columns: readonly Column[] }
  | { readonly kind: 'expect'; readonly expectation: Expectation };

export type StatementKind = StatementBody['kind'];

/** A hint or mistake seen while reading, without any other statement. */
export interface Remark {
  readonly code: 'syntax' | 'reading' | 'value';
  readonly message: string;
  readonly span: Span;
  readonly mend?: { readonly title: string; readonly span: Span; readonly text: string };
  /** The statement that begins here with a misspelt word, and the name that it declares. */
  readonly misspelt?: { readonly meant: ReservedWord; readonly name: Word | null };
}

export interface ParsedStatement {
  /** It breaks off before it is complete: what follows in the text may belong to it. */
  readonly endsEarly: boolean;
  /** Null where the statement could not be read to its end. */
  readonly body: StatementBody | null;
  /** The name it declares, as far as it could be read. */
  readonly name: Word | null;
  readonly remarks: readonly Remark[];
}
