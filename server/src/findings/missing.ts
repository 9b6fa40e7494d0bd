import { fromText, type FindingRule } from './rule';

/** What a model cannot do without is not there: its mass, an interaction, a model in the file. */
export const missing: FindingRule = { code: 'missing', raise: fromText('missing') };
