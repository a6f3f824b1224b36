/**
 * Every setting of the editor with its meaning and default; the manifest and the reader of settings are made from it.
 *
 * Knows: names and defaults.  Must not know: the client, where values come from.
 */
import { DEFAULT_SETTINGS } from '../checks/settings.ts';

export type SettingForm =
  | { readonly type: 'boolean'; readonly default: boolean }
  | {
      readonly type: 'number';
      readonly default: number;
      readonly minimum: number;
      readonly maximum: number;
    }
  | {
      readonly type: 'choice';
      readonly default: string;
      readonly choices: Readonly<Record<string, string>>;
    }
  | { readonly type: 'severities' };

export type Setting = SettingForm & { readonly text: string };

export const SETTINGS = {
  run: {
    type: 'choice',
    default: 'type',
    choices: {
      type: 'While you type.',
      save: 'When a plan is opened and when it is saved.',
      off: 'Never; hover, completion and the rest still work.',
    },
    text: 'When plans are checked.',
  },
  severities: {
    type: 'severities',
    text: 'Severity by the name of a check; `off` silences it.',
  },
  'thresholds.error': {
    type: 'number',
    default: DEFAULT_SETTINGS.thresholds.error,
    minimum: 0.5,
    maximum: 1,
    text: 'How sure the analysis must be that a transfer fails before it says error.',
  },
  'thresholds.warning': {
    type: 'number',
    default: DEFAULT_SETTINGS.thresholds.warning,
    minimum: 0.5,
    maximum: 1,
    text: 'How sure the analysis must be that a transfer fails before it warns.',
  },
  'thresholds.undecided': {
    type: 'number',
    default: DEFAULT_SETTINGS.thresholds.undecided,
    minimum: 0,
    maximum: 0.5,
    text: 'How likely failure must be before a transfer is called undecided.',
  },
  concentration: {
    type: 'number',
    default: DEFAULT_SETTINGS.concentration,
    minimum: 0.001,
    maximum: 20,
    text: 'Concentration in mol/L that is assumed where a step writes no volume.',
  },
  'hints.enabled': {
    type: 'boolean',
    default: true,
    text: 'Shows worked-out figures between the words of a plan.',
  },
  'hints.amounts': { type: 'boolean', default: true, text: 'mmol behind amounts written in other units.' },
  'hints.transfers': {
    type: 'boolean',
    default: true,
    text: 'log K and the share that reacts behind deprotonate and protonate.',
  },
  'hints.pH': { type: 'boolean', default: true, text: 'pH behind quench and adjust.' },
  'hints.layers': {
    type: 'boolean',
    default: false,
    text: 'Share in the layer behind extract.',
  },
  lenses: { type: 'boolean', default: true, text: 'Shows a summary above each step.' },
} as const satisfies Readonly<Record<string, Setting>>;

export type SettingName = keyof typeof SETTINGS;
