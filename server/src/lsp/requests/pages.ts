/** The pages that explain checks, as documents that the client can open. */
import { explanation } from '../../answers/explain.ts';
import type { Session } from '../session.ts';

export function registerPages({ connection }: Session): void {
  connection.workspace.textDocumentContent.on(({ uri }) => {
    const name = /\/([a-zA-Z-]+)\.md$/.exec(uri)?.[1] ?? '';
    return { text: explanation(name) ?? `There is no check called ${name}.\n` };
  });
}
