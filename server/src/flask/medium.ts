/**
 * Decides what surrounds the couples: one phase or two, the solvent that governs, the scale and what borrowing it costs.
 *
 * Knows: rows of solvents, volumes.  Must not know: constants, structures, text.
 * Units: litre.
 * Invariants: scaling all volumes changes nothing but the volumes; a flask without volumes gets one.   (tests/flask/fates.test.ts)
 * The rules for mixtures are common practice: a fifth of water or alcohol by volume already levels strong bases.
 */
import type { SolventRow } from '../tables/rows.ts';
import type { Contents, Ingredient, Medium } from './state.ts';

export const DEFAULT_CONCENTRATION = 0.2;
/** Share of the volume from which water or another hydroxylic solvent governs a mixture. */
const GOVERNING_SHARE = 0.2;
/** Water beside an immiscible solvent that the latter dissolves without a layer of its own. */
const DISSOLVED_SHARE = 0.02;
/** Units of pKa by which a full share of foreign solvent blurs the scale of the one that governs. */
const MIXING_SD = 1.2;
/** The practical ceilings of solid bases are held on the DMSO scale; judging another aprotic solvent on it costs this. */
const SURFACE_SCALE_SD = 1;
const HYDROXYLIC = new Set(['water', 'alcohol', 'acid']);
const APROTIC_SCALE = 'DMSO';
const NO_SOLVENT_SD = 2;

interface Liquid {
  readonly row: SolventRow;
  readonly volume: number;
}

/** What surrounds the couples of a flask. */
export function mediumOf(contents: Contents): Medium {
  const { liquids, assumedVolume } = liquidsOf(contents);
  if (liquids.length === 0) return withoutSolvent(contents);
  const total = sum(liquids);
  const water = sum(liquids.filter(({ row }) => isWater(row)));
  const immiscible = liquids.filter(({ row }) => !isWater(row) && row.waterMiscibility !== 'yes');
  if (DISSOLVED_SHARE * total < water && isLayered(liquids, immiscible, water, total)) {
    return twoLayers(liquids, immiscible, assumedVolume);
  }
  return onePhase(contents, liquids, total, assumedVolume);
}

/** Whether water separates: enough of it, and enough of something that does not mix with it. */
function isLayered(
  liquids: readonly Liquid[],
  immiscible: readonly Liquid[],
  water: number,
  total: number,
): boolean {
  const foreign = sum(immiscible);
  if (foreign < DISSOLVED_SHARE * total) return false;
  // Half of the volume in a solvent that mixes with both brings both into one phase.
  const between = total - water - foreign;
  const allPartly = immiscible.every(({ row }) => row.waterMiscibility === 'partly');
  if (allPartly && water < 2 * DISSOLVED_SHARE * foreign) return false;
  return between < 0.5 * total || liquids.length === 1;
}

function twoLayers(
  liquids: readonly Liquid[],
  immiscible: readonly Liquid[],
  assumedVolume: boolean,
): Medium {
  const below = liquids.filter((liquid) => !immiscible.includes(liquid));
  const water = below.find(({ row }) => isWater(row))!.row;
  return {
    solvent: water,
    scale: water.scale,
    scaleSd: water.scaleSd,
    volume: sum(below),
    assumedVolume,
    names: below.map(({ row }) => row.name),
    aqueous: true,
    protic: true,
    organic: {
      volume: sum(immiscible),
      names: immiscible.map(({ row }) => row.name),
      solvent: largest(immiscible),
    },
  };
}

function onePhase(
  contents: Contents,
  liquids: readonly Liquid[],
  total: number,
  assumedVolume: boolean,
): Medium {
  const share = (test: (row: SolventRow) => boolean) => sum(liquids.filter(({ row }) => test(row))) / total;
  const hydroxylic = liquids.filter(({ row }) => HYDROXYLIC.has(row.kind));
  const protic = GOVERNING_SHARE <= share((row) => HYDROXYLIC.has(row.kind));
  const aqueous = GOVERNING_SHARE <= share(isWater);
  const governing = aqueous
    ? liquids.find(({ row }) => isWater(row))!.row
    : largest(protic ? hydroxylic : liquids);
  const foreign = share((row) => row.name !== governing.name);
  const onSurface = !protic && hasSolidBase(contents) && governing.scale !== APROTIC_SCALE;
  return {
    solvent: governing,
    scale: onSurface ? APROTIC_SCALE : governing.scale,
    scaleSd: Math.hypot(
      onSurface ? Math.max(governing.scaleSd, SURFACE_SCALE_SD) : governing.scaleSd,
      MIXING_SD * foreign,
    ),
    volume: total,
    assumedVolume,
    names: liquids.map(({ row }) => row.name),
    aqueous,
    protic,
    organic: null,
  };
}

/** A flask without solvent is judged where molecules see each other: on the aprotic scale, with wide doubt. */
function withoutSolvent(contents: Contents): Medium {
  return {
    solvent: null,
    scale: APROTIC_SCALE,
    scaleSd: NO_SOLVENT_SD,
    volume: assumedVolumeOf(contents),
    assumedVolume: true,
    names: [],
    aqueous: false,
    protic: false,
    organic: null,
  };
}

/** Everything liquid that counts as solvent: what is written as such, and reagents that are a fifth of the volume. */
function liquidsOf(contents: Contents): { liquids: Liquid[]; assumedVolume: boolean } {
  const rows = contents.ingredients.filter(({ solvent, role }) => solvent !== null && role !== 'inert');
  const solvents = rows.filter(({ role }) => role === 'solvent');
  const written = solvents.filter(({ volume }) => volume !== null && 0 < volume);
  const assumedVolume = written.length === 0;
  const assumed = assumedVolumeOf(contents) / Math.max(solvents.length, 1);
  const liquids = (assumedVolume ? solvents : written).map(({ solvent, volume }) => ({
    row: solvent!,
    volume: volume !== null && 0 < volume ? volume : assumed,
  }));
  const total = sum(liquids);
  for (const { solvent, role, volume } of rows) {
    if (role === 'solvent' || volume === null || volume <= 0) continue;
    if (GOVERNING_SHARE * (total + volume) <= volume) liquids.push({ row: solvent!, volume });
  }
  return { liquids: merge(liquids), assumedVolume: assumedVolume && liquids.length === solvents.length };
}

function merge(liquids: readonly Liquid[]): Liquid[] {
  const byName = new Map<string, Liquid>();
  for (const { row, volume } of liquids) {
    byName.set(row.name, { row, volume: volume + (byName.get(row.name)?.volume ?? 0) });
  }
  return [...byName.values()];
}

function assumedVolumeOf({ ingredients, concentration }: Contents): number {
  const dissolved = ingredients.filter(({ role }) => role !== 'solvent' && role !== 'inert');
  const compounds = dissolved.filter(({ role }) => role === 'compound');
  const most = Math.max(0, ...(compounds.length === 0 ? dissolved : compounds).map(({ mol }) => usable(mol)));
  return (0 < most ? most : 1e-3) / (concentration ?? DEFAULT_CONCENTRATION);
}

function hasSolidBase({ ingredients }: Contents): boolean {
  return ingredients.some(isSolidBase);
}

/** Whether a reagent acts from its surface in an aprotic solvent; hydrides do so too but have a couple of their own. */
export function isSolidBase({ reagent, role }: Ingredient): boolean {
  return (
    role !== 'inert' &&
    reagent !== null &&
    reagent.surfaceCeiling !== null &&
    !reagent.roles.includes('metal-hydride')
  );
}

export function isWater({ kind }: SolventRow): boolean {
  return kind === 'water';
}

/** An amount that can be counted: finite and not negative. */
export function usable(mol: number): number {
  return Number.isFinite(mol) && 0 < mol ? mol : 0;
}

function sum(liquids: readonly Liquid[]): number {
  return liquids.reduce((total, { volume }) => total + volume, 0);
}

function largest(liquids: readonly Liquid[]): SolventRow {
  return liquids.reduce((most, liquid) => (most.volume < liquid.volume ? liquid : most)).row;
}
