/**
 * How warm a flask gets from proton transfers if no heat leaves it.
 *
 * Knows: rows of `heats` and `enthalpies`, heat capacities of solvents.  Must not know: text.
 * Units: kJ (negative where heat is set free), kelvin.
 * Accuracy: enthalpies in water stand for all solvents; a figure for planning, never a safety assessment.
 * Invariant: nothing added, nothing heated; twice the flask, the same rise.   (tests/flask/shares.test.ts)
 */
import { constantsIn as constantsOf } from '../chemistry/constants.ts';
import type { HeatRow } from '../tables/rows.ts';
import type { Tables } from '../tables/tables.ts';
import { isCalled } from './kinetics.ts';
import { ledgerOf, type Transfer } from './ledger.ts';
import { solveContents } from './solve.ts';
import type { ConstantsIn, Contents, Ingredient, Medium, Site } from './state.ts';
import { enthalpyOf } from './temperature.ts';

export interface HeatPart {
  readonly from: Site;
  readonly to: Site;
  readonly mol: number;
  readonly heat: number;
}

export interface HeatBalance {
  /** kJ; negative where heat is set free. */
  readonly heat: number;
  /** K; null without a solvent of known heat capacity. */
  readonly rise: number | null;
  /** Largest first. */
  readonly parts: readonly HeatPart[];
  /** Keys of the sources drawn on. */
  readonly sources: readonly string[];
}

/** kJ/K of a litre of water and of a litre of organic solvent of unknown heat capacity (common practice). */
const WATER_CAPACITY = 4.18;
const ORGANIC_CAPACITY = 1.7;
/** kJ/mol of giving up a proton where no enthalpy is tabulated: 5.7 kJ for each unit of pKa, entropy left out. */
const PER_UNIT = 5.71;

/** The heat of the proton transfers that an addition brings about, and the rise if none of it leaves. */
export function heatOfAddition(
  before: Contents,
  added: readonly Ingredient[],
  tables: Tables,
  constantsIn: ConstantsIn = constantsOf,
): HeatBalance {
  const after: Contents = { ...before, ingredients: [...before.ingredients, ...added] };
  const [old, now] = [before, after].map((contents) => solveContents(contents, tables, constantsIn));
  const heats = neutralisation(tables);
  const sources = new Set(heats === null ? [] : heats.sources);
  const partsOf = (transfers: readonly Transfer[], contents: Contents) =>
    transfers.map((transfer): HeatPart => {
      const { heat, from } = heatOfTransfer(transfer, contents, tables);
      for (const source of from) sources.add(source);
      return { from: transfer.from, to: transfer.to, mol: transfer.mol, heat };
    });
  const parts = partsOf(ledgerOf(now!), after);
  const sum = (list: readonly HeatPart[]) => list.reduce((total, { heat }) => total + heat, 0);
  const heat = sum(parts) - sum(partsOf(ledgerOf(old!), before));
  const capacity = heatCapacity(after, now!.medium);
  return {
    heat,
    rise: capacity === null ? null : -heat / capacity,
    parts: [...parts].sort((a, b) => a.heat - b.heat),
    sources: [...sources],
  };
}

function heatOfTransfer(
  { from, to, mol, fromSolvent, toSolvent }: Transfer,
  { ingredients }: Contents,
  tables: Tables,
): { heat: number; from: readonly string[] } {
  const taker = ingredients.find(({ id }) => id === to.ingredient);
  const row = taker === undefined ? undefined : tables.heats.find(({ what }) => isCalled(taker, what));
  // A reagent that gives its heat with water gives more with a stronger acid, by what that acid gains over water.
  if (row !== undefined && !toSolvent) return { heat: mol * row.heat, from: row.sources };
  const giving = givingUp(from, fromSolvent, tables);
  const taking = givingUp(to, toSolvent, tables);
  return { heat: mol * (giving.enthalpy - taking.enthalpy), from: [...giving.sources, ...taking.sources] };
}

/** Enthalpy of giving up a proton to water, kJ/mol. */
function givingUp(
  { couple, constant }: Site,
  isSolvent: boolean,
  tables: Tables,
): { enthalpy: number; sources: readonly string[] } {
  const row = neutralisation(tables);
  if (couple.group === 'water' || (isSolvent && couple.kind === 'acid')) {
    return { enthalpy: -(row?.heat ?? 0), sources: row?.sources ?? [] };
  }
  if (isSolvent) return { enthalpy: 0, sources: [] };
  const known = enthalpyOf(couple, 1, tables);
  if (known !== null) return { enthalpy: known.enthalpy, sources: known.sources };
  // Strong acids have given their proton to water already.
  return { enthalpy: PER_UNIT * Math.max(0, constant.value), sources: [] };
}

function neutralisation({ heats }: Tables): HeatRow | null {
  return heats.find(({ what }) => what === 'class:strong-acid-strong-base') ?? null;
}

function heatCapacity({ ingredients }: Contents, medium: Medium): number | null {
  if (medium.solvent === null) return null;
  let capacity = 0;
  for (const { solvent, role, volume } of ingredients) {
    if (solvent === null || role === 'inert') continue;
    const litres = volume !== null && 0 < volume ? volume : role === 'solvent' ? medium.volume : 0;
    const perGram = solvent.heatCapacity;
    const perLitre =
      perGram !== null && solvent.density !== null
        ? perGram * solvent.density
        : solvent.kind === 'water'
          ? WATER_CAPACITY
          : ORGANIC_CAPACITY;
    capacity += litres * perLitre;
  }
  return capacity === 0 ? null : capacity;
}
