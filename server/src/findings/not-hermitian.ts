import { fromRemarks } from './remarks';
import { fromText, type FindingRule } from './rule';

const inText = fromText('not-hermitian');
const inResults = fromRemarks('not-hermitian', () => 'error');

/** A kernel whose conjugate transpose is another one, so that probability is not kept. */
export const notHermitian: FindingRule = { code: 'not-hermitian', raise: scope => [...inText(scope), ...inResults(scope)] };
