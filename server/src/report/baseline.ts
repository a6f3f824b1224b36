/**
 * What was found before and is known: new findings are told from those, and those from what is gone.
 *
 * Knows: findings and the text of their lines.  Must not know: line numbers, where a baseline is kept.
 * Invariant: lines added, moved or taken away elsewhere change no match.   (tests/report/baseline.test.ts)
 */
import type { Finding } from '../checks/finding.ts';
import { fingerprint } from './fingerprint.ts';
import type { FileFindings } from './summary.ts';

/** Findings of one file that share check, step and text of the line. */
export interface KnownFinding {
  readonly check: string;
  readonly step: string | null;
  readonly fingerprint: string;
  readonly count: number;
}

export interface Baseline {
  readonly version: 1;
  readonly files: readonly { readonly file: string; readonly findings: readonly KnownFinding[] }[];
}

export interface Compared {
  /** With what is new as findings and the rest as known. */
  readonly files: readonly FileFindings[];
  readonly gone: readonly (KnownFinding & { readonly file: string })[];
}

/** The baseline of what was found; what is accepted in the plan needs none. */
export function baselineOf(files: readonly FileFindings[]): Baseline {
  const entries = files.map(({ file, text, findings }) => {
    const lines = text.split(/\r\n|\n|\r/);
    const known = new Map<string, KnownFinding>();
    for (const finding of findings.filter(({ accepted }) => !accepted)) {
      const print = fingerprint(finding, lines);
      const { check, step } = finding;
      known.set(print, { check, step, fingerprint: print, count: (known.get(print)?.count ?? 0) + 1 });
    }
    return { file, findings: [...known.values()] };
  });
  const filled = entries.filter(({ findings }) => findings.length !== 0);
  return { version: 1, files: filled.sort((a, b) => (a.file < b.file ? -1 : 1)) };
}

/** Reads a baseline. @throws Error in words where it is none */
export function readBaseline(text: string): Baseline {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch {
    throw new Error('is no JSON');
  }
  if (!isBaseline(value)) throw new Error('is no baseline of this version');
  return value;
}

/** Tells what is new; what is gone is looked for only in files that were checked or are no more. */
export function compareWith(
  baseline: Baseline,
  files: readonly FileFindings[],
  isThere: (file: string) => boolean,
): Compared {
  const left = new Map(
    baseline.files.map(({ file, findings }) => [
      file,
      new Map(findings.map((known) => [known.fingerprint, { ...known }])),
    ]),
  );
  const compared = files.map((each): FileFindings => {
    const known = left.get(each.file);
    if (known === undefined) return each;
    const lines = each.text.split(/\r\n|\n|\r/);
    const [fresh, old]: [Finding[], Finding[]] = [[], []];
    for (const finding of each.findings) {
      const entry = finding.accepted ? undefined : known.get(fingerprint(finding, lines));
      if (entry === undefined || entry.count === 0) fresh.push(finding);
      else {
        known.set(entry.fingerprint, { ...entry, count: entry.count - 1 });
        old.push(finding);
      }
    }
    return { ...each, findings: fresh, known: old };
  });
  const checked = new Set(files.map(({ file }) => file));
  const gone = [...left].flatMap(([file, known]) =>
    checked.has(file) || !isThere(file)
      ? [...known.values()].filter(({ count }) => 0 < count).map((each) => ({ ...each, file }))
      : [],
  );
  return { files: compared, gone };
}

function isBaseline(value: unknown): value is Baseline {
  const { version, files } = (value ?? {}) as { version?: unknown; files?: unknown };
  return version === 1 && Array.isArray(files) && files.every(isEntry);
}

function isEntry(value: unknown): boolean {
  const { file, findings } = (value ?? {}) as { file?: unknown; findings?: unknown };
  return typeof file === 'string' && Array.isArray(findings) && findings.every(isKnown);
}

function isKnown(value: unknown): boolean {
  const { check, fingerprint: print, count } = (value ?? {}) as Partial<KnownFinding>;
  return typeof check === 'string' && typeof print === 'string' && Number.isInteger(count);
}
