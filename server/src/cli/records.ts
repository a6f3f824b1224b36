/** `lyate check --ndjson`: one plan a line in, one answer a line out, in order and one for one. */
import { analyseNow, createAnalyser } from '../answers/analyse.ts';
import { builtTables } from '../host/tables.ts';
import { plainFinding } from '../report/json.ts';
import { answerLines } from './streams.ts';

/** Answers every record; a bad one gets an error of its own and the run goes on. */
export async function checkRecords(): Promise<number> {
  const analyser = createAnalyser(builtTables());
  await answerLines((line) => JSON.stringify(answer(line)));
  return 0;

  function answer(line: string): object {
    let id: unknown = null;
    try {
      const record: unknown = JSON.parse(line);
      if (typeof record !== 'object' || record === null || Array.isArray(record))
        return { id, error: 'not a JSON object' };
      const { id: given, text } = record as { id?: unknown; text?: unknown };
      id = given ?? null;
      if (typeof text !== 'string') return { id, error: 'the record has no "text"' };
      const { findings } = analyseNow(analyser, { file: 'record.lyate', text, language: 'lyate' });
      return { id, findings: findings.map(plainFinding) };
    } catch (error) {
      return { id, error: error instanceof SyntaxError ? 'not JSON' : String(error) };
    }
  }
}
