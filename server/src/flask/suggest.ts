/**
 * Screens every base (acid) of the tables in every solvent for one intended transfer, by the judge that the checks use.
 *
 * Knows: flasks, verdicts, rows.  Must not know: plans, text, how a list is shown.
 * Units: mol, L, K; log K decimal; cost in units of pKa, lower is better.
 * Invariants:
 *  1. An option's verdict is that of `judgeTransfer` on the flask with the option in it.   (tests/flask/suggest.test.ts)
 *  2. Every pair ends as an option or as a rejection with its reason.                     (same)
 *  3. The same question gives the same list; a bounded number of flasks are solved. (same)
 * A candidate solvent stands alone: what a stock solution of the base brings along is left out.
 */
import { constantsIn as constantsOf } from '../chemistry/constants.ts';
import { perceive } from '../chemistry/perceive.ts';
import type { LimitRow, ReagentRow, SolventRow } from '../tables/rows.ts';
import type { Tables } from '../tables/tables.ts';
import {
  type Attacked,
  attackedBy,
  type Choice,
  choicesAs,
  isUsedIn,
  USUAL_COST,
  type Usual,
} from './choices.ts';
import { firstSites, lostToSolvent, type OtherSite, siteOrder } from './fates.ts';
import { type Intent, judgeTransfer, type VerdictThresholds } from './judge.ts';
import { lifetimeAt } from './lifetime.ts';
import { createReach, type Reach } from './reach.ts';
import { type Place, solventsTried } from './solvents-tried.ts';
import type { ConstantsIn, Contents, Ingredient, Verdict } from './state.ts';
import { COST, costOf, isShort } from './suggest-cost.ts';

/** What is wanted: a transfer in a flask, and what may be put in place of what. */
export interface Want {
  readonly contents: Contents;
  readonly intent: Intent;
  /** Ids of the bases (acids) whose place a candidate takes. */
  readonly acting: readonly number[];
  /** Ids of the solvents whose place a candidate takes. */
  readonly solvents: readonly number[];
  /** as-written: the solvents can't be changed, because another step has put them in. */
  readonly where: 'anywhere' | 'as-written';
  /** mol of candidate for each mol of the site. */
  readonly equiv: number;
  /** ordinary: what is rare is looked at only where nothing ordinary does it. */
  readonly breadth: 'ordinary' | 'all';
}

/** One base (acid) in one solvent that makes the transfer. */
export interface Option {
  readonly reagent: ReagentRow;
  /** Null for the solvents as written. */
  readonly solvent: SolventRow | null;
  readonly verdict: Verdict;
  /** More than asked for where other sites have to be covered first. */
  readonly equiv: number;
  /** K: as written, or the nearest at which the reagent is ordinarily used. */
  readonly temperature: number;
  readonly usual: Usual;
  /** Sites that take (give) their proton before the meant one and are covered by `equiv`. */
  readonly ahead: readonly OtherSite[];
  /** The next site after the meant one. */
  readonly next: OtherSite | null;
  /** What is known against the reagent in this solvent, at this temperature or below. */
  readonly limit: LimitRow | null;
  /** Hours until half of it is gone at this temperature; null where that is not known. */
  readonly halfLife: number | null;
  readonly notes: readonly string[];
  readonly cost: number;
  /** Place of the solvent among all, to settle ties. */
  readonly rank: number;
}

export type Reason =
  | { readonly kind: 'too-weak'; readonly short: number }
  | { readonly kind: 'not-used-in' }
  | { readonly kind: 'lost-to-solvent'; readonly share: number }
  | ({ readonly kind: 'attacks' } & Attacked)
  | { readonly kind: 'frozen' | 'boils'; readonly temperature: number }
  | { readonly kind: 'not-proposed'; readonly note: string }
  | { readonly kind: 'slow' }
  | { readonly kind: 'no-constant' }
  | { readonly kind: 'not-reached' };

export interface Rejection {
  readonly reagent: ReagentRow | null;
  readonly solvent: SolventRow | null;
  readonly reason: Reason;
}

export interface Screening {
  /** Best first. */
  readonly options: readonly Option[];
  readonly rejections: readonly Rejection[];
  /** The flask as written. */
  readonly asWritten: Verdict | null;
}

const ZERO_CELSIUS = 273.15;
/** Flasks solved for one question, fewer where each holds much; keeps the answer under a second or so. */
const MOST_JUDGED = { ordinary: 500, all: 1000 } as const;
const LEAST_JUDGED = 12;
/** Ingredients of a flask up to which all of these are solved. */
const USUAL_SIZE = 8;
/** Options from which the rare pairs are left out where only the ordinary ones are asked for. */
const ENOUGH = 12;
const FOR_GOOD = new Set<string>(['metal-hydride', 'metal-amide', 'organometallic', 'aluminium-hydride']);
const LOST = 0.1;
/** Excess over what the sites ask for. */
const EXCESS = 1.05;
const SURELY_FIRST = 0.8;
/** A small steady amount is enough for a conversion down to this log K. */
const STEADY = 8;

/** Screens all bases (acids) and solvents for a transfer. */
export function screen(
  want: Want,
  tables: Tables,
  thresholds?: VerdictThresholds,
  constantsIn: ConstantsIn = constantsOf,
): Screening {
  const screening = new ScreeningRun(want, tables, thresholds, constantsIn);
  return screening.run();
}

/** A pair that only the flask can judge. */
interface Pair {
  readonly choice: Choice;
  readonly place: Place;
  readonly temperature: number;
  /** Cost before the flask is solved. */
  readonly prior: number;
}

class ScreeningRun {
  private readonly options: Option[] = [];
  private readonly rejections: Rejection[] = [];
  private judged = 0;
  private readonly mostJudged: number;
  private readonly loses: boolean;
  private readonly rest: readonly Ingredient[];
  private readonly site: Ingredient | undefined;
  private readonly nextId: number;
  private readonly want: Want;
  private readonly tables: Tables;
  private readonly thresholds: VerdictThresholds | undefined;
  private readonly constantsIn: ConstantsIn;
  private readonly reach: Reach;

  constructor(
    want: Want,
    tables: Tables,
    thresholds: VerdictThresholds | undefined,
    constantsIn: ConstantsIn,
  ) {
    this.want = want;
    this.tables = tables;
    this.thresholds = thresholds;
    this.constantsIn = constantsIn;
    const { contents, intent, acting, solvents } = want;
    this.loses = intent.direction === 'deprotonate';
    // The work on a flask grows faster than what it holds.
    const size = Math.max(1, contents.ingredients.length / USUAL_SIZE);
    this.mostJudged = Math.max(LEAST_JUDGED, MOST_JUDGED[want.breadth] / size ** 1.5);
    this.rest = contents.ingredients.filter(({ id }) => !acting.includes(id) && !solvents.includes(id));
    this.site = contents.ingredients.find(({ id }) => id === intent.ingredient);
    this.reach = createReach(intent, this.site, tables, constantsIn);
    this.nextId = 1 + Math.max(-1, ...contents.ingredients.map(({ id }) => id));
  }

  run(): Screening {
    const { contents, intent, solvents, where } = this.want;
    const asWritten = judgeTransfer(contents, intent, this.tables, this.constantsIn, this.thresholds);
    if (this.site?.molecule != null) {
      const { places, never } = solventsTried(contents, solvents, this.nextId, this.tables, where);
      for (const { solvent, note } of never)
        this.rejections.push({ reagent: null, solvent, reason: { kind: 'not-proposed', note } });
      const pairs = choicesAs(this.loses ? 'base' : 'acid', this.tables)
        .flatMap((choice) => this.pairsOf(choice, places))
        .sort((a, b) => a.prior - b.prior);
      for (const pair of pairs) this.tryPair(pair);
    }
    this.options.sort(
      (a, b) => a.cost - b.cost || compare(a.reagent.name, b.reagent.name) || a.rank - b.rank,
    );
    return { options: this.options, rejections: this.rejections, asWritten };
  }

  /** The places in which a reagent has to be judged; what the tables alone rule out is refused here. */
  private pairsOf(choice: Choice, places: readonly Place[]): Pair[] {
    const { reagent, row } = choice;
    const refuse = (reason: Reason, solvent: SolventRow | null = null) => {
      this.rejections.push({ reagent, solvent, reason });
      return [];
    };
    if (row.usual === 'never') return refuse({ kind: 'not-proposed', note: row.note });
    const attacked = attackedBy(choice, this.rest, this.tables);
    if (attacked !== null) return refuse({ kind: 'attacks', ...attacked });
    const celsius = this.want.contents.temperature - ZERO_CELSIUS;
    const warmest = row.warmest ?? Number.POSITIVE_INFINITY;
    const temperature = ZERO_CELSIUS + Math.min(warmest, Math.max(celsius, row.coldest ?? celsius));
    return places.flatMap((place) => {
      const { solvent, ingredients } = place;
      const rows = ingredients.flatMap((one) => one.solvent ?? []);
      if (!rows.some((one) => isUsedIn(row, one))) return refuse({ kind: 'not-used-in' }, solvent);
      const outside = rows.map((one) => rangeOf(one, temperature)).find((one) => one !== null);
      if (outside != null) return refuse(outside, solvent);
      return [{ choice, place, temperature, prior: USUAL_COST[row.usual] + place.cost }];
    });
  }

  /** Comes to the pairs in the order of how ordinary they are, so that bounds on the work cut off only the rare ones. */
  private tryPair(pair: Pair): void {
    const { choice, place } = pair;
    const outcome = this.isBeyond(pair) ? ({ kind: 'not-reached' } as const) : this.outcomeOf(pair);
    if ('kind' in outcome)
      this.rejections.push({ reagent: choice.reagent, solvent: place.solvent, reason: outcome });
    else this.options.push(outcome);
  }

  private isBeyond({ prior }: Pair): boolean {
    if (this.mostJudged <= this.judged) return true;
    return this.want.breadth === 'ordinary' && USUAL_COST.rare <= prior && ENOUGH <= this.options.length;
  }

  private outcomeOf(pair: Pair): Option | Reason {
    const { choice, place } = pair;
    const { reagent } = choice;
    // The tables name one of them at least, or the pair would not have come here.
    const { scale } = place.ingredients.find((one) => one.solvent !== null)!.solvent!;
    const gap = this.reach.gapOf(reagent, perceive(reagent.smiles!, this.tables), scale);
    if (gap !== null && gap.best < -(this.want.intent.isConsumed ? STEADY : 0))
      return { kind: 'too-weak', short: -gap.plain };
    this.judged++;
    return this.weigh(pair);
  }

  private flaskOf({ choice, place, temperature }: Pair, equiv: number): Contents {
    const { reagent } = choice;
    const candidate: Ingredient = {
      id: this.nextId + 1,
      name: reagent.name,
      molecule: perceive(reagent.smiles!, this.tables),
      mol: equiv * this.site!.mol,
      volume: null,
      role: this.loses ? 'base' : 'acid',
      reagent,
      solvent: null,
      assumed: false,
      qualifier: null,
    };
    return {
      ...this.want.contents,
      temperature,
      ingredients: [...place.ingredients, ...this.rest, candidate],
    };
  }

  private weigh(pair: Pair): Option | Reason {
    const { choice, place, temperature } = pair;
    const { reagent, row } = choice;
    const { solvent } = place;
    const flask = (mol: number) => this.flaskOf(pair, mol);
    const { intent, equiv: asked, contents } = this.want;
    const { tables, constantsIn } = this;
    if (reagent.roles.some((role) => FOR_GOOD.has(role))) {
      const lost = lostToSolvent(flask(asked), tables, constantsIn)[0];
      if (lost !== undefined && LOST <= lost.share) return { kind: 'lost-to-solvent', share: lost.share };
    }
    let equiv = asked;
    let verdict = this.judge(flask(equiv));
    if (verdict === null) return { kind: 'no-constant' };
    if (verdict.answer === 'no' && verdict.logK <= 0)
      return { kind: 'too-weak', short: Math.max(0, -verdict.margin) };
    let order = siteOrder(flask(equiv), verdict, intent.direction, tables, constantsIn);
    const ahead = firstSites(order, SURELY_FIRST).filter(({ amount }) => 0.05 * this.site!.mol <= amount);
    if (0 < verdict.logK && ahead.length !== 0) {
      const others = ahead.reduce((sum, { amount }) => sum + amount, 0) / this.site!.mol;
      equiv = Math.max(asked, EXCESS * (1 + others));
      verdict = this.judge(flask(equiv))!;
      order = siteOrder(flask(equiv), verdict, intent.direction, tables, constantsIn);
    }
    if (verdict.allowances.includes('slow')) return { kind: 'slow' };
    if (verdict.answer === 'no') return { kind: 'too-weak', short: Math.max(0, -verdict.margin) };
    const next =
      order.find((one) => 0 < one.difference && !ahead.includes(one) && one.probability < SURELY_FIRST) ??
      null;
    const { limit, halfLife } = this.lifeOf(reagent, place, temperature);
    const notes = [row.note, place.note].filter((note) => note !== '');
    const isWrittenReagent = contents.ingredients.some(
      ({ id, reagent: own }) => this.want.acting.includes(id) && own?.name === reagent.name,
    );
    const isAsWritten =
      isWrittenReagent &&
      place.ingredients.every(({ id }) => this.want.solvents.includes(id)) &&
      temperature === contents.temperature &&
      equiv === asked;
    // What is written and works needs no other to take its place.
    const keeps = isAsWritten && verdict.answer === 'yes' && !isShort(halfLife);
    const cost = keeps
      ? 0
      : USUAL_COST[row.usual] +
        place.cost +
        (isWrittenReagent ? 0 : COST.newReagent) +
        (temperature === contents.temperature ? 0 : COST.otherTemperature) +
        (isShort(halfLife) ? COST.limit : 0) +
        (ahead.length === 0 ? 0 : COST.ahead) +
        costOf(verdict, next, this.loses);
    return {
      reagent,
      solvent,
      verdict,
      equiv,
      temperature,
      usual: row.usual,
      ahead,
      next,
      limit,
      halfLife,
      notes,
      cost,
      rank: place.rank,
    };
  }

  private judge(contents: Contents): Verdict | null {
    return judgeTransfer(contents, this.want.intent, this.tables, this.constantsIn, this.thresholds);
  }

  /** What is known against a reagent in a solvent, the shortest life where there are several solvents. */
  private lifeOf(
    { name }: ReagentRow,
    { ingredients }: Place,
    temperature: number,
  ): { limit: LimitRow | null; halfLife: number | null } {
    const celsius = temperature - ZERO_CELSIUS;
    const { limits } = this.tables;
    const solvents = ingredients.flatMap(({ solvent }) => solvent?.name ?? []);
    const lives = solvents.flatMap((solvent) => lifetimeAt(limits, name, solvent, celsius) ?? []);
    const [shortest] = lives.sort((a, b) => a.hours - b.hours);
    const said = limits.find(
      (row) => row.reagent === name && row.temperature <= celsius && solvents.includes(row.solvent),
    );
    return {
      limit: said ?? (isShort(shortest?.hours ?? null) ? shortest!.row : null),
      halfLife: shortest?.hours ?? null,
    };
  }
}

function rangeOf(solvent: SolventRow | null, temperature: number): Reason | null {
  const celsius = temperature - ZERO_CELSIUS;
  if (solvent?.meltingPoint != null && celsius < solvent.meltingPoint) return { kind: 'frozen', temperature };
  if (solvent?.boilingPoint != null && solvent.boilingPoint + 1 < celsius)
    return { kind: 'boils', temperature };
  return null;
}

function compare(a = '', b = ''): number {
  return a < b ? -1 : b < a ? 1 : 0;
}
