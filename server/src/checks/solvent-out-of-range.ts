/** A temperature at which a solvent boils or is frozen, or a wash with a solvent that mixes with both layers. */
import { defineCheck } from './define.ts';

export default defineCheck({
  name: 'solvent-out-of-range',
  family: 'solvent',
  severity: 'warning',
  summary:
    'A temperature at which a solvent boils or is frozen, or a wash with a solvent that mixes with both layers.',
  why: 'Above the boiling point the temperature is not reached at ambient pressure; a frozen solvent does not mix; a miscible wash takes the product with it.',
  remedy: 'Change the temperature, the solvent or the wash, or note the pressure.',
  silentWhen:
    'Within five degrees of the boiling point and ten of the melting point, and mixtures whose largest part stays liquid.',
  sources: ['crc-handbook'],
  *inStep({ step, additions }) {
    const solvents = additions.filter(
      ({ statement, ingredient }) => statement?.keyword === 'solvent' && ingredient.solvent !== null,
    );
    for (const statement of step.statements) {
      if (
        statement.keyword === 'wash' &&
        statement.substance.solvent?.waterMiscibility === 'yes' &&
        statement.substance.solvent.kind !== 'water'
      ) {
        yield {
          range: statement.substance.range,
          message: `${statement.substance.name} mixes with water and with the organic layer: a wash with it parts nothing.`,
        };
      }
      if (statement.keyword !== 'temperature' || statement.to === 'reflux') continue;
      const celsius = statement.to - 273.15;
      const range = {
        start: { line: statement.range.start.line, character: statement.keywordRange.end.character + 1 },
        end: statement.range.end,
      };
      for (const { ingredient, range: place } of solvents.slice(0, 1)) {
        const { boilingPoint, meltingPoint } = ingredient.solvent!;
        const related = [{ range: place, message: 'the solvent' }];
        if (boilingPoint !== null && boilingPoint + 5 < celsius)
          yield {
            range,
            related,
            message: `${ingredient.name} boils at ${boilingPoint} °C; ${Math.round(celsius)} °C needs pressure.`,
          };
        if (solvents.length === 1 && meltingPoint !== null && celsius < meltingPoint - 10)
          yield { range, related, message: `${ingredient.name} is solid below ${meltingPoint} °C.` };
      }
    }
  },
});
