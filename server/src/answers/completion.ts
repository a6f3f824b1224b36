/**
 * What can be written at a place of a plan: keywords, compounds, substances of the tables, sites, units, checks.
 *
 * Knows: plans, tables, the words of the language.  Must not know: the protocol.
 * Works on the text of the line alone where the line cannot be read yet, because that is when it is asked.
 */
import { CHECKS } from '../checks/registry.generated.ts';
import { readSmiles } from '../chemistry/smiles.ts';
import { ACTING_ROLES } from '../flask/choices.ts';
import { fenceIndents } from '../route/markdown.ts';
import type { Position, Range } from '../route/plan.ts';
import { scanLine, stringText, type Token } from '../route/scan.ts';
import type { ReagentRole, ReagentRow, SolventRow } from '../tables/rows.ts';
import { inLine } from './ranges.ts';
import { written } from './rename.ts';
import type { Analysed } from './types.ts';
import { KEYWORD_PAGES, LAYERS, QUALIFIERS, STATES, UNITS } from './vocabulary.ts';

export type ChoiceKind =
  | 'keyword'
  | 'compound'
  | 'reagent'
  | 'solvent'
  | 'site'
  | 'unit'
  | 'value'
  | 'label'
  | 'check';

export interface Choice {
  readonly kind: ChoiceKind;
  /** What is shown and typed against. */
  readonly label: string;
  /** What is written. */
  readonly text: string;
  /** What it takes the place of. */
  readonly range: Range;
  readonly detail: string;
  /** Markdown. */
  readonly page: string;
  /** Lower comes first. */
  readonly rank: number;
}

interface Place {
  readonly line: number;
  readonly character: number;
  /** Tokens that end before the cursor; the one being typed is not among them. */
  readonly before: readonly Token[];
  /** Start of the word being typed; the cursor where none is. */
  readonly start: number;
}

const BASE_ROLES = ACTING_ROLES.base;
const ACID_ROLES: ReadonlySet<ReagentRole> = new Set([...ACTING_ROLES.acid, 'lewis-acid']);
const INERT_ROLES: ReadonlySet<ReagentRole> = new Set(['catalyst', 'ligand', 'drying-agent', 'additive']);

/** Choices at a place; empty inside remarks, quotes and structures, and outside the fences of a page. */
export function completionsAt(analysed: Analysed, position: Position): Choice[] {
  const text = textOfLine(analysed, position.line);
  if (text === null) return [];
  const place = placeIn(text, position);
  if (place === null) return [];
  const keyword = place.before[0]?.text;
  if (keyword === undefined) return keywords(analysed, place);
  return statement(analysed, keyword, place);
}

function textOfLine({ source }: Analysed, line: number): string | null {
  const lines = source.text.split(/\r\n|\r|\n/);
  const text = lines[line];
  if (text === undefined) return null;
  if (source.language === 'markdown' && fenceIndents(lines)[line] === null) return null;
  return text;
}

function placeIn(text: string, { line, character }: Position): Place | null {
  const { tokens, comment } = scanLine(text.slice(0, character));
  if (comment !== null) return null;
  const last = tokens.at(-1);
  if (last === undefined || last.end < character)
    return { line, character, before: tokens, start: character };
  if (last.kind !== 'word') return null;
  return { line, character, before: tokens.slice(0, -1), start: last.start };
}

function keywords(analysed: Analysed, place: Place): Choice[] {
  const inStep = analysed.plan.steps.some(({ firstLine }) => firstLine < place.line);
  return Object.entries(KEYWORD_PAGES)
    .filter(([, page]) => page.place === 'both' || (page.place === 'step') === inStep)
    .map(([word, { form, text }]) => ({
      kind: 'keyword' as const,
      label: word,
      text: word,
      range: typed(place),
      detail: form,
      page: text,
      rank: 0,
    }));
}

function statement(analysed: Analysed, keyword: string, place: Place): Choice[] {
  const last = place.before.at(-1)!.text;
  const words = place.before.map(({ text }) => text);
  switch (keyword) {
    case 'charge':
    case 'quench':
    case 'wash':
    case 'base':
    case 'acid':
    case 'inert':
      return inAddition(analysed, keyword, place);
    case 'solvent':
      return words.length === 1 ? solvents(analysed, place) : amounts(analysed, place);
    case 'deprotonate':
    case 'protonate':
      if (words.length === 1) return compounds(analysed, place);
      if (last === 'at' || last.endsWith(',')) return sites(analysed, nameAfter(place.before), place);
      return values(['at'], 'Names the site', place);
    case 'measured':
      if (words.length === 1) return values(['pKa'], 'The value', place);
      if (last === 'in') return solvents(analysed, place);
      if (last === 'at') return sites(analysed, compoundAbove(analysed, place.line), place);
      return values(['at', 'in', 'source'], 'measured', place);
    case 'convert':
      if (words.length === 1 || last === '+' || last === 'to') return compounds(analysed, place);
      return values(words.includes('to') ? ['+', 'yield'] : ['+', 'to'], 'convert', place);
    case 'adjust':
      if (words.length === 1) return values(['pH'], 'The pH to reach', place);
      if (last === 'with') return reagents(analysed, place, new Set([...ACID_ROLES, ...BASE_ROLES]));
      return words.length === 3 ? values(['with'], 'What brings it there', place) : [];
    case 'extract':
      if (words.length === 1) return compounds(analysed, place);
      if (last === 'into') return solvents(analysed, place);
      return words.includes('into') ? amounts(analysed, place) : values(['into'], 'The layer', place);
    case 'keep':
      if (words.length === 1) return compounds(analysed, place);
      return last === 'in' ? values(LAYERS, 'Layer', place) : values(['in'], 'The layer', place);
    case 'isolate':
      if (words.length === 1) return compounds(analysed, place);
      return last === 'as' ? values(STATES, 'State of charge', place) : values(['as'], 'The state', place);
    case 'accept':
      return words.length === 1 ? checks(place) : [];
    case 'step':
      if (last === 'continues') return labels(analysed, place);
      if (words.at(-2) === 'continues') return values(LAYERS, 'Layer', place);
      return words.length === 2 ? values(['continues'], 'Goes on with another flask', place) : [];
    case 'temperature':
      if (isNumber(last)) return values(['°C', 'K'], 'Temperature', place);
      return words.length === 1 || last === 'to'
        ? values(['rt', 'reflux'], 'Temperature', place)
        : values(['to'], 'A second temperature', place);
    default:
      return [];
  }
}

function inAddition(analysed: Analysed, keyword: string, place: Place): Choice[] {
  const { before } = place;
  const last = before.at(-1)!.text;
  if (last === 'in') return solvents(analysed, place);
  const hasAmount = before.slice(1).some(({ text }) => isNumber(text));
  const first = before.length === 1;
  const strengthOnly = before.length === 2 && /^(sat|conc|aq)\.?$/.test(last);
  if (!first && !strengthOnly) {
    return hasAmount || nameIsKnown(analysed, before)
      ? amounts(analysed, place)
      : [...reagents(analysed, place, rolesOf(keyword)), ...amounts(analysed, place)];
  }
  return [
    ...compounds(analysed, place),
    ...reagents(analysed, place, rolesOf(keyword)),
    ...(keyword === 'charge' || keyword === 'quench' || keyword === 'wash'
      ? solvents(analysed, place, 3)
      : []),
  ];
}

function rolesOf(keyword: string): ReadonlySet<ReagentRole> {
  if (keyword === 'base') return BASE_ROLES;
  if (keyword === 'acid') return ACID_ROLES;
  if (keyword === 'inert') return INERT_ROLES;
  return new Set(keyword === 'quench' || keyword === 'wash' ? (['quench'] as const) : []);
}

function nameIsKnown({ plan }: Analysed, before: readonly Token[]): boolean {
  const name = nameAfter(before);
  return plan.compounds.some((compound) => compound.name === name);
}

function nameAfter(before: readonly Token[]): string | null {
  const token = before[1];
  if (token === undefined) return null;
  return token.kind === 'string' ? stringText(token) : token.text;
}

function compoundAbove({ plan }: Analysed, line: number): string | null {
  const above = plan.compounds.filter(
    ({ file, nameRange }) => file === undefined && nameRange.start.line < line,
  );
  return above.at(-1)?.name ?? null;
}

function typed({ line, start, character }: Place): Range {
  return inLine(line, { start, end: character });
}

function compounds({ plan }: Analysed, place: Place): Choice[] {
  const seen = new Set<string>();
  return plan.compounds.flatMap(({ name, smiles, file }) => {
    if (seen.has(name)) return [];
    seen.add(name);
    const page = `\`${smiles.replaceAll('`', '')}\`${file === undefined ? '' : `\n\nfrom ${file}`}`;
    return [
      {
        kind: 'compound' as const,
        label: name,
        text: written(name),
        range: typed(place),
        detail: 'compound',
        page,
        rank: 0,
      },
    ];
  });
}

function reagents({ tables }: Analysed, place: Place, wanted: ReadonlySet<ReagentRole>): Choice[] {
  return tables.reagents.flatMap((row) => {
    const rank = row.roles.some((role) => wanted.has(role)) ? 1 : 2;
    return named(row, place, 'reagent', row.roles.join(', '), reagentPage(row), rank);
  });
}

function solvents({ tables }: Analysed, place: Place, rank = 1): Choice[] {
  return tables.solvents.flatMap((row) => named(row, place, 'solvent', row.kind, solventPage(row), rank));
}

function named(
  row: { readonly name: string; readonly synonyms: readonly string[] },
  place: Place,
  kind: ChoiceKind,
  detail: string,
  page: string,
  rank: number,
): Choice[] {
  const range = typed(place);
  return [row.name, ...row.synonyms].map((name) => ({
    kind,
    label: name,
    text: name,
    range,
    detail: name === row.name ? detail : `= ${row.name} · ${detail}`,
    page,
    rank: name === row.name ? rank : rank + 0.5,
  }));
}

/** What the tables say of a reagent. */
export function reagentPage({ name, smiles, roles, note, stockMolarity, stockSolvent }: ReagentRow): string {
  const parts = [`**${name}**${roles.length === 0 ? '' : ` · ${roles.join(', ')}`}`];
  if (smiles !== null) parts.push(`\`${smiles}\``);
  if (stockMolarity !== null) {
    parts.push(`usual strength ${stockMolarity} M${stockSolvent === null ? '' : ` in ${stockSolvent}`}`);
  }
  if (note !== '') parts.push(note);
  return parts.join('\n\n');
}

/** What the tables say of a solvent. */
export function solventPage({
  name,
  smiles,
  kind,
  boilingPoint,
  permittivity,
  pKs,
  waterMiscibility,
}: SolventRow): string {
  const facts = [
    boilingPoint === null ? '' : `boils at ${boilingPoint} °C`,
    permittivity === null ? '' : `ε ${permittivity}`,
    pKs === null ? '' : `pKs ${pKs}`,
    { yes: 'mixes with water', partly: 'mixes partly with water', no: 'does not mix with water' }[
      waterMiscibility
    ],
  ].filter((fact) => fact !== '');
  return [`**${name}** · ${kind}`, `\`${smiles}\``, facts.join(', ')].join('\n\n');
}

function sites({ plan }: Analysed, name: string | null, place: Place): Choice[] {
  const compound = plan.compounds.find((each) => each.name === name);
  if (compound === undefined) return [];
  const atoms = readSmiles(compound.smiles).structure?.atoms ?? [];
  const maps = new Map<number, string>();
  for (const { mapNumber, element } of atoms)
    if (mapNumber !== 0 && !maps.has(mapNumber)) maps.set(mapNumber, element);
  return [...maps].map(([map, element]) => ({
    kind: 'site' as const,
    label: `:${map}`,
    text: `:${map}`,
    range: typed(place),
    detail: `${element} of ${compound.name}`,
    page: `\`${compound.smiles.replaceAll('`', '')}\``,
    rank: map,
  }));
}

function amounts(analysed: Analysed, place: Place): Choice[] {
  const last = place.before.at(-1)!.text;
  if (isNumber(last)) {
    return Object.entries(UNITS).map(([unit, page], rank) => ({
      kind: 'unit' as const,
      label: unit,
      text: unit,
      range: typed(place),
      detail: page,
      page: '',
      rank,
    }));
  }
  if (last === 'in' || last === 'into') return solvents(analysed, place);
  return values([...QUALIFIERS, 'in', 'of'], 'Amount', place);
}

function values(words: readonly string[], detail: string, place: Place): Choice[] {
  return words.map((word, rank) => ({
    kind: 'value' as const,
    label: word,
    text: word,
    range: typed(place),
    detail,
    page: '',
    rank,
  }));
}

function labels({ plan }: Analysed, place: Place): Choice[] {
  return plan.steps
    .filter(({ firstLine }) => firstLine < place.line)
    .map(({ label, title }, rank) => ({
      kind: 'label' as const,
      label,
      text: written(label),
      range: typed(place),
      detail: title ?? 'step',
      page: '',
      rank: -rank,
    }));
}

function checks(place: Place): Choice[] {
  return CHECKS.map(({ name, family, summary }) => ({
    kind: 'check' as const,
    label: name,
    text: name,
    range: inLine(place.line, { start: place.start, end: place.character }),
    detail: family,
    page: summary,
    rank: 0,
  }));
}

function isNumber(text: string): boolean {
  return /^[-−+]?\d+(\.\d+)?$/.test(text);
}
