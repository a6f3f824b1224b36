/**
 * The acidity of a flask while a reagent is added to it: points of the curve, and where each couple is half done.
 *
 * Knows: contents, solved flasks.  Must not know: text, how a curve is drawn.
 * Units: mol; pH on the medium's own scale.  The volume that the titrant brings is not added.
 * Invariants: pH never falls while a base is added; a marked point has its couple half protonated.   (tests/flask/titration-curve.test.ts)
 */
import { constantsIn as constantsOf } from '../chemistry/constants.ts';
import type { Tables } from '../tables/tables.ts';
import { solveFlask } from './solve.ts';
import type { ConstantsIn, Contents, CoupleState, FlaskState, Ingredient } from './state.ts';

export interface CurvePoint {
  readonly mol: number;
  readonly pH: number;
}

/** Half of a couple has lost (taken) its proton. */
export interface HalfPoint extends CurvePoint {
  readonly ingredient: number;
  readonly group: string;
  readonly groupName: string;
  readonly pKa: number;
  readonly sd: number;
}

export interface TitrationCurve {
  readonly kind: 'base' | 'acid';
  readonly scale: string;
  readonly volume: number;
  readonly temperature: number;
  readonly points: readonly CurvePoint[];
  /** In the order in which they are met. */
  readonly halves: readonly HalfPoint[];
}

const FIRST_POINTS = 60;
const MOST_POINTS = 240;
/** Neighbouring points further apart than this get one between them. */
const COARSE = 0.25;
/** What is drawn beyond the last couple, as a share of what the couples take. */
const BEYOND = 1.3;
/** Couples of less than this share of the greatest amount are not marked. */
const WORTH_MARKING = 0.02;
const HALF = 0.5;
const NEUTRAL = 7;

interface Solved extends CurvePoint {
  readonly couples: readonly CoupleState[];
}

/**
 * The curve of a flask with a titrant (its own `mol` does not count); null where the flask has no pH.
 *
 * @param most mol at the end of the curve; worked out from what the couples can take where undefined
 */
export function titrationCurve(
  contents: Contents,
  titrant: Ingredient,
  tables: Tables,
  { most, constantsIn = constantsOf }: { readonly most?: number; readonly constantsIn?: ConstantsIn } = {},
): TitrationCurve | null {
  const start = solveFlask(contents, tables, constantsIn);
  if (start.pH === null) return null;
  const kind = kindOf(titrant);
  const end = most ?? BEYOND * capacityOf(contents, start, kind, titrant, tables, constantsIn);
  const solve = (mol: number): Solved => {
    if (mol === 0) return { mol, pH: start.pH!, couples: start.couples };
    const { pH, couples } = solveFlask(
      { ...contents, ingredients: [...contents.ingredients, { ...titrant, mol }] },
      tables,
      constantsIn,
    );
    return { mol, pH: pH ?? start.pH!, couples };
  };
  const points = refined(
    Array.from({ length: FIRST_POINTS + 1 }, (_, place) => solve((end * place) / FIRST_POINTS)),
    solve,
  );
  const { medium, temperature } = start;
  return {
    kind,
    scale: medium.scale,
    volume: medium.volume,
    temperature,
    points: points.map(({ mol, pH }) => ({ mol, pH })),
    halves: halvesOf(points, contents),
  };
}

/** What is added as: by its own couples, the stronger side. */
function kindOf({ molecule, reagent, role }: Ingredient): 'base' | 'acid' {
  if (role === 'base' || role === 'acid') return role;
  if (reagent?.roles.some((one) => one === 'mineral-acid' || one === 'organic-acid')) return 'acid';
  return molecule?.couples.some(({ holdsProton, element }) => holdsProton && element !== 'C') &&
    !molecule.couples.some(({ holdsProton }) => !holdsProton)
    ? 'acid'
    : 'base';
}

/** mol of titrant that all couples within its reach take. */
function capacityOf(
  contents: Contents,
  start: FlaskState,
  kind: 'base' | 'acid',
  titrant: Ingredient,
  tables: Tables,
  constantsIn: ConstantsIn,
): number {
  const solvents = solventIds(contents);
  const amounts = start.couples.filter(({ ingredient }) => !solvents.has(ingredient));
  // What a great excess brings about shows which couples are within reach.
  const total = amounts.reduce((sum, { amount }) => sum + amount, 0);
  const excess = Math.max(20 * total, start.medium.volume);
  const after = solveFlask(
    { ...contents, ingredients: [...contents.ingredients, { ...titrant, mol: excess }] },
    tables,
    constantsIn,
  );
  const left = new Map(after.couples.map((couple) => [keyOf(couple), couple]));
  const moved = amounts.reduce((sum, couple) => {
    const now = left.get(keyOf(couple))?.protonated ?? couple.protonated;
    return (
      sum + couple.amount * Math.max(0, kind === 'base' ? couple.protonated - now : now - couple.protonated)
    );
  }, 0);
  return 0 < moved ? moved : Math.max(total, 0.01 * start.medium.volume);
}

/** Halves the steps in which the pH jumps, the widest first, until none is coarse or enough is done. */
function refined(points: readonly Solved[], solve: (mol: number) => Solved): Solved[] {
  const list = [...points];
  while (list.length < MOST_POINTS) {
    let widest = 0;
    let at = -1;
    for (let place = 1; place < list.length; place++) {
      const [left, right] = [list[place - 1]!, list[place]!];
      const jump = Math.abs(right.pH - left.pH);
      const isSplittable = 1e-6 * list.at(-1)!.mol < right.mol - left.mol;
      if (widest < jump && isSplittable) {
        widest = jump;
        at = place;
      }
    }
    if (widest < COARSE) break;
    list.splice(at, 0, solve((list[at - 1]!.mol + list[at]!.mol) / 2));
  }
  return list;
}

function halvesOf(points: readonly Solved[], contents: Contents): HalfPoint[] {
  const solvents = solventIds(contents);
  const own = new Set(contents.ingredients.map(({ id }) => id));
  const first = points[0]!.couples.filter(
    ({ ingredient }) => own.has(ingredient) && !solvents.has(ingredient),
  );
  const largest = Math.max(0, ...first.map(({ amount }) => amount));
  return first
    .filter(({ amount }) => WORTH_MARKING * largest <= amount)
    .flatMap((couple): HalfPoint[] => {
      const found = crossing(points, keyOf(couple));
      if (found === null) return [];
      const { ingredient, constant } = couple;
      const { group, groupName } = couple.couple;
      return [{ ...found, ingredient, group, groupName, pKa: constant.value, sd: constant.sd }];
    })
    .sort((a, b) => a.mol - b.mol);
}

/** Where the share that holds a proton passes one half. */
function crossing(points: readonly Solved[], key: string): CurvePoint | null {
  const share = ({ couples }: Solved) =>
    couples.find((couple) => keyOf(couple) === key)?.protonated ?? Number.NaN;
  for (let place = 1; place < points.length; place++) {
    const [left, right] = [points[place - 1]!, points[place]!];
    const [before, after] = [share(left), share(right)];
    if (Number.isNaN(before) || Number.isNaN(after) || before < HALF === after < HALF) continue;
    const part = (HALF - before) / (after - before);
    return { mol: left.mol + part * (right.mol - left.mol), pH: left.pH + part * (right.pH - left.pH) };
  }
  return null;
}

function keyOf({ ingredient, couple, constant }: CoupleState): string {
  return `${ingredient} ${couple.component} ${couple.kind} ${couple.atom} ${constant.value}`;
}

function solventIds({ ingredients }: Contents): Set<number> {
  return new Set(ingredients.filter(({ role }) => role === 'solvent').map(({ id }) => id));
}

/** What a flask is titrated with where nobody says: a strong base while it is acidic, else a strong acid. */
export function usualTitrant({ ingredients }: Contents, { pH, medium }: FlaskState): string {
  if (medium.aqueous) return pH !== null && NEUTRAL < pH ? 'HCl' : 'NaOH';
  if (ingredients.some(({ role }) => role === 'base')) return 'HCl';
  return medium.protic ? 'NaOMe' : 'LDA';
}
