/**
 * The flask of a step at each line that changes it, as plain numbers.
 *
 * Knows: analysed plans.  Must not know: how the numbers are shown.
 * Units: SI, but mol and litre; pH on the medium's own scale.
 */
import type { Analysed } from './types.ts';

/** One state a statement, in order; null where the plan has no such step. */
export function flaskStates({ plan, steps }: Analysed, label: string) {
  const index = plan.steps.findIndex((step) => step.label === label);
  const step = plan.steps[index];
  if (step === undefined) return null;
  const { moments, additions } = steps[index]!.facts;
  const names = new Map(additions.map(({ ingredient }) => [ingredient.id, ingredient.name]));
  return moments.map(({ statement, state }) => {
    const { medium, temperature, pH, ionicStrength, couples, gases, residual } = state();
    return {
      line: step.firstLine + statement.range.start.line,
      scale: medium.scale,
      temperature,
      pH,
      ionicStrength,
      volume: medium.volume,
      couples: couples.map(({ ingredient, couple, constant, amount, protonated }) => ({
        name: names.get(ingredient) ?? 'solvent',
        atom: couple.atom,
        group: couple.group,
        pKa: constant.value,
        sd: constant.sd,
        amount,
        protonated,
      })),
      gases: gases.map(({ name, mol }) => ({ name, mol })),
      residual,
    };
  });
}
