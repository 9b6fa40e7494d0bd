import type { Finding, FindingCode } from './finding';
import type { Draft } from './rule';

/** The page that explains a code. */
export const docsOf = (code: FindingCode): string => `docs/findings.md#${code}`;

/** A draft with its code, its model and its page. */
export const finished = (code: FindingCode, model: string | null, draft: Draft): Finding => ({
  code,
  model,
  docs: docsOf(code),
  related: [],
  fixes: [],
  ...draft,
});
