/**
 * Facts about elements: numbers, masses, and the numbers of bonds that they form.
 *
 * Units: g/mol.
 * Sources: standard atomic masses, IUPAC 2021 (abridged); valences of the OpenSMILES specification, and for charged
 * atoms those of the element with as many electrons.
 */

const SYMBOLS = (
  'H He Li Be B C N O F Ne Na Mg Al Si P S Cl Ar K Ca Sc Ti V Cr Mn Fe Co Ni Cu Zn Ga Ge As Se Br Kr ' +
  'Rb Sr Y Zr Nb Mo Tc Ru Rh Pd Ag Cd In Sn Sb Te I Xe Cs Ba La Ce Pr Nd Pm Sm Eu Gd Tb Dy Ho Er Tm Yb Lu ' +
  'Hf Ta W Re Os Ir Pt Au Hg Tl Pb Bi Po At Rn Fr Ra Ac Th Pa U Np Pu Am Cm Bk Cf Es Fm Md No Lr ' +
  'Rf Db Sg Bh Hs Mt Ds Rg Cn Nh Fl Mc Lv Ts Og'
).split(' ');

const MASSES = (
  '1.008 4.0026 6.94 9.0122 10.81 12.011 14.007 15.999 18.998 20.180 22.990 24.305 26.982 28.085 30.974 32.06 35.45 39.95 ' +
  '39.098 40.078 44.956 47.867 50.942 51.996 54.938 55.845 58.933 58.693 63.546 65.38 69.723 72.630 74.922 78.971 79.904 83.798 ' +
  '85.468 87.62 88.906 91.224 92.906 95.95 97 101.07 102.91 106.42 107.87 112.41 114.82 118.71 121.76 127.60 126.90 131.29 ' +
  '132.91 137.33 138.91 140.12 140.91 144.24 145 150.36 151.96 157.25 158.93 162.50 164.93 167.26 168.93 173.05 174.97 ' +
  '178.49 180.95 183.84 186.21 190.23 192.22 195.08 196.97 200.59 204.38 207.2 208.98 209 210 222 223 226 227 232.04 231.04 238.03'
)
  .split(' ')
  .map(Number);

const NUMBERS = new Map(SYMBOLS.map((symbol, index) => [symbol, index + 1]));

/** Bonds that a neutral atom of the main groups forms, fewest first; elements left out form any number. */
const VALENCES: Readonly<Record<string, readonly number[]>> = {
  H: [1],
  He: [0],
  Be: [2],
  B: [3],
  C: [4],
  N: [3],
  O: [2],
  F: [1],
  Ne: [0],
  Al: [3],
  Si: [4],
  P: [3, 5],
  S: [2, 4, 6],
  Cl: [1],
  Ar: [0],
  Ga: [3],
  Ge: [4],
  As: [3, 5],
  Se: [2, 4, 6],
  Br: [1],
  Kr: [0],
  In: [3],
  Sn: [2, 4],
  Sb: [3, 5],
  Te: [2, 4, 6],
  I: [1, 3, 5],
  Xe: [0, 2, 4, 6],
  Pb: [2, 4],
  Bi: [3, 5],
  Cs: [1],
  Po: [2, 4, 6],
  At: [1, 3, 5],
  Rn: [0],
  Fr: [1],
};

/**
 * Anions of these elements widen their own shell, instead of becoming like a later element, once they would have more
 * electrons than the number given here: PF6− is like SF6, but (CH3)2S−R is no chlorine.
 */
const WIDENING: Readonly<Record<string, number>> = { P: 16, S: 16, As: 34, Se: 34 };

const NON_METALS = new Set('H He B C N O F Ne Si P S Cl Ar As Se Br Kr Te I Xe At Rn'.split(' '));

/** Atomic number; 0 for an unknown symbol. */
export function numberOf(element: string): number {
  return NUMBERS.get(element) ?? 0;
}

/** Symbol of an atomic number; empty where there is none. */
export function symbolOf(number: number): string {
  return SYMBOLS[number - 1] ?? '';
}

/** Whether a lone pair may lead to this element as a bond of its own. */
export function isMetal(element: string): boolean {
  return !NON_METALS.has(element);
}

/** Electrons beyond the closed shells: the number of the group up to 12, and of the group less ten from there on. */
export function outerElectronsOf(element: string): number {
  const number = numberOf(element);
  const core = [86, 54, 36, 18, 10, 2].find((closed) => closed < number) ?? 0;
  const filled = core < 54 ? 0 : 14;
  const beyond = number - core;
  const group = filled < beyond - 3 ? beyond - filled : beyond;
  return core < 18 || group <= 12 ? group : group - 10;
}

/** Average mass in g/mol; NaN for elements without a usual one. */
export function massOf(element: string): number {
  return MASSES[numberOf(element) - 1] ?? Number.NaN;
}

/**
 * Numbers of bonds, hydrogens included, that an atom of this charge may have, fewest first.
 *
 * Null where any number goes, as for metals. A charged atom is counted like the neutral element with as many
 * electrons: N+ like C. (tests/chemistry/elements.test.ts compares every element and charge with RDKit)
 */
export function valencesOf(element: string, charge: number): readonly number[] | null {
  const own = VALENCES[element];
  if (charge === 0 || own === undefined) return own ?? null;
  if (element === 'H') return null;
  const electrons = numberOf(element) - charge;
  if ((WIDENING[element] ?? Number.POSITIVE_INFINITY) < electrons) {
    return own.map((valence) => valence + charge).filter((valence) => 0 <= valence);
  }
  return VALENCES[symbolOf(electrons)] ?? null;
}
