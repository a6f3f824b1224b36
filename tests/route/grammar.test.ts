/** Holds GRAMMAR.md to the parser: sentences made from the one are read by the other, and both know the same keywords. */
import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { KEYWORDS, parseLine } from '../../server/src/route/parse.ts';

const page = readFileSync(new URL('../../server/src/route/GRAMMAR.md', import.meta.url), 'utf8');
const source = page.split('```ebnf\n')[1]!.split('```')[0]!;

type Node =
  | { kind: 'literal' | 'terminal' | 'rule'; text: string }
  | { kind: 'sequence' | 'choice'; parts: Node[] }
  | { kind: 'repeat'; part: Node; least: number; most: number };

const rules = new Map(
  source
    .trim()
    .split('\n')
    .map((line) => {
      const [name, body] = line.split(' ::= ');
      return [name!.trim(), readBody(body!)] as const;
    }),
);

function readBody(body: string): Node {
  const tokens = body.match(/'[^']*'|[A-Za-z]+|[()|?*+]/g)!;
  let at = 0;
  const choice = (): Node => {
    const parts = [sequence()];
    while (tokens[at] === '|') {
      at++;
      parts.push(sequence());
    }
    return parts.length === 1 ? parts[0]! : { kind: 'choice', parts };
  };
  const sequence = (): Node => {
    const parts: Node[] = [];
    while (at < tokens.length && tokens[at] !== '|' && tokens[at] !== ')') parts.push(item());
    return { kind: 'sequence', parts };
  };
  const item = (): Node => {
    const token = tokens[at++]!;
    let node: Node;
    if (token === '(') {
      node = choice();
      at++;
    } else if (token.startsWith("'")) node = { kind: 'literal', text: token.slice(1, -1) };
    else node = { kind: /^[A-Z]+$/.test(token) ? 'terminal' : 'rule', text: token };
    const times = tokens[at];
    if (times === '?' || times === '*' || times === '+') {
      at++;
      return { kind: 'repeat', part: node, least: times === '+' ? 1 : 0, most: times === '?' ? 1 : 3 };
    }
    return node;
  };
  return choice();
}

const TERMINALS: Readonly<Record<string, fc.Arbitrary<string>>> = {
  WORD: fc.constantFrom('ketone', 'NaOEt', 'P', '2,6-lutidine', 'n-BuLi', 'Pd/C', '12a', '(R)-3'),
  STRING: fc.constantFrom('"x"', '"a b // c"', '"say \\"no\\""', '""'),
  QUOTED: fc.constantFrom('"x"', '"sat. NH4Cl"', '"a + b"'),
  SMILES: fc.constantFrom('CCO', 'CC[OH:1]', '[Na+].[O-]CC'),
  STRUCTURE: fc.constantFrom('<CCO>', '<[Na+].[O-]CC>'),
  NUMBER: fc.constantFrom('1', '1.05', '40', '.5', '2e1'),
  COUNT: fc.constantFrom('1', '2', '12'),
  SIGNED: fc.constantFrom('-7', '−1.5', '20', '0'),
  SITE: fc.constantFrom(':1', ':12'),
  RATIO: fc.constantFrom('3:1', '3:1:1', '9:0.5'),
};

function sentences(node: Node): fc.Arbitrary<string> {
  switch (node.kind) {
    case 'literal':
      return fc.constant(node.text);
    case 'terminal':
      return TERMINALS[node.text]!;
    case 'rule':
      return sentences(rules.get(node.text)!);
    case 'choice':
      return fc.oneof(...node.parts.map(sentences));
    case 'sequence':
      return fc
        .tuple(...node.parts.map(sentences))
        .map((parts) => parts.filter((part) => part !== '').join(' '));
    case 'repeat':
      return fc
        .array(sentences(node.part), { minLength: node.least, maxLength: node.most })
        .map((parts) => parts.join(' '));
  }
}

function literalsAtStart(node: Node): string[] {
  switch (node.kind) {
    case 'literal':
      return [node.text];
    case 'rule':
      return literalsAtStart(rules.get(node.text)!);
    case 'choice':
      return node.parts.flatMap(literalsAtStart);
    case 'sequence':
      return literalsAtStart(node.parts[0]!);
    default:
      return [];
  }
}

describe('GRAMMAR.md', () => {
  it('uses every rule it has and has every rule it uses', () => {
    const used = new Set(['line']);
    const walk = (node: Node): void => {
      if (node.kind === 'rule') used.add(node.text);
      if (node.kind === 'terminal') expect(Object.keys(TERMINALS)).toContain(node.text);
      if (node.kind === 'repeat') walk(node.part);
      if (node.kind === 'sequence' || node.kind === 'choice') for (const part of node.parts) walk(part);
    };
    for (const node of rules.values()) walk(node);
    expect([...used].sort()).toEqual([...rules.keys()].sort());
  });

  it('begins its lines with the keywords of the parser and no others', () => {
    expect([...new Set(literalsAtStart(rules.get('line')!))].sort()).toEqual([...KEYWORDS].sort());
  });

  it('makes only sentences that the parser reads', () => {
    fc.assert(
      fc.property(sentences(rules.get('line')!), (sentence) => {
        const { problems, syntax } = parseLine(sentence);
        // A percentage above 100 is well formed and still no yield.
        expect(problems.filter(({ check }) => check !== 'bad-unit')).toEqual([]);
        expect(syntax).not.toBeNull();
      }),
      { numRuns: 5000 },
    );
  });
});
