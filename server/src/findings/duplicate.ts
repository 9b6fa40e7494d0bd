import { fromText, type FindingRule } from './rule';

/** A name, or a statement that may stand once, stands a second time. */
export const duplicate: FindingRule = { code: 'duplicate', raise: fromText('duplicate') };
