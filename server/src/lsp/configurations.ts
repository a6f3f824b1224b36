/**
 * Keeps what `lyate.json` of each root says, and tells the client what is wrong in it and in the files that it names.
 *
 * Knows: files through the door.  Must not know: documents, requests.
 * Invariants: the same function as on the command line works a configuration out   (tests/lsp/configuration.test.ts);
 * nothing outside a root is read.
 */
import { type Configured, configure, type ReadFile, settingsOf } from '../answers/configured.ts';
import type { Settings } from '../checks/settings.ts';
import type { Door, Files } from './door.ts';
import { pathOf, uriOf } from './places.ts';

export interface ConfigurationsOptions {
  readonly door: Door;
  readonly files: Files;
  /** Shows what is wrong in a file that is no plan. */
  readonly show: (uri: string, file: ReadFile | null) => void;
}

export interface Configurations {
  of(root: string): Promise<Configured>;
  /** Forgets what came from a file; false where nothing did. */
  changedOnDisk(uri: string): boolean;
  clear(): void;
}

export function createConfigurations({ door, files, show }: ConfigurationsOptions): Configurations {
  const byRoot = new Map<string, Promise<Configured>>();
  const rootsByFile = new Map<string, Set<string>>();
  const shown = new Map<string, Set<string>>();

  const work = async (root: string): Promise<Configured> => {
    const asking = configure(door.tables());
    let turn = asking.next();
    while (!turn.done) {
      const uri = uriOf(root, turn.value);
      rootsByFile.set(uri, (rootsByFile.get(uri) ?? new Set()).add(root));
      turn = asking.next(await files.read(root, turn.value));
    }
    tell(root, turn.value);
    return turn.value;
  };

  const tell = (root: string, { files: read }: Configured) => {
    const faulty = new Map(
      read.filter(({ findings }) => findings.length !== 0).map((file) => [uriOf(root, file.file), file]),
    );
    for (const uri of shown.get(root) ?? []) if (!faulty.has(uri)) show(uri, null);
    for (const [uri, file] of faulty) show(uri, file);
    shown.set(root, new Set(faulty.keys()));
  };

  return {
    of(root) {
      const known = byRoot.get(root);
      if (known !== undefined) return known;
      const fresh = work(root);
      byRoot.set(root, fresh);
      fresh.catch(() => byRoot.delete(root));
      return fresh;
    },
    changedOnDisk(uri) {
      const roots = [...(rootsByFile.get(uri) ?? [])];
      for (const root of roots) byRoot.delete(root);
      return roots.length !== 0;
    },
    clear() {
      byRoot.clear();
    },
  };
}

/** What a plan is checked by: the configuration where there is one, else what the editor says. */
export function settingsIn(configured: Configured, root: string, uri: string, editor: Settings): Settings {
  return settingsOf(configured, pathOf(root, uri), editor);
}
