/** A few rows to resolve names with, so that these tests do not depend on the contents of the real tables. */
import { substanceKey } from '../../server/src/route/structures.ts';
import type { ReagentRow, SolventRow } from '../../server/src/tables/rows.ts';
import { readTables } from '../../server/src/tables/tables.ts';

function solvent(
  names: string,
  smiles: string,
  density: number | null,
  more: Partial<SolventRow> = {},
): SolventRow {
  const [name, ...synonyms] = names.split('|');
  return {
    name: name!,
    synonyms,
    smiles,
    key: substanceKey(smiles)!,
    kind: 'other',
    density,
    boilingPoint: null,
    meltingPoint: null,
    permittivity: null,
    pKs: null,
    lyoniumPKa: null,
    lyatePKa: null,
    ownCoupleSd: null,
    protonTransferEnergy: null,
    transferSd: null,
    waterMiscibility: 'no',
    scale: 'DMSO',
    scaleSd: 1,
    protic: false,
    heatCapacity: null,
    sources: ['common-practice'],
    basis: 'recalled',
    ...more,
  } as SolventRow;
}

function reagent(names: string, smiles: string | null, more: Partial<ReagentRow> = {}): ReagentRow {
  const [name, ...synonyms] = names.split('|');
  return {
    name: name!,
    synonyms,
    smiles,
    key: smiles === null ? null : substanceKey(smiles),
    roles: [],
    molarMass: null,
    density: null,
    stockMolarity: null,
    stockMassShare: null,
    stockSolvent: null,
    saturatedMolarity: null,
    protonCapacity: null,
    surfaceCeiling: null,
    acidReleased: null,
    note: '',
    sources: ['common-practice'],
    basis: 'recalled',
    ...more,
  } as ReagentRow;
}

export const SMALL_TABLES = readTables({
  version: 'small',
  groups: [],
  substituents: [],
  frames: [],
  activation: [],
  measured: [],
  scales: [],
  cautions: [],
  limits: [],
  stability: [],
  kinetics: [],
  heats: [],
  sources: [],
  solvents: [
    solvent('water|H2O', 'O', 0.997, { scale: 'water' }),
    solvent('THF|tetrahydrofuran', 'C1CCOC1', 0.883),
    solvent('EtOAc|ethyl acetate', 'CCOC(C)=O', 0.895),
    solvent('EtOH|ethanol', 'CCO', 0.785),
    solvent('hexanes', 'CCCCCC', 0.655),
    solvent('mineral oil', 'CCCCCCCCCCCC', 0.85),
    solvent('DMSO', 'CS(C)=O', 1.096),
    solvent('Et3N|triethylamine', 'CCN(CC)CC', 0.726),
    solvent('acetic acid|AcOH', 'CC(=O)O', 1.044),
  ],
  reagents: [
    reagent('NaOEt', '[Na+].CC[O-]'),
    reagent('n-BuLi|butyllithium', '[Li]CCCC', { stockMolarity: 2.5, stockSolvent: 'hexanes' }),
    reagent('LDA', 'CC(C)[N-]C(C)C.[Li+]', { stockMolarity: 2, stockSolvent: 'THF' }),
    reagent('NH4Cl', '[NH4+].[Cl-]', { saturatedMolarity: 5 }),
    reagent('NaH', '[Na+].[H-]'),
    reagent('HCl', 'Cl', { stockMassShare: 0.37, density: 1.18, stockSolvent: 'water' }),
    reagent('Pd/C', null),
    reagent('BnBr|benzyl bromide', 'BrCc1ccccc1', { density: 1.438 }),
    reagent('Et3N|triethylamine', 'CCN(CC)CC', { density: 0.726 }),
    reagent('ethyl bromoacetate', 'CCOC(=O)CBr', { density: 1.506 }),
    reagent('sodium', '[Na]'),
  ],
});
