import { fromText, type FindingRule } from './rule';

/** A quantity has another dimension than its place asks for, or a number lacks its unit. */
export const dimension: FindingRule = { code: 'dimension', raise: fromText('dimension') };
