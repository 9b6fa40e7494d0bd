import { fromText, type FindingRule } from './rule';

/** The text departs from the grammar: one finding a mistake, at its place, with what to write instead. */
export const syntax: FindingRule = { code: 'syntax', raise: fromText('syntax') };
