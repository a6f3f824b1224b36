/** Reads the plans that a command was asked about, and says on standard error what cannot be read. */
import { readText } from '../host/files.ts';
import { findPlans } from '../host/paths.ts';
import { plainLine } from '../report/plain.ts';

export interface Source {
  readonly file: string;
  readonly text: string;
}

/** The text of every plan that can be read; `failed` where some cannot. */
export function readAll(paths: readonly string[]): { sources: Source[]; failed: boolean } {
  const { files, missing } = findPlans(paths.length === 0 ? ['.'] : paths);
  let failed = missing.length !== 0;
  for (const path of missing) process.stderr.write(`lyate: ${plainLine(path)} does not exist\n`);
  const sources: Source[] = [];
  for (const file of files) {
    const { text, problem } = readText(file);
    if (text === undefined) {
      process.stderr.write(`lyate: ${plainLine(file)} ${problem}\n`);
      failed = true;
    } else {
      sources.push({ file, text });
    }
  }
  return { sources, failed };
}
