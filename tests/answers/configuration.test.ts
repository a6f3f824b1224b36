/** lyate.json: what is read, what is refused and where, and which settings hold for a plan. */
import { readFileSync } from 'node:fs';
import Ajv from 'ajv';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readConfiguration, settingsFor } from '../../server/src/answers/configuration.ts';
import { schemaText } from '../../server/src/answers/configuration-schema.ts';
import { DEFAULT_SETTINGS, LIMITS } from '../../server/src/checks/settings.ts';
import { SETTINGS } from '../../server/src/lsp/settings-table.ts';

const messages = (text: string) =>
  readConfiguration(text).problems.map(({ range, message }) => {
    const { start, end } = range;
    return `${start.line + 1}:${start.character + 1}-${end.character + 1} ${message}`;
  });

describe('a configuration', () => {
  it('gives the defaults where it says nothing', () => {
    const { configuration, problems } = readConfiguration('{}');
    expect(problems).toEqual([]);
    expect(settingsFor(configuration, 'a/b.lyate')).toEqual(DEFAULT_SETTINGS);
  });

  it('is read whole', () => {
    const { configuration, problems } = readConfiguration(
      JSON.stringify({
        $schema: 'x',
        severities: { 'transfer-uphill': 'warning', levelled: 'off' },
        thresholds: { error: 0.99 },
        concentration: 0.5,
        values: ['house/pka.csv'],
        reagents: ['house/reagents.csv'],
        solvents: [],
        ignore: ['old/**'],
        overrides: [
          { files: ['drafts/**'], severities: { 'transfer-uphill': 'hint' } },
          { files: ['*.md'], thresholds: { warning: 0.9 } },
        ],
      }),
    );
    expect(problems).toEqual([]);
    expect(configuration.ignore).toEqual(['old/**']);
    expect(configuration.houseFiles.map(({ kind, path }) => [kind, path])).toEqual([
      ['values', 'house/pka.csv'],
      ['reagents', 'house/reagents.csv'],
    ]);
    expect(settingsFor(configuration, 'side.lyate')).toEqual({
      severities: { 'transfer-uphill': 'warning', levelled: 'off' },
      thresholds: { ...DEFAULT_SETTINGS.thresholds, error: 0.99 },
      concentration: 0.5,
    });
    expect(settingsFor(configuration, 'drafts/deep/side.md')).toEqual({
      severities: { 'transfer-uphill': 'hint', levelled: 'off' },
      thresholds: { error: 0.99, warning: 0.9, undecided: 0.2 },
      concentration: 0.5,
    });
  });

  it('names wrong keys, types and values at their place, and lets the rest hold', () => {
    const text = `{
  "severitees": {},
  "severities": { "transfer-uphil": "off", "levelled": "loud", "toxic-gas": 1, "undecided": "off" },
  "thresholds": { "error": 0.2, "warning": "high" },
  "concentration": 1e400,
  "values": ["a.csv", 3, ""],
  "ignore": "old",
  "overrides": [{ "severities": {} }, { "files": ["x/*"], "concentration": 1 }]
}`;
    expect(messages(text)).toEqual([
      '2:3-15 There is no entry "severitees". Is severities meant?',
      '3:19-35 There is no entry "transfer-uphil" in severities. Is transfer-uphill meant?',
      '3:56-62 severities.levelled must be one of error, warning, information, hint, off.',
      '3:77-78 severities.toxic-gas must be a text, not a number.',
      '4:28-31 thresholds.error must not be below 0.5.',
      '4:44-50 thresholds.warning must be a text, not a text.'.replace('a text, not', 'a number, not'),
      '5:20-25 concentration must be a number that there is.',
      '6:23-24 values.1 must be a text, not a number.',
      '6:26-28 values.2 must not be empty.',
      '7:13-18 ignore must be a list, not a text.',
      '8:17-37 overrides.0 needs an entry "files".',
    ]);
    const { configuration } = readConfiguration(text);
    expect(settingsFor(configuration, 'a.lyate').severities).toEqual({ undecided: 'off' });
    expect(settingsFor(configuration, 'x/a.lyate').concentration).toBe(1);
    expect(configuration.houseFiles.map(({ path }) => path)).toEqual(['a.csv']);
  });

  it('says where the text is no JSON', () => {
    expect(messages('{ "a" 1 }')[0]).toMatch(/^1:7-8 This is no JSON: colon expected/);
    expect(messages('')[0]).toMatch(/^1:1-1 This is no JSON/);
    expect(messages('{ // a remark\n}')[0]).toMatch(/^1:3-14 This is no JSON/);
    expect(messages('[1]')).toEqual(['1:1-4 The configuration must be an object, not a list.']);
    expect(messages('['.repeat(200_000)).length).toBeGreaterThan(0);
  });

  it('is harmless where it names what every object has', () => {
    const text =
      '{ "__proto__": { "concentration": 7 }, "constructor": 1, "severities": { "__proto__": "off", "toString": "off" } }';
    expect(messages(text).length).toBe(4);
    const { configuration } = readConfiguration(text);
    expect(settingsFor(configuration, 'a.lyate')).toEqual(DEFAULT_SETTINGS);
    expect(({} as { concentration?: number }).concentration).toBeUndefined();
  });

  it('never throws, whatever the text', () => {
    fc.assert(
      fc.property(
        fc.oneof(
          fc.string(),
          fc.json(),
          fc.json().map((text) => `{"overrides":[${text}]}`),
        ),
        (text) => {
          const { configuration } = readConfiguration(text);
          settingsFor(configuration, 'a/b.lyate');
        },
      ),
      { numRuns: 300 },
    );
  });

  it('takes globs as people write them', () => {
    const holds = (glob: string, path: string) => {
      const text = JSON.stringify({ overrides: [{ files: [glob], concentration: 3 }] });
      return settingsFor(readConfiguration(text).configuration, path).concentration === 3;
    };
    expect(holds('drafts', 'drafts/a.lyate')).toBe(true);
    expect(holds('drafts/', 'x/drafts/a.lyate')).toBe(true);
    expect(holds('./drafts/*.md', 'drafts/a.md')).toBe(true);
    expect(holds('drafts/*.md', 'x/drafts/a.md')).toBe(false);
    expect(holds('*.md', 'x/y/a.md')).toBe(true);
    expect(holds('draft', 'drafts/a.lyate')).toBe(false);
  });
});

describe('the schema that ships', () => {
  const schema = JSON.parse(schemaText());
  const validate = new Ajv({ strict: true }).compile(schema);

  it('is the one in data/schema and wired into the manifest', () => {
    expect(readFileSync('data/schema/lyate.json', 'utf8')).toBe(schemaText());
    const { contributes } = JSON.parse(readFileSync('package.json', 'utf8'));
    expect(contributes.jsonValidation).toEqual([
      { fileMatch: 'lyate.json', url: './data/schema/lyate.json' },
    ]);
  });

  it('agrees with the reader about what is right', () => {
    const samples = [
      {},
      { severities: { levelled: 'off' } },
      { severities: { levelled: 'shout' } },
      { severities: { nothing: 'off' } },
      { thresholds: { error: 0.4 } },
      { thresholds: { undecided: 0.5 } },
      { concentration: 0 },
      { concentration: '1' },
      { overrides: [{}] },
      { overrides: [{ files: ['a'] }] },
      { values: [1] },
      { other: 1 },
    ];
    for (const sample of samples) {
      expect([sample, readConfiguration(JSON.stringify(sample)).problems.length === 0]).toEqual([
        sample,
        validate(sample),
      ]);
    }
  });

  it('has the limits of the editor', () => {
    for (const name of ['error', 'warning', 'undecided'] as const) {
      const { minimum, maximum } = SETTINGS[`thresholds.${name}`];
      expect(LIMITS.thresholds[name]).toEqual({ low: minimum, high: maximum });
    }
    const { minimum, maximum } = SETTINGS.concentration;
    expect(LIMITS.concentration).toEqual({ low: minimum, high: maximum });
  });
});
