/**
 * Finds the configuration of a plan on disk and analyses the plan under it.
 *
 * The configuration of a plan is the `lyate.json` in its workspace (`files.ts`), so none outside is ever read.
 * Must not know: what a plan or a setting means.
 */
import { join, relative, resolve } from 'node:path';
import { type Analyser, createAnalyser } from '../answers/analyse.ts';
import { type Asking, type Configured, configure, settingsOf } from '../answers/configured.ts';
import type { Analysed, SourceText } from '../answers/types.ts';
import type { Settings } from '../checks/settings.ts';
import { workspaceOf } from './files.ts';
import { analyseIn, onDisk, type Reader, textBelow } from './plans.ts';
import { builtTables } from './tables.ts';

export interface Surroundings {
  readonly root: string;
  readonly configured: Configured;
  readonly settings: Settings;
}

/** Analyses plans, each under what holds for it; remembers configurations for as long as it lives. */
export interface PlanDesk {
  analyse(source: SourceText): Analysed;
  surroundings(file: string): Surroundings;
  /** Every configuration that was used so far, by its root. */
  used(): ReadonlyMap<string, Configured>;
}

/**
 * @param top folder above which nothing is looked for; everything up to the file system's root where undefined
 * @param read text of a file that was found to lie inside; the one on disk where undefined
 */
export function createPlanDesk(top?: string, read: Reader = onDisk): PlanDesk {
  const byRoot = new Map<string, Configured>();
  const analysers = new Map<string, Analyser>();

  const surroundings = (file: string): Surroundings => {
    const root = workspaceOf(file, top === undefined ? [] : [top]);
    let configured = byRoot.get(root);
    if (configured === undefined) {
      configured = answered(configure(builtTables()), (path) => textBelow(root, path, read));
      byRoot.set(root, configured);
    }
    return { root, configured, settings: settingsOf(configured, pathBelow(root, file)) };
  };

  return {
    surroundings,
    used: () => byRoot,
    analyse(source) {
      const { root, configured, settings } = surroundings(source.file);
      const key = `${root}\0${JSON.stringify(settings)}`;
      let analyser = analysers.get(key);
      if (analyser === undefined) {
        analyser = createAnalyser(configured.tables, settings);
        analysers.set(key, analyser);
      }
      return analyseIn(root, analyser, source, read);
    },
  };
}

/** Path of a file below a root with `/` between its parts. */
export function pathBelow(root: string, file: string): string {
  return relative(root, resolve(file)).split('\\').join('/');
}

/** The place of a file of a configuration as a person would write it from here. */
export function pathFromHere(root: string, file: string): string {
  const place = relative('.', join(root, file));
  return place.startsWith('..') ? join(root, file) : place;
}

function answered<Answer>(asking: Asking<Answer>, text: (path: string) => string | null): Answer {
  let turn = asking.next();
  while (!turn.done) turn = asking.next(text(turn.value));
  return turn.value;
}
