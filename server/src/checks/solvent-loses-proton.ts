/** The solvent gives its proton to a base that was meant for something else. */
import { constantsIn } from '../chemistry/constants.ts';
import { lostToSolvent, type ReagentFate, reagentFates } from '../flask/fates.ts';
import type { Contents } from '../flask/state.ts';
import { defineCheck } from './define.ts';
import type { StepFacts } from './facts.ts';
import { unit } from './verdicts.ts';

export default defineCheck({
  name: 'solvent-loses-proton',
  family: 'solvent',
  severity: 'error',
  summary: 'The solvent gives its proton to a base that was meant for something else.',
  why: 'A hydride, metal amide or organometallic that meets an acidic solvent is gone, with heat and often with gas.',
  remedy: 'Choose a solvent without acidic protons: ethers or hydrocarbons for strong bases.',
  silentWhen:
    'Reversible exchange with the solvent’s own anion, and solvents whose protons move too slowly to matter.',
  sources: ['bordwell-1988', 'common-practice'],
  wrong: `compound K = O=C([CH3:1])c1ccccc1
step A
  solvent MeCN 20 mL
  temperature -40 °C
  charge K 5 mmol
  base LDA 1.1 equiv 2.0 M in THF
  deprotonate K at :1
`,
  right: `compound K = O=C([CH3:1])c1ccccc1
step A
  solvent THF 20 mL
  temperature -78 °C
  charge K 5 mmol
  base LDA 1.1 equiv 2.0 M in THF
  deprotonate K at :1
`,
  *inStep(facts) {
    const said = new Set<string>();
    for (const { statement, contents } of facts.moments) {
      if (statement.keyword === 'convert' || statement.keyword === 'quench' || statement.keyword === 'wash')
        break;
      for (const fate of lossesTo(contents, facts)) {
        if (fate.as !== 'base' || !fate.bySolvent || fate.isLevelled || fate.share < 0.1) continue;
        const base = facts.additions.find(({ ingredient }) => ingredient.id === fate.ingredient);
        const solvent = facts.additions.find(({ ingredient }) => ingredient.id === fate.other.ingredient);
        if (
          base === undefined ||
          !base.ingredient.reagent?.roles.some((role) => FOR_GOOD.has(role)) ||
          said.has(base.ingredient.name) ||
          ADDS_TO.has(solvent?.ingredient.solvent?.kind ?? '')
        )
          continue;
        said.add(base.ingredient.name);
        yield {
          range: solvent?.range ?? base.range,
          confidence: 1 - fate.doubt,
          figures: {
            deltaPKa: fate.own.constant.value - fate.other.constant.value,
            sd: Math.hypot(fate.own.constant.sd, fate.other.constant.sd),
            logK: fate.own.constant.value - fate.other.constant.value,
            extent: fate.share,
          },
          message: `${solvent?.ingredient.name ?? 'The solvent'} (pKa ${unit(fate.other)}) gives its proton to ${base.ingredient.name} (conjugate acid pKa ${fate.own.constant.value.toFixed(1)}): the base is gone before it acts.`,
          related: [{ range: base.range, message: 'the base that is lost' }],
        };
      }
    }
  },
});

/**
 * What the solvent takes of each reagent.
 *
 * A metal amide or an organometallic in solution meets the solvent first; a solid hydride waits, and is judged by where
 * its protons end up.
 */
function lossesTo(contents: Contents, { tables }: StepFacts): ReagentFate[] {
  const isHydride = ({ ingredient }: ReagentFate) =>
    contents.ingredients.find(({ id }) => id === ingredient)?.reagent?.roles.includes('metal-hydride') ??
    false;
  return [
    ...lostToSolvent(contents, tables, constantsIn).filter((fate) => !isHydride(fate)),
    ...reagentFates(contents, tables, constantsIn).filter(isHydride),
  ];
}

/** Reagents that never come back once a proton has been taken. */
const FOR_GOOD = new Set<string>(['metal-hydride', 'metal-amide', 'organometallic', 'aluminium-hydride']);
/** Solvents whose carbonyl group is attacked before a proton moves; another finding says so. */
const ADDS_TO = new Set(['amide', 'ester', 'carbonate', 'urea']);
