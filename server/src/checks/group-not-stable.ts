/** A group that is meant to survive meets an acid, a base or fluoride that takes it off. */
import { constantsIn } from '../chemistry/constants.ts';
import { matchSites } from '../chemistry/match.ts';
import type { Pattern } from '../chemistry/smarts.ts';
import { isCalled } from '../flask/kinetics.ts';
import { solveFlask } from '../flask/solve.ts';
import type { Contents, Ingredient } from '../flask/state.ts';
import type { Substance } from '../route/plan.ts';
import type { StabilityRow } from '../tables/rows.ts';
import type { Tables } from '../tables/tables.ts';
import { defineCheck } from './define.ts';
import type { ConvertFact, StepFacts } from './facts.ts';

export default defineCheck({
  name: 'group-not-stable',
  family: 'conversion',
  severity: 'warning',
  summary: 'A group that is meant to survive meets an acid, a base or fluoride that takes it off.',
  why: 'A protecting group that comes off too early, or an ester that is saponified on the way, costs the step.',
  remedy: 'Choose a milder acid or base, another protecting group, or another order of the steps.',
  silentWhen:
    'Where the product holds fewer of the groups than the reactant, where bases (acids) in the flask use up what would attack, in short contacts such as quench and wash, and for reagents that attack in another way than as acid, base or fluoride.',
  sources: ['greene-2014'],
  wrong: `compound A = CC(C)(C)[Si](C)(C)OCCCC(=O)OC
compound B = CC(C)(C)[Si](C)(C)OCCCC(=O)O
step A
  solvent THF 20 mL
  charge A 5 mmol
  charge TBAF 1.2 equiv 1.0 M in THF
  charge water 2 equiv
  convert A to B
`,
  right: `compound A = CC(C)(C)[Si](C)(C)OCCCC(=O)OC
compound B = OCCCC(=O)OC
step A
  solvent THF 20 mL
  charge A 5 mmol
  charge TBAF 1.2 equiv 1.0 M in THF
  charge AcOH 0.2 equiv
  convert A to B
`,
  *inStep(facts) {
    for (const { substance, fault } of [...afterConversions(facts), ...heldThrough(facts)]) {
      const { row, attacker } = fault;
      const reagent = facts.additions.find(({ ingredient }) => ingredient.id === attacker?.id);
      yield {
        range: substance.range,
        message: `The ${row.name} of ${substance.name} is meant to stay, but ${fault.words}: the trade holds it safe ${safeRange(row)}.`,
        related:
          reagent === undefined ? [] : [{ range: reagent.range, message: `what attacks the ${row.name}` }],
      };
    }
  },
});

interface Blamed {
  readonly substance: Substance;
  readonly fault: Fault;
}

/** Products that hold as many of a group as their reactants did. */
function afterConversions(facts: StepFacts): Blamed[] {
  return facts.conversions.flatMap((fact) =>
    fact.statement.to.flatMap(({ substance }) => {
      const fault = faultOf(fact, substance, facts);
      return fault === null ? [] : [{ substance, fault }];
    }),
  );
}

/** Compounds that no conversion touches and that a later line wants back as they are, the first such line of each. */
function heldThrough({ step, moments, conversions, tables }: StepFacts): Blamed[] {
  const isTouched = (name: string) =>
    conversions.some(({ statement }) =>
      [...statement.from, ...statement.to].some(({ substance }) => substance.name === name),
    );
  const last = moments.filter(({ statement }) => !WORK_UP.has(statement.keyword)).at(-1);
  const said = new Set<string>();
  return step.statements.flatMap((statement): Blamed[] => {
    if (!WANTING_BACK.has(statement.keyword) || !('substance' in statement) || last === undefined) return [];
    const { substance } = statement;
    const one = moleculeIn(last.contents.ingredients, substance);
    if (one === undefined || isTouched(one.name) || said.has(one.name)) return [];
    said.add(one.name);
    for (const row of tables.stability) {
      if (countIn(one, row) === 0) continue;
      const attacker = attackerOf(row, last.contents, one.mol, tables);
      if (attacker !== null)
        return [{ substance, fault: { row, attacker, words: `${attacker.name} takes it off` } }];
    }
    return [];
  });
}

/** Lines of the work-up, whose contacts are short. */
const WORK_UP = new Set(['quench', 'wash', 'extract', 'adjust', 'keep', 'isolate']);
const WANTING_BACK = new Set(['extract', 'keep', 'isolate']);

interface Fault {
  readonly row: StabilityRow;
  readonly attacker: Ingredient | null;
  readonly words: string;
}

type Way = 'acid' | 'base' | 'fluoride';

/** How a reagent called so attacks; others attack in ways that acidity does not decide. */
const WAYS: Readonly<Record<string, Way>> = {
  'role:mineral-acid': 'acid',
  'role:organic-acid': 'acid',
  'reagent:TFA': 'acid',
  'reagent:TsOH': 'acid',
  'reagent:CSA': 'acid',
  'reagent:PPTS': 'acid',
  'reagent:HCl': 'acid',
  'reagent:HBr': 'acid',
  'reagent:formic acid': 'acid',
  'role:hydroxide': 'base',
  'role:alkoxide': 'base',
  'reagent:piperidine': 'base',
  'reagent:DBU': 'base',
  'reagent:diethylamine': 'base',
  'role:fluoride': 'fluoride',
  'reagent:TBAF': 'fluoride',
  'reagent:HF·pyridine': 'fluoride',
};
/** Equivalents of an acid or base left over from which it attacks. */
const LEAST = { acid: 0.02, base: 0.2 } as const;
/** Water-scale constants beyond which something takes up an acid, or gives a proton to a base. */
const TAKES_ACID = 4;
const GIVES_TO_BASE = 9;

function faultOf({ statement, before }: ConvertFact, product: Substance, facts: StepFacts): Fault | null {
  const after = moleculeIn(facts.left.ingredients, product) ?? null;
  const made = facts.additions.find(({ substance }) => substance === product)?.ingredient ?? null;
  const graph = (made?.molecule ?? after?.molecule)?.graph;
  if (graph == null) return null;
  const reactants = before.ingredients.filter(({ name }) =>
    statement.from.some(({ substance }) => substance.name === name),
  );
  const amount = Math.max(0, ...reactants.map(({ mol }) => mol));
  for (const row of facts.tables.stability) {
    const kept = matchSites(graph, row.pattern as Pattern).length;
    const had = reactants.reduce((sum, one) => sum + countIn(one, row), 0);
    if (kept === 0 || had === 0 || kept < had) continue;
    const attacker = attackerOf(row, before, amount, facts.tables);
    if (attacker !== null) return { row, attacker, words: `${attacker.name} takes it off` };
    const pH = acidityOf(before, facts.tables);
    if (pH !== null && isOutside(row, pH))
      return { row, attacker: null, words: `the water is at pH ${pH.toFixed(1)}` };
  }
  return null;
}

function moleculeIn(ingredients: readonly Ingredient[], { name }: Substance): Ingredient | undefined {
  return ingredients.find((one) => one.name === name);
}

function countIn({ molecule }: Ingredient, { pattern }: StabilityRow): number {
  return molecule?.graph == null ? 0 : matchSites(molecule.graph, pattern as Pattern).length;
}

/** The ingredient that attacks the group by acidity and is not used up by the rest of the flask. */
function attackerOf(
  { attackedBy, lowest, highest }: StabilityRow,
  contents: Contents,
  amount: number,
  tables: Tables,
): Ingredient | null {
  const pH = acidityOf(contents, tables);
  for (const what of attackedBy) {
    const way = WAYS[what];
    const one = contents.ingredients.find((other) => isCalled(other, what) && 0 < other.mol);
    if (way === undefined || one === undefined) continue;
    if (way === 'fluoride') return one;
    if (pH !== null) {
      if (way === 'acid' && lowest !== null && pH < lowest) return one;
      if (way === 'base' && highest !== null && highest < pH) return one;
      continue;
    }
    if (LEAST[way] * amount < excessOf(way, one, contents, tables)) return one;
  }
  return null;
}

/** mol of an acid (base) that the bases (acids) of a flask without water do not use up. */
function excessOf(
  way: 'acid' | 'base',
  attacker: Ingredient,
  { ingredients }: Contents,
  tables: Tables,
): number {
  return ingredients.reduce((sum, one) => {
    if (one.role === 'solvent' || one.role === 'inert' || one.molecule === null) return sum;
    if (one === attacker) return sum + one.mol;
    const { couples } = one.molecule;
    const values = constantsIn(one.molecule, 'water', tables).couples;
    const takes = couples.filter(({ holdsProton, element }, place) => {
      const value = values[place]?.value;
      if (value === undefined || element === 'C') return false;
      return way === 'acid' ? !holdsProton && TAKES_ACID < value : holdsProton && value < GIVES_TO_BASE;
    }).length;
    return sum - takes * one.mol;
  }, 0);
}

/** pH where water governs; else null. */
function acidityOf(contents: Contents, tables: Tables): number | null {
  const { medium, pH } = solveFlask(contents, tables, constantsIn);
  return medium.aqueous ? pH : null;
}

/** Beyond the range by at least a unit, so that a doubtful pH says nothing. */
function isOutside({ lowest, highest }: StabilityRow, pH: number): boolean {
  return (lowest !== null && pH < lowest - 1) || (highest !== null && highest + 1 < pH);
}

function safeRange({ lowest, highest, upTo }: StabilityRow): string {
  const range =
    lowest === null || highest === null ? 'only dry' : `between pH ${lowest} and ${highest} in water`;
  return upTo === null ? range : `${range} up to ${upTo} °C`;
}
