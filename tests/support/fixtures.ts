/**
 * Reads literate fixtures: prose, plans in fences, and under their lines the findings they must give.
 *
 * A marker is a line of blanks, carets, a severity and a check name, with part of the message in quotes if wanted:
 *
 *       base NaOH 1 equiv
 *            ^^^^ error transfer-uphill "too weak"
 *
 * It points at the line above it and is taken out before the plan is analysed. A plan without markers asserts
 * silence. A fence of the kind `lyate sound` or `lyate flawed` allows information and hints besides its markers, because sound practice
 * may be commented on but never blamed.
 */
import type { Finding } from '../../server/src/checks/finding.ts';

export interface Marker {
  readonly line: number;
  readonly start: number;
  readonly end: number;
  readonly severity: string;
  readonly check: string;
  readonly text: string;
}

export interface Fixture {
  /** The headings above the fence, joined. */
  readonly title: string;
  readonly plan: string;
  readonly sound: boolean;
  readonly markers: readonly Marker[];
}

const MARKER = /^( *)(\^+) (error|warning|information|hint) ([A-Za-z-]+)(?: "(.*)")?$/;

/** All plans of one fixture file, in order. */
export function readFixtures(markdown: string): Fixture[] {
  const fixtures: Fixture[] = [];
  let title = '';
  let block: { lines: string[]; markers: Marker[]; sound: boolean } | null = null;
  for (const line of markdown.split('\n')) {
    if (block === null) {
      if (line.startsWith('#')) title = line.replace(/^#+\s*/, '');
      if (/^```lyate\b/.test(line))
        block = { lines: [], markers: [], sound: line.includes('sound') || line.includes('flawed') };
      continue;
    }
    if (line.startsWith('```')) {
      fixtures.push({
        title,
        plan: `${block.lines.join('\n')}\n`,
        sound: block.sound,
        markers: block.markers,
      });
      block = null;
      continue;
    }
    const marker = MARKER.exec(line);
    if (marker) {
      const [, blanks, carets, severity, check, text] = marker;
      const start = blanks!.length;
      block.markers.push({
        line: block.lines.length - 1,
        start,
        end: start + carets!.length,
        severity: severity!,
        check: check!,
        text: text ?? '',
      });
    } else {
      block.lines.push(line);
    }
  }
  return fixtures;
}

/** What differs between the findings of a plan and its markers, one line each; empty where they agree. */
export function differences(fixture: Fixture, findings: readonly Finding[]): string[] {
  const open = findings.filter(
    (finding) => !(fixture.sound && (finding.severity === 'information' || finding.severity === 'hint')),
  );
  const missing: string[] = [];
  const pool = fixture.sound ? [...findings] : [...open];
  const matched = new Set<Finding>();
  for (const marker of fixture.markers) {
    const found = pool.find((finding) => !matched.has(finding) && matches(marker, finding));
    if (found) matched.add(found);
    else
      missing.push(
        `missing  ${marker.line + 1}:${marker.start + 1}-${marker.end + 1} ${marker.severity} ${marker.check} "${marker.text}"`,
      );
  }
  const extra = open
    .filter((finding) => !matched.has(finding))
    .map(({ range, severity, check, message }) => {
      const { start, end } = range;
      return `extra    ${start.line + 1}:${start.character + 1}-${end.character + 1} ${severity} ${check} "${message}"`;
    });
  return [...missing, ...extra];
}

function matches(marker: Marker, { range, severity, check, message }: Finding): boolean {
  return (
    range.start.line === marker.line &&
    range.start.character === marker.start &&
    range.end.character === marker.end &&
    severity === marker.severity &&
    check === marker.check &&
    message.includes(marker.text)
  );
}
