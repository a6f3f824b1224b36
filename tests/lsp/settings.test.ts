/** What a client may say about settings, in any form and of any type. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DEFAULT_SETTINGS } from '../../server/src/checks/settings.ts';
import { readSettings } from '../../server/src/lsp/settings.ts';

describe('settings', () => {
  it('are those of the program where nothing is said', () => {
    const { run, checks, problems } = readSettings(undefined);
    expect(run).toBe('type');
    expect(checks).toEqual(DEFAULT_SETTINGS);
    expect(problems).toEqual([]);
  });

  it('are read nested and with dots', () => {
    expect(readSettings({ thresholds: { error: 0.99 } }).checks.thresholds.error).toBe(0.99);
    expect(readSettings({ 'thresholds.error': 0.99 }).checks.thresholds.error).toBe(0.99);
    expect(readSettings({ hints: { enabled: false } }).hints.size).toBe(0);
  });

  it('of the wrong type are named and left at their default', () => {
    const { run, checks, problems } = readSettings({
      run: 'always',
      concentration: '0.2',
      severities: { 'transfer-uphill': 'loud', nonsense: 'off' },
    });
    expect(run).toBe('type');
    expect(checks).toEqual(DEFAULT_SETTINGS);
    expect(problems.length).toBe(4);
  });

  it('never throw', () => {
    fc.assert(fc.property(fc.anything(), (section) => readSettings(section).checks.concentration > 0));
  });
});
