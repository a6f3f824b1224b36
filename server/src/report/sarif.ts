/**
 * Findings as SARIF 2.1.0, for the code review of a hosting service.
 *
 * Knows: findings and the pages of checks.  Must not know: files on disk.
 * Sources: OASIS SARIF 2.1.0.
 */
import { explanation } from '../answers/explain.ts';
import type { CheckPages } from '../checks/define.ts';
import type { Finding, Severity } from '../checks/finding.ts';
import type { Range } from '../route/plan.ts';
import { fingerprint } from './fingerprint.ts';
import type { FileFindings } from './summary.ts';

const LEVELS: Record<Severity, 'error' | 'warning' | 'note'> = {
  error: 'error',
  warning: 'warning',
  information: 'note',
  hint: 'note',
};

/** One run of the program over the given files. */
export function sarifReport(
  files: readonly FileFindings[],
  checks: readonly CheckPages[],
  version: string,
): string {
  const places = new Map(checks.map(({ name }, index) => [name, index]));
  const log = {
    $schema: 'https://docs.oasis-open.org/sarif/sarif/v2.1.0/os/schemas/sarif-schema-2.1.0.json',
    version: '2.1.0',
    runs: [
      {
        tool: { driver: { name: 'lyate', version, semanticVersion: version, rules: checks.map(rule) } },
        columnKind: 'utf16CodeUnits',
        artifacts: files.map(({ file }) => ({ location: { uri: uriOf(file) }, roles: ['analysisTarget'] })),
        results: files.flatMap((file) => {
          const lines = file.text.split(/\r\n|\n|\r/);
          const told = (finding: Finding) => result(file.file, lines, finding, places);
          if (file.known === undefined) return file.findings.map(told);
          return [
            ...file.findings.map((finding) => ({ ...told(finding), baselineState: 'new' })),
            ...file.known.map((finding) => ({ ...told(finding), baselineState: 'unchanged' })),
          ];
        }),
      },
    ],
  };
  return `${JSON.stringify(log, null, 1)}\n`;
}

function rule(check: CheckPages) {
  const { name, summary, why, remedy, severity, family, quiet } = check;
  return {
    id: name,
    name,
    shortDescription: { text: summary },
    fullDescription: { text: why },
    help: { text: `${why} ${remedy}`, markdown: explanation(name) ?? `${why} ${remedy}` },
    defaultConfiguration: { level: LEVELS[severity], ...(quiet ? { enabled: false } : {}) },
    properties: { family, tags: [family] },
  };
}

function result(
  file: string,
  lines: readonly string[],
  finding: Finding,
  places: ReadonlyMap<string, number>,
) {
  const { check, severity, confidence, message, range, related, accepted, reason, figures } = finding;
  return {
    ruleId: check,
    ...(places.has(check) ? { ruleIndex: places.get(check) } : {}),
    level: LEVELS[severity],
    rank: Math.round(confidence * 1000) / 10,
    message: { text: message },
    locations: [{ physicalLocation: physical(file, range) }],
    ...(related.length === 0
      ? {}
      : {
          relatedLocations: related.map((place, id) => ({
            id,
            message: { text: place.message },
            physicalLocation: physical(place.file ?? file, place.range),
          })),
        }),
    partialFingerprints: { 'lyate/v1': fingerprint(finding, lines) },
    // An empty list says that suppressions were looked for, so a viewer can tell open from unknown.
    suppressions: accepted ? [{ kind: 'inSource', status: 'accepted', justification: reason ?? '' }] : [],
    properties: { confidence, figures },
  };
}

function physical(file: string, { start, end }: Range) {
  return {
    artifactLocation: { uri: uriOf(file) },
    region: {
      startLine: start.line + 1,
      startColumn: start.character + 1,
      endLine: end.line + 1,
      endColumn: end.character + 1,
    },
  };
}

/** A relative reference for a path as given, an absolute one as a file address. */
function uriOf(file: string): string {
  const parts = file.split(/[\\/]/).map(encodeURIComponent);
  return file.startsWith('/') ? `file://${parts.join('/')}` : parts.join('/');
}
