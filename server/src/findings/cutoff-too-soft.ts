import { fromRemarks } from './remarks';
import { termOf, type FindingRule } from './rule';

/** The cutoff falls off too slowly to make a loop finite. An error unless counterterms cancel the monomial all the same. */
export const cutoffTooSoft: FindingRule = {
  code: 'cutoff-too-soft',
  raise: fromRemarks('cutoff-too-soft', (model, { subject }) => {
    const status = termOf(model, subject)?.status;
    return status === 'cancelled' || status === 'finite' ? 'information' : 'error';
  }),
};
