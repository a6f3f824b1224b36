/**
 * Reads SMARTS into plain data; only the build does so, the program starts from the data.
 *
 * Knows: the SMARTS grammar.  Must not know: molecules, files.
 * Invariants: a pattern is plain JSON; its first atom is the first of the text.   (tests/chemistry/smarts.test.ts)
 * Absent on purpose: isotopes, chirality and R<n> counts, whose meaning differs between programs.
 * Sources: Daylight theory manual, chapter 4.
 */
import { numberOf } from './elements.ts';

export type AtomQuery =
  | readonly ['and' | 'or', ...AtomQuery[]]
  | readonly ['not', AtomQuery]
  | readonly ['within', Pattern]
  /** number: atomic number; aromatic, aliphatic, ring, any: no value; hydrogens, degree, connections, valence, ringSize, ringBonds, charge: the count. */
  | readonly [
      (
        | 'number'
        | 'aromatic'
        | 'aliphatic'
        | 'ring'
        | 'any'
        | 'hydrogens'
        | 'degree'
        | 'connections'
        | 'valence'
        | 'ringSize'
        | 'ringBonds'
        | 'charge'
      ),
      number,
    ];

export type BondQuery =
  | readonly ['and' | 'or', ...BondQuery[]]
  | readonly ['not', BondQuery]
  /** order: 1 single, 2 double, 3 triple, of bonds that are not aromatic. */
  | readonly ['order', number]
  | readonly ['aromatic' | 'ring' | 'any' | 'usual'];

export interface PatternBond {
  readonly from: number;
  readonly to: number;
  readonly query: BondQuery;
}

export interface Pattern {
  readonly atoms: readonly AtomQuery[];
  readonly bonds: readonly PatternBond[];
}

/** Something in a SMARTS that cannot be read, with its place in the text. */
export class SmartsError extends Error {
  readonly position: number;

  constructor(message: string, position: number) {
    super(`${message} at character ${position + 1}`);
    this.position = position;
  }
}

const OUTSIDE = /Cl|Br|[BCNOPSFI]|[bcnops]|\*|[aA]/y;
const BOND_SIGNS = new Set(['-', '=', '#', '$', ':', '~', '@', '!', ',', ';', '&', '/', '\\']);

/** Reads one SMARTS. @throws SmartsError */
export function parseSmarts(text: string): Pattern {
  const reader = new Reader(text);
  const pattern = reader.pattern();
  if (reader.place < text.length) throw new SmartsError(`unexpected ${text[reader.place]}`, reader.place);
  return pattern;
}

class Reader {
  place = 0;
  readonly text: string;

  constructor(text: string) {
    this.text = text;
  }

  /** Reads until the end of the text or an unmatched closing parenthesis. */
  pattern(): Pattern {
    const atoms: AtomQuery[] = [];
    const bonds: PatternBond[] = [];
    const rings = new Map<number, { atom: number; query: BondQuery | null }>();
    const branches: number[] = [];
    let previous = -1;
    let query: BondQuery | null = null;
    const needsAtom = (what: string) => {
      if (previous === -1) throw this.error(`${what} needs an atom before it`);
    };
    const endsBond = () => {
      if (query !== null) throw this.error('a bond leads nowhere');
    };
    while (this.place < this.text.length) {
      const sign = this.text[this.place]!;
      if (sign === '(') {
        needsAtom('a branch');
        endsBond();
        branches.push(previous);
        this.place += 1;
      } else if (sign === ')') {
        if (branches.length === 0) break;
        endsBond();
        previous = branches.pop()!;
        this.place += 1;
      } else if (sign === '.') {
        needsAtom('a dot');
        endsBond();
        previous = -1;
        this.place += 1;
      } else if (BOND_SIGNS.has(sign)) {
        needsAtom('a bond');
        query = this.bondQuery();
      } else if (/[0-9%]/.test(sign)) {
        needsAtom('a ring number');
        const digit = this.ringDigit();
        const open = rings.get(digit);
        if (open === undefined) {
          rings.set(digit, { atom: previous, query });
        } else {
          if (open.atom === previous) throw this.error('a ring bond joins an atom to itself');
          bonds.push({ from: open.atom, to: previous, query: query ?? open.query ?? ['usual'] });
          rings.delete(digit);
        }
        query = null;
      } else {
        const atom = atoms.push(this.atom()) - 1;
        if (previous !== -1) bonds.push({ from: previous, to: atom, query: query ?? ['usual'] });
        previous = atom;
        query = null;
      }
    }
    endsBond();
    if (rings.size !== 0) throw this.error('a ring bond is left open');
    if (branches.length !== 0) throw this.error('a branch is left open');
    if (previous === -1) throw this.error(atoms.length === 0 ? 'no atom' : 'a dot leads nowhere');
    return { atoms, bonds };
  }

  private ringDigit(): number {
    const match = /%(\d\d)|(\d)/y;
    match.lastIndex = this.place;
    const found = match.exec(this.text);
    if (found === null) throw this.error('a ring number is one digit, or % and two');
    this.place += found[0].length;
    return Number(found[1] ?? found[2]);
  }

  private atom(): AtomQuery {
    if (this.text[this.place] === '[') {
      this.place += 1;
      const query = this.hydrogen() ?? this.lowAnd();
      if (this.text[this.place] === ':') this.mapNumber();
      if (this.text[this.place] !== ']') throw this.error('a bracket is left open');
      this.place += 1;
      return query;
    }
    OUTSIDE.lastIndex = this.place;
    const found = OUTSIDE.exec(this.text);
    if (found === null) throw this.error(`unexpected ${this.text[this.place]}`);
    this.place += found[0].length;
    return symbolQuery(found[0]);
  }

  /** H is the element only where it stands alone or with a charge; elsewhere it counts hydrogens. */
  private hydrogen(): AtomQuery | null {
    const match = /H([+-]\d?)?(?=[\]:])/y;
    match.lastIndex = this.place;
    const found = match.exec(this.text);
    if (found === null) return null;
    this.place += 1;
    const sign = this.text[this.place];
    if (sign !== '+' && sign !== '-') return ['number', 1];
    this.place += 1;
    return ['and', ['number', 1], ['charge', this.charge(sign)]];
  }

  private mapNumber(): void {
    const match = /:\d+/y;
    match.lastIndex = this.place;
    const found = match.exec(this.text);
    if (found === null) throw this.error('a map number is missing');
    this.place += found[0].length;
  }

  private lowAnd(): AtomQuery {
    return this.chain(';', 'and', () => this.or());
  }

  private or(): AtomQuery {
    return this.chain(',', 'or', () => this.highAnd());
  }

  private chain(sign: string, word: 'and' | 'or', part: () => AtomQuery): AtomQuery {
    const parts = [part()];
    while (this.text[this.place] === sign) {
      this.place += 1;
      parts.push(part());
    }
    return parts.length === 1 ? parts[0]! : [word, ...parts];
  }

  private highAnd(): AtomQuery {
    const parts = [this.not()];
    for (;;) {
      const sign = this.text[this.place];
      if (sign === '&') this.place += 1;
      else if (sign === undefined || sign === ']' || sign === ',' || sign === ';' || sign === ':') break;
      parts.push(this.not());
    }
    return parts.length === 1 ? parts[0]! : ['and', ...parts];
  }

  private not(): AtomQuery {
    if (this.text[this.place] !== '!') return this.primitive();
    this.place += 1;
    return ['not', this.not()];
  }

  private primitive(): AtomQuery {
    const { text } = this;
    if (text.startsWith('$(', this.place)) {
      this.place += 2;
      const inner = this.pattern();
      if (text[this.place] !== ')') throw this.error('a $( is left open');
      this.place += 1;
      return ['within', inner];
    }
    const symbol = this.elementSymbol();
    if (symbol !== null) return symbol;
    const sign = text[this.place];
    if (sign === undefined) throw this.error('unexpected end');
    this.place += 1;
    switch (sign) {
      case '#':
        return ['number', this.number('#')];
      case '*':
        return ['any', 0];
      case 'a':
        return ['aromatic', 0];
      case 'A':
        return ['aliphatic', 0];
      case 'H':
        return ['hydrogens', this.optionalNumber() ?? 1];
      case 'D':
        return ['degree', this.optionalNumber() ?? 1];
      case 'X':
        return ['connections', this.optionalNumber() ?? 1];
      case 'v':
        return ['valence', this.optionalNumber() ?? 1];
      case 'R':
        return this.ringQuery();
      case 'r': {
        const size = this.optionalNumber();
        return size === null ? ['ring', 0] : ['ringSize', size];
      }
      case 'x': {
        const count = this.optionalNumber();
        return count === null ? ['ring', 0] : ['ringBonds', count];
      }
      case '+':
      case '-':
        return ['charge', this.charge(sign)];
      default:
        this.place -= 1;
        throw this.error(`unexpected ${sign}`);
    }
  }

  private ringQuery(): AtomQuery {
    const count = this.optionalNumber();
    if (count === null) return ['ring', 0];
    if (count === 0) return ['not', ['ring', 0]];
    throw this.error('R with a number is not used here');
  }

  /** Element symbols inside brackets, hydrogen apart. */
  private elementSymbol(): AtomQuery | null {
    const { text, place } = this;
    if (text[place] === 'H') return null;
    const two = text.slice(place, place + 2);
    if (/^[A-Z][a-z]$/.test(two) && numberOf(two) !== 0) {
      this.place += 2;
      return twoLetterQuery(two);
    }
    if (two === 'se' || two === 'te' || two === 'as' || two === 'si') {
      this.place += 2;
      return symbolQuery(two);
    }
    const one = text[place] ?? '';
    if (/[BCNOPSFIKVWUY]/.test(one) || /[bcnops]/.test(one)) {
      this.place += 1;
      return symbolQuery(one);
    }
    return null;
  }

  private charge(sign: string): number {
    const value = sign === '+' ? 1 : -1;
    const count = this.optionalNumber();
    if (count !== null) return value * count;
    let total = value;
    while (this.text[this.place] === sign) {
      this.place += 1;
      total += value;
    }
    return total;
  }

  private optionalNumber(): number | null {
    const match = /\d+/y;
    match.lastIndex = this.place;
    const found = match.exec(this.text);
    if (found === null) return null;
    this.place += found[0].length;
    return Number(found[0]);
  }

  private number(after: string): number {
    const value = this.optionalNumber();
    if (value === null) throw this.error(`a number is missing after ${after}`);
    return value;
  }

  private bondQuery(): BondQuery {
    const low: BondQuery[] = [];
    let or: BondQuery[] = [];
    let high: BondQuery[] = [];
    const closeHigh = () => {
      if (high.length === 0) throw this.error('a bond is missing');
      or.push(high.length === 1 ? high[0]! : ['and', ...high]);
      high = [];
    };
    const closeOr = () => {
      closeHigh();
      low.push(or.length === 1 ? or[0]! : ['or', ...or]);
      or = [];
    };
    let negated = false;
    for (;;) {
      const sign = this.text[this.place];
      if (sign === undefined || !BOND_SIGNS.has(sign)) break;
      this.place += 1;
      if (sign === '!') {
        negated = !negated;
        continue;
      }
      if (sign === ',') closeHigh();
      else if (sign === ';') closeOr();
      else if (sign !== '&') {
        const query = bondSign(sign);
        high.push(negated ? ['not', query] : query);
        negated = false;
      }
    }
    closeOr();
    return low.length === 1 ? low[0]! : ['and', ...low];
  }

  private error(message: string): SmartsError {
    return new SmartsError(message, this.place);
  }
}

function bondSign(sign: string): BondQuery {
  switch (sign) {
    case '=':
      return ['order', 2];
    case '#':
      return ['order', 3];
    case '$':
      return ['order', 4];
    case ':':
      return ['aromatic'];
    case '~':
      return ['any'];
    case '@':
      return ['ring'];
    default:
      return ['order', 1];
  }
}

/** Symbols of two letters say nothing about aromaticity, except chlorine and bromine, which are never aromatic. */
function twoLetterQuery(symbol: string): AtomQuery {
  return symbol === 'Cl' || symbol === 'Br' ? symbolQuery(symbol) : ['number', numberOf(symbol)];
}

function symbolQuery(symbol: string): AtomQuery {
  if (symbol === '*') return ['any', 0];
  if (symbol === 'a') return ['aromatic', 0];
  if (symbol === 'A') return ['aliphatic', 0];
  const element = symbol[0]!.toUpperCase() + symbol.slice(1);
  return ['and', ['number', numberOf(element)], [symbol[0] === element[0] ? 'aliphatic' : 'aromatic', 0]];
}
