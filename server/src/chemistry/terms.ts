/**
 * The terms from which the constant of a couple in water is summed: what stands where around a site.
 *
 * A term is a name and a factor; the table `terms` gives the unit's worth of each name. Names run from the general
 * (any donor of this kind in para position) to the special (this substituent on this kind of acid), so that an unknown
 * substituent still finds its first atoms and an unknown frame still finds its parts.
 *
 * Knows: graphs, groups.  Must not know: values, scales.
 * Invariants: terms do not depend on the order of atoms.   (tests/chemistry/terms.test.ts)
 */
import { atomKinds, orderBetween, permanentCharge, unfolded } from './atom-kinds.ts';
import { type Core, coresOf, frameName } from './cores.ts';
import { bondDistances } from './distances.ts';
import type { Graph } from './graph.ts';
import type { Sigma, Substituents } from './substituents.ts';

export interface Term {
  readonly name: string;
  readonly factor: number;
}

/** What the terms need to know of a couple. */
export interface Site {
  readonly atom: number;
  readonly kind: 'acid' | 'base';
  readonly group: string;
  readonly family: string;
}

/** How far along a chain single atoms are counted. */
const LONGEST_CHAIN = 7;
/** Share of an effect that passes one more saturated bond. */
const FALL_OFF = 0.45;
/** Response of each kind of link between site and ring to a substituent, in units of benzoic acids. */
const REACH_RESPONSE = [5.5, 2.4, 1.2, 0.5, 0.25];

/** No family answers to atoms three or more bonds away by more than this. */
const FAR_RESPONSE = 1.6;

/** The response of phenols, in which corrections of single families are counted. */
const PHENOL_RESPONSE = 2.4;

/** How strongly each family answers to its surroundings, in units of phenols; families that are not named answer with 1. */
const FAMILY_RESPONSE: Readonly<Record<string, number>> = {
  'carboxylic-acid': 0.5,
  phosphoric: 0.6,
  'sulfonic-acid': 0.6,
  'boronic-acid': 0.8,
  peracid: 0.6,
  anilinium: 1.3,
  pyridinium: 1.4,
  azolium: 1.4,
  amidinium: 1.5,
  imine: 1.8,
  'azole-nh': 1.6,
  'aniline-nh': 2,
  'amide-nh': 1.6,
  imide: 1.4,
  oxime: 1.4,
  enol: 1.6,
  lactam: 1.3,
  'carbon-acid': 4,
  'amine-nh': 2,
  'oxygen-base': 2,
  alkyne: 2,
};

/**
 * All terms of a site, in the neutral reference form of its molecule.
 *
 * @param substituents the published constants, indexed
 */
export function termsOf(graph: Graph, site: Site, substituents: Substituents): Term[] {
  const sums = new Map<string, number>();
  const series = `${site.kind[0]}.${site.family}`;
  const answer = FAMILY_RESPONSE[site.family] ?? 1;
  const addRaw = (name: string, factor: number) => {
    sums.set(name, (sums.get(name) ?? 0) + factor);
  };
  const add = (name: string, factor: number) =>
    addRaw(name, name.includes(`:${series}`) ? factor * answer : factor);
  addRaw(`series:${series}`, 1);
  add(`group:${site.group}`, 1);
  for (const depth of [1, 3]) add(`near${depth}:${site.kind[0]}${unfolded(graph, site.atom, -1, depth)}`, 1);
  const cores = coresOf(graph, site.atom);
  for (const core of cores) addCore(graph, site, core, series, substituents, addRaw);
  addAcceptors(graph, site, series, add);
  addChain(graph, site, series, answer, cores, add);
  addRings(graph, site, series, add);
  addCharges(graph, site, series, add);
  return [...sums].map(([name, factor]) => ({ name, factor }));
}

type Add = (name: string, factor: number) => void;

/** Ring atoms, fused rings and substituents of one ring system. */
function addCore(
  graph: Graph,
  site: Site,
  core: Core,
  series: string,
  substituents: Substituents,
  add: Add,
): void {
  const response = (REACH_RESPONSE[core.reach] ?? 0.12) * dulled(graph, site, core.way);
  const line = `${series}.${core.reach}`;
  const kinds = atomKinds(graph);
  let total = 0;
  const nearest = core.reach === 1 ? kinds[site.atom]! : '';
  const ortho: string[] = [];
  add(`frameany:${frameName(graph, core)}.${core.reach === 0 ? 'in' : 'on'}`, response);
  for (const [atom, place] of core.places) {
    const kind = kinds[atom]!;
    const standing = { place, line, response };
    if (kind === 'n') {
      addSigma(AZA, standing, add);
      total += place === 'm' || place[2] === 'n' ? AZA.m : AZA.p;
    }
    if (kind !== 'c') {
      add(`aza:${line}.${place}.${kind}`, response / PHENOL_RESPONSE);
      add(`aza:*.${place}.${kind}`, response);
    }
    for (const next of graph.atoms[atom]!.neighbours) {
      if (core.atoms.has(next) || orderBetween(graph, atom, next) === 0) continue;
      if (leadsBack(graph, atom, next, core)) {
        addTie(graph, next, standing, add);
        continue;
      }
      const sigma = substituents.sigmaOf(graph, next, atom);
      addSigma(sigma, standing, add);
      addSubstituent(graph, atom, next, standing, add);
      total += place === 'm' || place[2] === 'n' ? sigma.m : sigma.p;
      if (place === 'o') {
        ortho.push(kinds[next]!);
        addBay(kinds[next]!, nearest, standing, add);
      }
    }
  }
  add(`bend:${line}`, total * Math.abs(total));
  add('bendany:', response * total * Math.abs(total));
  if (2 <= ortho.length) {
    add(`crowd:${line}`, response / PHENOL_RESPONSE);
    add(`crowd:${line}.${ortho.sort().join('.')}`, response / PHENOL_RESPONSE);
  }
  for (const ring of graph.rings) addFusion(graph, core, ring, line, response, add);
}

/**
 * Share of an effect that a carbon acid still feels when other acceptors already hold its charge.
 *
 * @param way the neighbour of the site through which the effect comes
 */
function dulled(graph: Graph, { atom, family }: Site, way: number): number {
  if (family !== 'carbon-acid') return 1;
  const kinds = atomKinds(graph);
  let held = 0;
  for (const next of graph.atoms[atom]!.neighbours) if (next !== way) held += holdOf(kinds[next]!);
  return 1 / (1 + held);
}

/** How much of the charge of a carbanion an acceptor takes up. */
function holdOf(kind: string): number {
  if (kind === 'NO2') return 1;
  if (/^(C=O|C=S|C#N|S\()/.test(kind)) return 0.3;
  return 0;
}

interface Standing {
  readonly place: string;
  readonly line: string;
  readonly response: number;
}

/** An ortho neighbour beside a nitrogen that may carry alkyl groups: they turn it out of the ring's plane. */
function addBay(kind: string, nearest: string, { line, response }: Standing, add: Add): void {
  if (!/^N[0-2]$/.test(nearest)) return;
  add(`bay:${line}.${nearest}`, response / PHENOL_RESPONSE);
  add(`bay:${line}.${nearest}.${kind}`, response / PHENOL_RESPONSE);
}

/** A nitrogen in the place of a CH group of the ring, as a substituent (Perrin, Dempsey and Serjeant 1981). */
const AZA: Sigma = { name: 'aza', m: 0.73, p: 0.83, minus: 0.3, plus: 0 };

/** Resonance class of a place: ortho, meta, para, beside, across, or reached or not reached across a fusion. */
function resonance(place: string): string {
  return place.startsWith('f') ? place.slice(0, 3) : place[0]!;
}

/** The published line: response times substituent constant, by place. */
function addSigma({ m, p, minus, plus }: Sigma, { place, line, response }: Standing, add: Add): void {
  const far = resonance(place);
  for (const [name, sigma] of [
    ['m', m],
    ['p', p],
    ['minus', minus],
    ['plus', plus],
  ] as const) {
    if (sigma === 0) continue;
    add(`sigma-${name}:*.${far}`, response * sigma);
    if (name === 'm') continue;
    add(`sigma-${name}:${line}.${far}`, response * sigma);
    if (place !== far) add(`sigma-${name}:${line}.${place}`, response * sigma);
  }
}

/** What the published line does not hold: corrections by substituent, from its first atom outwards. */
function addSubstituent(
  graph: Graph,
  ringAtom: number,
  root: number,
  { place, line, response }: Standing,
  add: Add,
): void {
  for (const depth of [0, 1, 2]) {
    const key = unfolded(graph, root, ringAtom, depth);
    if (depth === 0) add(`sub0:*.${resonance(place)}.${key}`, response);
    add(`sub${depth}:${line}.${place}.${key}`, response / PHENOL_RESPONSE);
  }
}

/** A saturated ring closed over the core, or the chain to the site itself. */
function addTie(graph: Graph, root: number, { place, line, response }: Standing, add: Add): void {
  const kind = atomKinds(graph)[root]!;
  add(`tied:${line}.${place}.${kind}`, response / PHENOL_RESPONSE);
  add(`tied:*.${place}.${kind}`, response);
}

/** Whether a substituent is part of a ring that shares two atoms with the core. */
function leadsBack(graph: Graph, ringAtom: number, root: number, core: Core): boolean {
  return graph.rings.some(
    (ring) =>
      ring.includes(ringAtom) &&
      ring.includes(root) &&
      2 <= ring.filter((atom) => core.atoms.has(atom)).length,
  );
}

/** A further ring on the core: its size, nature and the places it takes. */
function addFusion(
  graph: Graph,
  core: Core,
  ring: readonly number[],
  line: string,
  response: number,
  add: Add,
): void {
  if (ring.includes(core.anchor)) return;
  const shared = ring.filter((atom) => core.atoms.has(atom));
  if (shared.length < 2) return;
  const places =
    shared.length === ring.length
      ? ring.map((atom) => core.places.get(atom)!)
      : shared.map((atom) => core.places.get(atom)!);
  const nature = ring.every((atom) => graph.atoms[atom]!.aromatic) ? 'a' : 's';
  const key = `${nature}${ring.length}.${[...places].sort().slice(0, 2).join('')}`;
  add(`fused:${line}.${key}`, response / PHENOL_RESPONSE);
  add(`fused:*.${key}`, response);
}

/** What activates a site from its neighbours, whatever else they carry: acceptors by kind, and how many. */
function addAcceptors(graph: Graph, site: Site, series: string, add: Add): void {
  const kinds = atomKinds(graph);
  const acceptors = graph.atoms[site.atom]!.neighbours.map((next) => kinds[next]!)
    .filter((kind) => !/^C[0-4]$/.test(kind))
    .sort();
  add(`beside:${series}.${acceptors.join('.')}`, 1);
  if (1 < acceptors.length) add(`beside:${series}.${acceptors.length}`, 1);
  acceptors.forEach((first, place) => {
    for (const second of acceptors.slice(place + 1)) {
      add(`pair:${series}.${first}.${second}`, 1);
      add(`pair:${series}.${acceptorClass(first)}.${acceptorClass(second)}`, 1);
    }
  });
}

function acceptorClass(kind: string): string {
  if (kind.startsWith('C=')) return kind.startsWith('C=C') ? 'vinyl' : 'acyl';
  if (kind.startsWith('S(')) return 'sulfonyl';
  return kind.startsWith('C#') ? 'cyano' : /^(F|Cl|Br|I)$/.test(kind) ? 'halogen' : kind[0]!;
}

/** Atoms along the chains that start at the site, up to the first ring atom of a core. */
function addChain(
  graph: Graph,
  site: Site,
  series: string,
  answer: number,
  cores: readonly Core[],
  add: Add,
): void {
  const kinds = atomKinds(graph);
  const inCore = new Set(cores.flatMap(({ atoms }) => [...atoms]));
  const distance = new Map([[site.atom, 0]]);
  const conjugated = new Set([site.atom]);
  const shares = new Map(graph.atoms[site.atom]!.neighbours.map((next) => [next, dulled(graph, site, next)]));
  let front = [site.atom];
  for (let d = 1; d <= LONGEST_CHAIN && front.length !== 0; d++) {
    const next: number[] = [];
    for (const atom of front) {
      if (inCore.has(atom)) continue;
      for (const other of graph.atoms[atom]!.neighbours) {
        if (distance.has(other)) continue;
        distance.set(other, d);
        next.push(other);
        const unsaturated = !/^C[0-4]$/.test(kinds[other]!);
        if (unsaturated && conjugated.has(atom)) conjugated.add(other);
        const path = conjugated.has(other) ? 'j' : 's';
        const fall = FALL_OFF ** (d - 1);
        // What sits on a site drives it hard; what acts from farther away does so in every family alike.
        const direct = d === 1 || (d === 2 && conjugated.has(other));
        if (d !== 1) shares.set(other, shares.get(atom)!);
        const dull = d === 1 && holdOf(kinds[other]!) !== 0 ? 1 : shares.get(other)!;
        const share = dull * (direct ? 1 : Math.min(1, FAR_RESPONSE / answer));
        add(`chain:*.${kinds[other]}`, 3 * fall * answer * share);
        add(`chain:${series}.${kinds[other]}`, 3 * fall * share);
        add(`chain${path}:${series}.${d}.${kinds[other]}`, share);
        if (d <= 5) add(`chain2${path}:${series}.${d}.${unfolded(graph, other, atom, 1)}`, share);
      }
    }
    front = next;
  }
}

/** Rings that hold the site, and rings that hold its neighbour. */
function addRings(graph: Graph, site: Site, series: string, add: Add): void {
  const own = graph.rings.filter((ring) => ring.includes(site.atom) && !graph.atoms[site.atom]!.aromatic);
  for (const ring of own) add(`ring:${series}.${ring.length}`, 1);
  if (1 < own.length)
    add(
      `rings:${series}.${own
        .map(({ length }) => length)
        .sort()
        .join('')}`,
      1,
    );
  for (const next of graph.atoms[site.atom]!.neighbours) {
    if (graph.atoms[next]!.aromatic) continue;
    for (const ring of graph.rings) {
      if (ring.includes(next) && !ring.includes(site.atom)) add(`ringside:${series}.${ring.length}`, 1);
    }
  }
}

/** Permanent charges by distance in bonds. */
function addCharges(graph: Graph, site: Site, series: string, add: Add): void {
  const distance = bondDistances(graph, site.atom);
  for (const atom of graph.atoms) {
    const d = distance[atom.index]!;
    if (atom.index === site.atom || d < 0 || !permanentCharge(graph, atom)) continue;
    const sign = atom.charge < 0 ? '-' : '+';
    add(`charge:*.${sign}`, 10 / d ** 2);
    add(`charge:*.${sign}${Math.min(d, 8)}`, 1);
    add(`charge:${series}.${sign}`, 10 / d ** 2);
  }
}

/** The class under which terms were given one prior variance: their kind, and whether they speak of one family or all. */
export function termClass(name: string): string {
  const colon = name.indexOf(':');
  const kind = name.slice(0, colon);
  return name[colon + 1] === '*' ? `${kind}-any` : kind;
}
