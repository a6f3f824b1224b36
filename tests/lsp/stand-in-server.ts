/**
 * The real server with an analysis that only reads: for tests of the protocol, which need findings that never change.
 *
 * Findings are those of the text family; the tables are the few rows of the route tests.
 */
import { createConnection, ProposedFeatures } from 'vscode-languageserver/node';
import type { Analyser } from '../../server/src/answers/analyse.ts';
import type { Analysed } from '../../server/src/answers/types.ts';
import type { Finding } from '../../server/src/checks/finding.ts';
import type { Settings } from '../../server/src/checks/settings.ts';
import { nodeFiles } from '../../server/src/lsp/node-files.ts';
import { startServer } from '../../server/src/lsp/server.ts';
import type { TextProblem } from '../../server/src/route/plan.ts';
import { createPlanReader } from '../../server/src/route/resolve.ts';
import type { Tables } from '../../server/src/tables/tables.ts';
import { SMALL_TABLES } from '../route/small-tables.ts';

function readOnly(tables: Tables, settings: Settings): Analyser {
  const reader = createPlanReader(tables, settings);
  return {
    *analyse(source, files) {
      if (source.text.includes('note "break"')) throw new Error('broken on purpose');
      const plan = reader.resolve(source, files);
      const findings: Finding[] = plan.problems.map((problem) => toFinding(problem, null, 0));
      const steps = [];
      for (const step of plan.steps) {
        for (const problem of step.problems) findings.push(toFinding(problem, step.label, step.firstLine));
        const facts = {
          step,
          additions: [],
          moments: [],
          transfers: [],
          conversions: [],
          left: null,
          tables,
          settings,
        };
        steps.push({ facts, findings: [] });
        yield;
      }
      const kept = findings.filter(({ check }) => settings.severities[check] !== 'off');
      return { source, plan, steps, findings: kept, tables, settings } as unknown as Analysed;
    },
  };
}

function toFinding(
  { check, range, message, related, severity }: TextProblem,
  step: string | null,
  lines: number,
): Finding {
  const down = (place: TextProblem['range']) => ({
    start: { ...place.start, line: place.start.line + lines },
    end: { ...place.end, line: place.end.line + lines },
  });
  return {
    check,
    severity: severity ?? 'error',
    confidence: 1,
    step,
    range: down(range),
    message,
    figures: {},
    related: related ?? [],
    accepted: false,
    reason: null,
  };
}

startServer(createConnection(ProposedFeatures.all), {
  tables: () => SMALL_TABLES,
  createAnalyser: readOnly,
  files: nodeFiles,
  pause: () => new Promise((resolve) => setImmediate(resolve)),
  now: () => performance.now(),
});
