/** What is known about the thing under the cursor; plain text for clients that show no Markdown. */
import { type Hover, MarkupKind } from 'vscode-languageserver';
import { hoverAt } from '../../answers/hover.ts';
import { answering, type Session } from '../session.ts';

export function registerHover(session: Session): void {
  const formats = session.capabilities.textDocument?.hover?.contentFormat ?? [];
  const kind = formats.includes(MarkupKind.Markdown) ? MarkupKind.Markdown : MarkupKind.PlainText;
  session.connection.onHover(
    answering(session, null as Hover | null, ({ analysed }, { position }) => {
      const found = hoverAt(analysed, position);
      if (found === null) return null;
      const value = kind === MarkupKind.Markdown ? found.markdown : withoutPictures(found.markdown);
      return { range: found.range, contents: { kind, value } };
    }),
  );
}

function withoutPictures(markdown: string): string {
  return markdown
    .split('\n')
    .filter((line) => !line.startsWith('![structure](data:'))
    .join('\n');
}
