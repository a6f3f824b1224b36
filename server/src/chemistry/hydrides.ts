/**
 * Writes salt-like hydrides given as one atom, [NaH] or [CaH2], as metal cation and hydride ions.
 *
 * Invariants: atoms of the text keep their places; the hydride ions follow after the last of them, with the span of
 * their metal.   (tests/chemistry/perceive.test.ts)
 */
import type { Atom, Structure } from './molecule.ts';

const SALT_LIKE = new Set(['Li', 'Na', 'K', 'Rb', 'Cs', 'Mg', 'Ca', 'Sr', 'Ba']);

export function spellOutHydrides(structure: Structure): Structure {
  const isHydride = ({ element, writtenHydrogens = 0 }: Atom) =>
    0 < writtenHydrogens && SALT_LIKE.has(element);
  if (!structure.atoms.some(isHydride)) return structure;
  const ions: Atom[] = [];
  const atoms = structure.atoms.map((atom): Atom => {
    if (!isHydride(atom)) return atom;
    const count = atom.writtenHydrogens!;
    for (let one = 0; one < count; one++) ions.push(hydrideOf(atom, structure.atoms.length + ions.length));
    return { ...atom, writtenHydrogens: 0, charge: atom.charge + count };
  });
  return { atoms: [...atoms, ...ions], bonds: structure.bonds };
}

function hydrideOf({ span }: Atom, index: number): Atom {
  return {
    index,
    element: 'H',
    aromatic: false,
    isotope: 0,
    charge: -1,
    writtenHydrogens: 0,
    mapNumber: 0,
    span,
  };
}
