/**
 * Flasks by hand: molecules with stated constants, so that the flask is tested apart from the chemistry that estimates.
 *
 * Values are those of Bordwell (DMSO) and the usual tables (water), rounded; what matters is the flask's arithmetic.
 */
import type { Constant, Couple, Perceived, ProtonStep } from '../../server/src/chemistry/couple.ts';
import type { ConstantsIn, Contents, Ingredient, Role } from '../../server/src/flask/state.ts';
import type { ReagentRole, ReagentRow, SolventRow } from '../../server/src/tables/rows.ts';
import { readTables, type Tables } from '../../server/src/tables/tables.ts';
import { readTable } from '../../server/tools/read-table.ts';

const anySource = { has: () => true } as unknown as ReadonlySet<string>;
const rows = (name: string) =>
  readTable(`data/${name}.csv`, `data/schema/${name}.json`, anySource).map(({ cells }) => cells);

/** The flask's own tables as they stand; all others empty. */
export const tables: Tables = readTables({
  version: 'kit',
  groups: [],
  substituents: [],
  frames: [],
  activation: [],
  measured: [],
  scales: [],
  solvents: [],
  reagents: [],
  cautions: [],
  limits: [],
  stability: [],
  kinetics: rows('kinetics'),
  heats: rows('heats'),
  enthalpies: rows('enthalpies'),
  gases: rows('gases'),
  hydrides: rows('hydrides'),
  sources: [],
});

export interface CoupleSpec {
  readonly group: string;
  readonly family: string;
  readonly element: string;
  readonly kind?: 'acid' | 'base';
  readonly held?: boolean;
  readonly water?: number;
  readonly dmso?: number;
  readonly alcohol?: number;
  readonly sd?: number;
  readonly component?: number;
}

const known = new WeakMap<Perceived, readonly CoupleSpec[]>();

/** A molecule of stated couples; components carry the charges given. */
export function molecule(
  couples: readonly CoupleSpec[],
  charges: readonly number[] = [0],
  molarMass = 100,
): Perceived {
  const made: Perceived = {
    smiles: `kit:${JSON.stringify([couples, charges])}`,
    key: JSON.stringify(couples.map(({ group }) => group)),
    problem: null,
    graph: null,
    components: charges.map((charge, index) => ({
      index,
      atoms: [],
      charge,
      bareCharge:
        charge - couples.filter(({ component, held }) => (component ?? 0) === index && (held ?? true)).length,
      spectator: !couples.some(({ component }) => (component ?? 0) === index),
    })),
    couples: couples.map(
      (spec, atom): Couple => ({
        atom,
        element: spec.element,
        group: spec.group,
        groupName: spec.group,
        kind: spec.kind ?? 'acid',
        family: spec.family,
        holdsProton: spec.held ?? true,
        equivalents: [atom],
        component: spec.component ?? 0,
      }),
    ),
    uncovered: [],
    molarMass,
  };
  known.set(made, couples);
  return made;
}

/** Reads the stated constants back. */
export const constantsIn: ConstantsIn = (perceived, scale) => {
  const specs = known.get(perceived)!;
  const constant = (spec: CoupleSpec): Constant | null => {
    const value = scale === 'water' ? spec.water : scale === 'EtOH' ? spec.alcohol : spec.dmso;
    if (value === undefined) return null;
    return { value, sd: spec.sd ?? 0.3, scale, origin: 'measured', sources: [], hops: [] };
  };
  const couples = specs.map(constant);
  const steps = perceived.components.map(({ index }) =>
    perceived.couples
      .flatMap((couple, place): ProtonStep[] => {
        const value = couples[place] ?? null;
        return couple.component !== index || value === null ? [] : [{ couple, constant: value }];
      })
      .sort((a, b) => a.constant.value - b.constant.value),
  );
  return { couples, steps };
};

const solvent = (row: Partial<SolventRow> & Pick<SolventRow, 'name' | 'kind' | 'scale'>): SolventRow => ({
  synonyms: [],
  smiles: '',
  key: row.name,
  density: 0.9,
  boilingPoint: null,
  meltingPoint: null,
  permittivity: null,
  pKs: null,
  lyoniumPKa: null,
  lyatePKa: null,
  ownCoupleSd: 0.2,
  protonTransferEnergy: null,
  transferSd: null,
  waterMiscibility: 'yes',
  scaleSd: 0,
  protic: false,
  heatCapacity: 2,
  sources: [],
  basis: 'recalled',
  ...row,
});

export const WATER = solvent({
  name: 'water',
  kind: 'water',
  scale: 'water',
  density: 0.99705,
  lyoniumPKa: -1.743,
  lyatePKa: 15.738,
  protic: true,
  heatCapacity: 4.18,
});
export const ETHANOL = solvent({
  name: 'EtOH',
  kind: 'alcohol',
  scale: 'EtOH',
  density: 0.789,
  lyoniumPKa: -1.2,
  lyatePKa: 20.1,
  protic: true,
  scaleSd: 0.5,
});
export const DMSO = solvent({
  name: 'DMSO',
  kind: 'sulfoxide',
  scale: 'DMSO',
  lyatePKa: 35.1,
  lyoniumPKa: -1.5,
});
export const DMF = solvent({ name: 'DMF', kind: 'amide', scale: 'DMSO', scaleSd: 0.7 });
export const MECN = solvent({ name: 'MeCN', kind: 'nitrile', scale: 'DMSO', lyatePKa: 31.3, scaleSd: 1 });
export const THF = solvent({ name: 'THF', kind: 'ether', scale: 'DMSO', scaleSd: 1.5 });
export const TOLUENE = solvent({
  name: 'toluene',
  kind: 'aromatic',
  scale: 'DMSO',
  scaleSd: 2,
  waterMiscibility: 'no',
});
export const DCM = solvent({
  name: 'CH2Cl2',
  kind: 'halogenated',
  scale: 'DMSO',
  scaleSd: 1.5,
  waterMiscibility: 'no',
});
const MASS: Readonly<Record<string, number>> = {
  water: 18.015,
  EtOH: 46.07,
  DMSO: 78.13,
  DMF: 73.09,
  MeCN: 41.05,
  THF: 72.11,
  toluene: 92.14,
  CH2Cl2: 84.93,
};

/** A reagent's row with what matters to the flask. */
export function reagentRow(
  name: string,
  roles: readonly ReagentRole[],
  more: Partial<ReagentRow> = {},
): ReagentRow {
  return {
    name,
    roles,
    synonyms: [],
    smiles: null,
    key: null,
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
    sources: [],
    basis: 'recalled',
    ...more,
  };
}

export interface Part {
  readonly name: string;
  readonly molecule: Perceived | null;
  readonly mol: number;
  readonly role?: Role;
  readonly reagent?: ReagentRow;
}

/** A flask of parts in a solvent, 1 L unless another volume is given. */
export function flask(
  solvents: readonly (readonly [SolventRow, number])[],
  parts: readonly Part[],
  temperature = 298.15,
): Contents {
  const poured = solvents.map(
    ([row, volume], place): Ingredient => ({
      id: place,
      name: row.name,
      molecule: molecule([], [0], MASS[row.name] ?? 80),
      mol: (volume * (row.density ?? 1) * 1000) / (MASS[row.name] ?? 80),
      volume,
      role: 'solvent',
      reagent: null,
      solvent: row,
      assumed: false,
      qualifier: null,
    }),
  );
  const added = parts.map(
    (part, place): Ingredient => ({
      id: solvents.length + place,
      name: part.name,
      molecule: part.molecule,
      mol: part.mol,
      volume: null,
      role: part.role ?? 'compound',
      reagent: part.reagent ?? null,
      solvent: null,
      assumed: false,
      qualifier: null,
    }),
  );
  return { ingredients: [...poured, ...added], temperature };
}

type Known = readonly [
  group: string,
  family: string,
  element: string,
  water: number,
  dmso: number,
  alcohol: number,
];
const acid = (
  [group, family, element, water, dmso, alcohol]: Known,
  held = true,
  component = 0,
): CoupleSpec => ({
  group,
  family,
  element,
  water,
  dmso,
  alcohol,
  held,
  component,
});
const base = (known: Known, held = false, component = 0): CoupleSpec => ({
  ...acid(known, held, component),
  kind: 'base',
});

const HYDROXIDE: Known = ['water', 'water', 'O', 15.74, 31.4, 19];
const ETHOXIDE: Known = ['alcohol-primary', 'alcohol', 'O', 15.9, 29.8, 20.1];
const T_BUTOXIDE: Known = ['alcohol-tertiary', 'alcohol', 'O', 17, 32.2, 21];
const KETONE: Known = ['ketone-ch', 'carbon-acid', 'C', 19.3, 26.5, 23];
const TRIETHYLAMINE: Known = ['amine-tertiary', 'ammonium', 'N', 10.75, 9.0, 10.3];
const DIISOPROPYLAMIDE: Known = ['amine-nh-hindered', 'amine-nh', 'N', 36, 36, 36];

/** Substances of everyday steps. */
export const stock = {
  ketone: () => molecule([acid(KETONE)]),
  ester: () => molecule([acid(['ester-ch', 'carbon-acid', 'C', 25.6, 29.5, 28])]),
  malonate: () => molecule([acid(['malonate-ch', 'carbon-acid', 'C', 13.3, 16.4, 16.5])]),
  nitrile: () => molecule([acid(['nitrile-ch', 'carbon-acid', 'C', 28.9, 31.3, 31])]),
  phenol: () => molecule([acid(['phenol', 'phenol', 'O', 9.99, 18, 14])]),
  carboxylicAcid: () => molecule([acid(['carboxylic-acid', 'carboxylic-acid', 'O', 4.76, 12.6, 10.3])]),
  alcohol: () => molecule([acid(ETHOXIDE)]),
  alkyne: () => molecule([acid(['alkyne-terminal', 'alkyne', 'C', 25, 32, 30])]),
  arene: () => molecule([acid(['aryl-ch', 'carbon-acid', 'C', 43, 44.5, 44])]),
  thiol: () => molecule([acid(['thiol', 'thiol', 'S', 10.6, 17, 14])]),
  amine: () => molecule([base(['amine-primary', 'ammonium', 'N', 10.65, 11, 11])]),
  enolate: () => molecule([acid(KETONE, false)], [-1]),
  NaOH: () => molecule([acid(HYDROXIDE, false)], [-1, 1]),
  NaOEt: () => molecule([acid(ETHOXIDE, false)], [-1, 1]),
  KOtBu: () => molecule([acid(T_BUTOXIDE, false)], [-1, 1]),
  LDA: () => molecule([acid(DIISOPROPYLAMIDE, false)], [-1, 1]),
  diisopropylamine: () =>
    molecule([acid(DIISOPROPYLAMIDE), base(['amine-secondary', 'ammonium', 'N', 11, 10.7, 11])]),
  LiHMDS: () => molecule([acid(['disilazane', 'amine-nh', 'N', 27, 30, 27], false)], [-1, 1]),
  nBuLi: () => molecule([acid(['alkane-ch', 'carbon-acid', 'C', 50, 55, 50], false)], [-1, 1]),
  NaH: () => molecule([acid(['dihydrogen', 'dihydrogen', 'H', 35, 35, 35], false)], [-1, 1]),
  Et3N: () => molecule([base(TRIETHYLAMINE)]),
  Et3NHCl: () =>
    molecule(
      [base(TRIETHYLAMINE, true), acid(['hydrogen-chloride', 'mineral-acid', 'Cl', -6, 1.8, 0], false, 1)],
      [1, -1],
    ),
  DBU: () => molecule([base(['amidine-bicyclic', 'amidinium', 'N', 13.5, 13.9, 13.5])]),
  pyridine: () => molecule([base(['pyridine', 'pyridinium', 'N', 5.22, 3.4, 4.4])]),
  carbonate: () =>
    molecule(
      [
        acid(['carbonic-acid', 'carboxylic-acid', 'O', 6.35, 12, 11], false),
        acid(['carbonic-acid', 'carboxylic-acid', 'O', 10.33, 17, 15], false),
      ],
      [-2, 1, 1],
    ),
  bicarbonate: () =>
    molecule(
      [
        acid(['carbonic-acid', 'carboxylic-acid', 'O', 6.35, 12, 11], false),
        acid(['carbonic-acid', 'carboxylic-acid', 'O', 10.33, 17, 15], true),
      ],
      [-1, 1],
    ),
  HCl: () => molecule([acid(['hydrogen-chloride', 'mineral-acid', 'Cl', -6, 1.8, 0])]),
  NH4Cl: () =>
    molecule(
      [
        base(['ammonia', 'ammonium', 'N', 9.25, 10.5, 10.5], true),
        acid(['hydrogen-chloride', 'mineral-acid', 'Cl', -6, 1.8, 0], false, 1),
      ],
      [1, -1],
    ),
} as const;
