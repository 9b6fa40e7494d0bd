import type { Span } from '../language/document';
import type { Finding } from './finding';
import { finished } from './finished';
import { fromText, type FindingRule } from './rule';

/** A file that cannot be used: one the model names, or the model's own file (`fileFinding`). */
export const file: FindingRule = { code: 'file', raise: fromText('file') };

/** The finding about a file that could not be read, or not as UTF-8. */
export const fileFinding = (message: string, span: Span): Finding => finished('file', null, { severity: 'error', message, span });
