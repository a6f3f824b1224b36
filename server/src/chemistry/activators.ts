/**
 * Names what stands on a carbon or nitrogen that is to lose a proton: the groups that activate it, and its ring.
 *
 * Knows: graphs.  Must not know: values, scales.
 * Invariants: names do not depend on the order of atoms.   (tests/chemistry/activators.test.ts)
 * The names are those of `data/activation.csv`. One file although long: every name is decided against all others, so
 * that the list of groups reads as one from top to bottom.
 */
import { atomKinds, orderBetween, permanentCharge } from './atom-kinds.ts';
import { coresOf, ringSystems } from './cores.ts';
import type { Graph } from './graph.ts';
import type { Substituents } from './substituents.ts';

export interface Activator {
  readonly name: string;
  readonly count: number;
  /** Sum of the substituent constants on its arene. */
  readonly sigma: number;
}

/** Terms that count how many alkyl groups stand beside a strong activator. */
const ALKYL = 'alkyl';
const FLUORIDES = new Set(['F']);
const HALOGENS = new Set(['F', 'Cl', 'Br', 'I']);
const ACCEPTING = new Set(['C=O', 'C#N', 'NO2', 'S(=O)2', 'S(=O)1', 'P=O', 'C=OO', 'C=ON', 'C=OH']);
const MODIFIERS = new Set([
  ALKYL,
  'beta-hetero',
  'beta-aryl',
  'fused-aryl',
  'para-nitro',
  'para-carbonyl',
  'para-acceptor',
  'acyl-fluorine',
  'crowded',
  'ring3',
  'ring4',
  'ring-dicarbonyl',
  'tied-diaryl',
  'aromatic-anion',
]);
const ACCEPTORS_OF_N = ['C=O', 'S(=O)2'];
const CARBONYLS = new Set([
  'acyl',
  'aroyl',
  'formyl',
  'ester',
  'aryl-ester',
  'lactone',
  'amide',
  'imide',
  'lactam',
  'thioester',
]);
const TURNING = new Set(['aryl', 'imino-C', 'azinyl1', 'azinyl2', 'azinyl-meta']);
const SULFONYLS = new Set(['sulfonyl', 'arylsulfonyl', 'triflyl', 'phosphonyl', 'phosphinyl']);
/** Rings whose anion is flat as it stands. */
const RIGID = new Set(['cyclopentadienyl', 'indenyl', 'fluorenyl']);
/** Field from an ortho place is stronger than from the others. */
const ORTHO = 1.2;
/** σp from which a substituent counts as an acceptor. */
const ACCEPTOR = 0.2;
/** Places that the charge reaches. */
const CONJUGATED = new Set(['o', 'p']);

/** Whether a name only corrects what the groups do. */
export function isModifier(name: string): boolean {
  return MODIFIERS.has(name) || name.includes('+');
}

/** Everything that bears on the acidity of one sp3 carbon or nitrogen; null where the site is of another kind. */
export function activatorsOf(graph: Graph, site: number, substituents: Substituents): Activator[] | null {
  const atom = graph.atoms[site]!;
  if (atom.aromatic || (atom.element !== 'C' && atom.element !== 'N')) return null;
  if (atom.bonds.some((bond) => graph.bonds[bond]!.order !== 1)) return null;
  const counts = new Map<string, { count: number; sigma: number }>();
  const add = (name: string, sigma = 0) => {
    const known = counts.get(name) ?? { count: 0, sigma: 0 };
    counts.set(name, { count: known.count + 1, sigma: known.sigma + sigma });
  };
  const tied = aromaticAnion(graph, site);
  const inside = tied === null ? new Set<number>() : new Set(tied.ring);
  if (tied !== null)
    add(
      tied.name,
      tied.arenes.reduce((sum, root) => sum + arylSigma(graph, site, root, substituents).all, 0),
    );
  for (const root of atom.neighbours) {
    if (inside.has(root) && tied!.closed) continue;
    const name = branchName(graph, root, site);
    const sigma = sigmaBehind(graph, site, root, name, substituents);
    add(name, sigma.all);
    for (const [acceptor, share] of sigma.conjugated) add(acceptor, share);
    for (const extra of extras(graph, root, site, name)) add(extra);
  }
  if (tied === null && isCrowded(counts)) add('crowded');
  for (const name of ringTerms(graph, site)) add(name);
  for (const name of crowding(counts)) add(name.name, 0);
  return [...counts].map(([name, { count, sigma }]) => ({ name, count, sigma }));
}

/** The name of the group that starts at `root`. */
function branchName(graph: Graph, root: number, from: number): string {
  const { element, aromatic, charge } = graph.atoms[root]!;
  if (aromatic) return arylName(graph, root);
  switch (element) {
    case 'C':
      return carbonName(graph, root, from);
    case 'N':
      return nitrogenName(graph, root);
    case 'O':
      return oxygenName(graph, root, from);
    case 'S':
    case 'Se':
      return sulfurName(graph, root, from);
    case 'P':
      return phosphorusName(graph, root);
    case 'Si':
      return 'silyl';
    case 'B':
      return 'boryl';
    default:
      return charge === 0 && HALOGENS.has(element) ? element : `other-${element}`;
  }
}

function arylName(graph: Graph, root: number): string {
  const { element, charge } = graph.atoms[root]!;
  if (element === 'N') return charge > 0 ? 'pyridinio' : 'n-azolyl';
  const kinds = atomKinds(graph);
  const ring = graph.rings
    .filter((candidate) => candidate.includes(root) && candidate.every((atom) => graph.atoms[atom]!.aromatic))
    .sort((a, b) => a.length - b.length)[0];
  if (ring === undefined) return 'aryl';
  const cationic = ring.some((atom) => permanentCharge(graph, graph.atoms[atom]!));
  if (cationic) return 'azinio';
  const place = (atom: number) => {
    const steps = Math.abs(ring.indexOf(atom) - ring.indexOf(root));
    return Math.min(steps, ring.length - steps);
  };
  const nitrogens = ring.filter((atom) => kinds[atom] === 'n');
  if (ring.length === 6) {
    const conjugated = nitrogens.filter((atom) => place(atom) !== 2).length;
    return conjugated !== 0
      ? `azinyl${Math.min(2, conjugated)}`
      : nitrogens.length !== 0
        ? 'azinyl-meta'
        : 'aryl';
  }
  if (nitrogens.some((atom) => place(atom) === 1)) return 'azolyl';
  return 'five-ring';
}

function carbonName(graph: Graph, root: number, from: number): string {
  const atom = graph.atoms[root]!;
  const kind = atomKinds(graph)[root]!;
  if (kind === 'C#N') return 'cyano';
  if (kind.startsWith('C#')) return 'alkynyl';
  const double = atom.neighbours.find((next) => orderBetween(graph, root, next) === 2);
  if (double === undefined) {
    const fluorines = atom.neighbours.filter((next) => FLUORIDES.has(graph.atoms[next]!.element)).length;
    return 1 < fluorines ? 'fluoroalkyl' : ALKYL;
  }
  const others = atom.neighbours.filter((next) => next !== from && next !== double);
  const single = others.map((next) => graph.atoms[next]!);
  switch (graph.atoms[double]!.element) {
    case 'C':
      return vinylName(graph, root, double, from);
    case 'N':
      return 'imidoyl';
    case 'S':
      return single.some(({ element }) => element === 'N') ? 'thioamide' : 'thioacyl';
    case 'O':
      break;
    default:
      return 'other-C';
  }
  const hetero = single.find(({ element }) => element !== 'C');
  if (hetero === undefined) {
    if (single.length === 0) return 'formyl';
    return single[0]!.aromatic ? 'aroyl' : 'acyl';
  }
  const together = sameRing(graph, from, root, hetero.index);
  const arylated = hetero.neighbours.some((next) => next !== root && graph.atoms[next]!.aromatic);
  switch (hetero.element) {
    case 'O':
      if (0 < hetero.hydrogens) return 'carboxyl';
      return together ? 'lactone' : arylated ? 'aryl-ester' : 'ester';
    case 'N':
      return amideName(graph, root, hetero.index, from, together);
    case 'S':
      return 'thioester';
    default:
      return 'acyl-halide';
  }
}

/** A nitrogen that serves two carbonyl groups gives each less; in a ring with an acidic nitrogen it is held in place. */
function amideName(graph: Graph, root: number, nitrogen: number, from: number, together: boolean): string {
  const kinds = atomKinds(graph);
  const shared = graph.atoms[nitrogen]!.neighbours.some(
    (next) =>
      next !== root &&
      next !== from &&
      !graph.atoms[next]!.aromatic &&
      ACCEPTORS_OF_N.some((kind) => kinds[next]!.startsWith(kind)),
  );
  if (graph.atoms[from]!.element === 'C') return shared ? 'imide' : 'amide';
  return together ? 'lactam' : 'amide';
}

function vinylName(graph: Graph, root: number, double: number, from: number): string {
  const kinds = atomKinds(graph);
  const ends = [root, double].flatMap((atom) =>
    graph.atoms[atom]!.neighbours.filter((next) => next !== from && next !== root && next !== double),
  );
  if (
    ends.some(
      (next) =>
        ACCEPTING.has(kinds[next]!) || (kinds[next]!.startsWith('C=O') && !graph.atoms[next]!.aromatic),
    )
  )
    return 'vinyl-acceptor';
  const arenes = ends.filter((next) => graph.atoms[next]!.aromatic).length;
  return arenes === 0 ? 'vinyl' : 1 < arenes ? 'diarylvinyl' : 'styryl';
}

function nitrogenName(graph: Graph, root: number): string {
  const atom = graph.atoms[root]!;
  const kind = atomKinds(graph)[root]!;
  if (kind === 'NO2') return 'nitro';
  if (kind.startsWith('N#')) return 'isocyano';
  if (kind.startsWith('N=')) return atom.charge > 0 ? 'azido' : `imino-${kind[2]}`;
  if (permanentCharge(graph, atom)) return 'ammonio';
  return kind.startsWith('Na') ? 'acylamino' : 'amino';
}

function oxygenName(graph: Graph, root: number, from: number): string {
  const other = graph.atoms[root]!.neighbours.find((next) => next !== from);
  if (other === undefined) return 'hydroxy';
  if (graph.atoms[other]!.aromatic) return 'aryloxy';
  return atomKinds(graph)[root] === 'Oa' ? 'acyloxy' : 'alkoxy';
}

function sulfurName(graph: Graph, root: number, from: number): string {
  const atom = graph.atoms[root]!;
  const oxygens = atom.neighbours.filter((next) => orderBetween(graph, root, next) === 2).length;
  const others = atom.neighbours.filter((next) => next !== from && orderBetween(graph, root, next) === 1);
  const arylated = others.some((next) => graph.atoms[next]!.aromatic);
  if (permanentCharge(graph, atom)) return oxygens === 0 ? 'sulfonio' : 'sulfoxonio';
  if (oxygens === 0) return arylated ? 'arylthio' : 'alkylthio';
  if (oxygens === 1) return arylated ? 'arylsulfinyl' : 'sulfinyl';
  if (others.some((next) => isPerfluorinated(graph, next))) return 'triflyl';
  const hetero = others.map((next) => graph.atoms[next]!.element).find((element) => element !== 'C');
  if (hetero === 'O') return 'sulfonate';
  if (hetero === 'N') return 'sulfamoyl';
  if (hetero !== undefined) return 'sulfonyl-halide';
  return arylated ? 'arylsulfonyl' : 'sulfonyl';
}

function phosphorusName(graph: Graph, root: number): string {
  const atom = graph.atoms[root]!;
  if (permanentCharge(graph, atom)) return 'phosphonio';
  if (!atom.neighbours.some((next) => orderBetween(graph, root, next) === 2)) return 'phosphino';
  const esters = atom.neighbours.filter((next) => graph.atoms[next]!.element === 'O').length;
  return 1 < esters ? 'phosphonyl' : 'phosphinyl';
}

function isPerfluorinated(graph: Graph, index: number): boolean {
  const { element, neighbours } = graph.atoms[index]!;
  return element === 'C' && 1 < neighbours.filter((next) => graph.atoms[next]!.element === 'F').length;
}

interface ArylSigma {
  readonly all: number;
  /** The part that direct conjugation with the site adds, by the kind of acceptor. */
  readonly conjugated: readonly (readonly [string, number])[];
}

const NO_SIGMA: ArylSigma = { all: 0, conjugated: [] };

/** Constants of the substituents on the arene that the branch is, or carries behind its first atom. */
function sigmaBehind(
  graph: Graph,
  site: number,
  root: number,
  name: string,
  substituents: Substituents,
): ArylSigma {
  if (graph.atoms[root]!.aromatic) return arylSigma(graph, site, root, substituents);
  if (name !== 'aroyl' && !name.startsWith('aryl')) return NO_SIGMA;
  const ring = graph.atoms[root]!.neighbours.find((next) => next !== site && graph.atoms[next]!.aromatic);
  return ring === undefined ? NO_SIGMA : { ...NO_SIGMA, all: arylSigma(graph, root, ring, substituents).all };
}

/** Sum of the constants on an arene as its anchor sees them. */
function arylSigma(graph: Graph, site: number, root: number, substituents: Substituents): ArylSigma {
  const core = coresOf(graph, site).find(({ anchor, reach }) => anchor === root && reach === 1);
  if (core === undefined) return NO_SIGMA;
  const conjugated: [string, number][] = [];
  let all = 0;
  for (const [atom, place] of core.places) {
    for (const next of graph.atoms[atom]!.neighbours) {
      if (core.atoms.has(next) || next === site || orderBetween(graph, atom, next) === 0) continue;
      if (inRingWith(graph, site, atom, next)) continue;
      const { m, p, minus } = substituents.sigmaOf(graph, next, atom);
      const through = p + minus;
      all += place === 'o' ? ORTHO * Math.max(m, through) : place === 'p' ? through : m;
      if (CONJUGATED.has(place) && ACCEPTOR < p && 0 < minus) {
        conjugated.push([acceptorName(atomKinds(graph)[next]!), minus]);
      }
    }
  }
  return { all, conjugated };
}

/** Nitro and carbonyl groups take the charge over; cyano and sulfonyl groups mostly pull on it. */
function acceptorName(kind: string): string {
  return kind === 'NO2' ? 'para-nitro' : kind.startsWith('C=O') ? 'para-carbonyl' : 'para-acceptor';
}

function inRingWith(graph: Graph, site: number, atom: number, next: number): boolean {
  return graph.rings.some((ring) => ring.includes(site) && ring.includes(atom) && ring.includes(next));
}

/** What stands one bond further and still counts. */
function extras(graph: Graph, root: number, from: number, name: string): string[] {
  const atom = graph.atoms[root]!;
  const beyond = atom.neighbours.filter((next) => next !== from).map((next) => graph.atoms[next]!);
  if (name === ALKYL) {
    return beyond
      .filter(({ element, aromatic }) => aromatic || (element !== 'C' && element !== 'Si'))
      .map(({ aromatic }) => (aromatic ? 'beta-aryl' : 'beta-hetero'));
  }
  if (name === 'aryl')
    return ringSystems(graph).some((system) => system.includes(root) && 6 < system.length)
      ? ['fused-aryl']
      : [];
  if (name === 'acyl' || name === 'formyl') {
    return beyond
      .filter(({ index, element }) => element === 'C' && isPerfluorinated(graph, index))
      .map(() => 'acyl-fluorine');
  }
  return [];
}

/** Rings that hold the site and change what its anion is worth. */
function ringTerms(graph: Graph, site: number): string[] {
  const terms: string[] = [];
  for (const ring of graph.rings) {
    if (!ring.includes(site)) continue;
    if (ring.length === 3) terms.push('ring3');
    if (ring.length === 4) terms.push('ring4');
    const carbonyls = ring.filter(
      (atom) => atomKinds(graph)[atom]!.startsWith('C=O') && sharesBond(graph, atom, site),
    ).length;
    if (1 < carbonyls) terms.push('ring-dicarbonyl');
    const arenes = ring.filter((atom) => graph.atoms[atom]!.aromatic && sharesBond(graph, atom, site)).length;
    if (ring.length === 6 && 1 < arenes) terms.push('tied-diaryl');
    if (ring.length === 5 && isHeteroaromaticAnion(graph, ring, site)) terms.push('aromatic-anion');
  }
  return terms;
}

/** Whether three flat groups, one of them an arene or an imine, cannot all lie in one plane. */
function isCrowded(counts: ReadonlyMap<string, { count: number }>): boolean {
  const total = (names: ReadonlySet<string>) =>
    [...counts].reduce((sum, [name, { count }]) => sum + (names.has(name) ? count : 0), 0);
  return 0 < total(TURNING) && 2 < total(TURNING) + total(CARBONYLS) + total(SULFONYLS);
}

/** Groups that get into each other's way once the site is flat. */
function crowding(counts: ReadonlyMap<string, { count: number }>): { name: string }[] {
  const count = (name: string) => counts.get(name)?.count ?? 0;
  const alkyls = count(ALKYL);
  if (alkyls === 0) return [];
  const names = [...counts.keys()];
  const carbonyls = names.filter((name) => CARBONYLS.has(name)).reduce((sum, name) => sum + count(name), 0);
  const found: string[] = [];
  if (count('nitro') !== 0) found.push('alkyl+nitro');
  if (names.some((name) => RIGID.has(name))) found.push('alkyl+flat');
  if (names.some((name) => name === 'phosphonio' || name === 'sulfonio')) found.push('alkyl+onium');
  if (1 < carbonyls) found.push('alkyl+dicarbonyl');
  return found.flatMap((name) => Array.from({ length: alkyls }, () => ({ name })));
}

interface AromaticAnion {
  readonly name: string;
  readonly ring: readonly number[];
  readonly arenes: readonly number[];
  readonly closed: boolean;
}

/** The cyclopentadiene, indene or fluorene whose sp3 carbon the site is. */
function aromaticAnion(graph: Graph, site: number): AromaticAnion | null {
  const flat = (atom: number) =>
    graph.atoms[atom]!.element === 'C' && (graph.atoms[atom]!.aromatic || hasDoubleCarbon(graph, atom));
  const ring = graph.rings.find(
    (candidate) =>
      candidate.length === 5 &&
      candidate.includes(site) &&
      candidate.every((atom) => atom === site || flat(atom)),
  );
  if (ring === undefined) return null;
  const roots = graph.atoms[site]!.neighbours.filter((next) => ring.includes(next));
  const arenes = roots.filter((next) => graph.atoms[next]!.aromatic);
  const fused = ring.filter((atom) => graph.atoms[atom]!.aromatic).length / 2;
  return {
    name: ['cyclopentadienyl', 'indenyl', 'fluorenyl'][Math.min(2, Math.floor(fused))]!,
    ring,
    arenes,
    closed: true,
  };
}

function hasDoubleCarbon(graph: Graph, atom: number): boolean {
  return graph.atoms[atom]!.neighbours.some(
    (next) => orderBetween(graph, atom, next) === 2 && graph.atoms[next]!.element === 'C',
  );
}

/** A five-membered ring of the site, one heteroatom and three flat carbons: furan, pyrrole or thiophene once the proton is off. */
function isHeteroaromaticAnion(graph: Graph, ring: readonly number[], site: number): boolean {
  const others = ring.filter((atom) => atom !== site);
  const hetero = others.filter((atom) => ['O', 'N', 'S'].includes(graph.atoms[atom]!.element));
  const flat = others.filter(
    (atom) =>
      graph.atoms[atom]!.aromatic || graph.atoms[atom]!.bonds.some((bond) => graph.bonds[bond]!.order === 2),
  );
  return hetero.length === 1 && flat.length === 3 && !flat.includes(hetero[0]!);
}

function sharesBond(graph: Graph, first: number, second: number): boolean {
  return graph.atoms[first]!.neighbours.includes(second);
}

function sameRing(graph: Graph, first: number, second: number, third: number): boolean {
  return graph.rings.some((ring) => ring.includes(first) && ring.includes(second) && ring.includes(third));
}
