/** Entry of a worker that answers records; one set of tables and caches a worker. */
import { createRecordAnswers } from './record-answer.ts';

const answer = createRecordAnswers();

/** Answers of some lines, in their order. */
export default function answerAll(lines: readonly (string | null)[]): string[] {
  return lines.map(answer);
}
