/**
 * What is in one of two layers once the other has been drawn off.
 *
 * Knows: solved flasks, calculated log P.  Must not know: plans, text.
 * Units: mol, litre.
 * Accuracy: an estimate, by the log P of octanol and water; what carries no carbon stays in water.
 * Invariant: what is in the two layers adds up to what was in the flask.   (tests/flask/separate.test.ts)
 */
import { constantsIn as constantsOf } from '../chemistry/constants.ts';
import { neutralForm } from '../chemistry/neutral.ts';
import { perceive } from '../chemistry/perceive.ts';
import { writeSmiles } from '../chemistry/write-smiles.ts';
import type { Tables } from '../tables/tables.ts';
import { layerForms, mainComponent, organicShare } from './layers.ts';
import { solveFlask } from './solve.ts';
import type { ConstantsIn, Contents, FlaskState, Ingredient } from './state.ts';

export type Layer = 'organic' | 'aqueous';

/** Less than this share of an ingredient in a layer is not carried on. */
const TRACE = 1e-3;

/** The ingredients of one layer; all of them where there are no two layers. */
export function ingredientsIn(
  layer: Layer,
  contents: Contents,
  tables: Tables,
  constantsIn: ConstantsIn = constantsOf,
): readonly Ingredient[] {
  const state = solveFlask(contents, tables, constantsIn);
  if (state.medium.organic === null) return contents.ingredients;
  return contents.ingredients.flatMap((one): Ingredient[] => {
    if (one.role === 'inert') return [one];
    if (one.role === 'solvent' || one.solvent !== null) return livesIn(layer, one) ? [one] : [];
    const organic = shareInOrganic(one, state, tables, constantsIn);
    const share = layer === 'organic' ? organic : 1 - organic;
    if (share < TRACE) return [];
    const molecule = layer === 'organic' ? (neutralMain(one, tables) ?? one.molecule) : one.molecule;
    return [{ ...one, molecule, mol: one.mol * share }];
  });
}

/** Share of an ingredient that is in the organic layer of a solved flask with two layers; 0 where there is one. */
export function shareInOrganic(
  { molecule, own }: Ingredient,
  { medium, pH }: FlaskState,
  tables: Tables,
  constantsIn: ConstantsIn = constantsOf,
): number {
  if (medium.organic === null) return 0;
  // Without a structure nobody knows; it stays with the compounds.
  if (molecule === null) return 1;
  const { logD } = layerForms(molecule, pH ?? NEUTRAL, tables, constantsIn, own ?? []);
  return logD === null ? 0 : organicShare(logD, medium.organic.volume, medium.volume);
}

/** pH of water without acids and bases. */
const NEUTRAL = 7;

function livesIn(layer: Layer, { solvent }: Ingredient): boolean {
  const isAqueous = solvent === null || solvent.kind === 'water' || solvent.waterMiscibility === 'yes';
  return (layer === 'aqueous') === isAqueous;
}

/** The organic part as it lies in an organic layer: neutral, without the ions that balanced it; null where it stays charged. */
function neutralMain({ molecule }: Ingredient, tables: Tables): Ingredient['molecule'] {
  const main = molecule === null ? null : mainComponent(molecule);
  if (molecule?.graph == null || main === null || molecule.components.length === 1) return null;
  const { graph } = neutralForm(molecule.graph);
  const atoms = molecule.components[main]!.atoms;
  if (atoms.reduce((sum, atom) => sum + graph.atoms[atom]!.charge, 0) !== 0) return null;
  const neutral = perceive(writeSmiles(graph, atoms).text, tables);
  return neutral.graph === null ? null : neutral;
}
