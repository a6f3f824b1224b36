/** Colours as the editor works them out from the grammar, with the same engine. */
import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { beforeAll, describe, expect, it } from 'vitest';
import oniguruma from 'vscode-oniguruma';
import textmate from 'vscode-textmate';
import { KEYWORD_PAGES, UNITS } from '../../server/src/answers/vocabulary.ts';
import { KEYWORDS } from '../../server/src/route/parse.ts';

let plan: textmate.IGrammar;
let page: textmate.IGrammar;

beforeAll(async () => {
  const wasm = createRequire(import.meta.url).resolve('vscode-oniguruma/release/onig.wasm');
  await oniguruma.loadWASM(readFileSync(wasm));
  const files: Record<string, string> = {
    'source.lyate': 'client/syntaxes/lyate.tmLanguage.json',
    'markdown.lyate.codeblock': 'client/syntaxes/lyate-in-markdown.tmLanguage.json',
  };
  const registry = new textmate.Registry({
    onigLib: Promise.resolve({
      createOnigScanner: (patterns: string[]) => new oniguruma.OnigScanner(patterns),
      createOnigString: (text: string) => new oniguruma.OnigString(text),
    }),
    loadGrammar: async (scope) => {
      const path = files[scope];
      return path === undefined ? null : textmate.parseRawGrammar(readFileSync(path, 'utf8'), path);
    },
  });
  plan = (await registry.loadGrammar('source.lyate'))!;
  page = (await registry.loadGrammar('markdown.lyate.codeblock'))!;
});

/** Innermost scope of each run of characters that is not blank. */
function colours(line: string, grammar = plan): [string, string][] {
  return grammar
    .tokenizeLine(line, null)
    .tokens.map(({ startIndex, endIndex, scopes }): [string, string] => [
      line.slice(startIndex, endIndex).trim(),
      scopes.at(-1)!,
    ])
    .filter(([text]) => text !== '');
}

function scopeOf(line: string, text: string): string | undefined {
  return colours(line).find(([run]) => run === text)?.[1];
}

describe('words of the language', () => {
  it('has a page for every keyword the reader knows and for no other', () => {
    expect(Object.keys(KEYWORD_PAGES).sort()).toEqual([...KEYWORDS].sort());
  });

  it.each(KEYWORDS)('colours %s as a keyword where a line begins, and nowhere else', (keyword) => {
    expect(scopeOf(`  ${keyword} x`, keyword)).toBe('keyword.control.lyate');
    expect(colours(`charge a-${keyword} 1 g`).slice(1)).not.toContainEqual([keyword, expect.anything()]);
  });

  it('colours every word that the grammar of the language names', () => {
    const grammar = readFileSync('server/src/route/GRAMMAR.md', 'utf8').split('```')[1]!;
    const words = [...grammar.matchAll(/'([^']+)'/g)].map(([, word]) => word!);
    const plain = words.filter((word) => !KEYWORDS.includes(word) && !['=', ','].includes(word));
    expect(plain.length).toBeGreaterThan(40);
    const unseen = plain.filter((word) => {
      const seen = [`charge y ${word}`, `charge y 1 ${word}`].some(
        (line) => scopeOf(line, word) !== undefined,
      );
      return !seen && scopeOf(`step y ${word} z`, word) === undefined;
    });
    expect(unseen).toEqual([]);
  });
});

describe('lines', () => {
  it('tells the parts of a compound apart', () => {
    expect(colours('compound 12a = CC(=O)[CH2:1]C // ketone')).toEqual([
      ['compound', 'keyword.control.lyate'],
      ['12a', 'entity.name.type.compound.lyate'],
      ['=', 'keyword.operator.assignment.lyate'],
      ['CC(=O)[CH2', 'string.regexp.structure.lyate'],
      [':1', 'variable.parameter.site.lyate'],
      [']C', 'string.regexp.structure.lyate'],
      ['// ketone', 'comment.line.double-slash.lyate'],
    ]);
  });

  it.each(Object.keys(UNITS))('colours a number with %s', (unit) => {
    expect(colours(`charge 1 2.5 ${unit}`).slice(1)).toContainEqual(['2.5', 'constant.numeric.lyate']);
    expect(scopeOf(`charge 1 2.5 ${unit}`, unit)).toBe('storage.type.unit.lyate');
  });

  it('starts no comment inside quotes', () => {
    expect(scopeOf('note "see // there" // here', '// here')).toBe('comment.line.double-slash.lyate');
    expect(colours('note "see // there"').map(([text]) => text)).not.toContain('// there');
  });

  it('reads a quoted name and an escaped quote as one', () => {
    expect(scopeOf('compound "acid \\" A" = CC(=O)O', '"acid \\" A"')).toBe(
      'entity.name.type.compound.lyate',
    );
  });

  it('tells the steps apart that a step goes on from', () => {
    const run = colours('step B continues A organic "Second"');
    expect(run[1]).toEqual(['B', 'entity.name.function.step.lyate']);
    expect(run[3]).toEqual(['A', 'entity.name.function.step.lyate']);
    expect(run[4]).toEqual(['organic', 'constant.language.lyate']);
  });

  it('colours sites and the minus sign of the typesetter', () => {
    expect(colours('deprotonate 1 at :1, :2').filter(([, scope]) => scope.includes('site')).length).toBe(2);
    expect(scopeOf('temperature −78 °C', '−78')).toBe('constant.numeric.lyate');
  });

  it('stays quick on a line that goes on for long', () => {
    const start = performance.now();
    plan.tokenizeLine(`charge ${'((((a1 '.repeat(2000)}`, null, 2000);
    expect(performance.now() - start).toBeLessThan(2500);
  });
});

describe('fences in Markdown', () => {
  it('reads the plan inside a fence and stops at its end', () => {
    let state = textmate.INITIAL as textmate.StateStack;
    const scopes = ['```lyate', 'base NaH 1 equiv', '```', 'base of the hill'].map((line) => {
      const result = page.tokenizeLine(line, state);
      state = result.ruleStack;
      return result.tokens.flatMap((token) => token.scopes);
    });
    expect(scopes[1]).toContain('keyword.control.lyate');
    expect(scopes[1]).toContain('meta.embedded.block.lyate');
    expect(scopes[3]).not.toContain('keyword.control.lyate');
  });
});
