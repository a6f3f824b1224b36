/** Shows the page that explains a check: the one asked for, that of the finding at the cursor, or one that is picked. */
import * as vscode from 'vscode';

const SCHEME = 'lyate-check';

export async function showExplanation(name?: unknown): Promise<void> {
  const check = typeof name === 'string' ? name : (checkAtCursor() ?? (await pick()));
  if (check === undefined) return;
  const uri = vscode.Uri.from({ scheme: SCHEME, path: `/${check}.md` });
  await vscode.commands.executeCommand('markdown.showPreview', uri);
}

function checkAtCursor(): string | undefined {
  const editor = vscode.window.activeTextEditor;
  if (editor === undefined) return undefined;
  const place = editor.selection.active;
  const found = vscode.languages
    .getDiagnostics(editor.document.uri)
    .find(({ source, range }) => source === 'lyate' && range.contains(place));
  return found === undefined ? undefined : nameOf(found);
}

function nameOf({ code }: vscode.Diagnostic): string | undefined {
  const value = typeof code === 'object' ? code.value : code;
  return typeof value === 'string' ? value : undefined;
}

/** The checks that the settings name, which are all there are. */
async function pick(): Promise<string | undefined> {
  const extension = vscode.extensions.getExtension('lyate.lyate');
  const { properties } = extension?.packageJSON.contributes.configuration ?? {};
  const checks: Record<string, { description?: string }> = properties?.['lyate.severities']?.properties ?? {};
  const items = Object.entries(checks).map(([label, { description }]) => ({
    label,
    detail: description ?? '',
  }));
  const picked = await vscode.window.showQuickPick(items, {
    placeHolder: 'The check to explain',
    matchOnDetail: true,
  });
  return picked?.label;
}
