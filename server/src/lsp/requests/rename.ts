/** Gives a compound or a step another name wherever it is named. */
import { LSPErrorCodes, type Range, ResponseError, type WorkspaceEdit } from 'vscode-languageserver';
import { targetAt } from '../../answers/names-at.ts';
import { whyNot, written } from '../../answers/rename.ts';
import { answering, type Session } from '../session.ts';
import { placesAcross } from './across-files.ts';

export function registerRename(session: Session): void {
  session.connection.onPrepareRename(
    answering(session, null as { range: Range; placeholder: string } | null, ({ analysed }, { position }) => {
      const target = targetAt(analysed, position);
      return target && { range: target.range, placeholder: target.name };
    }),
  );
  session.connection.onRenameRequest(
    answering(
      session,
      null as WorkspaceEdit | null,
      async (result, { position, newName }): Promise<WorkspaceEdit | null> => {
        const target = targetAt(result.analysed, position);
        if (target === null) return null;
        const all = await placesAcross(session, result, target);
        for (const { result: each } of all) {
          const problem = whyNot(each.analysed, target, newName);
          if (problem !== null) throw new ResponseError(LSPErrorCodes.RequestFailed, problem);
        }
        const newText = written(newName);
        return {
          changes: Object.fromEntries(
            all.map(({ uri, ranges }) => [uri, ranges.map((range) => ({ range, newText }))]),
          ),
        };
      },
    ),
  );
}
