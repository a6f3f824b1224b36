/**
 * Keeps an analysis of every open plan up to date with its text, its settings and the files it uses.
 *
 * Knows: open documents, the analysis.  Must not know: the protocol's requests, how findings are shown.
 * Invariants:
 *  1. What is handed out belongs to the text as it is now; a stale run is dropped, never handed out.  (tests/lsp/server.test.ts)
 *  2. An open buffer beats the disk.                                                                  (same)
 *  3. What is remembered about a document goes when it is closed.
 */
import type { TextDocument } from 'vscode-languageserver-textdocument';
import type { Analyser } from '../answers/analyse.ts';
import { CONFIGURATION_FILE } from '../answers/configuration.ts';
import type { Analysed } from '../answers/types.ts';
import { type Configurations, settingsIn } from './configurations.ts';
import type { Door, Files } from './door.ts';
import { normal, pathOf, uriOf } from './places.ts';
import type { EditorSettings } from './settings.ts';

export type Language = 'lyate' | 'markdown';

/** Why a plan was looked at again: its own text, or something around it. */
export type Cause = 'text' | 'surroundings';

export interface Result {
  readonly uri: string;
  readonly version: number;
  readonly root: string;
  readonly analysed: Analysed;
  readonly settings: EditorSettings;
  readonly cause: Cause;
}

export interface PlansOptions {
  readonly door: Door;
  readonly files: Files;
  readonly folders: () => readonly string[];
  readonly document: (uri: string) => TextDocument | undefined;
  readonly settingsOf: (uri: string) => Promise<EditorSettings>;
  readonly configurations: Configurations;
  readonly onResult: (result: Result) => void;
  readonly onFailure: (uri: string, error: unknown) => void;
}

export interface Plans {
  opened(uri: string): void;
  changed(uri: string): void;
  closed(uri: string): void;
  /** The file behind an address is no longer what it was on disk. */
  changedOnDisk(uri: string): void;
  /** Settings or folders are no longer what they were. */
  refreshAll(): void;
  /** The analysis of the text as it is now; null for what is no open plan. */
  current(uri: string): Promise<Result | null>;
  /** Analyses a plan that is not open; null where it cannot be read. */
  unopened(root: string, path: string): Promise<Result | null>;
  readonly open: () => readonly string[];
}

interface OpenPlan {
  readonly uri: string;
  root: string;
  ticket: number;
  running: Promise<Result | null>;
  /** Addresses of the files that the plan asked for at its last analysis. */
  uses: ReadonlySet<string>;
  analyser: { readonly key: string; readonly analyser: Analyser } | null;
}

/** How often the analysis may ask for more files; a longer chain of `use` is left as it is. */
const ROUNDS = 64;
/** ms of work before messages that have arrived meanwhile are read. */
const SLICE = 8;
/** Files that are not open and whose text is remembered. */
const TEXTS_REMEMBERED = 500;

/** The language of a document; null for those that hold no plans. */
export function languageOf(document: TextDocument): Language | null {
  if (document.languageId === 'lyate' || document.languageId === 'markdown') return document.languageId;
  if (document.uri.endsWith('.lyate')) return 'lyate';
  return /\.(md|markdown)$/i.test(document.uri) ? 'markdown' : null;
}

export function createPlans(options: PlansOptions): Plans {
  const { door, files, folders, document, settingsOf, configurations, onResult, onFailure } = options;
  const open = new Map<string, OpenPlan>();
  const onDisk = new Map<string, string | null>();

  const textOf = async (root: string, path: string): Promise<string | null> => {
    const uri = uriOf(root, path);
    const buffer = [...open.values()].find((plan) => normal(plan.uri) === uri);
    const text = buffer && document(buffer.uri)?.getText();
    if (text !== undefined) return text;
    const known = onDisk.get(uri);
    if (known !== undefined) return known;
    const read = await files.read(root, path);
    if (TEXTS_REMEMBERED <= onDisk.size) onDisk.delete(onDisk.keys().next().value!);
    onDisk.set(uri, read);
    return read;
  };

  /** Null as soon as `isStale` says so. */
  const analyse = async (
    analyser: Analyser,
    source: Analysed['source'],
    root: string,
    isStale: () => boolean,
  ): Promise<{ analysed: Analysed; uses: ReadonlySet<string> } | null> => {
    const texts = new Map<string, string | null>();
    const uses = new Set<string>();
    for (let round = 0; ; round++) {
      const work = analyser.analyse(source, texts);
      let until = door.now() + SLICE;
      let turn = work.next();
      while (!turn.done) {
        if (until < door.now()) {
          await door.pause();
          if (isStale()) return null;
          until = door.now() + SLICE;
        }
        turn = work.next();
      }
      const analysed = turn.value;
      if (analysed.plan.needs.length === 0 || ROUNDS <= round) return { analysed, uses };
      for (const need of analysed.plan.needs) {
        uses.add(uriOf(root, need));
        texts.set(need, await textOf(root, need));
      }
      if (isStale()) return null;
    }
  };

  const analyserFor = async (root: string, uri: string, settings: EditorSettings) => {
    const configured = await configurations.of(root);
    const checks = settingsIn(configured, root, uri, settings.checks);
    return {
      key: JSON.stringify([configured.tables.version, checks]),
      create: () => door.createAnalyser(configured.tables, checks),
    };
  };

  const run = async (plan: OpenPlan, ticket: number, cause: Cause): Promise<Result | null> => {
    const isStale = () => plan.ticket !== ticket;
    const newest = () => (open.get(plan.uri) === plan ? plan.running : null);
    try {
      await door.pause();
      if (isStale()) return newest();
      const settings = await settingsOf(plan.uri);
      if (isStale()) return newest();
      const text = document(plan.uri);
      const language = text === undefined ? null : languageOf(text);
      if (text === undefined || language === null) return null;
      const { version } = text;
      const source = { file: pathOf(plan.root, plan.uri), text: text.getText(), language };
      const { key, create } = await analyserFor(plan.root, plan.uri, settings);
      if (isStale()) return newest();
      if (plan.analyser?.key !== key) plan.analyser = { key, analyser: create() };
      const done = await analyse(plan.analyser.analyser, source, plan.root, isStale);
      if (done === null || isStale()) return newest();
      plan.uses = done.uses;
      const { uri, root } = plan;
      const result = { uri, version, root, analysed: done.analysed, settings, cause };
      onResult(result);
      return result;
    } catch (error) {
      if (isStale()) return newest();
      onFailure(plan.uri, error);
      return null;
    }
  };

  const refresh = (plan: OpenPlan, cause: Cause) => {
    plan.ticket++;
    plan.running = run(plan, plan.ticket, cause);
  };

  const refreshUsersOf = (uri: string) => {
    const file = normal(uri);
    for (const plan of open.values()) if (plan.uses.has(file)) refresh(plan, 'surroundings');
  };

  const refreshAll = () => {
    onDisk.clear();
    configurations.clear();
    for (const plan of open.values()) {
      plan.root = files.rootOf(plan.uri, folders());
      refresh(plan, 'surroundings');
    }
  };

  return {
    opened(uri) {
      const text = document(uri);
      if (text === undefined || languageOf(text) === null) return;
      const plan: OpenPlan = {
        uri,
        root: files.rootOf(uri, folders()),
        ticket: 0,
        running: Promise.resolve(null),
        uses: new Set(),
        analyser: null,
      };
      open.set(uri, plan);
      refresh(plan, 'text');
      refreshUsersOf(uri);
    },
    changed(uri) {
      const plan = open.get(uri);
      if (plan !== undefined) refresh(plan, 'text');
      refreshUsersOf(uri);
    },
    closed(uri) {
      const plan = open.get(uri);
      if (plan !== undefined) plan.ticket++;
      open.delete(uri);
      onDisk.delete(normal(uri));
      refreshUsersOf(uri);
    },
    changedOnDisk(uri) {
      onDisk.delete(normal(uri));
      if (configurations.changedOnDisk(normal(uri)) || uri.endsWith(`/${CONFIGURATION_FILE}`)) {
        refreshAll();
        return;
      }
      refreshUsersOf(uri);
    },
    refreshAll,
    async current(uri) {
      return (await open.get(uri)?.running) ?? null;
    },
    async unopened(root, path) {
      const uri = uriOf(root, path);
      const text = await textOf(root, path);
      if (text === null) return null;
      const settings = await settingsOf(uri);
      const language = /\.(md|markdown)$/i.test(path) ? 'markdown' : 'lyate';
      const analyser = (await analyserFor(root, uri, settings)).create();
      const done = await analyse(analyser, { file: path, text, language }, root, () => false);
      return done && { uri, version: 0, root, analysed: done.analysed, settings, cause: 'surroundings' };
    },
    open: () => [...open.keys()],
  };
}
