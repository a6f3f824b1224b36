/**
 * What a fix is: changes of the text that mend a finding.
 *
 * Knows: findings, places.  Must not know: how fixes are found, the protocol.
 */
import type { Finding } from '../checks/finding.ts';
import type { Range } from '../route/plan.ts';

export interface Edit {
  readonly range: Range;
  readonly text: string;
}

export interface Fix {
  readonly title: string;
  readonly finding: Finding;
  readonly edits: readonly Edit[];
  /** May be applied without a look: nothing but the mistake changes. */
  readonly safe: boolean;
  /** The one to take where there is only one sensible. */
  readonly preferred: boolean;
}
