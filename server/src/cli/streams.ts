/** Standard input, whole and line by line. */
import { createInterface } from 'node:readline';

/** All of standard input as text. */
export async function readStandardInput(): Promise<string> {
  const parts: Buffer[] = [];
  for await (const part of process.stdin) parts.push(part as Buffer);
  return Buffer.concat(parts).toString('utf8');
}

/** Calls back for each line and writes the answer, in order, waiting where the reader of the output is slow. */
export async function answerLines(answer: (line: string) => string): Promise<void> {
  const lines = createInterface({ input: process.stdin, crlfDelay: Number.POSITIVE_INFINITY });
  for await (const line of lines) {
    if (line.trim() === '') continue;
    if (!process.stdout.write(`${answer(line)}\n`))
      await new Promise<void>((done) => process.stdout.once('drain', done));
  }
}
