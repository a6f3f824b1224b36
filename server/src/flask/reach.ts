/**
 * Tells from bare constants which reagents are hopeless for a site, so that their flasks need not be solved.
 *
 * Knows: constants on the scales.  Must not know: flasks, text.
 * Units: pKa.
 * Invariant: what is called hopeless the judge refuses too.   (tests/flask/suggest.test.ts)
 */
import type { Constant, Perceived } from '../chemistry/couple.ts';
import type { ReagentRow } from '../tables/rows.ts';
import type { Tables } from '../tables/tables.ts';
import type { Intent } from './judge.ts';
import type { ConstantsIn, Ingredient } from './state.ts';

export interface Gap {
  /** log K on the scale asked for. */
  readonly plain: number;
  /** The most favourable on any scale that a flask may be worked on, with the benefit of every doubt. */
  readonly best: number;
}

export interface Reach {
  /** Null where only the flask can tell. */
  gapOf(reagent: ReagentRow, molecule: Perceived, scale: string): Gap | null;
}

/** A constant as it stands, and moved by its doubt in favour of the transfer. */
interface Strength {
  readonly plain: number;
  readonly doubted: number;
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
  const known = new Map<string, Strength | null>();
  const remember = (key: string, find: () => Strength | null): Strength | null => {
    const before = known.get(key);
    if (before !== undefined) return before;
    const found = find();
    known.set(key, found);
    return found;
  };
  return {
    gapOf(reagent, molecule, scale) {
      const gaps: Gap[] = [];
      for (const one of new Set([scale, ...FALLBACKS])) {
        const ofSite = remember(`\0${one}`, () => siteStrength(one));
        const own = remember(`${reagent.name}\0${one}`, () => reagentStrength(reagent, molecule, one));
        if (ofSite === null || own === null) return null;
        const between = (side: keyof Strength) =>
          loses ? own[side] - ofSite[side] : ofSite[side] - own[side];
        gaps.push({ plain: between('plain'), best: between('doubted') });
      }
      return { plain: gaps[0]!.plain, best: Math.max(...gaps.map(({ best }) => best)) };
    },
  };

  function siteStrength(scale: string): Strength | null {
    if (site?.molecule == null) return null;
    const { couples } = constantsIn(site.molecule, scale, tables, site.own ? { own: site.own } : {});
    const places = meant.length === 0 ? couples.map((_, place) => place) : meant;
    return strongest(
      places.map((place) => couples[place] ?? null),
      loses ? 'lowest' : 'highest',
    );
  }

  function reagentStrength(reagent: ReagentRow, molecule: Perceived, scale: string): Strength | null {
    // A surface or a hydride acts by what the trade knows of it, not by its constant.
    if (reagent.surfaceCeiling !== null || reagent.roles.includes('metal-hydride')) return null;
    const { couples } = constantsIn(molecule, scale, tables, {});
    const own = molecule.couples.flatMap(({ holdsProton }, place) =>
      holdsProton === loses ? [] : [couples[place] ?? null],
    );
    return strongest(own, loses ? 'highest' : 'lowest');
  }
}

/** The extreme of some constants; null where one of them is missing, because it might be the one that counts. */
function strongest(constants: readonly (Constant | null)[], end: 'lowest' | 'highest'): Strength | null {
  if (constants.length === 0 || constants.includes(null)) return null;
  const sign = end === 'highest' ? 1 : -1;
  const most = (values: readonly number[]) => sign * Math.max(...values.map((value) => sign * value));
  const known = constants as readonly Constant[];
  return {
    plain: most(known.map(({ value }) => value)),
    doubted: most(known.map(({ value, sd }) => value + sign * SPREAD * sd)),
  };
}
