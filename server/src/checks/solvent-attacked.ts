/** The solvent reacts with a reagent in another way than by giving it a proton at once. */
import { isCalled } from '../flask/kinetics.ts';
import { lifetimeAt } from '../flask/lifetime.ts';
import type { Ingredient } from '../flask/state.ts';
import { defineCheck, type Report } from './define.ts';
import type { Addition, StepFacts } from './facts.ts';
import { shareLeft } from './left.ts';

export default defineCheck({
  name: 'solvent-attacked',
  family: 'solvent',
  severity: 'error',
  summary: 'The solvent reacts with a reagent in another way than by giving it a proton at once.',
  why: 'Organometallics and strong hydrides add to the carbonyl groups of amides and esters, alkoxides exchange with esters and condense ketones; alkyllithiums take an ether apart, fast when warm.',
  remedy: 'Use an ether or a hydrocarbon, and stay as cold as the half-life of the base asks for.',
  silentWhen:
    'Amounts of such a compound charged as a reagent, as DMF after a lithiation; solvents that a conversion names; bases that live for hours or have been used up.',
  sources: ['stanetty-1997', 'common-practice'],
  wrong: `compound P = Clc1ccccc1
step A
  solvent DMF 20 mL
  charge P 5 mmol
  charge MeMgBr 1.2 equiv 3.0 M in Et2O
`,
  right: `compound P = Clc1ccccc1
step A
  solvent THF 20 mL
  charge P 5 mmol
  charge MeMgBr 1.2 equiv 3.0 M in Et2O
`,
  *inStep(facts) {
    yield* additions(facts);
    yield* lifetimes(facts);
  },
});

/** Reagents that attack a solvent of a kind whenever they meet it in one phase; where a proton goes first, another finding says so. */
const ATTACKS: readonly { readonly what: readonly string[]; readonly kinds: readonly string[] }[] = [
  {
    what: ['role:organometallic', 'role:aluminium-hydride'],
    kinds: ['amide', 'ester', 'carbonate', 'urea'],
  },
  { what: ['role:alkoxide'], kinds: ['ester', 'carbonate', 'ketone'] },
  { what: ['role:metal-amide', 'role:metal-hydride'], kinds: ['ester', 'carbonate'] },
];
/** Hours of half-life below which a base is lost during an addition, and during a reaction. */
const MINUTES = 1;
const REACTION = 4;
/** Share of a base that must still be there to be lost. */
const STILL_THERE = 0.3;
const ZERO_CELSIUS = 273.15;

function* additions(facts: StepFacts): Iterable<Report> {
  const { moments } = facts;
  for (const reagent of facts.additions) {
    if (reagent.statement === null) continue;
    const meeting = moments.find(({ statement }) => statement === reagent.statement);
    if (meeting === undefined || meeting.state().medium.organic !== null) continue;
    for (const solvent of facts.additions) {
      if (!isSolventOf(facts, solvent) || !attacks(reagent.ingredient, solvent.ingredient)) continue;
      yield {
        range: solvent.range,
        message: `${reagent.ingredient.name} attacks ${solvent.ingredient.name}: ${article(solvent.ingredient.solvent!.kind)} is no solvent for it.`,
        related: [{ range: reagent.range, message: 'the reagent that attacks' }],
      };
    }
  }
}

function attacks(reagent: Ingredient, { solvent }: Ingredient): boolean {
  return ATTACKS.some(
    ({ what, kinds }) => kinds.includes(solvent?.kind ?? '') && what.some((one) => isCalled(reagent, one)),
  );
}

/** Written as a solvent, and no reactant of the step. */
function isSolventOf({ step }: StepFacts, { ingredient, statement }: Addition): boolean {
  if (ingredient.role !== 'solvent' || statement?.keyword !== 'solvent') return false;
  return !step.statements.some(
    (other) =>
      other.keyword === 'convert' &&
      other.from.some(({ substance }) => substance.solvent === ingredient.solvent),
  );
}

/** Bases that a solvent uses up in the time that a step takes. */
function* lifetimes(facts: StepFacts): Iterable<Report> {
  const said = new Set<number>();
  for (const moment of facts.moments) {
    const celsius = moment.contents.temperature - ZERO_CELSIUS;
    for (const reagent of moment.contents.ingredients) {
      const addition = facts.additions.find(({ ingredient }) => ingredient.id === reagent.id);
      if (reagent.reagent === null || addition?.statement == null || said.has(reagent.id)) continue;
      for (const solvent of moment.contents.ingredients) {
        if (solvent.role !== 'solvent' || solvent.solvent === null) continue;
        const life = lifetimeAt(facts.tables.limits, reagent.reagent.name, solvent.solvent.name, celsius);
        if (life === null || REACTION < life.hours || shareLeft(reagent, moment) < STILL_THERE) continue;
        said.add(reagent.id);
        yield {
          range: addition.range,
          severity: life.hours < MINUTES ? 'warning' : 'information',
          figures: { halfLifeHours: life.hours, temperature: celsius },
          message: `${reagent.name} ${life.row.what}: in ${solvent.name} at ${Math.round(celsius)} °C half of it is gone in ${duration(life.hours)}${life.isExtrapolated ? ', extrapolated' : ''}.`,
        };
      }
    }
  }
}

function duration(hours: number): string {
  return hours < 2 ? `${Number((60 * hours).toPrecision(2))} min` : `${Number(hours.toPrecision(2))} h`;
}

function article(kind: string): string {
  return `${/^[aeiou]/.test(kind) ? 'an' : 'a'} ${kind}`;
}
