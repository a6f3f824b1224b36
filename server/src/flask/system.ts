/**
 * Turns the contents of a flask into acids with stepwise constants: what the balance is solved for.
 *
 * Here the flask departs from bare tables: solvents enter by their own couples, dead protons stay where they are, solid
 * bases act from their surface, hydrides by what their class takes, and in two layers the neutral forms share out.
 * Knows: ingredients, rows.  Must not know: intended transfers, verdicts, text.
 * Units: mol; pKa on the medium's scale.
 * Invariants: ids of ingredients are kept; an ingredient without usable amount or structure gives nothing.   (tests/flask/judge.test.ts)
 */
import type { Component, Constant, Couple, Perceived, ProtonStep } from '../chemistry/couple.ts';
import type { SolventRow } from '../tables/rows.ts';
import type { Tables } from '../tables/tables.ts';
import { PKA_OF_HYDRONIUM, pKaOfWater } from './balance.ts';
import { coupledSteps } from './carbon-sites.ts';
import { distribution } from './distribution.ts';
import type { FlaskAcid, FlaskSystem, Participation } from './flask-acid.ts';
import { withIonPairs } from './ion-pairing.ts';
import { rateOf } from './kinetics.ts';
import { isSolidBase, isWater, usable } from './medium.ts';
import { hydrideAcid, surfaceAcid } from './practical-bases.ts';
import { heldInSalt } from './salts.ts';
import { stepsIn } from './scale-choice.ts';
import type { ConstantsIn, Contents, Ingredient, Medium } from './state.ts';
import { atTemperature } from './temperature.ts';
import { pKwOfLiquid } from './water-constant.ts';

/** On the DMSO scale, from which an organometallic rather adds or does nothing than take a proton from carbon. */
const SPARED_FROM = 20;
/** A carbon acid that does give its proton to an organometallic before anything else. */
const EATING_FAMILIES = new Set(['alkyne', 'hydrogen-cyanide']);
/** Solvents to which an organometallic or a hydride adds. */
const CARBONYL_SOLVENTS = new Set(['ester', 'amide', 'carbonate', 'urea']);
const HOT_WATER = 100;
const ZERO_CELSIUS = 273.15;

/** The acids of a flask. */
export function systemOf(
  contents: Contents,
  medium: Medium,
  tables: Tables,
  constantsIn: ConstantsIn,
  participation: Participation = {},
): FlaskSystem {
  const celsius = Math.min(Math.max(contents.temperature - ZERO_CELSIUS, 0), HOT_WATER);
  const pKw = medium.aqueous ? pKwOfLiquid(celsius) : null;
  const build: Build = { contents, medium, tables, constantsIn, participation, pKw };
  const acids: FlaskAcid[] = [];
  let spectatorCharges = 0;
  const solventMol = new Map<string, number>();
  for (const one of contents.ingredients) {
    if (one.role === 'inert') continue;
    if (isGoverning(one, medium)) {
      const amount = solventAmount(one, medium);
      const before = solventMol.get(one.solvent!.name);
      solventMol.set(one.solvent!.name, (before ?? 0) + amount);
      if (before === undefined) acids.push(...solventAcids(one, 0, build));
      continue;
    }
    // Organic solvents over water meet its pH only through what they dissolve.
    if (one.role === 'solvent' && medium.organic !== null) continue;
    const { acids: more, charges } = ingredientAcids(one, build);
    acids.push(...more);
    spectatorCharges += charges;
  }
  const withSolvent = acids.map((acid) => {
    if (!acid.isSolvent) return acid;
    const total = solventMol.get(medium.solvent!.name)!;
    return { ...acid, amount: total };
  });
  const paired = withIonPairs(withSolvent, contents, medium, tables, constantsIn);
  return { acids: paired, spectatorCharges, pKw };
}

interface Build {
  readonly contents: Contents;
  readonly medium: Medium;
  readonly tables: Tables;
  readonly constantsIn: ConstantsIn;
  readonly participation: Participation;
  readonly pKw: number | null;
}

function isGoverning({ solvent }: Ingredient, medium: Medium): boolean {
  return solvent !== null && medium.solvent !== null && solvent.name === medium.solvent.name;
}

function solventAmount({ solvent, volume, mol, molecule }: Ingredient, medium: Medium): number {
  const litres = volume !== null && 0 < volume ? volume : medium.volume;
  return molOfLiquid(litres, { solvent, molecule }) ?? usable(mol);
}

/** mol of a solvent beside the one that governs: a tenth of water in THF still eats a Grignard reagent. */
function minorAmount({ solvent, volume, molecule }: Ingredient): number {
  return volume === null ? 0 : usable(molOfLiquid(volume, { solvent, molecule }) ?? 0);
}

function molOfLiquid(
  litres: number,
  { solvent, molecule }: Pick<Ingredient, 'solvent' | 'molecule'>,
): number | null {
  const [mass, density] = [molecule?.molarMass ?? null, solvent?.density ?? null];
  return mass === null || density === null ? null : (litres * 1000 * density) / mass;
}

/** The lyonium and lyate couples of the solvent that governs. */
function solventAcids(one: Ingredient, amount: number, build: Build): FlaskAcid[] {
  const lyonium = solventStep(one, 'base', build);
  const lyate = solventStep(one, 'acid', build);
  const steps = [lyonium, lyate].filter((step) => step !== null);
  if (steps.length === 0) return [];
  return [
    {
      ingredient: one.id,
      component: 0,
      steps,
      shifts: steps.map(() => 0),
      amount,
      protonsCharged: lyate === null ? 0 : 1,
      fullCharge: lyonium === null ? 0 : 1,
      gas: null,
      isSolvent: true,
      isSolventIon: false,
    },
  ];
}

/** A couple of the solvent with its own constant, or with that of its structure where the row has none; null without either. */
function solventStep(one: Ingredient, kind: Couple['kind'], build: Build): ProtonStep | null {
  const { medium, pKw } = build;
  const row = medium.solvent!;
  const alive = aliveCouples(one.molecule, kind, build);
  if (kind === 'acid' && build.participation.sparingCarbonyls && CARBONYL_SOLVENTS.has(row.kind)) return null;
  // Its protons are known, and none of them moves.
  if (alive.length === 0 && (one.molecule?.couples.length ?? 0) !== 0) return null;
  const value = ownValue(row, kind, medium, pKw);
  if (value === null) return structureStep(one, alive, build);
  const couple: Couple = alive[0] ?? {
    atom: 0,
    element: '',
    group: kind === 'base' ? 'lyonium' : 'lyate',
    groupName: row.name,
    kind,
    family: 'solvent',
    holdsProton: kind === 'acid',
    equivalents: [0],
    component: 0,
  };
  const sd = row.ownCoupleSd ?? 0;
  const what = kind === 'base' ? `protonated ${row.name}` : `${row.name} as an acid`;
  const hops = [{ what, value, sd, sources: row.sources }];
  return {
    couple,
    constant: { value, sd, scale: medium.scale, origin: 'measured', sources: row.sources, hops },
  };
}

/** A solvent's own constant counts only on the scale it was written for; water's follows the temperature. */
function ownValue(row: SolventRow, kind: Couple['kind'], medium: Medium, pKw: number | null): number | null {
  if (pKw !== null && isWater(row)) return kind === 'base' ? PKA_OF_HYDRONIUM : pKaOfWater(pKw);
  if (row.scale !== medium.scale) return null;
  return kind === 'base' ? row.lyoniumPKa : row.lyatePKa;
}

/** The easiest of the solvent's couples by the constants of its structure. */
function structureStep(
  { molecule }: Ingredient,
  alive: readonly Couple[],
  { constantsIn, medium, tables }: Build,
): ProtonStep | null {
  if (molecule === null) return null;
  const { couples } = constantsIn(molecule, medium.scale, tables);
  let best: ProtonStep | null = null;
  for (const couple of alive) {
    const constant = couples[molecule.couples.indexOf(couple)];
    if (constant == null) continue;
    const isEasier =
      best === null ||
      (couple.kind === 'acid' ? constant.value < best.constant.value : best.constant.value < constant.value);
    if (isEasier) best = { couple, constant };
  }
  return best;
}

/** The couples of a solvent that move, those on heteroatoms first. */
function aliveCouples(
  molecule: Perceived | null,
  kind: Couple['kind'],
  { contents, tables }: Build,
): Couple[] {
  const isAlive = (couple: Couple) =>
    kind === 'base' || rateOf(couple, 'leaves', contents, tables) === 'instant';
  return (molecule?.couples ?? [])
    .filter((couple) => couple.kind === kind && isAlive(couple))
    .sort((a, b) => Number(a.element === 'C') - Number(b.element === 'C'));
}

function ingredientAcids(one: Ingredient, build: Build): { acids: FlaskAcid[]; charges: number } {
  const { medium, tables, constantsIn } = build;
  const amount = one.role === 'solvent' ? minorAmount(one) : usable(one.mol);
  if (one.molecule === null || amount === 0) return { acids: [], charges: 0 };
  if (isSolidBase(one) && !medium.protic && medium.organic === null) {
    return { acids: surfaceAcid(one, amount, medium), charges: 0 };
  }
  const steps = stepsIn(one.molecule, one.own, medium, tables, constantsIn);
  const acids: FlaskAcid[] = [];
  let charges = 0;
  const meant = build.participation.intended?.find(({ ingredient }) => ingredient === one.id)?.couple ?? null;
  const drawn = one.molecule.components.map((component, place) => {
    const all = [...(steps[place] ?? [])].sort((a, b) => a.constant.value - b.constant.value);
    const moving = all.filter((step) => !step.couple.holdsProton || moves(step, one, build));
    const kept = coupledSteps(moving, one.molecule!, meant);
    const lacking = all.filter(({ couple }) => !couple.holdsProton).length;
    const held = kept.filter(({ couple }) => couple.holdsProton).length;
    return { component, all, steps: kept, held, fullCharge: component.charge + lacking };
  });
  const inSalt = heldInSalt(drawn);
  drawn.forEach(({ component, all, steps: kept, fullCharge }, place) => {
    if (kept.length === 0) {
      charges += amount * component.charge ** 2;
      return;
    }
    const own = ownSolvent(one, component, kept, build);
    const placed = kept.map((step) => ({
      ...step,
      constant:
        own?.get(step.couple.kind) ??
        (medium.aqueous
          ? atTemperature(
              step.constant,
              step.couple,
              placeAmong(all, step),
              build.contents.temperature,
              tables,
            )
          : step.constant),
    }));
    acids.push({
      ingredient: one.id,
      component: component.index,
      steps: placed,
      shifts: distribution(one, component, placed.length, fullCharge, medium),
      amount,
      protonsCharged: inSalt[place]!,
      fullCharge,
      gas: gasOf(kept, build),
      isSolvent: false,
      isSolventIon: own !== null,
    });
  });
  if (acids.length === 0) acids.push(...hydrideAcid(one, amount, medium, tables));
  return { acids, charges };
}

/** The constants of the solvent's own couples, where a component is the solvent or its ion; else null. */
function ownSolvent(
  { molecule }: Ingredient,
  { atoms }: Component,
  steps: readonly ProtonStep[],
  build: Build,
): Map<Couple['kind'], Constant> | null {
  const { contents, medium } = build;
  const solvent = contents.ingredients.find((one) => isGoverning(one, medium));
  if (solvent === undefined || medium.solvent === null) return null;
  const isSame = isWater(medium.solvent)
    ? steps.every(({ couple }) => couple.group === 'water' || couple.group === 'water-o')
    : sameAtoms(molecule!, atoms, solvent.molecule);
  if (!isSame) return null;
  const [acid] = solventAcids(solvent, 0, build);
  return new Map(acid?.steps.map(({ couple, constant }) => [couple.kind, constant]));
}

/** Whether a component and a solvent have the same heavy atoms and the same groups. */
function sameAtoms(molecule: Perceived, atoms: readonly number[], solvent: Perceived | null): boolean {
  if (molecule.graph === null || solvent?.graph == null) return false;
  const heavy = (list: readonly { readonly element: string }[]) =>
    list
      .map(({ element }) => element)
      .filter((element) => element !== 'H')
      .sort()
      .join();
  const there = new Set(atoms);
  const groups = (perceived: Perceived, inside: (atom: number) => boolean) =>
    perceived.couples
      .filter(({ atom }) => inside(atom))
      .map(({ group }) => group)
      .sort()
      .join();
  return (
    heavy(atoms.map((atom) => molecule.graph!.atoms[atom]!)) === heavy(solvent.graph.atoms) &&
    groups(molecule, (atom) => there.has(atom)) === groups(solvent, () => true)
  );
}

/** Which proton of the molecule a step is, from 1. */
function placeAmong(all: readonly ProtonStep[], { couple, constant }: ProtonStep): number {
  const own = all.filter((step) => step.couple.group === couple.group);
  return own.findIndex((step) => step.constant.value === constant.value) + 1;
}

/** Whether a proton that a molecule holds can leave it in this flask. */
function moves(
  { couple, constant }: ProtonStep,
  { id }: Ingredient,
  { contents, tables, participation, medium }: Build,
): boolean {
  const isIntended = participation.intended?.some(
    (meant) =>
      meant.ingredient === id && meant.couple.atom === couple.atom && meant.couple.kind === couple.kind,
  );
  if (isIntended) return true;
  if (rateOf(couple, 'leaves', contents, tables) !== 'instant') return false;
  if (!participation.sparingCarbonyls || couple.element !== 'C' || medium.aqueous) return true;
  return EATING_FAMILIES.has(couple.family) || constant.value < SPARED_FROM;
}

function gasOf(steps: readonly ProtonStep[], { tables, medium }: Build): FlaskAcid['gas'] {
  for (const row of tables.gases) {
    if (!steps.some(({ couple }) => row.groups.includes(couple.group))) continue;
    const molarity = medium.aqueous ? row.water : row.organic;
    // The neutral form must be one that these steps can reach.
    if (molarity === null || steps.length < row.protons) return null;
    return { name: row.name, protons: row.protons, most: molarity * medium.volume };
  }
  return null;
}
