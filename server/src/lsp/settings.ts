/**
 * Reads what the client says about settings; what has the wrong type is left at its default and named.
 *
 * Knows: the table of settings.  Must not know: the protocol.
 */

import type { HintKind } from '../answers/hints.ts';
import type { Severity } from '../checks/finding.ts';
import { CHECKS } from '../checks/registry.generated.ts';
import type { Settings } from '../checks/settings.ts';
import { SETTINGS, type Setting, type SettingName } from './settings-table.ts';

export interface EditorSettings {
  readonly run: 'type' | 'save' | 'off';
  readonly hints: ReadonlySet<HintKind>;
  readonly lenses: boolean;
  readonly checks: Settings;
  /** What could not be read, in words for the log. */
  readonly problems: readonly string[];
}

const SEVERITIES: ReadonlySet<unknown> = new Set(['error', 'warning', 'information', 'hint', 'off']);
const HINTS: readonly HintKind[] = ['amounts', 'transfers', 'pH'];

/** Settings from the client's `lyate` section, whatever that is. */
export function readSettings(section: unknown): EditorSettings {
  const problems: string[] = [];
  const value = <Name extends SettingName>(name: Name) => settingOf(section, name, problems);
  const hints =
    value('hints.enabled') === true ? HINTS.filter((kind) => value(`hints.${kind}`) === true) : [];
  return {
    run: value('run') as EditorSettings['run'],
    hints: new Set(hints),
    lenses: value('lenses') === true,
    checks: {
      severities: readSeverities(dig(section, 'severities'), problems),
      thresholds: {
        error: value('thresholds.error') as number,
        warning: value('thresholds.warning') as number,
        undecided: value('thresholds.undecided') as number,
      },
      concentration: value('concentration') as number,
    },
    problems,
  };
}

function settingOf(section: unknown, name: SettingName, problems: string[]): unknown {
  const setting: Setting = SETTINGS[name];
  if (setting.type === 'severities') return {};
  const value = dig(section, name);
  if (value === undefined || value === null) return setting.default;
  if (fits(setting, value)) return value;
  problems.push(
    `lyate.${name} cannot be ${JSON.stringify(value)?.slice(0, 60)}; ${JSON.stringify(setting.default)} holds`,
  );
  return setting.default;
}

function fits(setting: Exclude<Setting, { type: 'severities' }>, value: unknown): boolean {
  switch (setting.type) {
    case 'boolean':
      return typeof value === 'boolean';
    case 'number':
      return typeof value === 'number' && setting.minimum <= value && value <= setting.maximum;
    case 'choice':
      return typeof value === 'string' && Object.hasOwn(setting.choices, value);
  }
}

/** `a.b` of a section, whether it is written nested or with dots. */
function dig(section: unknown, name: string): unknown {
  if (typeof section !== 'object' || section === null) return undefined;
  const fields = section as Record<string, unknown>;
  if (Object.hasOwn(fields, name)) return fields[name];
  const [head, ...rest] = name.split('.');
  if (rest.length === 0 || !Object.hasOwn(fields, head!)) return undefined;
  return dig(fields[head!], rest.join('.'));
}

function readSeverities(value: unknown, problems: string[]): Record<string, Severity | 'off'> {
  const severities: Record<string, Severity | 'off'> = {};
  if (value === undefined || value === null) return severities;
  if (typeof value !== 'object' || Array.isArray(value)) {
    problems.push('lyate.severities must name checks and severities');
    return severities;
  }
  const known = new Set(CHECKS.map(({ name }) => name));
  for (const [name, severity] of Object.entries(value)) {
    if (!known.has(name)) problems.push(`lyate.severities names ${name}, which is no check`);
    else if (!SEVERITIES.has(severity))
      problems.push(`lyate.severities gives ${name} no severity that there is`);
    else severities[name] = severity as Severity | 'off';
  }
  return severities;
}
