/**
 * Brings a configuration and the files that it names together with the tables.
 *
 * Knows: configurations, house rows.  Must not know: how a file is read; it asks for texts and is handed them.
 * Invariants:
 *  1. Editor and command line both run this and nothing else, so they agree.        (tests/lsp/configuration.test.ts)
 *  2. A house file never lies outside the folder of the configuration.              (tests/host/configured.test.ts)
 */
import type { Finding } from '../checks/finding.ts';
import { DEFAULT_SETTINGS, type Settings } from '../checks/settings.ts';
import type { TextProblem } from '../route/plan.ts';
import { digest } from '../route/resolve.ts';
import { joinPath } from '../route/use.ts';
import { type Tables, withHouseRows } from '../tables/tables.ts';
import {
  CONFIGURATION_FILE,
  type Configuration,
  type NamedFile,
  readConfiguration,
  settingsFor,
} from './configuration.ts';
import { type HouseFile, readHouse } from './house.ts';

/** A file that stands behind the analysis, with what is wrong in it. */
export interface ReadFile {
  /** Relative to the folder of the configuration, with `/`. */
  readonly file: string;
  readonly text: string;
  readonly findings: readonly Finding[];
}

export interface Configured {
  readonly tables: Tables;
  /** Null where there is no `lyate.json`. */
  readonly configuration: Configuration | null;
  readonly files: readonly ReadFile[];
  /** Every path that was asked for, so that a host knows what to watch. */
  readonly asked: readonly string[];
}

/** Asks for the texts of files by their paths below the root; handed null where one cannot be had. */
export type Asking<Answer> = Generator<string, Answer, string | null>;

/** What holds below a root, worked out from its files. */
export function* configure(tables: Tables): Asking<Configured> {
  const text = yield CONFIGURATION_FILE;
  const asked = [CONFIGURATION_FILE];
  if (text === null) return { tables, configuration: null, files: [], asked };
  const { configuration, problems } = readConfiguration(text);
  const house: HouseFile[] = [];
  for (const named of configuration.houseFiles) {
    const place = joinPath(CONFIGURATION_FILE, named.path);
    const content = place === null ? null : yield place;
    if (place !== null) asked.push(place);
    if (place === null || content === null) problems.push(missing(named, place));
    else if (!house.some(({ file }) => file === place))
      house.push({ kind: named.kind, file: place, text: content });
  }
  const read = readHouse(house, tables);
  const mark = digest(JSON.stringify(house));
  return {
    tables: house.length === 0 ? tables : withHouseRows(tables, read.rows, mark),
    configuration,
    files: [
      { file: CONFIGURATION_FILE, text, findings: problems.map(findingOf) },
      ...house.map((each) => ({
        file: each.file,
        text: each.text,
        findings: (read.problems.get(each.file) ?? []).map(findingOf),
      })),
    ],
    asked,
  };
}

/**
 * The settings of one plan; `path` is relative to the root.
 *
 * Where there is a configuration nothing else counts, so that a plan is judged alike for everybody who opens it.
 */
export function settingsOf(
  { configuration }: Configured,
  path: string,
  elsewhere: Settings = DEFAULT_SETTINGS,
): Settings {
  return configuration === null ? elsewhere : settingsFor(configuration, path);
}

function missing({ path, range }: NamedFile, place: string | null): TextProblem {
  const message =
    place === null
      ? `"${path}" leads out of the folder of this file.`
      : `"${path}" is not there or cannot be read.`;
  return { check: 'bad-configuration', range, message };
}

function findingOf({ check, range, message }: TextProblem): Finding {
  return {
    check,
    severity: 'error',
    confidence: 1,
    step: null,
    range,
    message,
    figures: {},
    related: [],
    accepted: false,
    reason: null,
  };
}
