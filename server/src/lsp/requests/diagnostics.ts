/**
 * Findings as the client wants them: pushed with the version they belong to, or held until it asks.
 *
 * Invariants: the last finding's going is told too; closing a document clears it.   (tests/lsp/server.test.ts)
 */
import { type Diagnostic, DocumentDiagnosticReportKind } from 'vscode-languageserver';
import { uriOf } from '../places.ts';
import type { Result } from '../plans.ts';
import type { Session } from '../session.ts';
import { toDiagnostic } from '../to-protocol.ts';

export interface Diagnostics {
  /** A new analysis is there. */
  show(result: Result): void;
  /** The next analysis of the document is to be shown even where they wait for a save. */
  due(uri: string): void;
  /** The document was saved: shows what is known. */
  saved(uri: string): void;
  closed(uri: string): void;
}

interface Shown {
  readonly id: string;
  readonly items: readonly Diagnostic[];
}

/** Whether the client asks for diagnostics by itself. */
export function pulls({ capabilities }: Pick<Session, 'capabilities'>): boolean {
  return capabilities.textDocument?.diagnostic !== undefined;
}

/** The diagnostics of an analysis. */
export function diagnosticsOf({ uri, root, analysed, settings }: Result, pages: boolean): Diagnostic[] {
  if (settings.run === 'off') return [];
  const context = { uri, uriOf: (file: string) => uriOf(root, file), pages };
  return analysed.findings
    .filter(({ accepted }) => !accepted)
    .map((finding) => toDiagnostic(finding, context));
}

/** Whether the client can open the pages that explain checks. */
export function opensPages({ capabilities }: Pick<Session, 'capabilities'>): boolean {
  return capabilities.workspace?.textDocumentContent !== undefined;
}

export function createDiagnostics(session: Session): Diagnostics {
  const { connection, capabilities } = session;
  const pull = pulls(session);
  const shown = new Map<string, Shown>();
  const waiting = new Set<string>();
  let generation = 0;

  const tell = (result: Result) => {
    const { uri, version, cause } = result;
    const items = diagnosticsOf(result, opensPages(session));
    generation++;
    shown.set(uri, { id: `${version}.${generation}`, items });
    if (!pull) void connection.sendDiagnostics({ uri, version, diagnostics: items });
    else if (cause === 'surroundings') askAgain();
  };
  const askAgain = () => {
    if (capabilities.workspace?.diagnostics?.refreshSupport) connection.languages.diagnostics.refresh();
  };

  if (pull) {
    connection.languages.diagnostics.on(async ({ textDocument: { uri }, previousResultId }) => {
      await session.plans.current(uri);
      const last = shown.get(uri);
      if (last === undefined) return { kind: DocumentDiagnosticReportKind.Full, items: [] };
      if (last.id === previousResultId) {
        return { kind: DocumentDiagnosticReportKind.Unchanged, resultId: last.id };
      }
      return { kind: DocumentDiagnosticReportKind.Full, resultId: last.id, items: [...last.items] };
    });
  }

  return {
    show(result) {
      const now = result.settings.run !== 'save' || result.cause === 'surroundings';
      if (now || waiting.delete(result.uri)) tell(result);
    },
    due(uri) {
      waiting.add(uri);
    },
    saved(uri) {
      waiting.add(uri);
      void session.plans.current(uri).then((result) => {
        if (result === null || result.settings.run !== 'save' || !waiting.delete(uri)) return;
        tell(result);
        if (pull) askAgain();
      });
    },
    closed(uri) {
      shown.delete(uri);
      waiting.delete(uri);
      if (!pull) void connection.sendDiagnostics({ uri, diagnostics: [] });
    },
  };
}
