/** What a hover says, and that text of a plan in it stays text. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import { hoverAt } from '../../server/src/answers/hover.ts';
import { code, plain } from '../../server/src/answers/markdown-text.ts';
import { builtTables } from '../../server/src/host/tables.ts';

const analyser = createAnalyser(builtTables());
const read = (text: string) => analyseNow(analyser, { file: 'plan.lyate', text, language: 'lyate' });
/** Markdown of the hover over the first place of a word in a line. */
function over(text: string, line: number, word: string): string {
  const character = text.split('\n')[line]!.indexOf(word);
  return hoverAt(read(text), { line, character })?.markdown ?? '';
}

const PLAN = `compound acid = OC(=O)c1ccccc1
step A "Salt"
  solvent water 20 mL
  charge acid 5 mmol
  base NaHCO3 1.2 equiv
  accept transfer-uphill "seen"
`;

describe('a hover', () => {
  it('says what a keyword is for and where the step ends up', () => {
    expect(over(PLAN, 1, 'step')).toMatch(/At its end: pH \d/);
  });

  it('knows compounds, reagents, solvents, amounts and checks', () => {
    expect(over(PLAN, 3, 'acid')).toMatch(/aromatic carboxylic acid \| 4\.2 ±/);
    expect(over(PLAN, 4, 'NaHCO3')).toContain('**NaHCO3**');
    expect(over(PLAN, 2, 'water')).toContain('**water**');
    expect(over(PLAN, 4, '1.2')).toContain('6 mmol');
    expect(over(PLAN, 5, 'transfer-uphill')).toContain('**transfer\\-uphill**');
  });

  it('knows the atom of a structure', () => {
    const { line, character } = { line: 0, character: PLAN.indexOf('OC(=O)') };
    expect(hoverAt(read(PLAN), { line, character })?.markdown).toMatch(
      /^\*\*O1\*\*[^!]*aromatic carboxylic acid: pKa 4\.2/,
    );
  });

  it('says nothing where nothing is, and nothing throws on half a plan', () => {
    for (let end = 0; end < PLAN.length; end += 7) {
      const analysed = read(PLAN.slice(0, end));
      for (let line = 0; line < 7; line++) {
        for (const character of [0, 3, 12, 90]) hoverAt(analysed, { line, character });
      }
    }
    expect(hoverAt(read(PLAN), { line: 400, character: 0 })).toBeNull();
  });
});

describe('text in Markdown', () => {
  it('keeps none of its marks', () => {
    expect(plain('<b>*x*</b> [a](b) `c` $d$ &amp;')).not.toMatch(/(?<!\\)[<>*[\]()`$&]/);
    expect(plain('a\u001b[31mb\nc')).toBe('a \\[31mb c');
  });

  it('as code ends where it should, whatever it holds', () => {
    fc.assert(
      fc.property(fc.string({ unit: fc.constantFrom('`', 'a', ' ', '\n') }), (text) => {
        const marked = code(text);
        const fence = /^`+/.exec(marked)![0];
        const inner = marked.slice(fence.length, -fence.length);
        return marked.endsWith(fence) && !inner.includes('\n') && !inner.split(/[^`]+/).includes(fence);
      }),
    );
  });
});
