/**
 * The rows of the tables under `data/`, as the program holds them after the build has checked them.
 *
 * Knows: the shape of a row.  Must not know: where a row came from, structures, plans.
 * Units: pKa dimensionless on the named scale; density g/mL at 25 °C; temperatures °C; energies kJ/mol.
 * Invariants: every row names its sources and the basis on which its values stand; an empty cell is null, never 0.
 */

/** How a value got here: remembered from its source, compared with a second compilation, or worked out. */
export type Basis = 'recalled' | 'checked' | 'derived';

/** The scales on which acidities are written; water, DMSO and MeCN are measured scales, the others lean on them. */
export type ScaleId = string;

export interface Sourced {
  /** Keys into the bibliography; `common-practice` marks a fact of the trade without a published source. */
  readonly sources: readonly string[];
  readonly basis: Basis;
}

export interface SolventRow extends Sourced {
  readonly name: string;
  readonly synonyms: readonly string[];
  readonly smiles: string;
  /** Canonical key of the structure, made at build. */
  readonly key: string;
  /** water, alcohol, acid, amide, sulfoxide, nitrile, ether, ketone, ester, carbonate, halogenated, aromatic, alkane, amine, nitro, phosphoramide, urea, other */
  readonly kind: string;
  readonly density: number | null;
  readonly boilingPoint: number | null;
  readonly meltingPoint: number | null;
  readonly permittivity: number | null;
  /** Autoprotolysis constant on the solvent's own scale. */
  readonly pKs: number | null;
  /** pKa of the protonated solvent and of the solvent itself, on `scale`, molar-concentration convention. */
  readonly lyoniumPKa: number | null;
  readonly lyatePKa: number | null;
  readonly ownCoupleSd: number | null;
  /** Gibbs energy of transfer of the proton from water, kJ/mol. */
  readonly protonTransferEnergy: number | null;
  readonly transferSd: number | null;
  readonly waterMiscibility: 'yes' | 'partly' | 'no';
  /** The scale on which acidities in this solvent are looked up and what borrowing it costs. */
  readonly scale: ScaleId;
  readonly scaleSd: number;
  /** Ionic species separate poorly or well: decides whether ion pairs are judged. */
  readonly protic: boolean;
  readonly heatCapacity: number | null;
}

/** What a reagent does in a flask; one name can have several. */
export type ReagentRole =
  | 'metal-hydride'
  | 'metal-amide'
  | 'organometallic'
  | 'borohydride'
  | 'aluminium-hydride'
  | 'solid-base'
  | 'amine-base'
  | 'alkoxide'
  | 'hydroxide'
  | 'carbonate'
  | 'mineral-acid'
  | 'organic-acid'
  | 'lewis-acid'
  | 'coupling-agent'
  | 'acylating'
  | 'alkylating'
  | 'sulfonylating'
  | 'silylating'
  | 'halogenating'
  | 'oxidant'
  | 'reductant'
  | 'catalyst'
  | 'ligand'
  | 'gas'
  | 'salt'
  | 'drying-agent'
  | 'additive'
  | 'electrophile'
  | 'nucleophile'
  | 'dehydrating'
  | 'protecting'
  | 'fluoride'
  | 'cyanide'
  | 'azide'
  | 'quench';

export interface ReagentRow extends Sourced {
  readonly name: string;
  readonly synonyms: readonly string[];
  /** Null only for substances without one structure (silica, Pd/C, Celite). */
  readonly smiles: string | null;
  readonly key: string | null;
  readonly roles: readonly ReagentRole[];
  /** g/mol where the structure does not give it (hydrates, polymers, supported catalysts). */
  readonly molarMass: number | null;
  readonly density: number | null;
  /** Usual strength, for an amount written by volume alone or with `sat.`: mol/L, mass share, and in what. */
  readonly stockMolarity: number | null;
  readonly stockMassShare: number | null;
  readonly stockSolvent: string | null;
  readonly saturatedMolarity: number | null;
  /** Protons that one mol takes up (bases) or gives (acids) in practice. */
  readonly protonCapacity: number | null;
  /** Highest pKa on the DMSO scale that a solid base is held to reach in an aprotic solvent. */
  readonly surfaceCeiling: number | null;
  /** Acid that one mol releases when it does its job (coupling agents, acid chlorides), mol per mol. */
  readonly acidReleased: number | null;
  readonly note: string;
}

/** Two things that must not meet, or one thing that must not be made; a caution never claims that anything is safe. */
/** One thing in a flask that a caution may speak of. */
export interface Trigger {
  readonly kind: 'reagent' | 'role' | 'solvent' | 'kind' | 'group';
  /** Name of the reagent or solvent, role of a reagent, kind of a solvent, SMARTS of a group. */
  readonly name: string;
  /** The SMARTS as parsed by the build; null for the other kinds. */
  readonly pattern: unknown;
}

export interface CautionRow extends Sourced {
  readonly id: string;
  readonly check: 'toxic-gas' | 'gas-release' | 'runaway-pair' | 'skin-carrier';
  /** What has to be there, one of these; empty where `group` decides alone. */
  readonly first: readonly Trigger[];
  /** What it must not meet, one of these; empty where the first is enough. */
  readonly second: readonly Trigger[];
  /** Group whose protonated form is the danger; empty where the pair decides. */
  readonly group: string;
  /** SMILES of the gas. */
  readonly gas: string | null;
  /** Its pKa in water; the caution speaks below this plus the margin. */
  readonly gasValue: number | null;
  readonly gasMargin: number | null;
  /** °C from which the pair is a danger. */
  readonly aboveTemperature: number | null;
  readonly hazard: string;
  readonly advice: string;
}

/** How long a strong base lives in a solvent, between known points. */
export interface LimitRow extends Sourced {
  readonly reagent: string;
  readonly solvent: string;
  readonly temperature: number;
  readonly halfLifeHours: number | null;
  readonly what: string;
}

/** A protecting or sensitive group and between which pH in water the trade holds it safe. */
export interface StabilityRow extends Sourced {
  readonly id: string;
  readonly name: string;
  readonly smarts: string;
  readonly pattern: unknown;
  readonly lowest: number | null;
  readonly highest: number | null;
  /** °C up to which the range above holds. */
  readonly upTo: number | null;
  /** Reagent roles or names that take it off. */
  readonly attackedBy: readonly string[];
  readonly note: string;
}

/** How ordinary it is to take a reagent as the base or the acid, or a solvent as such, and in what. */
export interface ChoiceRow extends Sourced {
  /** `reagent:NAME`, `role:ROLE` or `solvent:NAME`; the first row that fits holds. */
  readonly what: string;
  readonly as: 'base' | 'acid' | 'solvent';
  /** never: it is not proposed, for the reason in the note. */
  readonly usual: 'everyday' | 'known' | 'rare' | 'never';
  /** Kinds or names of solvents. */
  readonly usedIn: readonly string[];
  /** °C from which it ordinarily acts, and up to which it is ordinarily used. */
  readonly coldest: number | null;
  readonly warmest: number | null;
  /** Ids of electrophiles that it attacks. */
  readonly attacks: readonly string[];
  readonly note: string;
}

/** A group that a nucleophilic base attacks before or beside the proton it was taken for. */
export interface ElectrophileRow extends Sourced {
  readonly id: string;
  readonly name: string;
  readonly smarts: string;
  readonly pattern: unknown;
}

export interface SourceRow {
  readonly id: string;
  readonly title: string;
  readonly text: string;
}

/** Substituent constants of one group on an arene. */
export interface SubstituentRow extends Sourced {
  readonly name: string;
  /** The substituent on a methyl group whose carbon is marked :1. */
  readonly smiles: string;
  readonly sigmaM: number;
  readonly sigmaP: number;
  readonly sigmaPMinus: number | null;
  readonly sigmaPPlus: number | null;
  readonly note: string;
}

/** What one term of the estimator in water is worth; names are those of `chemistry/terms.ts`. */
export interface TermRow {
  readonly name: string;
  /** pKa units for a factor of one. */
  readonly value: number;
  /** Molecules of the fit in which the term occurs. */
  readonly n: number;
}

/** How far estimates of one kind go astray: of a family (sd), or of terms that no molecule of the fit has shown (variance). */
export interface SpreadRow {
  readonly kind: 'family' | 'term';
  readonly name: string;
  readonly value: number;
  readonly n: number;
}

/** Which protons on carbon (and some on nitrogen) move at all, and what wakes them; the first row that fits holds. */
export interface KineticsRow extends Sourced {
  readonly id: string;
  /** leaves: the site is to lose its proton; arrives: it is to take one. */
  readonly direction: 'leaves' | 'arrives';
  /** Ids of groups; empty where `families` decides. */
  readonly groups: readonly string[];
  readonly families: readonly string[];
  /** `role:ROLE` or `reagent:NAME` of a base in the flask, any one of them; empty where any base will do. */
  readonly bases: readonly string[];
  /** The same of a helper that must be there besides the base. */
  readonly helpers: readonly string[];
  /** °C from which the row holds. */
  readonly above: number | null;
  readonly rate: 'instant' | 'slow' | 'dead';
  readonly note: string;
}

/** Enthalpy of giving up a proton in water at 25 °C, kJ/mol. */
export interface EnthalpyRow extends Sourced {
  readonly id: string;
  readonly groups: readonly string[];
  readonly families: readonly string[];
  readonly kind: 'acid' | 'base';
  /** Which proton of the molecule, from 1; null for any. */
  readonly step: number | null;
  readonly enthalpy: number;
  readonly sd: number;
  /** kJ/(mol K) */
  readonly heatCapacity: number | null;
  readonly note: string;
}

/** A form that leaves the flask as a gas once the liquid holds as much as it can at 1 atm. */
export interface GasRow extends Sourced {
  readonly name: string;
  readonly groups: readonly string[];
  /** Protons that the leaving form carries. */
  readonly protons: number;
  /** mol/L at 25 °C and 1 atm; null where it stays dissolved or no figure is at hand. */
  readonly water: number | null;
  readonly organic: number | null;
  readonly note: string;
}

/** A reagent that takes protons without a couple that its structure would show. */
export interface HydrideRow extends Sourced {
  readonly id: string;
  /** `reagent:NAME` or `role:ROLE`; the first row that fits holds. */
  readonly reagent: string;
  /** Protons that one mol takes up where the reagent's own row does not say. */
  readonly capacity: number;
  /** Highest pKa of an acid that eats it, in practice, on both scales. */
  readonly water: number | null;
  readonly dmso: number | null;
  readonly sd: number;
  /** Takes protons from carbon too. */
  readonly carbon: boolean;
  readonly gas: string;
  readonly note: string;
}

/** Heat of a class of reactions, kJ for each mol of proton or reagent; negative where heat is set free. */
export interface HeatRow extends Sourced {
  readonly id: string;
  /** `role:ROLE`, `reagent:NAME` or `class:NAME`. */
  readonly what: string;
  readonly heat: number;
  readonly sd: number;
  readonly note: string;
}

/** One kind of ionizable group: where it sits and what its parent is worth on the measured scales. */
export interface GroupRow extends Sourced {
  readonly id: string;
  readonly name: string;
  readonly kind: 'acid' | 'base';
  readonly family: string;
  readonly smarts: string;
  /** Parsed at build. */
  readonly pattern: unknown;
  /** The highest one that fits an atom wins it. */
  readonly priority: number;
  readonly example: string;
  readonly water: number | null;
  readonly waterSd: number | null;
  readonly dmso: number | null;
  readonly dmsoSd: number | null;
  readonly mecn: number | null;
  readonly mecnSd: number | null;
  readonly model: string;
  readonly note: string;
}

/** A measured constant at a marked site. */
export interface MeasuredRow extends Sourced {
  readonly name: string;
  readonly smiles: string;
  /** Key of the neutral molecule and names of the marked atoms (`chemistry/site-names.ts`), made at build. */
  readonly key: string;
  readonly classes: readonly number[];
  readonly direction: 'acid' | 'base';
  readonly scale: ScaleId;
  /** Protons lost by the fully protonated form, from 1; null where the site has one constant. */
  readonly step: number | null;
  readonly value: number;
  readonly sd: number;
  readonly temperature: number | null;
  readonly checkedAgainst: string;
  readonly note: string;
  /** From a file of the user's own, which outranks the tables. */
  readonly house?: true;
}

/** How constants of one family go from one scale to another: value = intercept + slope × value. */
export interface ScaleRow extends Sourced {
  readonly from: ScaleId;
  readonly to: ScaleId;
  readonly family: string;
  readonly slope: number;
  readonly intercept: number;
  readonly sd: number;
  readonly n: number | null;
  readonly low: number | null;
  readonly high: number | null;
  readonly note: string;
}

/** What one group on a carbon or nitrogen is worth to the acidity of its proton in DMSO. */
export interface ActivationRow extends Sourced {
  readonly centre: 'C' | 'N';
  /** A name of `chemistry/activators.ts`, or one of the model's own figures in brackets. */
  readonly name: string;
  /** pKa units that add up. */
  readonly field: number;
  /** pKa units that run into saturation. */
  readonly resonance: number;
  /** The same for each unit of substituent constant on the group's arene. */
  readonly sigma: number;
  /** Molecules of the fit that carry the group. */
  readonly n: number;
  readonly note: string;
}
