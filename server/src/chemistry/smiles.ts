/**
 * Reads OpenSMILES text strictly into atoms and bonds, each with its place in the text.
 *
 * Knows: the OpenSMILES grammar.  Must not know: valence, acidity, other libraries.
 * Invariants:
 *  1. Never throws; any string gives a structure or one problem.           (tests/chemistry/smiles.test.ts)
 *  2. Spans are UTF-16 code units, half-open, and lie inside the text.     (same)
 * Cost: linear in length.
 * Absent on purpose: valence and aromaticity, which need the whole graph.
 * Sources: the OpenSMILES specification.
 */

import type { Atom, Bond, BondSymbol, Span, Structure } from './molecule.ts';

export interface SmilesProblem {
  readonly message: string;
  readonly span: Span;
}

export type SmilesReading =
  | { readonly structure: Structure; readonly problem?: undefined }
  | { readonly structure?: undefined; readonly problem: SmilesProblem };

const ELEMENTS = new Set(
  (
    'H He Li Be B C N O F Ne Na Mg Al Si P S Cl Ar K Ca Sc Ti V Cr Mn Fe Co Ni Cu Zn Ga Ge As Se Br Kr ' +
    'Rb Sr Y Zr Nb Mo Tc Ru Rh Pd Ag Cd In Sn Sb Te I Xe Cs Ba La Ce Pr Nd Pm Sm Eu Gd Tb Dy Ho Er Tm Yb Lu ' +
    'Hf Ta W Re Os Ir Pt Au Hg Tl Pb Bi Po At Rn Fr Ra Ac Th Pa U Np Pu Am Cm Bk Cf Es Fm Md No Lr ' +
    'Rf Db Sg Bh Hs Mt Ds Rg Cn Nh Fl Mc Lv Ts Og'
  ).split(' '),
);
const WITHOUT_BRACKETS = /Cl|Br|[BCNOPSFI]|[bcnops]/y;
const BOND_SYMBOLS = '-=#$:/\\';
const BRACKET_ATOM =
  /^(\d{1,3})?([A-Z][a-z]?|se|as|te|si|[bcnops])(@@?|@(?:TH[12]|AL[12]|SP[123]|TB\d{1,2}|OH\d{1,2}))?(H\d?)?(\+\+|--|[+-]\d{0,2})?(?::(\d{1,3}))?$/;

/** Carries one problem out of the reader; never leaves this file. */
class Unreadable extends Error {
  readonly span: Span;

  constructor(message: string, start: number, end: number) {
    super(message);
    this.span = { start, end };
  }
}

interface OpenRing {
  readonly atom: number;
  readonly symbol: BondSymbol | undefined;
  readonly span: Span;
}

/** Reads one SMILES; blanks are not part of it, so a blank is a problem like any other stray character. */
export function readSmiles(text: string): SmilesReading {
  try {
    return { structure: readStrictly(text) };
  } catch (error) {
    if (error instanceof Unreadable) return { problem: { message: error.message, span: error.span } };
    throw error;
  }
}

function readStrictly(text: string): Structure {
  if (text === '') throw new Unreadable('There is no structure here.', 0, 0);
  const atoms: Atom[] = [];
  const bonds: Bond[] = [];
  const branches: { atom: number; at: number; atomsBefore: number }[] = [];
  const rings = new Map<number, OpenRing>();
  const joined = new Set<string>();
  let previous: number | undefined;
  let pending: { symbol: BondSymbol; at: number } | undefined;

  /** True between an opening round bracket and the first atom behind it. */
  const beginsBranch = () => branches.at(-1)?.atomsBefore === atoms.length;

  const join = (from: number, to: number, symbol: BondSymbol | undefined, span: Span) => {
    const key = from < to ? `${from} ${to}` : `${to} ${from}`;
    if (from === to) throw new Unreadable('A ring bond joins an atom to itself.', span.start, span.end);
    if (joined.has(key)) throw new Unreadable('These two atoms are already joined.', span.start, span.end);
    joined.add(key);
    bonds.push({ from, to, symbol, span });
  };

  const addAtom = (atom: Atom) => {
    atoms.push(atom);
    if (previous !== undefined) {
      const start = pending?.at ?? atom.span.start;
      join(previous, atom.index, pending?.symbol, { start, end: pending ? start + 1 : start });
    }
    previous = atom.index;
    pending = undefined;
  };

  const closeOrOpenRing = (digit: number, span: Span) => {
    if (previous === undefined)
      throw new Unreadable('A ring digit needs an atom before it.', span.start, span.end);
    if (beginsBranch()) {
      throw new Unreadable('A branch begins with an atom, not with a ring digit.', span.start, span.end);
    }
    const open = rings.get(digit);
    if (!open) {
      rings.set(digit, { atom: previous, symbol: pending?.symbol, span });
    } else {
      rings.delete(digit);
      if (open.symbol && pending && !sameRingBond(open.symbol, pending.symbol)) {
        throw new Unreadable('The two ends of this ring bond disagree.', span.start, span.end);
      }
      join(open.atom, previous, open.symbol ?? pending?.symbol, span);
    }
    pending = undefined;
  };

  let at = 0;
  while (at < text.length) {
    const character = text[at]!;
    if (character === '[') {
      const atom = readBracket(text, at, atoms.length);
      addAtom(atom);
      at = atom.span.end;
    } else if (BOND_SYMBOLS.includes(character)) {
      if (previous === undefined) throw new Unreadable('A bond needs an atom before it.', at, at + 1);
      if (pending) throw new Unreadable('Two bonds stand one after the other.', pending.at, at + 1);
      pending = { symbol: character as BondSymbol, at };
      at++;
    } else if (character === '(') {
      if (previous === undefined) throw new Unreadable('A branch needs an atom before it.', at, at + 1);
      if (pending) throw new Unreadable('A bond belongs inside the branch.', pending.at, at + 1);
      branches.push({ atom: previous, at, atomsBefore: atoms.length });
      at++;
    } else if (character === ')') {
      const branch = branches.pop();
      if (!branch) throw new Unreadable('This bracket closes no branch.', at, at + 1);
      if (pending) throw new Unreadable('A bond leads nowhere.', pending.at, pending.at + 1);
      if (previous === undefined) throw new Unreadable('A dot needs a structure on both sides.', at - 1, at);
      if (branch.atomsBefore === atoms.length)
        throw new Unreadable('The branch is empty.', branch.at, at + 1);
      previous = branch.atom;
      at++;
    } else if (character === '.') {
      if (pending) throw new Unreadable('A bond leads nowhere.', pending.at, pending.at + 1);
      if (previous === undefined || beginsBranch() || at + 1 === text.length) {
        throw new Unreadable('A dot needs a structure on both sides.', at, at + 1);
      }
      previous = undefined;
      at++;
    } else if (isDigit(character)) {
      closeOrOpenRing(Number(character), { start: at, end: at + 1 });
      at++;
    } else if (character === '%') {
      if (!isDigit(text[at + 1]) || !isDigit(text[at + 2])) {
        throw new Unreadable('After % two digits name the ring.', at, Math.min(at + 3, text.length));
      }
      closeOrOpenRing(Number(text.slice(at + 1, at + 3)), { start: at, end: at + 3 });
      at += 3;
    } else {
      const atom = readPlainAtom(text, at, atoms.length);
      addAtom(atom);
      at = atom.span.end;
    }
  }

  const branch = branches.pop();
  if (branch) throw new Unreadable('The branch is not closed.', branch.at, branch.at + 1);
  if (pending) throw new Unreadable('A bond leads nowhere.', pending.at, pending.at + 1);
  for (const { span } of rings.values())
    throw new Unreadable('The ring is not closed.', span.start, span.end);
  return { atoms, bonds };
}

/** A direction mark at both ends is judged later with the double bond, so any two marks agree here. */
function sameRingBond(one: BondSymbol, other: BondSymbol): boolean {
  const isDirection = (symbol: BondSymbol) => symbol === '/' || symbol === '\\';
  return one === other || (isDirection(one) && isDirection(other));
}

function isDigit(character: string | undefined): boolean {
  return character !== undefined && character >= '0' && character <= '9';
}

function readPlainAtom(text: string, at: number, index: number): Atom {
  WITHOUT_BRACKETS.lastIndex = at;
  const symbol = WITHOUT_BRACKETS.exec(text)?.[0];
  if (symbol === undefined) {
    const character = String.fromCodePoint(text.codePointAt(at)!);
    throw new Unreadable('This character has no meaning in a structure.', at, at + character.length);
  }
  const { element, aromatic } = elementOf(symbol);
  return {
    index,
    element,
    aromatic,
    isotope: 0,
    charge: 0,
    writtenHydrogens: undefined,
    mapNumber: 0,
    span: { start: at, end: at + symbol.length },
  };
}

function readBracket(text: string, at: number, index: number): Atom {
  const close = text.indexOf(']', at);
  if (close < 0) throw new Unreadable('The bracket is not closed.', at, at + 1);
  const span = { start: at, end: close + 1 };
  const inside = text.slice(at + 1, close);
  const parts = BRACKET_ATOM.exec(inside);
  if (!parts) throw new Unreadable('This bracket does not describe an atom.', span.start, span.end);
  const [, isotope, symbol, , hydrogens, charge, mapNumber] = parts;
  const { element, aromatic } = elementOf(symbol!);
  if (!ELEMENTS.has(element)) {
    throw new Unreadable(`There is no element ${symbol}.`, span.start, span.end);
  }
  return {
    index,
    element,
    aromatic,
    isotope: Number(isotope ?? 0),
    charge: chargeOf(charge),
    writtenHydrogens: hydrogens ? Number(hydrogens.slice(1) || 1) : 0,
    mapNumber: Number(mapNumber ?? 0),
    span,
  };
}

function elementOf(symbol: string): { element: string; aromatic: boolean } {
  const element = symbol[0]!.toUpperCase() + symbol.slice(1);
  return { element, aromatic: symbol !== element };
}

function chargeOf(text: string | undefined): number {
  if (!text) return 0;
  if (text === '++' || text === '--') return text === '++' ? 2 : -2;
  const size = text.length === 1 ? 1 : Number(text.slice(1));
  return text[0] === '-' ? 0 - size : size;
}
