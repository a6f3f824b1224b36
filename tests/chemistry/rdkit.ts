/**
 * The independent reader that structures, aromaticity and patterns are compared with.
 */
import initRDKit, { type MainModule } from '@rdkit/rdkit';

export type RDKit = MainModule;
type Molecule = NonNullable<ReturnType<RDKit['get_mol']>>;

export interface ReadByRDKit {
  readonly elements: readonly number[];
  readonly hydrogens: readonly number[];
  readonly charges: readonly number[];
  readonly aromaticAtoms: readonly number[];
  /** Ends of the aromatic bonds, the lower index first. */
  readonly aromaticBonds: readonly string[];
}

export async function loadRDKit(): Promise<RDKit> {
  return initRDKit({ logLevel: 'critical' } as never);
}

const AS_WRITTEN = JSON.stringify({ removeHs: false });
const EVERY_MATCH = JSON.stringify({ maxMatches: 100_000 });

/** What RDKit makes of a text after its sanitizer; null where it refuses. */
export function readByRDKit(rdkit: RDKit, smiles: string): ReadByRDKit | null {
  // RDKit has no JSON for the empty text.
  const molecule = smiles === '' ? null : moleculeOf(rdkit, smiles);
  if (molecule === null) return null;
  const { molecules, defaults } = JSON.parse(molecule.get_json());
  molecule.delete();
  const { atoms, bonds, extensions } = molecules[0];
  const marks = extensions?.find(({ name }: { name: string }) => name === 'rdkitRepresentation') ?? {};
  return {
    elements: atoms.map(({ z }: { z?: number }) => z ?? defaults.atom.z),
    hydrogens: atoms.map(({ impHs }: { impHs?: number }) => impHs ?? 0),
    charges: atoms.map(({ chg }: { chg?: number }) => chg ?? 0),
    aromaticAtoms: [...(marks.aromaticAtoms ?? [])].sort((a: number, b: number) => a - b),
    aromaticBonds: (marks.aromaticBonds ?? [])
      .map((bond: number) => [...bonds[bond].atoms].sort((a: number, b: number) => a - b).join('-'))
      .sort(),
  };
}

/**
 * Asks RDKit where patterns fit in molecules, each read once.
 *
 * @returns for a SMARTS and a text the atom sets that fit, each sorted, all sorted; null where RDKit refuses either
 */
export function matcherOf(rdkit: RDKit): (smarts: string, smiles: string) => string[] | null {
  const molecules = new Map<string, Molecule | null>();
  const patterns = new Map<string, Molecule | null>();
  return (smarts, smiles) => {
    if (!molecules.has(smiles)) molecules.set(smiles, moleculeOf(rdkit, smiles));
    if (!patterns.has(smarts)) patterns.set(smarts, rdkit.get_qmol(smarts));
    const [molecule, pattern] = [molecules.get(smiles), patterns.get(smarts)];
    if (!molecule || !pattern) return null;
    const found = JSON.parse(molecule.get_substruct_matches(pattern, EVERY_MATCH)) as { atoms: number[] }[];
    // Where nothing fits the answer is an empty object.
    return (Array.isArray(found) ? found : [])
      .map(({ atoms }) => atoms.sort((a, b) => a - b).join(' '))
      .sort();
  };
}

/** RDKit throws on a few texts, such as one with too many ring digits; that is a refusal too. */
function moleculeOf(rdkit: RDKit, smiles: string): Molecule | null {
  try {
    return rdkit.get_mol(smiles, AS_WRITTEN);
  } catch {
    return null;
  }
}
