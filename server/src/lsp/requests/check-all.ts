/** Checks every plan of the open folders, also those that are not open, with progress, until it is called off. */
import { uriOf } from '../places.ts';
import type { Session } from '../session.ts';
import { diagnosticsOf, opensPages } from './diagnostics.ts';

/** The command that the client offers. */
export const CHECK_ALL = 'lyate.checkAllPlans';

export interface CheckAll {
  /** Answers with how many plans were checked and how many findings they have; null where it was called off. */
  run(): Promise<{ plans: number; findings: number } | null>;
  /** What was shown for a file that is now open is taken back; its own analysis speaks for it. */
  opened(uri: string): void;
}

export function createCheckAll(session: Session): CheckAll {
  const { connection, plans, files, folders } = session;
  const shown = new Set<string>();
  const clear = (uri: string) => {
    if (shown.delete(uri)) void connection.sendDiagnostics({ uri, diagnostics: [] });
  };
  return {
    async run() {
      const progress = await connection.window.createWorkDoneProgress();
      progress.begin('Checking plans', 0, '', true);
      try {
        const open = new Set(plans.open());
        const all = (
          await Promise.all(
            folders().map(async (root) => (await files.plans(root)).map((path) => ({ root, path }))),
          )
        ).flat();
        const before = new Set(shown);
        let findings = 0;
        for (const [index, { root, path }] of all.entries()) {
          if (progress.token.isCancellationRequested) return null;
          progress.report(Math.round((100 * index) / all.length), path);
          const uri = uriOf(root, path);
          before.delete(uri);
          const result = open.has(uri) ? await plans.current(uri) : await plans.unopened(root, path);
          if (result === null) continue;
          const diagnostics = diagnosticsOf(result, opensPages(session));
          findings += diagnostics.length;
          if (open.has(uri)) continue;
          if (diagnostics.length === 0) clear(uri);
          else {
            shown.add(uri);
            void connection.sendDiagnostics({ uri, diagnostics });
          }
        }
        for (const gone of before) clear(gone);
        connection.window.showInformationMessage(
          `Lyate checked ${all.length} ${all.length === 1 ? 'plan' : 'plans'}: ${findings} ${findings === 1 ? 'finding' : 'findings'}.`,
        );
        return { plans: all.length, findings };
      } finally {
        progress.done();
      }
    },
    opened: clear,
  };
}
