import { findingsOf } from '../findings';
import type { Overrides } from '../language/document';
import type { CheckedFile } from '../report/checked-file';
import { checkComplete } from '../session/check';
import { standardDefaults } from '../session/settings';
import { readModelFile } from './read-file';

export interface CheckOptions {
  readonly overrides: Overrides;
  /** Also the non-perturbative solution of models in which nothing asks for it. */
  readonly full: boolean;
  /** `done` runs from 0 to 1 within each model. */
  progress(file: string, what: string, done: number): void;
}

/** Evaluations of kernels that one model may cost on the command line, where a person or a machine can wait. */
const budget = 2e10;

/** Checks one file. Never throws: a file that cannot be used comes back with its finding. */
export function checkFile(path: string, { overrides, full, progress }: CheckOptions): CheckedFile {
  progress(path, 'reading', 0);
  const read = readModelFile(path);
  if ('unusable' in read) return read.unusable;
  const checked = checkComplete(read.text, standardDefaults, overrides, {
    shouldStop: () => false,
    budget,
    full,
    progress: (model, done, what) => progress(path, `${model}, ${what}`, done),
  });
  return { path, sha256: read.sha256, text: read.text, checked, findings: [...read.faults, ...findingsOf(checked)] };
}
