/**
 * Follows a step line by line: fills the flask, judges each transfer, balances each conversion.
 *
 * Knows: resolved steps and flasks.  Must not know: checks, findings.
 * Invariant: the facts depend only on the step, what it goes on from, the tables and the settings.
 */

import { constantsIn } from '../chemistry/constants.ts';
import type { Perceived } from '../chemistry/couple.ts';
import { perceive } from '../chemistry/perceive.ts';
import { balanceConversion, type Conversion, protonsWanted } from '../flask/convert.ts';
import { type Intent, judgeTransfer } from '../flask/judge.ts';
import { ingredientsIn, type Layer } from '../flask/separate.ts';
import { solveFlask } from '../flask/solve.ts';
import type { Contents, FlaskState, Ingredient, Role, Verdict } from '../flask/state.ts';
import { type Titration, titrateTo } from '../flask/titrate.ts';
import type {
  AddStatement,
  AdjustStatement,
  Amount,
  ConvertStatement,
  KeepStatement,
  SolventStatement,
  Statement,
  Step,
  Substance,
  TransferStatement,
} from '../route/plan.ts';
import type { Tables } from '../tables/tables.ts';
import type { Addition, AdjustFact, ConvertFact, Moment, StepFacts, TransferFact } from './facts.ts';
import type { Settings } from './settings.ts';

const ROOM = 298.15;
const ZERO_CELSIUS = 273.15;
/** Rounds in which the volume of what is added to a pH settles. */
const DILUTIONS = 3;
/** A line without any amount in a flask without any: 1 mmol. */
const FALLBACK_MOL = 1e-3;

/** The facts of one step; `before` is the step whose flask it goes on from. */
export function gatherFacts(
  step: Step,
  before: StepFacts | null,
  tables: Tables,
  settings: Settings,
): StepFacts {
  const flask = new Filling(step, before, tables, settings);
  for (const statement of step.statements) flask.take(statement);
  return flask.facts();
}

class Filling {
  private readonly additions: Addition[] = [];
  private readonly moments: Moment[] = [];
  private readonly transfers: TransferFact[] = [];
  private readonly conversions: ConvertFact[] = [];
  private readonly adjustments: AdjustFact[] = [];
  private ingredients: Ingredient[] = [];
  private temperature: number;
  /** The layer that the last extraction or wash was made for. */
  private wanted: Layer | null = null;
  private next = 0;
  private readonly step: Step;
  private readonly tables: Tables;
  private readonly settings: Settings;

  constructor(step: Step, before: StepFacts | null, tables: Tables, settings: Settings) {
    this.step = step;
    this.tables = tables;
    this.settings = settings;
    this.temperature = before?.left.temperature ?? ROOM;
    const layer = step.continues?.layer ?? null;
    for (const one of before === null ? [] : layerLeft(before, layer, tables)) {
      const ingredient = { ...one, id: this.next++ };
      this.ingredients.push(ingredient);
      this.additions.push({ ingredient, statement: null, range: step.range, substance: null });
    }
  }

  take(statement: Statement): void {
    switch (statement.keyword) {
      case 'solvent':
        this.addSolvents(statement);
        break;
      case 'charge':
      case 'base':
      case 'acid':
      case 'inert':
      case 'quench':
        this.add(statement, statement.substance, statement.amount, roleOf(statement));
        break;
      case 'wash':
        this.drawOff(this.wanted ?? 'organic');
        this.addLayer(statement, statement.substance, statement.amount);
        this.wanted = 'organic';
        break;
      case 'extract':
        if (this.wanted !== null) this.drawOff(this.wanted);
        this.addLayer(statement, statement.into, statement.amount);
        this.wanted = isAqueous(statement.into) ? 'aqueous' : 'organic';
        break;
      case 'keep':
        this.keep(statement);
        return;
      case 'isolate':
        if (this.wanted !== null) this.drawOff(this.wanted);
        break;
      case 'temperature':
        this.temperature = statement.to === 'reflux' ? this.boilingPoint() : statement.to;
        return;
      case 'deprotonate':
      case 'protonate':
        this.judge(statement);
        break;
      case 'adjust':
        // What has been extracted into water is worked on there.
        if (this.wanted === 'aqueous') this.drawOff('aqueous');
        this.adjust(statement);
        break;
      case 'convert':
        this.convert(statement);
        break;
      default:
        break;
    }
    this.moments.push(this.moment(statement));
  }

  facts(): StepFacts {
    const { step, additions, moments, transfers, conversions, adjustments, tables, settings } = this;
    return {
      step,
      problems: step.problems,
      additions,
      moments,
      transfers,
      conversions,
      adjustments,
      left: this.contents(),
      tables,
      settings,
    };
  }

  private contents(): Contents {
    return {
      ingredients: this.ingredients,
      temperature: this.temperature,
      concentration: this.settings.concentration,
    };
  }

  private moment(statement: Statement): Moment {
    const contents = this.contents();
    let solved: FlaskState | undefined;
    return { statement, contents, state: () => (solved ??= solveFlask(contents, this.tables, constantsIn)) };
  }

  private boilingPoint(): number {
    const points = this.ingredients.flatMap(({ role, solvent }) =>
      role === 'solvent' && solvent?.boilingPoint != null ? [solvent.boilingPoint] : [],
    );
    return points.length === 0 ? ROOM : Math.min(...points) + ZERO_CELSIUS;
  }

  private addSolvents(statement: SolventStatement): void {
    const { parts, amount } = statement;
    for (const { substance, share } of parts) {
      this.put(statement, substance, {
        role: 'solvent',
        mol: 0,
        volume: amount.volume === null ? null : amount.volume * share,
        amount,
      });
    }
  }

  private add(statement: Statement, substance: Substance, amount: Amount, role: Role): void {
    this.put(statement, substance, { role, mol: amount.mol ?? FALLBACK_MOL, volume: amount.volume, amount });
    for (const { solvent, volume } of amount.carriers) {
      this.put(statement, solvent, { role: 'solvent', mol: 0, volume, amount });
    }
  }

  /** Brings a second layer in: a solvent, water, or a reagent dissolved in water. */
  private addLayer(statement: Statement, substance: Substance, amount: Amount): void {
    if (substance.solvent !== null && amount.carriers.length === 0) {
      const volume = amount.volume ?? this.largestVolume();
      this.put(statement, substance, { role: 'solvent', mol: 0, volume, amount });
      return;
    }
    this.add(statement, substance, amount, 'quench');
    const hasWater = amount.carriers.some(({ solvent }) => solvent.solvent?.kind === 'water');
    const water = this.tables.solventByName.get('water');
    // A volume of brine or of ammonium chloride is a volume of water.
    if (hasWater || water === undefined || amount.volume === null) return;
    const asWater: Substance = {
      ...substance,
      name: water.name,
      smiles: water.smiles,
      reagent: null,
      solvent: water,
    };
    this.put(statement, asWater, { role: 'solvent', mol: 0, volume: amount.volume, amount });
  }

  private largestVolume(): number | null {
    const volumes = this.ingredients.flatMap(({ role, volume }) =>
      role === 'solvent' && volume !== null ? [volume] : [],
    );
    return volumes.length === 0 ? null : Math.max(...volumes);
  }

  /** Goes on with one of two layers; with one layer nothing happens. */
  private drawOff(layer: Layer): void {
    this.ingredients = [...ingredientsIn(layer, this.contents(), this.tables, constantsIn)];
    this.wanted = null;
  }

  /** The moment of a `keep` shows both layers, what follows only the one that is kept. */
  private keep(statement: KeepStatement): void {
    this.moments.push(this.moment(statement));
    this.drawOff(statement.layer);
  }

  private put(
    statement: Statement,
    substance: Substance,
    { role, mol, volume, amount }: { role: Role; mol: number; volume: number | null; amount: Amount },
  ): void {
    const ingredient: Ingredient = {
      id: this.next++,
      name: substance.name,
      molecule: this.moleculeOf(substance),
      mol,
      volume,
      role,
      reagent: substance.reagent,
      solvent: substance.solvent,
      assumed: amount.assumed,
      qualifier: amount.qualifier,
      own: substance.compound?.measured ?? [],
    };
    this.ingredients = [...this.ingredients, ingredient];
    this.additions.push({ ingredient, statement, range: substance.range, substance });
  }

  private moleculeOf({ smiles }: Substance): Perceived | null {
    if (smiles === null) return null;
    const molecule = perceive(smiles, this.tables);
    return molecule.graph === null ? null : molecule;
  }

  private find(substance: Substance): Ingredient | null {
    const same = this.ingredients.filter(({ name, molecule }) =>
      substance.compound !== null || substance.smiles === null
        ? name === substance.name
        : name === substance.name || molecule?.smiles === substance.smiles,
    );
    return same.at(-1) ?? null;
  }

  private judge(statement: TransferStatement): void {
    const one = this.find(statement.substance);
    const convert = this.laterConversion(statement);
    const contents = this.contents();
    const verdicts: Verdict[] = [];
    if (one?.molecule != null) {
      const product = convert?.to[0]?.substance ?? null;
      const wanted = statement.sites.length === 0 ? [[]] : statement.sites.map(({ atoms }) => atoms);
      for (const atoms of wanted) {
        const couples = couplesAt(one.molecule, atoms, statement.keyword);
        if (0 < atoms.length && couples.length === 0) continue;
        const intent: Intent = {
          ingredient: one.id,
          couples,
          direction: statement.keyword,
          isConsumed: convert !== null,
          product: product === null ? null : this.moleculeOf(product),
        };
        const verdict = judgeTransfer(contents, intent, this.tables, constantsIn, this.settings.thresholds);
        if (verdict !== null) verdicts.push(verdict);
      }
    }
    this.transfers.push({ statement, contents, verdicts, convert, ingredient: one });
  }

  /** Adds as much as the pH asks for; what cannot be reached adds nothing. */
  private adjust(statement: AdjustStatement): void {
    const { substance, amount, pH } = statement;
    const before = this.ingredients;
    this.put(statement, substance, { role: 'quench', mol: amount.mol ?? FALLBACK_MOL, volume: null, amount });
    const added = this.ingredients.at(-1)!;
    const known = this.additions.length;
    let others = before;
    let volume: number | null = null;
    let titration = this.titrate(others, added, pH);
    // The liquid that the reagent brings dilutes the flask, so its amount is worked out again with it.
    for (let turn = 0; turn < DILUTIONS && titration.mol !== null && 0 < titration.mol; turn++) {
      const each = amount.mol === null || amount.mol <= 0 ? null : titration.mol / amount.mol;
      if (each === null || amount.volume === null) break;
      volume = amount.volume * each;
      this.ingredients = [...before];
      this.additions.length = known;
      for (const { solvent, volume: carried } of amount.carriers)
        if (carried !== null)
          this.put(statement, solvent, { role: 'solvent', mol: 0, volume: carried * each, amount });
      others = this.ingredients;
      titration = this.titrate(others, added, pH);
    }
    this.adjustments.push({ statement, titration, volume });
    const { mol } = titration;
    this.ingredients = mol === null ? [...before] : [...others, { ...added, mol, volume }];
  }

  private titrate(others: readonly Ingredient[], added: Ingredient, pH: number): Titration {
    return titrateTo({ ...this.contents(), ingredients: others }, pH, added, this.tables, constantsIn);
  }

  /** The next conversion of the step that uses up what the transfer makes. */
  private laterConversion(statement: TransferStatement): ConvertStatement | null {
    const { statements } = this.step;
    const later = statements.slice(statements.indexOf(statement) + 1);
    return (
      later.find(
        (other): other is ConvertStatement =>
          other.keyword === 'convert' &&
          other.from.some(({ substance }) => substance.name === statement.substance.name),
      ) ?? null
    );
  }

  private convert(statement: ConvertStatement): void {
    const before = this.contents();
    const counted = (list: ConvertStatement['from']) =>
      list.flatMap(({ substance, count }) => {
        const molecule = this.moleculeOf(substance);
        return molecule === null ? [] : [{ molecule, count }];
      });
    const [from, to] = [counted(statement.from), counted(statement.to)];
    const { statements } = this.step;
    const conversion: Conversion = balanceConversion(from, to, [
      ...this.ingredients,
      ...this.laterAdditions(statements.slice(statements.indexOf(statement) + 1)),
    ]);
    this.conversions.push({ statement, before, conversion });
    this.exchange(statement, conversion);
  }

  /** Quenches and later charges may bring atoms too. */
  private laterAdditions(statements: readonly Statement[]): Ingredient[] {
    return statements.flatMap((statement) => {
      if (statement.keyword !== 'quench' && statement.keyword !== 'charge' && statement.keyword !== 'acid')
        return [];
      const { substance, amount } = statement;
      return [
        {
          id: -1,
          name: substance.name,
          molecule: this.moleculeOf(substance),
          mol: amount.mol ?? 0,
          volume: amount.volume,
          role: 'quench' as const,
          reagent: substance.reagent,
          solvent: substance.solvent,
          assumed: amount.assumed,
          qualifier: amount.qualifier,
        },
      ];
    });
  }

  /** Takes the reactants away and puts products and by-products in their place. */
  private exchange({ from, to, yield: share }: ConvertStatement, { byProducts }: Conversion): void {
    const used = from.flatMap(({ substance, count }) => {
      const one = this.find(substance);
      return one === null ? [] : [{ one, count }];
    });
    if (used.length === 0) return;
    const extent = Math.min(...used.map(({ one, count }) => one.mol / count)) * (share ?? 1);
    const left = new Map(used.map(({ one, count }) => [one.id, Math.max(0, one.mol - extent * count)]));
    this.ingredients = this.ingredients
      .map((one) => (left.has(one.id) && one.role !== 'solvent' ? { ...one, mol: left.get(one.id)! } : one))
      .filter(({ role, mol }) => role === 'solvent' || 0 < mol);
    for (const { substance, count } of to)
      this.make(substance.name, this.moleculeOf(substance), extent * count, 'compound', substance);
    let wanted = used.reduce(
      (sum, { one, count }) => sum + count * (one.molecule === null ? 0 : protonsWanted(one.molecule)),
      0,
    );
    for (const { name, smiles, ion, count } of byProducts) {
      const asIon = ion === null ? 0 : Math.min(wanted, count);
      wanted -= asIon;
      if (0 < asIon) this.make(name, perceive(ion!, this.tables), extent * asIon, 'by-product', null);
      if (asIon < count)
        this.make(name, perceive(smiles, this.tables), extent * (count - asIon), 'by-product', null);
    }
  }

  private make(
    name: string,
    molecule: Perceived | null,
    mol: number,
    role: Role,
    substance: Substance | null,
  ): void {
    const ingredient: Ingredient = {
      id: this.next++,
      name,
      molecule,
      mol,
      volume: null,
      role,
      reagent: null,
      solvent: null,
      assumed: false,
      qualifier: null,
      own: substance?.compound?.measured ?? [],
    };
    this.ingredients = [...this.ingredients, ingredient];
    this.additions.push({
      ingredient,
      statement: null,
      range: substance?.range ?? this.step.range,
      substance,
    });
  }
}

/** Whether a layer brought in is water or something dissolved in it. */
export function isAqueous({ solvent, reagent }: Substance): boolean {
  return solvent === null ? reagent !== null : solvent.kind === 'water';
}

function roleOf({ keyword, substance }: AddStatement): Role {
  if (keyword === 'charge')
    return substance.kind === 'compound' || substance.kind === 'structure' ? 'compound' : 'reagent';
  return keyword;
}

/** Couples at the named atoms that can make the move. */
function couplesAt(
  { couples }: Perceived,
  atoms: readonly number[],
  keyword: 'deprotonate' | 'protonate',
): number[] {
  const holds = keyword === 'deprotonate';
  const at = couples.flatMap(({ equivalents, holdsProton }, index) =>
    equivalents.some((atom) => atoms.includes(atom)) && holdsProton === holds ? [index] : [],
  );
  return at;
}

/** What a step goes on with: the layer that it names, or all that the one before left. */
function layerLeft({ left }: StepFacts, layer: Layer | null, tables: Tables): readonly Ingredient[] {
  return layer === null ? left.ingredients : ingredientsIn(layer, left, tables, constantsIn);
}
