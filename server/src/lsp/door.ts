/**
 * What the server needs from the world around it; each entry hands in its own.
 *
 * Must not know: Node, the browser.
 * Addresses are URIs as the client writes them.
 */
import type { Analyser } from '../answers/analyse.ts';
import type { Settings } from '../checks/settings.ts';
import type { Tables } from '../tables/tables.ts';

export interface Files {
  /** The text of a file below a root; null where it is missing, unreadable or leads out. */
  read(root: string, path: string): Promise<string | null>;
  /** Every plan and Markdown page below a root, as paths relative to it. */
  plans(root: string): Promise<readonly string[]>;
  /** The root that the paths of a file's `use` lines may not leave. */
  rootOf(uri: string, folders: readonly string[]): string;
}

export interface Door {
  tables(): Tables;
  createAnalyser(tables: Tables, settings: Settings): Analyser;
  files(client: ClientFiles): Files;
  /** Lets messages that have arrived meanwhile be read. */
  pause(): Promise<void>;
  /** Milliseconds from any fixed point. */
  now(): number;
}

/** What a client can do for a server that has no disk; null where it offers nothing. */
export interface ClientFiles {
  readonly read: ((uri: string) => Promise<string | null>) | null;
  readonly plans: ((root: string) => Promise<readonly string[]>) | null;
}
