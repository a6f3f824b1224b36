import { expect, test } from 'vitest';
import { activatorsOf } from '../../server/src/chemistry/activators.ts';
import { readSubstituents } from '../../server/src/chemistry/substituents.ts';
import { tables } from '../support/tables.ts';
import { graphOf } from './written-graph.ts';

const substituents = readSubstituents(tables.substituents);
const names = (smiles: string) => {
  const graph = graphOf(smiles);
  const site = graph.atoms.findIndex(({ mapNumber }) => mapNumber === 1);
  return activatorsOf(graph, site, substituents)
    ?.map(({ name, count }) => `${count} ${name}`)
    .sort();
};

test.each([
  ['CCOC(=O)[CH2:1]C(=O)OCC', ['2 ester']],
  ['[CH3:1]C(=O)c1ccccc1', ['1 aroyl']],
  ['CC(=O)[CH:1](C)C(C)=O', ['1 alkyl', '1 alkyl+dicarbonyl', '2 acyl']],
  ['CC1(C)OC(=O)[CH2:1]C(=O)O1', ['1 ring-dicarbonyl', '2 lactone']],
  ['N#C[CH2:1]S(=O)(=O)c1ccccc1', ['1 arylsulfonyl', '1 cyano']],
  ['c1ccc2c(c1)[CH2:1]c1ccccc1-2', ['1 fluorenyl']],
  ['C1=CC=C[CH2:1]1', ['1 cyclopentadienyl']],
  ['[CH3:1]P(=O)(OC)OC', ['1 phosphonyl']],
  ['[CH3:1][P+](c1ccccc1)(c1ccccc1)c1ccccc1', ['1 phosphonio']],
  ['C[CH2:1][N+](=O)[O-]', ['1 alkyl', '1 alkyl+nitro', '1 nitro']],
  ['[CH3:1]c1ccc([N+](=O)[O-])cc1', ['1 aryl', '1 para-nitro']],
  ['[CH3:1]c1ccccn1', ['1 azinyl1']],
  ['C1CS[CH2:1]SC1', ['2 alkylthio']],
  ['O=C1Nc2ccccc2[CH2:1]1', ['1 amide', '1 aromatic-anion', '1 aryl']],
  ['O=C1[CH2:1]C(=O)NC(=O)N1', ['1 ring-dicarbonyl', '2 imide']],
  ['c1ccc([CH:1](c2ccccc2)c2ccccc2)cc1', ['1 crowded', '3 aryl']],
  ['c1ccc2c(c1)[CH2:1]c1ccccc1O2', ['1 tied-diaryl', '2 aryl']],
  ['c1ccc2ccccc2c1[CH3:1]', ['1 aryl', '1 fused-aryl']],
  ['CC(=O)[NH:1]c1ccccc1', ['1 acyl', '1 aryl']],
  ['O=C1CCC(=O)[NH:1]1', ['1 ring-dicarbonyl', '2 acyl']],
])('%s carries %j', (smiles, expected) => {
  expect(names(smiles)).toEqual(expected);
});

test('names do not depend on the order of atoms', () => {
  expect(names('c1([CH2:1]C#N)ccc([N+]([O-])=O)cc1')).toEqual(names('N#C[CH2:1]c1ccc([N+](=O)[O-])cc1'));
  expect(names('S(=O)(=O)([CH2:1]C(OCC)=O)C')).toEqual(names('CCOC(=O)[CH2:1]S(C)(=O)=O'));
});

test.each(['[cH:1]1ccccc1', '[CH:1]#C', '[CH2:1]=C', '[OH:1]C', 'c1cc[nH:1]c1'])(
  '%s is of another kind',
  (smiles) => {
    expect(names(smiles)).toBeUndefined();
  },
);
