/**
 * `lyate check --ndjson`: one plan a line in, one answer a line out, in order and one for one.
 *
 * Invariants:                                                              (tests/cli/archive.test.ts)
 *  1. However many workers there are, the output is the same.
 *  2. Only so many records are held at a time as the workers have in hand.
 */
import { closeSync, createReadStream, fstatSync, openSync, readSync, statSync, truncateSync } from 'node:fs';
import { join } from 'node:path';
import { createRecordAnswers } from './record-answer.ts';
import { LINE_FEED, linesOf, write } from './streams.ts';

type Line = string | null;

export interface RecordOptions {
  readonly jobs: number;
  /** Output of an earlier run; records whose ids it answers are passed over. */
  readonly skipDone?: string;
}

/** Records handed to a worker at once, so that talking to it costs little beside the work. */
const BATCH = 32;
/** Batches in hand for each worker, so that none waits for the next. */
const IN_HAND = 3;

/** MB of a worker's heap; a record needs some ten, tables and caches two hundred. */
const WORKER_MEMORY = 320;

/** Answers every record; a bad one gets an error of its own and the run goes on. */
export async function checkRecords({ jobs, skipDone }: RecordOptions): Promise<number> {
  const done = skipDone === undefined ? new Set<string>() : await idsIn(skipDone);
  if (jobs === 1) {
    const answer = createRecordAnswers();
    for await (const line of openRecords(done)) await write(`${answer(line)}\n`);
    return 0;
  }
  // Loaded here, because only this one command needs it and it brings a file of its own.
  const { Tinypool } = await import('tinypool');
  const pool = new Tinypool({
    filename: join(__dirname, 'records-worker.cjs'),
    minThreads: jobs,
    maxThreads: jobs,
    runtime: 'worker_threads',
    // Keeps each worker tidy: without it the memory of a long run only ever grows.
    resourceLimits: { maxOldGenerationSizeMb: WORKER_MEMORY },
  });
  const waiting: Promise<string[]>[] = [];
  const writeFirst = async () => {
    const answers = await waiting.shift()!;
    await write(answers.map((answer) => `${answer}\n`).join(''));
  };
  for await (const batch of batches(openRecords(done))) {
    waiting.push(answersTo(batch, (lines) => pool.run(lines)));
    if (jobs * IN_HAND <= waiting.length) await writeFirst();
  }
  while (waiting.length !== 0) await writeFirst();
  await pool.destroy();
  return 0;
}

/** Answers of a batch, whatever happens; where it takes its worker down, each record is tried alone, so that only the bad one is lost. */
export async function answersTo(
  batch: readonly Line[],
  run: (lines: readonly Line[]) => Promise<string[]>,
): Promise<string[]> {
  try {
    return await run(batch);
  } catch (error) {
    if (batch.length !== 1) {
      const answers: string[] = [];
      for (const line of batch) answers.push(...(await answersTo([line], run)));
      return answers;
    }
    const id = JSON.parse(idOf(batch[0] ?? '') ?? 'null');
    return [JSON.stringify({ id, error: `this record could not be worked on: ${(error as Error).message}` })];
  }
}

async function* openRecords(done: ReadonlySet<string>): AsyncGenerator<Line> {
  for await (const line of linesOf(process.stdin)) {
    if (line?.trim() === '') continue;
    if (done.size !== 0 && line !== null && done.has(idOf(line) ?? '')) continue;
    yield line;
  }
}

async function* batches(lines: AsyncIterable<Line>): AsyncGenerator<Line[]> {
  let batch: Line[] = [];
  for await (const line of lines) {
    batch.push(line);
    if (batch.length < BATCH) continue;
    yield batch;
    batch = [];
  }
  if (batch.length !== 0) yield batch;
}

/** Ids of the answers of an earlier run; where this run goes on writing to that very file, its last half line is taken off. */
async function idsIn(file: string): Promise<Set<string>> {
  const ids = new Set<string>();
  for await (const line of linesOf(createReadStream(file))) {
    const id = line === null ? null : idOf(line);
    if (id !== null) ids.add(id);
  }
  const [out, kept] = [fstatSync(process.stdout.fd), statSync(file)];
  if (out.ino === kept.ino && out.dev === kept.dev) truncateSync(file, endOfLastLine(file, kept.size));
  return ids;
}

/** Where the last whole line of a file ends, looked for from behind. */
function endOfLastLine(file: string, size: number): number {
  const opened = openSync(file, 'r');
  try {
    const part = Buffer.alloc(1 << 16);
    for (let end = size; 0 < end; ) {
      const start = Math.max(0, end - part.length);
      const count = readSync(opened, part, 0, end - start, start);
      const found = part.subarray(0, count).lastIndexOf(LINE_FEED);
      if (found !== -1) return start + found + 1;
      end = start;
    }
    return 0;
  } finally {
    closeSync(opened);
  }
}

/** The id of a record or an answer as text that tells 1 from "1"; null where there is none. */
function idOf(line: string): string | null {
  try {
    const { id } = JSON.parse(line) as { id?: unknown };
    return id === undefined || id === null ? null : JSON.stringify(id);
  } catch {
    return null;
  }
}
