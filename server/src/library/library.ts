/**
 * The door for programs: `import { analyse } from 'lyate'`.
 *
 * Knows: the analysis and the built tables.  Must not know: files, the protocol.
 * Invariant: what is given out is plain data of its own; changing it changes no later answer.   (tests/library.test.ts)
 */
import { type Analyser, analyseNow, createAnalyser } from '../answers/analyse.ts';
import { flaskStates } from '../answers/flask-states.ts';
import { DEFAULT_SETTINGS, type Settings } from '../checks/settings.ts';
import { builtTables } from '../host/tables.ts';
import { plainFinding } from '../report/json.ts';
import type { Analysis, Options } from './types.ts';

export type * from './types.ts';

const MOST_ANALYSERS = 16;
const analysers = new Map<string, Analyser>();

/**
 * Analyses a plan. Never throws for what a plan says; what is wrong with it is a finding.
 *
 * @throws TypeError where the text is no string
 */
export function analyse(text: string, options: Options = {}): Analysis {
  if (typeof text !== 'string') throw new TypeError('the text of a plan must be a string');
  const { language = 'lyate', file = 'plan.lyate', files = {} } = options;
  const texts = new Map<string, string | null>(Object.entries(files));
  const source = { file, text, language };
  const analyser = analyserFor(settingsOf(options));
  let analysed = analyseNow(analyser, source, texts);
  const needs = new Set<string>();
  while (analysed.plan.needs.length !== 0) {
    for (const need of analysed.plan.needs) {
      needs.add(need);
      texts.set(need, null);
    }
    analysed = analyseNow(analyser, source, texts);
  }
  const done = analysed;
  return {
    findings: structuredClone(done.findings.map(plainFinding)),
    steps: done.plan.steps.map(({ label }) => label),
    needs: [...needs],
    flask: (step) => flaskStates(done, step),
  };
}

function settingsOf({ severities, thresholds, concentration }: Options): Settings {
  return {
    severities: { ...severities },
    thresholds: { ...DEFAULT_SETTINGS.thresholds, ...thresholds },
    concentration: concentration ?? DEFAULT_SETTINGS.concentration,
  };
}

/** One for each set of settings, so that steps are remembered from call to call. */
function analyserFor(settings: Settings): Analyser {
  const key = JSON.stringify(settings);
  let analyser = analysers.get(key);
  if (analyser === undefined) {
    analyser = createAnalyser(builtTables(), settings);
    analysers.set(key, analyser);
    if (MOST_ANALYSERS < analysers.size) analysers.delete(analysers.keys().next().value!);
  }
  return analyser;
}
