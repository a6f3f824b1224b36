/** What can be written at the cursor. */
import type { CompletionItem, SignatureHelp } from 'vscode-languageserver';
import { completionsAt } from '../../answers/completion.ts';
import { signatureAt } from '../../answers/signature.ts';
import { answering, type Session } from '../session.ts';
import { toCompletion } from '../to-protocol.ts';

export function registerCompletion(session: Session): void {
  session.connection.onCompletion(
    answering(session, [] as CompletionItem[], ({ analysed }, { position }) =>
      completionsAt(analysed, position).map(toCompletion),
    ),
  );
}

export function registerSignatureHelp({ connection, documents }: Session): void {
  connection.onSignatureHelp(({ textDocument, position }): SignatureHelp | null => {
    const start = { line: position.line, character: 0 };
    const found = signatureAt(documents.get(textDocument.uri)?.getText({ start, end: position }) ?? '');
    if (found === null) return null;
    const { form, text, parts, active } = found;
    const parameters = parts.map(([from, to]) => ({ label: [from, to] as [number, number] }));
    return {
      signatures: [{ label: form, documentation: text, parameters, activeParameter: active }],
      activeSignature: 0,
      activeParameter: active,
    };
  });
}
