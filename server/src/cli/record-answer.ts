/** The answer to one record of an archive: its findings, or why there are none. */
import { type Analyser, analyseNow, createAnalyser } from '../answers/analyse.ts';
import { createPlanDesk } from '../host/configured.ts';
import { plainFinding } from '../report/json.ts';

/** Name of the plan in a record; it stands as if in the current folder, under its configuration. */
const NAME = 'record.lyate';

/** Records hardly ever repeat a step, and a step holds its whole flask. */
const STEPS_REMEMBERED = 32;

/** Answers lines, each with a line; never throws. */
export function createRecordAnswers(): (line: string | null) => string {
  let analyser: Analyser | undefined;
  const analyse = (text: string) => {
    if (analyser === undefined) {
      const { configured, settings } = createPlanDesk().surroundings(NAME);
      analyser = createAnalyser(configured.tables, settings, STEPS_REMEMBERED);
    }
    return analyseNow(analyser, { file: NAME, text, language: 'lyate' });
  };
  return (line) => JSON.stringify(answer(line));

  function answer(line: string | null): object {
    if (line === null) return { id: null, error: 'not UTF-8 text' };
    let id: unknown = null;
    try {
      const record: unknown = JSON.parse(line);
      if (typeof record !== 'object' || record === null || Array.isArray(record))
        return { id, error: 'not a JSON object' };
      const { id: given, text } = record as { id?: unknown; text?: unknown };
      id = given ?? null;
      if (typeof text !== 'string') return { id, error: 'the record has no "text"' };
      return { id, findings: analyse(text).findings.map(plainFinding) };
    } catch (error) {
      return { id, error: error instanceof SyntaxError ? 'not JSON' : String(error) };
    }
  }
}
