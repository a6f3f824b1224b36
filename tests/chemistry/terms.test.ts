import { join } from 'node:path';
import { expect, test } from 'vitest';
import { readSubstituents } from '../../server/src/chemistry/substituents.ts';
import { termsOf } from '../../server/src/chemistry/terms.ts';
import { readRules, readSubstituentRows, sitesByRule } from '../../server/tools/rule-sites.ts';
import { WRITTEN_TWICE } from './written-twice.ts';

const data = join(import.meta.dirname, '../../data');
const rules = readRules(join(data, 'groups.csv'));
const substituents = readSubstituents(readSubstituentRows(join(data, 'substituents.csv')));

function termsAt(smiles: string): string[] {
  const found = sitesByRule(smiles, rules)!;
  const kind = /\[[On]|N:1|NH2/i.test(smiles) && !/O[H]?:1|CH2:1/.test(smiles) ? 'base' : 'acid';
  const site = found.sites.find((one) => one.marked && one.kind === kind)!;
  return termsOf(found.graph, site, substituents)
    .map(({ name, factor }) => `${name} ${factor.toFixed(9)}`)
    .sort();
}

test.each(WRITTEN_TWICE)('terms do not depend on how %s is written', (...texts) => {
  const [first, ...others] = texts.map(termsAt);
  expect(first!.length).toBeGreaterThan(4);
  for (const other of others) expect(other).toEqual(first);
});

test('terms tell ortho, meta and para, and near from far', () => {
  const names = (smiles: string) => new Set(termsAt(smiles).map((line) => line.split(' ')[0]!));
  const para = names('[OH:1]c1ccc(Cl)cc1');
  const meta = names('[OH:1]c1cccc(Cl)c1');
  expect([...para].some((name) => !meta.has(name))).toBe(true);
  expect([...meta].some((name) => !para.has(name))).toBe(true);
  const two = names('ClCC(=O)[OH:1]');
  const three = names('ClCCC(=O)[OH:1]');
  expect([...two].some((name) => name.startsWith('chain') && !three.has(name))).toBe(true);
});
