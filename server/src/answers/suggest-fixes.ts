/**
 * Suggestions as changes that mend a finding: another base (acid), another solvent.
 *
 * Knows: analysed plans, findings.  Must not know: the protocol.
 * Invariant: none is safe to apply without a look.   (tests/answers/suggest.test.ts)
 */
import type { Finding } from '../checks/finding.ts';
import type { Fix } from './fix.ts';
import { suggestionsAt } from './suggest.ts';
import type { Analysed } from './types.ts';

/** Findings that another base, acid or solvent may mend. */
const MENDED: ReadonlySet<string> = new Set([
  'transfer-uphill',
  'transfer-partial',
  'transfer-slow',
  'undecided',
  'other-site-first',
  'solvent-loses-proton',
  'solvent-takes-proton',
  'solvent-attacked',
  'not-a-base',
  'not-an-acid',
  'group-not-stable',
]);
const MOST = 3;

/** The best few suggestions for the transfer that a finding is about; empty for findings of another kind. */
export function suggestedFixes(analysed: Analysed, finding: Finding): Fix[] {
  if (!MENDED.has(finding.check)) return [];
  const fixes = suggestionsAt(analysed, finding.range.start.line).flatMap(({ list }) =>
    list
      .filter(({ edits }) => edits.length !== 0)
      .slice(0, MOST)
      .map(({ title, option, edits }): Fix => {
        const equiv = `${Number(option.equiv.toFixed(2))} equiv`;
        return { title: `Take ${title}, ${equiv}`, finding, edits, safe: false, preferred: false };
      }),
  );
  return fixes.slice(0, MOST);
}
