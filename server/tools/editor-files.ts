/**
 * The text of every file that is made for the editor.
 *
 * Knows: vocabulary, settings.  Must not know: disks; it is handed what it has to change.
 */
import { schemaText } from '../src/answers/configuration-schema.ts';
import {
  KEYWORD_PAGES,
  LAYERS,
  LINKS,
  QUALIFIERS,
  STATES,
  STRENGTHS,
  UNIT_SPELLINGS,
  UNITS,
} from '../src/answers/vocabulary.ts';
import { CHECKS } from '../src/checks/registry.generated.ts';
import { SETTINGS, type Setting } from '../src/lsp/settings-table.ts';

export interface MadeFile {
  readonly path: string;
  readonly text: string;
}

/** All files; `read` gives the present text of one that is changed in part. */
export function editorFiles(read: (path: string) => string): MadeFile[] {
  return [
    { path: 'client/syntaxes/lyate.tmLanguage.json', text: print(planGrammar()) },
    { path: 'client/syntaxes/lyate-in-markdown.tmLanguage.json', text: print(markdownGrammar()) },
    { path: 'data/schema/lyate.json', text: schemaText() },
    { path: 'package.json', text: print(withSettings(JSON.parse(read('package.json')))) },
  ];
}

function print(value: unknown): string {
  return `${JSON.stringify(value, null, 2)}\n`;
}

interface Manifest {
  contributes: { configuration: unknown };
}

function withSettings(manifest: Manifest): Manifest {
  const properties = Object.fromEntries(
    Object.entries(SETTINGS).map(([name, setting], order) => [
      `lyate.${name}`,
      { ...property(setting), order, scope: 'resource', markdownDescription: setting.text },
    ]),
  );
  return {
    ...manifest,
    contributes: { ...manifest.contributes, configuration: { title: 'Lyate', properties } },
  };
}

function property(setting: Setting): object {
  switch (setting.type) {
    case 'boolean':
      return { type: 'boolean', default: setting.default };
    case 'number':
      return {
        type: 'number',
        default: setting.default,
        minimum: setting.minimum,
        maximum: setting.maximum,
      };
    case 'choice':
      return {
        type: 'string',
        enum: Object.keys(setting.choices),
        enumDescriptions: Object.values(setting.choices),
        default: setting.default,
      };
    case 'severities': {
      const severity = { type: 'string', enum: ['error', 'warning', 'information', 'hint', 'off'] };
      return {
        type: 'object',
        default: {},
        properties: Object.fromEntries(
          CHECKS.map(({ name, summary }) => [name, { ...severity, description: summary }]),
        ),
        additionalProperties: false,
      };
    }
  }
}

/** Words as a regular expression, the longest first so that none hides behind a shorter one. */
function oneOf(words: Iterable<string>): string {
  return [...words]
    .sort((a, b) => b.length - a.length || (a < b ? -1 : 1))
    .map((word) => word.replace(/[.*+?^${}()|[\]\\/%]/g, '\\$&'))
    .join('|');
}

const BEFORE = '(?<!\\S)';
const AFTER = '(?!\\S)';
const NUMBER = '[-+−]?(?:\\d+(?:\\.\\d+)?|\\.\\d+)(?:[eE][-+−]?\\d+)?';

function planGrammar(): object {
  const alone = ['compound', 'step'];
  const others = Object.keys(KEYWORD_PAGES).filter((word) => !alone.includes(word));
  const units = oneOf([...Object.keys(UNITS), ...UNIT_SPELLINGS]);
  return {
    $schema: 'https://raw.githubusercontent.com/martinring/tmlanguage/master/tmlanguage.json',
    name: 'Lyate',
    scopeName: 'source.lyate',
    patterns: [
      { include: '#comment' },
      { include: '#compound' },
      { include: '#step' },
      { include: '#statement' },
    ],
    repository: {
      comment: { name: 'comment.line.double-slash.lyate', match: `${BEFORE}//.*$` },
      compound: {
        begin: `^\\s*(compound)(?:\\s+("(?:[^"\\\\]|\\\\.)*"|\\S+))?(?:\\s+(=))?${AFTER}`,
        beginCaptures: {
          1: { name: 'keyword.control.lyate' },
          2: { name: 'entity.name.type.compound.lyate' },
          3: { name: 'keyword.operator.assignment.lyate' },
        },
        end: '$',
        patterns: [{ include: '#comment' }, { include: '#smiles' }],
      },
      smiles: {
        name: 'string.regexp.structure.lyate',
        match: '\\S+',
        captures: { 0: { patterns: [{ include: '#site' }] } },
      },
      site: { name: 'variable.parameter.site.lyate', match: '(?<=[A-Za-z0-9+\\-@]):\\d+(?=\\])' },
      step: {
        begin: `^\\s*(step)(?:\\s+("(?:[^"\\\\]|\\\\.)*"|\\S+))?${AFTER}`,
        beginCaptures: {
          1: { name: 'keyword.control.lyate' },
          2: { name: 'entity.name.function.step.lyate' },
        },
        end: '$',
        patterns: [
          { include: '#comment' },
          { include: '#string' },
          {
            match: `${BEFORE}(continues)\\s+("(?:[^"\\\\]|\\\\.)*"|\\S+)`,
            captures: {
              1: { name: 'keyword.operator.word.lyate' },
              2: { name: 'entity.name.function.step.lyate' },
            },
          },
          { include: '#value' },
        ],
      },
      statement: {
        begin: `^\\s*(${oneOf(others)})${AFTER}`,
        beginCaptures: { 1: { name: 'keyword.control.lyate' } },
        end: '$',
        patterns: [
          { include: '#comment' },
          { include: '#string' },
          { include: '#structure' },
          { include: '#map' },
          { include: '#strength' },
          { include: '#amount' },
          { include: '#value' },
          { include: '#link' },
          { include: '#operator' },
        ],
      },
      string: {
        name: 'string.quoted.double.lyate',
        begin: '"',
        end: '"|$',
        patterns: [{ name: 'constant.character.escape.lyate', match: '\\\\.' }],
      },
      structure: {
        match: `${BEFORE}(<)([^\\s>]*)(>)`,
        captures: {
          1: { name: 'punctuation.definition.structure.lyate' },
          2: { name: 'string.regexp.structure.lyate', patterns: [{ include: '#site' }] },
          3: { name: 'punctuation.definition.structure.lyate' },
        },
      },
      map: { name: 'variable.parameter.site.lyate', match: `${BEFORE}:\\d+(?=,|\\s|$)` },
      strength: {
        name: 'constant.language.strength.lyate',
        match: `${BEFORE}(?:${oneOf(STRENGTHS)})${AFTER}`,
      },
      amount: {
        match: `${BEFORE}(${NUMBER})\\s*(${units})(?=[\\s,]|$)`,
        captures: {
          1: { name: 'constant.numeric.lyate' },
          2: { name: 'storage.type.unit.lyate' },
        },
      },
      value: {
        name: 'constant.language.lyate',
        match: `${BEFORE}(?:${oneOf([...LAYERS, ...STATES, ...QUALIFIERS, 'rt', 'reflux'])})${AFTER}`,
      },
      link: { name: 'keyword.operator.word.lyate', match: `${BEFORE}(?:${oneOf(LINKS)})${AFTER}` },
      operator: { name: 'keyword.operator.lyate', match: `${BEFORE}(?:\\+/-|[+±x×,])${AFTER}` },
    },
  };
}

function markdownGrammar(): object {
  return {
    scopeName: 'markdown.lyate.codeblock',
    injectionSelector: 'L:text.html.markdown',
    patterns: [{ include: '#plan' }],
    repository: {
      plan: {
        begin: '(^|\\G)(\\s*)(`{3,}|~{3,})\\s*(?i:(lyate)((?:\\s+|[{,])[^`]*)?$)',
        name: 'markup.fenced_code.block.markdown',
        end: '(^|\\G)(\\2|\\s{0,3})(\\3)\\s*$',
        beginCaptures: {
          3: { name: 'punctuation.definition.markdown' },
          4: { name: 'fenced_code.block.language.markdown' },
          5: { name: 'fenced_code.block.language.attributes.markdown' },
        },
        endCaptures: { 3: { name: 'punctuation.definition.markdown' } },
        patterns: [
          {
            begin: '(^|\\G)(\\s*)(.*)',
            while: '(^|\\G)(?!\\s*([`~]{3,})\\s*$)',
            contentName: 'meta.embedded.block.lyate',
            patterns: [{ include: 'source.lyate' }],
          },
        ],
      },
    },
  };
}
