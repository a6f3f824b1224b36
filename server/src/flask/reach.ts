/**
 * Tells from bare constants which reagents are hopeless for a site, so that their flasks need not be solved.
 *
 * Knows: constants on the scales.  Must not know: flasks, text.
 * Units: pKa.
 * Invariant: what is called hopeless the judge refuses too.   (tests/flask/suggest.test.ts)
 */
import type { Perceived } from '../chemistry/couple.ts';
import type { ReagentRow } from '../tables/rows.ts';
import type { Tables } from '../tables/tables.ts';
import type { Intent } from './judge.ts';
import type { ConstantsIn, Ingredient } from './state.ts';

export interface Reach {
  /** The most favourable log K on any scale that a flask may be worked on; null where only the flask can tell. */
  gapAtBest(reagent: ReagentRow, molecule: Perceived, scale: string): number | null;
}

/** Standard deviations by which each constant gets the benefit of the doubt. */
const SPREAD = 3;
/** Scales that a flask may fall back to. */
const FALLBACKS = ['DMSO', 'water'];

/** Compares reagents with the sites that an intent means; remembers each constant it has looked up. */
export function createReach(
  { direction, couples: meant }: Intent,
  site: Ingredient | undefined,
  tables: Tables,
  constantsIn: ConstantsIn,
): Reach {
  const loses = direction === 'deprotonate';
  const known = new Map<string, number | null>();
  const remember = (key: string, find: () => number | null): number | null => {
    const before = known.get(key);
    if (before !== undefined) return before;
    const found = find();
    known.set(key, found);
    return found;
  };
  return {
    gapAtBest(reagent, molecule, scale) {
      let best: number | null = null;
      for (const one of new Set([scale, ...FALLBACKS])) {
        const ofSite = remember(`\0${one}`, () => siteStrength(one));
        const own = remember(`${reagent.name}\0${one}`, () => reagentStrength(reagent, molecule, one));
        if (ofSite === null || own === null) return null;
        const gap = loses ? own - ofSite : ofSite - own;
        best = best === null ? gap : Math.max(best, gap);
      }
      return best;
    },
  };

  function siteStrength(scale: string): number | null {
    if (site?.molecule == null) return null;
    const { couples } = constantsIn(site.molecule, scale, tables, site.own ? { own: site.own } : {});
    const places = meant.length === 0 ? couples.map((_, place) => place) : meant;
    const values = places.map((place) => couples[place] ?? null);
    if (values.length === 0 || values.includes(null)) return null;
    const doubted = values.map((one) => one!.value + (loses ? -1 : 1) * SPREAD * one!.sd);
    return loses ? Math.min(...doubted) : Math.max(...doubted);
  }

  function reagentStrength(reagent: ReagentRow, molecule: Perceived, scale: string): number | null {
    // A surface or a hydride acts by what the trade knows of it, not by its constant.
    if (reagent.surfaceCeiling !== null || reagent.roles.includes('metal-hydride')) return null;
    const { couples } = constantsIn(molecule, scale, tables, {});
    const values = molecule.couples.flatMap(({ holdsProton }, place) =>
      holdsProton === loses ? [] : [couples[place] ?? null],
    );
    if (values.length === 0 || values.includes(null)) return null;
    const doubted = values.map((one) => one!.value + (loses ? 1 : -1) * SPREAD * one!.sd);
    return loses ? Math.max(...doubted) : Math.min(...doubted);
  }
}
