/**
 * Standard input, whole and line by line, as text that is surely UTF-8.
 *
 * Invariant: holds one line and one part of the stream at a time.   (tests/cli/archive.test.ts)
 */
import { once } from 'node:events';

export const LINE_FEED = 0x0a;

/** All of standard input as text. @throws Error where it is not UTF-8 */
export async function readStandardInput(): Promise<string> {
  const parts: Buffer[] = [];
  for await (const part of process.stdin) parts.push(part as Buffer);
  const text = decoded(Buffer.concat(parts));
  if (text === null) throw new Error('standard input is not UTF-8 text');
  return text;
}

/** The lines of a stream without their ends; null for one that is not UTF-8.  Only the line feed ends a line. */
export async function* linesOf(stream: AsyncIterable<Buffer>): AsyncGenerator<string | null> {
  let rest: Buffer[] = [];
  for await (const part of stream) {
    let start = 0;
    for (let end = part.indexOf(LINE_FEED); end !== -1; end = part.indexOf(LINE_FEED, start)) {
      rest.push(part.subarray(start, end));
      yield decoded(Buffer.concat(rest));
      rest = [];
      start = end + 1;
    }
    if (start < part.length) rest.push(part.subarray(start));
  }
  if (rest.length !== 0) yield decoded(Buffer.concat(rest));
}

/** Writes and waits where the reader of the output is slow. */
export async function write(text: string): Promise<void> {
  if (!process.stdout.write(text)) await once(process.stdout, 'drain');
}

/** Calls back for each line that is not blank and writes the answer, in order. */
export async function answerLines(answer: (line: string) => string): Promise<void> {
  for await (const line of linesOf(process.stdin)) {
    if (line?.trim() === '') continue;
    await write(`${answer(line ?? '')}\n`);
  }
}

function decoded(bytes: Buffer): string | null {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    return null;
  }
}
