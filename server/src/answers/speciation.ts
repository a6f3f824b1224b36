/**
 * The forms of the compounds in a flask over pH, ready to be drawn.
 *
 * Knows: solved flasks.  Must not know: how curves are drawn.
 * Units: pH on the medium's own scale; shares 0 … 1.
 * Invariant: the shares of the forms of one component add up to one where none was left out.   (tests/answers/plots.test.ts)
 */
import { constantsIn } from '../chemistry/constants.ts';
import { speciate } from '../flask/speciate.ts';
import type { Contents, FlaskState } from '../flask/state.ts';
import type { Tables } from '../tables/tables.ts';

export interface FormCurve {
  /** "citric acid, 2−" */
  readonly name: string;
  readonly compound: string;
  readonly charge: number;
  readonly shares: readonly number[];
}

export interface FormCurves {
  readonly scale: string;
  readonly pHs: readonly number[];
  readonly forms: readonly FormCurve[];
  /** pH of the flask. */
  readonly now: number | null;
}

const POINTS = 141;
const AQUEOUS = { low: 0, high: 14 };
const WIDEST = { low: -15, high: 60 };
const MARGIN = 3;
/** Forms that never reach this share are left out, and more forms than this cannot be told apart. */
const LEAST = 0.01;
const MOST_FORMS = 12;
/** Constants beyond play no part in what a chemist looks for. */
const REACH = { low: -5, high: 40 };

/** All forms of what was charged, except solvents; empty where nothing has a proton to give or take. */
export function formCurves(
  { ingredients }: Contents,
  { medium, pH, couples }: FlaskState,
  tables: Tables,
): FormCurves {
  const { scale } = medium;
  const solutes = ingredients.filter(
    ({ role, molecule }) => role !== 'solvent' && role !== 'inert' && molecule !== null,
  );
  const ids = new Set(solutes.map(({ id }) => id));
  const values = couples
    .filter(({ ingredient }) => ids.has(ingredient))
    .map(({ constant }) => constant.value)
    .filter((value) => REACH.low <= value && value <= REACH.high);
  const { low, high } = medium.aqueous || values.length === 0 ? AQUEOUS : rangeOf(values);
  const pHs = Array.from({ length: POINTS }, (_, point) => low + ((high - low) * point) / (POINTS - 1));
  const seen = new Set<string>();
  const forms: FormCurve[] = [];
  for (const { molecule, name, own } of solutes) {
    if (seen.has(name)) continue;
    seen.add(name);
    const all = speciate(molecule!, scale, pHs, tables, constantsIn, own ?? []);
    for (const { component, charge, shares } of all) {
      const isAlone = all.filter((other) => other.component === component).length === 1;
      if (isAlone || Math.max(...shares) < LEAST) continue;
      forms.push({ name: `${name}, ${chargeWords(charge)}`, compound: name, charge, shares });
    }
  }
  return { scale, pHs, forms: forms.slice(0, MOST_FORMS), now: pH };
}

function rangeOf(values: readonly number[]): { low: number; high: number } {
  return {
    low: Math.max(WIDEST.low, Math.floor(Math.min(...values) - MARGIN)),
    high: Math.min(WIDEST.high, Math.ceil(Math.max(...values) + MARGIN)),
  };
}

/** "2−", "+", "neutral" */
function chargeWords(charge: number): string {
  if (charge === 0) return 'neutral';
  const size = Math.abs(charge) === 1 ? '' : String(Math.abs(charge));
  return `${size}${charge < 0 ? '−' : '+'}`;
}
