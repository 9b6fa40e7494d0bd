import type { Finding } from '../findings/finding';
import type { CheckedDocument } from '../session/checked';

/** One file of a check, as reports need it. */
export interface CheckedFile {
  /** As it was named on the command line. */
  readonly path: string;
  /** Of the file's bytes, hexadecimal; null where it could not be read. */
  readonly sha256: string | null;
  readonly text: string;
  /** Null where the file could not be read, or not as text. */
  readonly checked: CheckedDocument | null;
  readonly findings: readonly Finding[];
}

/** 0: good; 1: a finding of severity error; 2: a file that could not be read. */
export type ExitStatus = 0 | 1 | 2;

export function exitStatus(files: readonly CheckedFile[]): ExitStatus {
  if (files.some(({ sha256 }) => sha256 === null)) return 2;
  return files.some(({ findings }) => findings.some(({ severity }) => severity === 'error')) ? 1 : 0;
}
