/**
 * Everything that a picture of a flask shows, worked out: ladder, transfers, curves, balance, windows of solvents.
 *
 * Knows: analysed plans.  Must not know: how it is drawn; whoever draws it works out nothing.
 * Units: mol, L, K; pKa and pH on the medium's own scale, windows of solvents on the absolute one.
 */
import { stepShares } from '../flask/balance.ts';
import type { CoupleState, FlaskState, Site, Verdict } from '../flask/state.ts';
import { solventWindow } from '../flask/window.ts';
import type { SolventRow } from '../tables/rows.ts';
import { stepAt } from './steps.ts';
import type { Analysed } from './types.ts';

export interface Rung {
  /** Unique within the picture. */
  readonly id: string;
  readonly substance: string;
  /** From 1, in the order of the SMILES. */
  readonly atom: number;
  readonly element: string;
  readonly group: string;
  readonly pKa: number;
  readonly sd: number;
  readonly mol: number;
  /** Share that holds its proton now, and as charged, 0 … 1. */
  readonly protonated: number;
  readonly charged: number;
  readonly origin: string;
  readonly sources: readonly string[];
}

export interface Arrow {
  readonly from: string;
  readonly to: string;
  readonly answer: 'yes' | 'undecided' | 'no';
  readonly logK: number;
  readonly sd: number;
  readonly extent: number;
}

export interface Curve {
  readonly id: string;
  /** Share that holds its proton at each pH of the picture. */
  readonly shares: readonly number[];
}

export interface SolventBar {
  readonly solvent: string;
  readonly low: number;
  readonly high: number;
  readonly sd: number;
  readonly inFlask: boolean;
}

export interface FlaskPicture {
  readonly step: string;
  readonly title: string | null;
  /** Line of the statement after which the flask is shown, from 0. */
  readonly line: number;
  readonly scale: string;
  readonly temperature: number;
  readonly pH: number | null;
  readonly volume: number;
  readonly assumedVolume: boolean;
  readonly ionicStrength: number | null;
  readonly media: readonly string[];
  /** Acids stronger than low and bases stronger than high are levelled by the solvent. */
  readonly window: { readonly low: number; readonly high: number } | null;
  readonly rungs: readonly Rung[];
  /** Couples that lie outside the picture or would crowd it. */
  readonly leftOut: number;
  readonly arrows: readonly Arrow[];
  readonly pHs: readonly number[];
  readonly curves: readonly Curve[];
  readonly gases: readonly { readonly name: string; readonly mol: number }[];
  readonly solvents: readonly SolventBar[];
}

const LOWEST = -15;
const HIGHEST = 60;
const MOST_RUNGS = 30;
const POINTS = 121;
/** pH units shown beyond the outermost couples. */
const MARGIN = 2;

/**
 * The flask after the last statement at or above a line that changes it, on the step's own line after its last one.
 *
 * Null outside steps and for steps that charge nothing.
 */
export function flaskPictureAt(analysed: Analysed, line: number): FlaskPicture | null {
  const found = stepAt(analysed, line);
  if (found === null) return null;
  const { facts } = found.step;
  const within = line === found.firstLine ? Number.POSITIVE_INFINITY : line - found.firstLine;
  const before = facts.moments.filter(({ statement }) => statement.range.start.line <= within);
  const moment = before.at(-1) ?? facts.moments[0];
  if (moment === undefined) return null;
  const state = moment.state();
  const names = new Map(moment.contents.ingredients.map(({ id, name }) => [id, name]));
  const shown = state.couples.filter(({ constant }) => LOWEST <= constant.value && constant.value <= HIGHEST);
  const kept = [...shown]
    .sort((a, b) => weight(b) - weight(a))
    .slice(0, MOST_RUNGS)
    .sort((a, b) => a.constant.value - b.constant.value);
  const rungs = kept.map((couple) => rung(couple, state.couples.indexOf(couple), names));
  const transfers = facts.transfers.filter(({ statement }) => statement.range.start.line <= within);
  const verdicts = transfers.at(-1)?.verdicts ?? [];
  const pHs = grid(rungs.map(({ pKa }) => pKa));
  return {
    step: facts.step.label,
    title: facts.step.title,
    line: found.firstLine + moment.statement.range.start.line,
    scale: state.medium.scale,
    temperature: state.temperature,
    pH: state.pH,
    volume: state.medium.volume,
    assumedVolume: state.medium.assumedVolume,
    ionicStrength: state.ionicStrength,
    media: state.medium.names,
    window: windowOf(state.medium.solvent),
    rungs,
    leftOut: state.couples.length - rungs.length,
    arrows: verdicts.flatMap((verdict) => arrow(verdict, kept, rungs)),
    pHs,
    curves: curves(state, kept, rungs, pHs),
    gases: state.gases.map(({ name, mol }) => ({ name, mol })),
    solvents: solventBars(analysed.tables.solvents, new Set(state.medium.names)),
  };
}

/** What is there in amount, or takes part, is shown first. */
function weight({ amount, protonated, charged }: CoupleState): number {
  return amount * (1 + 10 * Math.abs(protonated - charged));
}

function rung(state: CoupleState, index: number, names: ReadonlyMap<number, string>): Rung {
  const { ingredient, couple, constant, amount, protonated, charged } = state;
  return {
    id: `r${index}`,
    substance: names.get(ingredient) ?? 'solvent',
    atom: couple.atom + 1,
    element: couple.element,
    group: couple.groupName,
    pKa: constant.value,
    sd: constant.sd,
    mol: amount,
    protonated,
    charged,
    origin: constant.origin,
    sources: constant.sources,
  };
}

/** The proton goes from the acid to the base, whichever of the two was named. */
function arrow(
  { site, partner, answer, logK, sd, extent }: Verdict,
  couples: readonly CoupleState[],
  rungs: readonly Rung[],
): Arrow[] {
  if (partner === null) return [];
  const [named, other] = [find(site, couples, rungs), find(partner, couples, rungs)];
  if (named === undefined || other === undefined) return [];
  const loses = (couples[rungs.indexOf(named)]?.charged ?? 1) >= 0.5;
  const [from, to] = loses ? [named, other] : [other, named];
  return [{ from: from.id, to: to.id, answer, logK, sd, extent }];
}

/** The rung of a site; of a couple with several steps the one whose constant is nearest. */
function find(site: Site, couples: readonly CoupleState[], rungs: readonly Rung[]): Rung | undefined {
  let best = -1;
  couples.forEach((state, place) => {
    const isSame =
      state.ingredient === site.ingredient &&
      state.couple.atom === site.couple.atom &&
      state.couple.group === site.couple.group;
    if (isSame && (best === -1 || off(state, site) < off(couples[best]!, site))) best = place;
  });
  return rungs[best];
}

function off(state: CoupleState, site: Site): number {
  return Math.abs(state.constant.value - site.constant.value);
}

function windowOf(solvent: SolventRow | null): FlaskPicture['window'] {
  if (solvent?.lyoniumPKa == null || solvent.lyatePKa === null) return null;
  return { low: solvent.lyoniumPKa, high: solvent.lyatePKa };
}

function grid(values: readonly number[]): number[] {
  if (values.length === 0) return [];
  const low = Math.floor(Math.max(LOWEST, Math.min(...values) - MARGIN));
  const high = Math.ceil(Math.min(HIGHEST, Math.max(...values) + MARGIN));
  return Array.from({ length: POINTS }, (_, point) => low + ((high - low) * point) / (POINTS - 1));
}

/** Steps of one component share their protons, so their curves are worked out together. */
function curves(
  state: FlaskState,
  kept: readonly CoupleState[],
  rungs: readonly Rung[],
  pHs: readonly number[],
): Curve[] {
  const components = new Map<string, CoupleState[]>();
  for (const each of state.couples) {
    const key = `${each.ingredient} ${each.couple.component}`;
    const list = components.get(key);
    if (list === undefined) components.set(key, [each]);
    else list.push(each);
  }
  const found = new Map<CoupleState, number[]>();
  for (const list of components.values()) {
    const steps = [...list].sort((a, b) => a.constant.value - b.constant.value);
    const pKa = steps.map(({ constant }) => constant.value);
    const shares = pHs.map((pH) => stepShares(pKa, pH));
    for (const [index, each] of steps.entries()) {
      found.set(
        each,
        shares.map((at) => at[index]!),
      );
    }
  }
  return rungs.map(({ id }, index) => ({ id, shares: found.get(kept[index]!) ?? [] }));
}

/** Solvents whose window is known on the absolute scale, those of the flask first, then by their middle. */
function solventBars(solvents: readonly SolventRow[], inFlask: ReadonlySet<string>): SolventBar[] {
  return solvents
    .flatMap((solvent) => {
      const { absolute } = solventWindow(solvent);
      if (absolute === null) return [];
      return [{ solvent: solvent.name, ...absolute, inFlask: inFlask.has(solvent.name) }];
    })
    .sort((a, b) => Number(b.inFlask) - Number(a.inFlask) || a.low + a.high - b.low - b.high);
}
