/** Plots as text: well formed, escaped, readable for those who cannot see them, and true to their numbers. */
import { expect, test } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import { speciationAt, titrationAt } from '../../server/src/answers/flask-plots.ts';
import { titrationPlot, windowsPlot, windowWords } from '../../server/src/answers/plots.ts';
import { placedWindow } from '../../server/src/flask/window.ts';
import { foldName } from '../../server/src/tables/fold-name.ts';
import { tables } from '../support/tables.ts';

const PLAN = `compound cit = OC(=O)CC(O)(CC(=O)O)C(=O)O
step A
  solvent water 100 mL
  charge  cit 10 mmol
  base    NaOH 2 equiv
step B
  solvent heptane 10 mL
  charge  <CCCC> 1 mmol
`;
const analysed = analyseNow(createAnalyser(tables), { file: 'x.lyate', text: PLAN, language: 'lyate' });

/** Names of the elements in order; fails where tags do not nest or a bare sign stands in text. */
function elementsOf(svg: string): string[] {
  const open: string[] = [];
  const names: string[] = [];
  const outside = svg.replace(
    /<(\/?)([a-z]+)((?: [\w:-]+="[^"<>]*")*)(\/?)>/gi,
    (_, close, name, _attributes, alone) => {
      if (close !== '') expect(open.pop()).toBe(name);
      else {
        names.push(name);
        if (alone === '') open.push(name);
      }
      return '';
    },
  );
  expect(open).toEqual([]);
  expect(outside).not.toMatch(/[<>]/);
  expect(outside).not.toMatch(/&(?!(?:amp|lt|gt|quot|#39);)/);
  return names;
}

test('a titration marks each half way with its pKa', () => {
  const plot = titrationAt(analysed, 3)!;
  expect(plot.line).toBe(3);
  const names = elementsOf(plot.svg);
  expect(names.filter((name) => name === 'circle')).toHaveLength(3);
  expect(plot.svg).toContain('1: pKa 3.1');
  expect(plot.svg).toMatch(/<desc [^>]*>pH from 2\.\d to 1[23]\.\d while [\d.]+ mmol of NaOH is added\./);
  expect(plot.svg).toContain('NaOH added, mmol');
});

test('the step line asks for the flask after its last line; another titrant can be named', () => {
  const plot = titrationAt(analysed, 1, 'HCl')!;
  expect(plot.line).toBe(4);
  expect(plot.numbers.kind).toBe('acid');
  expect(() => titrationAt(analysed, 1, 'unobtainium')).toThrow('unobtainium');
});

test('forms of one compound add up to one at every pH, but for those left out', () => {
  const { numbers, svg } = speciationAt(analysed, 4)!;
  const cit = numbers.forms.filter(({ compound }) => compound === 'cit');
  expect(cit.map(({ charge }) => charge)).toEqual(expect.arrayContaining([-3, -2, -1, 0]));
  numbers.pHs.forEach((_, place) => {
    expect(cit.reduce((sum, { shares }) => sum + shares[place]!, 0)).toBeCloseTo(1, 1);
  });
  elementsOf(svg);
  expect(svg).toContain('cit, 2−');
  expect(svg).toContain('this flask: ');
});

test('a flask without couples has no forms to draw, and there is nothing outside steps', () => {
  expect(speciationAt(analysed, 6)).toBeNull();
  expect(titrationAt(analysed, 0)).toBeNull();
});

test('windows stand on one axis, estimated ends dashed', () => {
  const windows = ['water', 'DMSO', 'THF', 'benzene'].map((solvent) => ({
    solvent,
    window: placedWindow(tables.solventByName.get(foldName(solvent))!, tables),
  }));
  const svg = windowsPlot(windows, { title: 'Windows' });
  const names = elementsOf(svg);
  expect(names.filter((name) => name === 'rect')).toHaveLength(4);
  expect(svg.match(/class="guess"/g)).toHaveLength(4);
  expect(svg).toContain('benzene: unknown to');
  expect(windowWords(windows[0]!.window)).toBe('0.0 ± 0.0 to 14.0 ± 0.0');
  expect(windowWords(windows[2]!.window)).toMatch(/\(estimated\) to .*\(estimated\)$/);
});

test('text of a plan never becomes markup', () => {
  const curve = titrationAt(analysed, 3)!.numbers;
  const svg = titrationPlot(curve, {
    title: '</title><script>alert(1)</script>&\u0000\u001b',
    titrant: '"><image href=x>',
    nameOf: () => "<b onclick='x'>",
  });
  const names = elementsOf(svg);
  expect(names).not.toContain('script');
  expect(names).not.toContain('image');
  expect(svg).not.toContain('\u0000');
  expect(svg).not.toContain('\u001b');
});

test('colours follow the theme of the reader', () => {
  const { svg } = titrationAt(analysed, 3)!;
  expect(svg).toContain('prefers-color-scheme:dark');
  expect(svg).toContain('currentColor');
});
