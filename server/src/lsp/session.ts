/**
 * What every request works with: the connection, the open documents, their analyses, what the client can do.
 *
 * Must not know: what any request answers.
 */
import type { CancellationToken, ClientCapabilities, Connection, TextDocuments } from 'vscode-languageserver';
import { LSPErrorCodes, ResponseError } from 'vscode-languageserver';
import type { TextDocument } from 'vscode-languageserver-textdocument';
import type { Files } from './door.ts';
import type { Plans, Result } from './plans.ts';

export interface Session {
  readonly connection: Connection;
  readonly documents: TextDocuments<TextDocument>;
  readonly plans: Plans;
  readonly files: Files;
  readonly capabilities: ClientCapabilities;
  /** Addresses of the folders that the client has open. */
  readonly folders: () => readonly string[];
  readonly log: (text: string) => void;
}

/**
 * Makes a request handler out of a function of the analysis of the document as it is now.
 *
 * A fault is logged and answered with `nothing`, so that one bad request does not take the others with it.
 */
export function answering<Params extends { textDocument: { uri: string } }, Answer>(
  session: Session,
  nothing: Answer,
  answer: (result: Result, params: Params) => Answer | Promise<Answer>,
): (params: Params, token: CancellationToken) => Promise<Answer> {
  return async (params, token) => {
    const result = await session.plans.current(params.textDocument.uri);
    if (token.isCancellationRequested) throw new ResponseError(LSPErrorCodes.RequestCancelled, 'cancelled');
    if (result === null) return nothing;
    try {
      return await answer(result, params);
    } catch (error) {
      if (error instanceof ResponseError) throw error;
      session.log(
        `A request failed: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}`,
      );
      return nothing;
    }
  };
}
