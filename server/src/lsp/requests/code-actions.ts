/** Fixes for the findings at a place, and all safe ones of a plan at once. */
import { type CodeAction, CodeActionKind } from 'vscode-languageserver';
import type { Edit } from '../../answers/fix.ts';
import { fixesFor } from '../../answers/fixes.ts';
import { overlap } from '../../answers/ranges.ts';
import { uriOf } from '../places.ts';
import type { Result } from '../plans.ts';
import { answering, type Session } from '../session.ts';
import { toAction, toDiagnostic } from '../to-protocol.ts';
import { opensPages } from './diagnostics.ts';

export const FIX_ALL = `${CodeActionKind.SourceFixAll}.lyate`;

export function registerCodeActions(session: Session): void {
  session.connection.onCodeAction(
    answering(session, [] as CodeAction[], (result, { range, context }) => {
      const wants = (kind: string) =>
        context.only === undefined ||
        context.only.some((only) => kind === only || kind.startsWith(`${only}.`));
      const actions: CodeAction[] = [];
      if (wants(CodeActionKind.QuickFix)) actions.push(...quickFixes(result, range, opensPages(session)));
      if (wants(FIX_ALL) && context.only !== undefined) actions.push(...fixAll(result));
      return actions;
    }),
  );
}

function quickFixes(result: Result, range: Parameters<typeof overlap>[0], pages: boolean): CodeAction[] {
  const { analysed, uri, root } = result;
  return analysed.findings
    .filter((finding) => overlap(finding.range, range))
    .flatMap((finding) => {
      const diagnostic = toDiagnostic(finding, { uri, uriOf: (file) => uriOf(root, file), pages });
      return fixesFor(analysed, finding).map((fix) => toAction(fix, uri, diagnostic));
    });
}

/** The safe fixes that do not touch one another. */
function fixAll({ analysed, uri }: Result): CodeAction[] {
  const edits: Edit[] = [];
  for (const finding of analysed.findings) {
    const safe = fixesFor(analysed, finding).find((fix) => fix.safe);
    if (safe === undefined) continue;
    const meets = safe.edits.some((edit) => edits.some((other) => overlap(edit.range, other.range)));
    if (!meets) edits.push(...safe.edits);
  }
  if (edits.length === 0) return [];
  const changes = { [uri]: edits.map(({ range, text }) => ({ range, newText: text })) };
  return [{ title: 'Fix all that is safe to fix', kind: FIX_ALL, edit: { changes } }];
}
