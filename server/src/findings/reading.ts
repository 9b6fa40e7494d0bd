import { fromText, type FindingRule } from './rule';

/** The text is right but may be read otherwise than it was meant. */
export const reading: FindingRule = { code: 'reading', raise: fromText('reading') };
