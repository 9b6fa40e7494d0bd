import { fromRemarks } from './remarks';
import { fromText, type FindingRule } from './rule';

const inText = fromText('not-evaluated');
const inResults = fromRemarks('not-evaluated', () => 'error');

/** A statement that is well formed but that this version does not evaluate: said, never ignored. */
export const notEvaluated: FindingRule = { code: 'not-evaluated', raise: scope => [...inText(scope), ...inResults(scope)] };
