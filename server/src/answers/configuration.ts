/**
 * Reads `lyate.json`, and says which settings hold for a plan.
 *
 * Knows: text, settings.  Must not know: files, the editor.
 * Invariants:                                                              (tests/answers/configuration.test.ts)
 *  1. Never throws; an entry that cannot be read is left out and named at its place, the others hold.
 *  2. Names are compared, never used to reach into an object, so no name can stand for something built in.
 */
import { type Node, type ParseError, parseTree, printParseErrorCode } from 'jsonc-parser';
import picomatch from 'picomatch';
import { DEFAULT_SETTINGS, type Settings, type Thresholds } from '../checks/settings.ts';
import type { Position, Range, TextProblem } from '../route/plan.ts';
import { CONFIGURATION_SCHEMA, type SchemaNode } from './configuration-schema.ts';
import type { HouseKind } from './house.ts';
import { nearestOf } from './nearest.ts';

/** Name of the file in its folder. */
export const CONFIGURATION_FILE = 'lyate.json';

/** Settings that an entry names; the others stay as they are. */
interface PartialSettings {
  readonly severities?: Settings['severities'];
  readonly thresholds?: Partial<Thresholds>;
  readonly concentration?: number;
}

export interface NamedFile {
  readonly kind: HouseKind;
  readonly path: string;
  readonly range: Range;
}

export interface Configuration {
  readonly settings: PartialSettings;
  readonly overrides: readonly { readonly files: readonly string[]; readonly settings: PartialSettings }[];
  readonly ignore: readonly string[];
  readonly houseFiles: readonly NamedFile[];
}

const NOTHING: Configuration = { settings: {}, overrides: [], ignore: [], houseFiles: [] };
const KINDS: readonly HouseKind[] = ['values', 'reagents', 'solvents'];

/** What a configuration says, and what is wrong with it. */
export function readConfiguration(text: string): { configuration: Configuration; problems: TextProblem[] } {
  const errors: ParseError[] = [];
  const body = text.startsWith('\ufeff') ? ` ${text.slice(1)}` : text;
  const tree = treeOf(body, errors);
  const place = placesOf(text);
  const problems: TextProblem[] = errors
    .slice(0, 1)
    .map(({ error, offset, length }) =>
      bad(place(offset, length), `This is no JSON: ${wordsOf(printParseErrorCode(error))}.`),
    );
  if (tree === 'too deep') problems.push(bad(place(0, 1), 'This is nested too deeply to be read.'));
  if (tree === undefined || tree === 'too deep') return { configuration: NOTHING, problems };
  const good = examine(tree, CONFIGURATION_SCHEMA, [], (node, message) =>
    problems.push(bad(place(node.offset, node.length), message)),
  );
  if (good === undefined) return { configuration: NOTHING, problems };
  return { configuration: configurationOf(good as Entry, tree, place), problems };
}

/** The settings that hold for a plan; `path` is relative to the folder of the configuration, with `/`. */
export function settingsFor({ settings, overrides }: Configuration, path: string): Settings {
  const holding = overrides.filter(({ files }) => isMatch(path, files));
  return [settings, ...holding.map((each) => each.settings)].reduce(
    (all: Settings, { severities, thresholds, concentration }) => ({
      severities: { ...all.severities, ...severities },
      thresholds: { ...all.thresholds, ...thresholds },
      concentration: concentration ?? all.concentration,
    }),
    DEFAULT_SETTINGS,
  );
}

function treeOf(text: string, errors: ParseError[]): Node | undefined | 'too deep' {
  try {
    return parseTree(text, errors, { disallowComments: true, allowEmptyContent: false });
  } catch {
    // The reader calls itself for each level, so brackets without end use up its stack.
    return 'too deep';
  }
}

/** Whether a path matches one of the globs; one without a slash matches in every folder. */
function isMatch(path: string, globs: readonly string[]): boolean {
  return globs.some((glob) => {
    const bare = glob.replace(/^\.\//, '').replace(/\/$/, '');
    const pattern = bare.includes('/') ? bare.replace(/^\//, '') : `**/${bare}`;
    return picomatch.isMatch(path, [pattern, `${pattern}/**`], { dot: true, windows: false });
  });
}

type Entry = ReadonlyMap<string, unknown>;

function configurationOf(
  entry: Entry,
  tree: Node,
  place: (offset: number, length: number) => Range,
): Configuration {
  const overrides = (entry.get('overrides') ?? []) as readonly Entry[];
  const houseFiles = KINDS.flatMap((kind) => {
    const list = valueAt(tree, kind)?.children ?? [];
    return list
      .filter(({ type, value }) => type === 'string' && value !== '')
      .map(({ value, offset, length }) => ({ kind, path: String(value), range: place(offset, length) }));
  });
  return {
    settings: partialOf(entry),
    overrides: overrides.map((each) => ({
      files: (each.get('files') ?? []) as readonly string[],
      settings: partialOf(each),
    })),
    ignore: (entry.get('ignore') ?? []) as readonly string[],
    houseFiles: entry.size === 0 ? [] : houseFiles,
  };
}

function partialOf(entry: Entry): PartialSettings {
  const severities = entry.get('severities') as Entry | undefined;
  const thresholds = entry.get('thresholds') as Entry | undefined;
  const concentration = entry.get('concentration') as number | undefined;
  return {
    ...(severities ? { severities: Object.fromEntries(severities) as Settings['severities'] } : {}),
    ...(thresholds ? { thresholds: Object.fromEntries(thresholds) as Partial<Thresholds> } : {}),
    ...(concentration === undefined ? {} : { concentration }),
  };
}

/** The value of a node as far as it fits the schema: maps for objects; undefined where it does not fit at all. */
function examine(
  node: Node,
  schema: SchemaNode,
  path: readonly string[],
  report: (node: Node, message: string) => void,
): unknown {
  const name = path.length === 0 ? 'The configuration' : path.join('.');
  if (node.type !== schema.type) {
    report(node, `${name} must be ${ARTICLE[schema.type]}, not ${ARTICLE[node.type] ?? node.type}.`);
    return undefined;
  }
  switch (schema.type) {
    case 'object':
      return examineObject(node, schema, path, report);
    case 'array':
      return (node.children ?? []).flatMap((child, place) => {
        const value = examine(child, schema.items!, [...path, String(place)], report);
        return value === undefined ? [] : [value];
      });
    default: {
      const fault = faultOf(node.value as string | number, schema);
      if (fault === null) return node.value;
      report(node, `${name} ${fault}.`);
      return undefined;
    }
  }
}

function examineObject(
  node: Node,
  schema: SchemaNode,
  path: readonly string[],
  report: (node: Node, message: string) => void,
): Entry | undefined {
  const properties = new Map(Object.entries(schema.properties ?? {}));
  const found = new Map<string, unknown>();
  const seen = new Set<string>();
  for (const { children } of node.children ?? []) {
    const [key, value] = children ?? [];
    if (key === undefined || value === undefined) continue;
    const word = String(key.value);
    const property = properties.get(word);
    if (property === undefined) {
      const [near] = nearestOf(properties.keys(), word);
      const hint = near === undefined ? '' : ` Is ${near} meant?`;
      report(key, `There is no entry "${word}"${path.length === 0 ? '' : ` in ${path.join('.')}`}.${hint}`);
      continue;
    }
    if (seen.has(word)) report(key, `"${word}" stands twice; the last one holds.`);
    seen.add(word);
    const good = examine(value, property, [...path, word], report);
    if (good !== undefined) found.set(word, good);
  }
  const missing = (schema.required ?? []).filter((word) => !seen.has(word));
  for (const word of missing) report(node, `${path.join('.')} needs an entry "${word}".`);
  return missing.length === 0 ? found : undefined;
}

function faultOf(
  value: string | number,
  { enum: of, minLength, minimum, maximum }: SchemaNode,
): string | null {
  if (typeof value === 'string') {
    if (of !== undefined && !of.includes(value)) return `must be one of ${of.join(', ')}`;
    return value.length < (minLength ?? 0) ? 'must not be empty' : null;
  }
  if (!Number.isFinite(value)) return 'must be a number that there is';
  if (minimum !== undefined && value < minimum) return `must not be below ${minimum}`;
  return maximum !== undefined && maximum < value ? `must not be above ${maximum}` : null;
}

const ARTICLE: Readonly<Record<string, string>> = {
  object: 'an object',
  array: 'a list',
  string: 'a text',
  number: 'a number',
  boolean: 'true or false',
  null: 'null',
};

/** "CommaExpected" as words: "comma expected". */
function wordsOf(code: string): string {
  return code.replace(/([a-z])([A-Z])/g, '$1 $2').toLowerCase();
}

/** The last value that an object gives a word. */
function valueAt(tree: Node, word: string): Node | undefined {
  const entries = (tree.children ?? []).filter(({ children }) => children?.[0]?.value === word);
  return entries.at(-1)?.children?.[1];
}

function bad(range: Range, message: string): TextProblem {
  return { check: 'bad-configuration', range, message };
}

/** Ranges by offset and length, both in UTF-16. */
function placesOf(text: string): (offset: number, length: number) => Range {
  const starts = [0];
  for (const { index, 0: end } of text.matchAll(/\r\n|\n|\r/g)) starts.push(index + end.length);
  const at = (offset: number): Position => {
    const within = Math.min(offset, text.length);
    let [line, after] = [0, starts.length];
    while (line + 1 < after) {
      const middle = (line + after) >> 1;
      if (starts[middle]! <= within) line = middle;
      else after = middle;
    }
    return { line, character: within - starts[line]! };
  };
  return (offset, length) => ({ start: at(offset), end: at(offset + Math.max(1, length)) });
}
