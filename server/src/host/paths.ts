/**
 * Finds the plans among files, folders and globs, with ignore files respected.
 *
 * Must not know: what a plan means.
 */
import { statSync } from 'node:fs';
import { join, relative, resolve, sep } from 'node:path';
import ignore, { type Ignore } from 'ignore';
import { globSync } from 'tinyglobby';
import { CONFIGURATION_FILE, readConfiguration } from '../answers/configuration.ts';
import { readText, workspaceOf } from './files.ts';

const PLANS = ['**/*.lyate', '**/*.md', '**/*.markdown'];
const NEVER = ['**/node_modules/**', '**/.git/**'];

export interface FoundPlans {
  /** As given, or below the folder as given. */
  readonly files: readonly string[];
  /** What was asked for and matches nothing. */
  readonly missing: readonly string[];
}

/** Whether a file is Markdown with plans in fences rather than a plan by itself. */
export function languageOf(file: string): 'lyate' | 'markdown' {
  return /\.(md|markdown)$/i.test(file) ? 'markdown' : 'lyate';
}

/**
 * Files are taken as they are, folders searched for plans and for Markdown, anything else read as a glob.
 * `.gitignore`, `.lyateignore` and `ignore` of `lyate.json` between the workspace and a folder hold for what is
 * searched, not for files named.
 */
export function findPlans(asked: readonly string[]): FoundPlans {
  const files = new Set<string>();
  const missing: string[] = [];
  for (const path of asked) {
    const stats = statSync(path, { throwIfNoEntry: false });
    if (stats?.isDirectory()) {
      for (const file of search(PLANS, path)) files.add(join(path, file));
    } else if (stats !== undefined) {
      files.add(path);
    } else {
      const found = isGlob(path) ? search([path.split(sep).join('/')], '.') : [];
      for (const file of found) files.add(file);
      if (found.length === 0) missing.push(path);
    }
  }
  return { files: [...files], missing };
}

function isGlob(path: string): boolean {
  return /[*?{[]/.test(path);
}

function search(patterns: readonly string[], folder: string): string[] {
  const found = globSync([...patterns], {
    cwd: folder,
    ignore: NEVER,
    dot: false,
    onlyFiles: true,
    expandDirectories: false,
  });
  const root = workspaceOf(join(resolve(folder), 'any'));
  const rules = new Map<string, Ignore>();
  return found.filter((file) => !isIgnored(root, resolve(folder, file), rules)).sort();
}

/** Whether an ignore file at or above a file, up to the workspace, names it. */
function isIgnored(root: string, file: string, rules: Map<string, Ignore>): boolean {
  const parts = relative(root, file).split(sep);
  for (let depth = 0; depth < parts.length; depth++) {
    const folder = join(root, ...parts.slice(0, depth));
    let rule = rules.get(folder);
    if (rule === undefined) {
      rule = rulesOf(folder);
      rules.set(folder, rule);
    }
    if (rule.ignores(parts.slice(depth).join('/'))) return true;
  }
  return false;
}

function rulesOf(folder: string): Ignore {
  const rules = ignore();
  for (const name of ['.gitignore', '.lyateignore']) rules.add(textOf(join(folder, name)));
  const configuration = textOf(join(folder, CONFIGURATION_FILE));
  if (configuration !== '') rules.add([...readConfiguration(configuration).configuration.ignore]);
  return rules;
}

function textOf(file: string): string {
  return readText(file).text ?? '';
}
