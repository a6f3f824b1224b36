/**
 * Turns addresses of files into paths below a root and back.
 *
 * Knows: URIs.  Must not know: disks.
 * Invariant: uriOf(root, pathOf(root, uri)) is the same file.   (tests/lsp/places.test.ts)
 */
import { URI, Utils } from 'vscode-uri';

/** Path of a file below a root with `/` between its parts; the file's own name where it lies elsewhere. */
export function pathOf(root: string, uri: string): string {
  const [above, file] = [URI.parse(root), URI.parse(uri)];
  const base = above.path.endsWith('/') ? above.path : `${above.path}/`;
  const same = above.scheme === file.scheme && above.authority === file.authority;
  return same && file.path.startsWith(base) ? file.path.slice(base.length) : Utils.basename(file);
}

/** Address of a path below a root, written in one way only. */
export function uriOf(root: string, path: string): string {
  return Utils.joinPath(URI.parse(root), ...path.split('/')).toString();
}

/** An address written in one way only, so that two spellings of one file are equal. */
export function normal(uri: string): string {
  return URI.parse(uri).toString();
}

/** The innermost of some folders that holds a file; the file's own folder where none does. */
export function folderOf(uri: string, folders: readonly string[]): string {
  const file = URI.parse(uri);
  const holding = folders
    .map((folder) => URI.parse(folder))
    .filter(
      ({ scheme, authority, path }) =>
        scheme === file.scheme &&
        authority === file.authority &&
        file.path.startsWith(path.endsWith('/') ? path : `${path}/`),
    )
    .sort((a, b) => b.path.length - a.path.length);
  return (holding[0] ?? Utils.dirname(file)).toString();
}
