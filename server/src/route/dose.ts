/**
 * Works out what an amount as written brings into the flask: mol, mass, volume and the solvents that come with it.
 *
 * Knows: quantities, molar masses, densities, usual strengths.  Must not know: acidity, statements, text.
 * Units: mol, g, L; densities g/mL.
 * Invariant: two ways of fixing the same mol agree within 5 % or are reported.       (tests/route/resolve.test.ts)
 */
import type { Amount, Substance } from './plan.ts';
import { structureOf } from './structures.ts';
import type { Quantity } from './units.ts';

/** The compound that `equiv`, `mol%` and `vol` refer to. */
export interface Basis {
  readonly mol: number;
  /** g; null where its molar mass is not known. */
  readonly mass: number | null;
}

/** An amount with its names resolved. */
export interface Written {
  readonly quantities: readonly { readonly quantity: Quantity; readonly portions: number }[];
  readonly qualifier: 'excess' | 'catalytic' | null;
  readonly saturated: boolean;
  readonly strength: Quantity | null;
  /** What the strength names as its solvent: `2.5 M in hexanes`. */
  readonly medium: Substance | null;
  readonly carriers: Amount['carriers'];
}

export interface Dose extends Omit<Amount, 'range'> {
  /** Two ways of writing the same mol that differ, in mol. */
  readonly disagreement: readonly [number, number] | null;
  /** A volume or mass is written from which no mol can be worked out. */
  readonly stuck: boolean;
}

/** mol/L at which solvents without a volume are taken. */
export const USUAL_CONCENTRATION = 0.2;
const TOLERANCE = 0.05;
/** equiv that the two words stand for. */
const EXCESS = 5;
const CATALYTIC = 0.1;
const ML_PER_L = 1000;

interface Stock {
  readonly molarity: number | null;
  readonly massShare: number | null;
  /** Name of the solvent that comes with it where the writer names none; null where it comes neat. */
  readonly solvent: string | null;
  /** Taken from how the reagent is bought, so that it settles nothing that the writer has settled. */
  readonly usual: boolean;
}

/** g/mol of a substance; null where nothing is known. */
export function molarMassOf({ reagent, smiles }: Substance): number | null {
  return reagent?.molarMass ?? (smiles === null ? null : structureOf(smiles).molarMass);
}

/** g/mL of a substance as a neat liquid. */
export function densityOf({ reagent, solvent }: Substance): number | null {
  return solvent?.density ?? reagent?.density ?? null;
}

/** The dose of one addition; `find` looks up the solvent that a stock solution brings. */
export function doseOf(
  substance: Substance,
  written: Written,
  basis: Basis | null,
  find: (name: string) => Substance | null,
): Dose {
  const { quantities, qualifier } = written;
  const mass = molarMassOf(substance);
  const stock = stockOf(substance, written, mass);
  const volume = volumeOf(written, basis);
  const estimates: number[] = [];
  let stuck = false;
  const settled = quantities.some(({ quantity }) =>
    ['substance', 'mass', 'equiv', 'mol-share'].includes(quantity.dimension),
  );
  for (const { quantity, portions } of quantities) {
    if (settled && stock.usual && ['volume', 'relative-volume'].includes(quantity.dimension)) continue;
    const total = { dimension: quantity.dimension, value: quantity.value * portions };
    const mol = molOf(total, substance, stock, mass, basis);
    if (mol === null) stuck ||= ['mass', 'volume'].includes(quantity.dimension);
    else estimates.push(mol);
  }
  const first = estimates[0];
  const other = first === undefined ? undefined : estimates.find((mol) => !agree(mol, first));
  const guess = qualifier === 'excess' ? EXCESS : qualifier === 'catalytic' ? CATALYTIC : 1;
  const mol = first ?? (basis === null ? null : guess * basis.mol);
  const solution = volume ?? solutionVolume(mol, stock, written, substance, mass);
  return {
    mol,
    equiv: mol === null || basis === null ? null : mol / basis.mol,
    volume: solution,
    mass: mol === null || mass === null ? writtenMass(written) : mol * mass,
    portions: quantities.reduce((most, { portions }) => Math.max(most, portions), 1),
    qualifier,
    assumed: first === undefined,
    carriers: [...written.carriers, ...stockCarrier(substance, written, stock, solution, mol, mass, find)],
    disagreement: other === undefined || first === undefined ? null : [first, other],
    stuck: stuck && first === undefined,
  };
}

/** L of a liquid written as volume, as `vol`, by mass, or as mol; null where nothing is written. */
export function liquidVolume(
  substance: Substance | null,
  written: Written,
  basis: Basis | null,
): number | null {
  const volume = volumeOf(written, basis);
  if (volume !== null || substance === null) return volume;
  const density = densityOf(substance);
  const dose = doseOf(substance, written, basis, () => null);
  return dose.assumed || density === null || dose.mass === null ? null : dose.mass / density / ML_PER_L;
}

function agree(one: number, other: number): boolean {
  return Math.abs(one - other) <= TOLERANCE * Math.max(one, other);
}

function volumeOf({ quantities }: Written, basis: Basis | null): number | null {
  for (const { quantity, portions } of quantities) {
    if (quantity.dimension === 'volume') return quantity.value * portions;
    if (quantity.dimension === 'relative-volume' && basis !== null && basis.mass !== null) {
      return (quantity.value * portions * basis.mass) / ML_PER_L;
    }
  }
  return null;
}

function writtenMass({ quantities, strength }: Written): number | null {
  const found = quantities.find(({ quantity }) => quantity.dimension === 'mass');
  if (found === undefined) return null;
  const share = strength?.dimension === 'mass-share' ? strength.value : 1;
  return found.quantity.value * found.portions * share;
}

/** The strength that holds: as written, saturated, or as the reagent is bought when only a volume is written. */
function stockOf(
  { reagent }: Substance,
  { strength, saturated, quantities }: Written,
  mass: number | null,
): Stock {
  const bought = reagent?.stockSolvent ?? null;
  const none = { molarity: null, massShare: null, usual: false };
  // A share by mass may be that of a solid, so it brings a solvent only where the reagent is sold in one.
  if (strength?.dimension === 'mass-share') return { ...none, massShare: strength.value, solvent: bought };
  const molarity =
    strength?.dimension === 'molarity'
      ? strength.value
      : strength?.dimension === 'mass-concentration' && mass !== null
        ? strength.value / mass
        : null;
  if (molarity !== null) return { ...none, molarity, solvent: bought ?? 'water' };
  if (saturated) return { ...none, molarity: reagent?.saturatedMolarity ?? null, solvent: 'water' };
  const byVolume = quantities.some(({ quantity }) =>
    ['volume', 'relative-volume'].includes(quantity.dimension),
  );
  const isDissolved = reagent !== null && (reagent.stockMolarity !== null || reagent.stockMassShare !== null);
  if (!byVolume || !isDissolved) return { ...none, solvent: null };
  const { stockMolarity, stockMassShare } = reagent;
  return { molarity: stockMolarity, massShare: stockMassShare, solvent: bought ?? 'water', usual: true };
}

function molOf(
  { dimension, value }: Quantity,
  substance: Substance,
  stock: Stock,
  mass: number | null,
  basis: Basis | null,
): number | null {
  switch (dimension) {
    case 'substance':
      return value;
    case 'equiv':
    case 'mol-share':
      return basis === null ? null : value * basis.mol;
    case 'mass':
      return mass === null ? null : (value * (stock.massShare ?? 1)) / mass;
    case 'volume':
      return molInVolume(value, substance, stock, mass);
    case 'relative-volume':
      return basis === null || basis.mass === null
        ? null
        : molInVolume((value * basis.mass) / ML_PER_L, substance, stock, mass);
    default:
      return null;
  }
}

function molInVolume(litres: number, substance: Substance, stock: Stock, mass: number | null): number | null {
  if (stock.molarity !== null) return litres * stock.molarity;
  const density =
    stock.massShare === null ? densityOf(substance) : densityOfStock(substance, stock.massShare);
  // A solution of a solvent row would be taken for the neat liquid, so without a strength only neat ones count.
  if (density === null || mass === null) return null;
  return (litres * ML_PER_L * density * (stock.massShare ?? 1)) / mass;
}

/** The row's density is that of the reagent as bought; other strengths have none. */
function densityOfStock({ reagent }: Substance, massShare: number): number | null {
  const bought = reagent?.stockMassShare ?? null;
  return reagent !== null && bought !== null && Math.abs(bought - massShare) < 0.03 ? reagent.density : null;
}

function solutionVolume(
  mol: number | null,
  { molarity, massShare }: Stock,
  { strength, saturated }: Written,
  substance: Substance,
  mass: number | null,
): number | null {
  if (mol === null) return null;
  if (molarity !== null && (strength !== null || saturated)) return mol / molarity;
  const density = massShare === null ? densityOf(substance) : densityOfStock(substance, massShare);
  if (density === null || mass === null) return null;
  return (mol * mass) / (massShare ?? 1) / density / ML_PER_L;
}

/** The solvent that a solution brings, as much of it as the solution has room for. */
function stockCarrier(
  substance: Substance,
  { medium }: Written,
  stock: Stock,
  solution: number | null,
  mol: number | null,
  mass: number | null,
  find: (name: string) => Substance | null,
): Amount['carriers'] {
  const solvent = medium ?? (stock.solvent === null ? null : find(stock.solvent));
  if (solvent === null) return [];
  if (stock.massShare === null || mol === null || mass === null) return [{ solvent, volume: solution }];
  const density = densityOf(solvent);
  const grams = (mol * mass * (1 - stock.massShare)) / stock.massShare;
  const isItself = solvent.smiles !== null && solvent.smiles === substance.smiles;
  if (isItself) return [];
  return [{ solvent, volume: density === null ? null : grams / density / ML_PER_L }];
}
