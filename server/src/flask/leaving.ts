/**
 * The small molecules that everyday conversions set free.
 *
 * Knows: formulas.  Must not know: flasks, text.
 * Invariant: the formula of each is that of its SMILES.   (tests/flask/convert.test.ts)
 * Common practice; the order is that in which they are tried, commonest first.
 */

export interface Leaving {
  readonly name: string;
  readonly smiles: string;
  /** SMILES of what is left of a strong acid without its proton; null for the others. */
  readonly ion: string | null;
  readonly atoms: ReadonlyMap<string, number>;
  /** Enough to protonate amines in the flask. */
  readonly isStrongAcid: boolean;
  /** Leaves the flask by itself near room temperature. */
  readonly isGas: boolean;
}

function leaving(
  name: string,
  smiles: string,
  atoms: Readonly<Record<string, number>>,
  traits: readonly ('acid' | 'gas')[] = [],
  ion: string | null = null,
): Leaving {
  return {
    name,
    smiles,
    ion,
    atoms: new Map(Object.entries(atoms)),
    isStrongAcid: traits.includes('acid'),
    isGas: traits.includes('gas'),
  };
}

export const LEAVING: readonly Leaving[] = [
  leaving('water', 'O', { H: 2, O: 1 }),
  leaving('HCl', 'Cl', { H: 1, Cl: 1 }, ['acid'], '[Cl-]'),
  leaving('HBr', 'Br', { H: 1, Br: 1 }, ['acid'], '[Br-]'),
  leaving('HI', 'I', { H: 1, I: 1 }, ['acid'], '[I-]'),
  leaving('HF', 'F', { H: 1, F: 1 }, ['acid'], '[F-]'),
  leaving('N2', 'N#N', { N: 2 }, ['gas']),
  leaving('CO2', 'O=C=O', { C: 1, O: 2 }, ['gas']),
  leaving('CO', '[C-]#[O+]', { C: 1, O: 1 }, ['gas']),
  leaving('SO2', 'O=S=O', { S: 1, O: 2 }, ['gas']),
  leaving('ammonia', 'N', { H: 3, N: 1 }, ['gas']),
  leaving('methanol', 'CO', { C: 1, H: 4, O: 1 }),
  leaving('ethanol', 'CCO', { C: 2, H: 6, O: 1 }),
  leaving('isobutene', 'CC(=C)C', { C: 4, H: 8 }, ['gas']),
  leaving('tert-butanol', 'CC(C)(C)O', { C: 4, H: 10, O: 1 }),
  leaving('acetic acid', 'CC(=O)O', { C: 2, H: 4, O: 2 }),
  leaving('methanesulfonic acid', 'CS(=O)(=O)O', { C: 1, H: 4, O: 3, S: 1 }, ['acid'], 'CS(=O)(=O)[O-]'),
  leaving(
    'p-toluenesulfonic acid',
    'Cc1ccc(cc1)S(=O)(=O)O',
    { C: 7, H: 8, O: 3, S: 1 },
    ['acid'],
    'Cc1ccc(cc1)S(=O)(=O)[O-]',
  ),
  leaving(
    'triflic acid',
    'FC(F)(F)S(=O)(=O)O',
    { C: 1, H: 1, F: 3, O: 3, S: 1 },
    ['acid'],
    'FC(F)(F)S(=O)(=O)[O-]',
  ),
  leaving(
    'trifluoroacetic acid',
    'FC(F)(F)C(=O)O',
    { C: 2, H: 1, F: 3, O: 2 },
    ['acid'],
    'FC(F)(F)C(=O)[O-]',
  ),
  leaving('sulfuric acid', 'OS(=O)(=O)O', { H: 2, O: 4, S: 1 }, ['acid'], 'OS(=O)(=O)[O-]'),
  leaving('methyl sulfate', 'COS(=O)(=O)O', { C: 1, H: 4, O: 4, S: 1 }, ['acid'], 'COS(=O)(=O)[O-]'),
  leaving('dimethylamine', 'CNC', { C: 2, H: 7, N: 1 }, ['gas']),
  leaving('succinimide', 'O=C1CCC(=O)N1', { C: 4, H: 5, N: 1, O: 2 }),
  leaving('benzyl alcohol', 'OCc1ccccc1', { C: 7, H: 8, O: 1 }),
  leaving('toluene', 'Cc1ccccc1', { C: 7, H: 8 }),
  leaving('benzoic acid', 'OC(=O)c1ccccc1', { C: 7, H: 6, O: 2 }),
  leaving('phenol', 'Oc1ccccc1', { C: 6, H: 6, O: 1 }),
  leaving('imidazole', 'c1c[nH]cn1', { C: 3, H: 4, N: 2 }),
  leaving('4-nitrophenol', 'Oc1ccc(cc1)[N+](=O)[O-]', { C: 6, H: 5, N: 1, O: 3 }),
  leaving('trimethylsilanol', 'C[Si](C)(C)O', { C: 3, H: 10, O: 1, Si: 1 }),
  leaving('tert-butyldimethylsilanol', 'CC(C)(C)[Si](C)(C)O', { C: 6, H: 16, O: 1, Si: 1 }),
  leaving('triphenylphosphine oxide', 'O=P(c1ccccc1)(c1ccccc1)c1ccccc1', { C: 18, H: 15, O: 1, P: 1 }),
  leaving('diethyl hydrogen phosphate', 'CCOP(=O)(O)OCC', { C: 4, H: 11, O: 4, P: 1 }),
  leaving('boric acid', 'OB(O)O', { B: 1, H: 3, O: 3 }),
  leaving('hydrogen', '[H][H]', { H: 2 }, ['gas']),
  leaving('hydrogen cyanide', 'C#N', { C: 1, H: 1, N: 1 }, ['gas']),
  leaving('hydrogen sulfide', 'S', { H: 2, S: 1 }, ['gas']),
];
