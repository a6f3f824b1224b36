/** Molecules with one site of interest, each written in several ways; the site carries :1. */
export const WRITTEN_TWICE: readonly (readonly string[])[] = [
  ['[OH:1]c1ccc(cc1)[N+](=O)[O-]', 'O=[N+]([O-])c1ccc([OH:1])cc1', 'c1cc([OH:1])ccc1N(=O)=O'],
  ['CC(=O)[OH:1]', '[OH:1]C(C)=O'],
  ['Cc1cccc([n:1]1)C', 'C1=CC(C)=[N:1]C(C)=C1'],
  ['[OH:1]C(=O)C(F)(F)F', 'FC(F)(F)C([OH:1])=O'],
  ['C[N:1]1CCOCC1', 'O1CC[N:1](C)CC1'],
  ['[NH2:1]c1ccc2ccccc2c1', 'c1ccc2cc([NH2:1])ccc2c1'],
  ['CCOC(=O)[CH2:1]C(C)=O', 'CC(=O)[CH2:1]C(=O)OCC'],
  ['c1cc2[nH]c[n:1]c2cc1', '[n:1]1c[nH]c2ccccc12'],
];
