import { fromText, type FindingRule } from './rule';

/** A name that nothing declares; the nearest declared one is offered. */
export const unknownName: FindingRule = { code: 'unknown-name', raise: fromText('unknown-name') };
