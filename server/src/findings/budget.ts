import { fromRemarks, severityWhereOpen } from './remarks';
import type { FindingRule } from './rule';

/** The evaluations allowed were used up before a number was good enough. */
export const budget: FindingRule = { code: 'budget', raise: fromRemarks('budget', severityWhereOpen) };
