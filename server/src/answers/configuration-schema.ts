/**
 * What `lyate.json` may say, as a JSON Schema: the editor completes by it and the reader checks by it.
 *
 * Knows: checks, limits of settings.  Must not know: files.
 * Invariant: `data/schema/lyate.json` is this schema written out.   (tests/answers/configuration.test.ts)
 */
import { CHECKS } from '../checks/registry.generated.ts';
import { DEFAULT_SETTINGS, LIMITS } from '../checks/settings.ts';

/** The part of JSON Schema that the configuration needs. */
export interface SchemaNode {
  readonly type: 'object' | 'array' | 'string' | 'number';
  readonly description?: string;
  readonly default?: unknown;
  readonly enum?: readonly string[];
  readonly minLength?: number;
  readonly minimum?: number;
  readonly maximum?: number;
  readonly properties?: Readonly<Record<string, SchemaNode>>;
  readonly required?: readonly string[];
  readonly additionalProperties?: false;
  readonly items?: SchemaNode;
}

const SEVERITY_WORDS = ['error', 'warning', 'information', 'hint', 'off'] as const;
const files = (description: string): SchemaNode => ({
  type: 'array',
  description,
  items: { type: 'string', minLength: 1 },
});
const object = (description: string, properties: Record<string, SchemaNode>): SchemaNode => ({
  type: 'object',
  description,
  properties,
  additionalProperties: false,
});

/** Settings that may also stand in an override. */
const SETTINGS: Readonly<Record<string, SchemaNode>> = {
  severities: object(
    'Severity by the name of a check; off silences it.',
    Object.fromEntries(
      CHECKS.map(({ name, summary }) => [
        name,
        { type: 'string', enum: SEVERITY_WORDS, description: summary },
      ]),
    ),
  ),
  thresholds: object('How sure the analysis must be that a transfer fails before it speaks.', {
    error: threshold('error', 'Before it says error.'),
    warning: threshold('warning', 'Before it warns.'),
    undecided: threshold('undecided', 'Before a transfer is called undecided.'),
  }),
  concentration: {
    type: 'number',
    description: 'mol/L where a step writes no volume.',
    default: DEFAULT_SETTINGS.concentration,
    minimum: LIMITS.concentration.low,
    maximum: LIMITS.concentration.high,
  },
};

export const CONFIGURATION_SCHEMA: SchemaNode = object('Settings of Lyate for the plans below this folder.', {
  $schema: { type: 'string', description: 'Address of this schema.' },
  ...SETTINGS,
  values: files('CSV files of own measured constants, relative to this file; they beat the tables.'),
  reagents: files('CSV files of own reagents, relative to this file.'),
  solvents: files('CSV files of own solvents, relative to this file.'),
  ignore: files('Plans that a search of folders leaves out, in the language of ignore files.'),
  overrides: {
    type: 'array',
    description: 'Settings for some plans only; of two that hold for a plan the later one wins.',
    items: {
      ...object('Settings for the plans that match.', {
        files: files('Globs relative to this file.'),
        ...SETTINGS,
      }),
      required: ['files'],
    },
  },
});

/** The schema as a file of its own. */
export function schemaText(): string {
  const head = { $schema: 'http://json-schema.org/draft-07/schema#', title: 'Configuration of Lyate' };
  return `${JSON.stringify({ ...head, ...CONFIGURATION_SCHEMA }, null, 2)}\n`;
}

function threshold(name: 'error' | 'warning' | 'undecided', description: string): SchemaNode {
  const { low, high } = LIMITS.thresholds[name];
  return {
    type: 'number',
    description,
    default: DEFAULT_SETTINGS.thresholds[name],
    minimum: low,
    maximum: high,
  };
}
