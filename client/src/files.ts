/** Reads files for a server that has no disk, through the editor, which knows remote and virtual ones. */
import * as vscode from 'vscode';

/** Bytes; larger files are not handed over. */
const LARGEST_FILE = 16 * 1024 * 1024;
const MOST_PLANS = 2000;

/** The text of a file inside an open folder; null where there is none. */
export async function readFile(address: string): Promise<string | null> {
  const uri = vscode.Uri.parse(address, true);
  if (vscode.workspace.getWorkspaceFolder(uri) === undefined) return null;
  try {
    const { size } = await vscode.workspace.fs.stat(uri);
    if (LARGEST_FILE < size) return null;
    return new TextDecoder('utf-8', { fatal: true }).decode(await vscode.workspace.fs.readFile(uri));
  } catch {
    return null;
  }
}

/** Paths, relative to a folder, of the plans and pages in it. */
export async function findPlans(root: string): Promise<string[]> {
  const folder = vscode.Uri.parse(root, true);
  const pattern = new vscode.RelativePattern(folder, '**/*.{lyate,md,markdown}');
  const found = await vscode.workspace.findFiles(pattern, undefined, MOST_PLANS);
  const start = folder.path.endsWith('/') ? folder.path.length : folder.path.length + 1;
  return found.map(({ path }) => path.slice(start)).sort();
}
