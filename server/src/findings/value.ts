import { fromRemarks } from './remarks';
import { fromText, type FindingRule } from './rule';

const inText = fromText('value');
const inResults = fromRemarks('value', () => 'error');

/** A number that no model can have: too large, 0/0, a cutoff or mass of 0, a value that depends on itself. */
export const value: FindingRule = { code: 'value', raise: scope => [...inText(scope), ...inResults(scope)] };
