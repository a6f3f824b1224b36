/** A temperature at which a solvent boils or is frozen, or a wash with a solvent that mixes with both layers. */

import type { Range, Statement, TemperatureStatement } from '../route/plan.ts';
import type { SolventRow } from '../tables/rows.ts';
import { defineCheck, type Report } from './define.ts';
import type { Addition, StepFacts } from './facts.ts';

export default defineCheck({
  name: 'solvent-out-of-range',
  family: 'solvent',
  severity: 'warning',
  summary:
    'A temperature at which a solvent boils or is frozen, or a wash with a solvent that mixes with both layers.',
  why: 'Above the boiling point the temperature is not reached at ambient pressure; a frozen solvent does not mix; a miscible wash takes the product with it.',
  remedy: 'Change the temperature, the solvent or the wash, or note the pressure.',
  silentWhen:
    'Within five degrees of the boiling point and ten of the melting point, mixtures whose largest part stays liquid, and steps whose note speaks of pressure, a sealed vessel or an autoclave.',
  sources: ['crc-handbook'],
  wrong: `compound K = O=C([CH3:1])c1ccccc1
step A
  solvent dioxane 20 mL
  temperature -78 °C
  charge K 5 mmol
`,
  right: `compound K = O=C([CH3:1])c1ccccc1
step A
  solvent THF 20 mL
  temperature -78 °C
  charge K 5 mmol
`,
  *inStep(facts) {
    const { statements } = facts.step;
    for (const [place, statement] of statements.entries()) {
      if (statement.keyword === 'wash') yield* miscibleWash(statement.substance);
      if (statement.keyword !== 'temperature') continue;
      const next = statements.findIndex((other, at) => place < at && other.keyword === 'temperature');
      const during = new Set<Statement>(statements.slice(0, next === -1 ? undefined : next));
      const main = largestSolvent(facts.additions, during);
      if (main !== null) yield* outside(facts, statement, main);
    }
  },
});

/** °C that a bath may lie above the boiling point, and a solution below the melting point of its solvent. */
const OVER = 5;
const UNDER = 10;
const ZERO_CELSIUS = 273.15;
/** Additions that end the reaction say nothing about the solvent it runs in. */
const WORK_UP = new Set(['quench', 'wash', 'extract', 'adjust']);
const UNDER_PRESSURE = /pressure|sealed|autoclave|microwave|\bbar\b/i;

interface Main {
  readonly solvent: SolventRow;
  readonly name: string;
  readonly range: Range;
}

function* miscibleWash({
  solvent,
  name,
  range,
}: {
  solvent: SolventRow | null;
  name: string;
  range: Range;
}): Iterable<Report> {
  if (solvent === null || solvent.waterMiscibility !== 'yes' || solvent.kind === 'water') return;
  yield {
    range,
    message: `${name} mixes with water and with the organic layer: a wash with it parts nothing.`,
  };
}

/** The solvent that makes up most of what is in the flask; the first one where volumes are missing. */
function largestSolvent(additions: readonly Addition[], during: ReadonlySet<Statement>): Main | null {
  const there = additions.filter(
    ({ ingredient, statement }) =>
      ingredient.role === 'solvent' &&
      ingredient.solvent !== null &&
      (statement === null || (during.has(statement) && !WORK_UP.has(statement.keyword))),
  );
  const isMeasured = there.every(({ ingredient }) => ingredient.volume !== null);
  const [first] = there;
  if (first === undefined) return null;
  const main = isMeasured
    ? there.reduce((most, one) => (most.ingredient.volume! < one.ingredient.volume! ? one : most))
    : first;
  return { solvent: main.ingredient.solvent!, name: main.ingredient.name, range: main.range };
}

function* outside(
  { step }: StepFacts,
  statement: TemperatureStatement,
  { solvent, name, range: place }: Main,
): Iterable<Report> {
  const { from, to, keywordRange } = statement;
  const range = {
    start: { line: statement.range.start.line, character: keywordRange.end.character + 1 },
    end: statement.range.end,
  };
  const related = [{ range: place, message: 'the solvent' }];
  const points = [from, to].flatMap((kelvin) => (kelvin === 'reflux' ? [] : [kelvin - ZERO_CELSIUS]));
  const [lowest, highest] = [Math.min(...points), Math.max(...points)];
  const { boilingPoint, meltingPoint } = solvent;
  const isClosed = step.statements.some(
    (other) => other.keyword === 'note' && UNDER_PRESSURE.test(other.text),
  );
  if (boilingPoint !== null && boilingPoint + OVER < highest && !isClosed)
    yield {
      range,
      related,
      message: `${name} boils at ${degrees(boilingPoint)}; ${degrees(highest)} needs pressure, which a note can say.`,
      figures: { boilingPoint, temperature: highest },
    };
  if (meltingPoint !== null && lowest < meltingPoint - UNDER)
    yield {
      range,
      related,
      message: `${name} freezes at ${degrees(meltingPoint)}: at ${degrees(lowest)} nothing stirs.`,
      figures: { meltingPoint, temperature: lowest },
    };
}

/** "−78 °C" */
function degrees(celsius: number): string {
  return `${Math.round(celsius)} °C`.replace('-', '−');
}
