/** The outline of a plan, and a search over the open plans and those of the workspace. */
import { type DocumentSymbol, SymbolKind, type WorkspaceSymbol } from 'vscode-languageserver';
import { symbolsOf } from '../../answers/symbols.ts';
import { uriOf } from '../places.ts';
import type { Result } from '../plans.ts';
import { answering, type Session } from '../session.ts';
import { toSymbol } from '../to-protocol.ts';

const MOST_SYMBOLS = 500;
const MOST_PLANS = 200;

export function registerSymbols(session: Session): void {
  session.connection.onDocumentSymbol(
    answering(session, [] as DocumentSymbol[], ({ analysed }) => symbolsOf(analysed).map(toSymbol)),
  );
  session.connection.onWorkspaceSymbol(async ({ query }, token) => {
    const wanted = query.toLowerCase();
    const found: WorkspaceSymbol[] = [];
    for await (const { uri, analysed } of everyPlan(session)) {
      if (token.isCancellationRequested || MOST_SYMBOLS < found.length) break;
      for (const { kind, name, detail, range } of symbolsOf(analysed)) {
        if (!`${name} ${detail}`.toLowerCase().includes(wanted)) continue;
        found.push({
          name: detail === '' || kind === 'compound' ? name : `${name} ${detail}`,
          kind: kind === 'compound' ? SymbolKind.Variable : SymbolKind.Function,
          location: { uri, range },
        });
      }
    }
    return found;
  });
}

/** The open plans, then those of the open folders that are not open. */
async function* everyPlan({ plans, files, folders }: Session): AsyncGenerator<Result> {
  const open = new Set(plans.open());
  for (const uri of open) {
    const result = await plans.current(uri);
    if (result !== null) yield result;
  }
  let left = MOST_PLANS;
  for (const root of folders()) {
    for (const path of await files.plans(root)) {
      if (open.has(uriOf(root, path)) || --left < 0) continue;
      const result = await plans.unopened(root, path);
      if (result !== null) yield result;
    }
  }
}
