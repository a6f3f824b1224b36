/**
 * What is known about the thing at a place of a plan, as Markdown.
 *
 * Knows: analysed plans, tables, checks.  Must not know: the protocol.
 * Invariant: text from the plan is shown as written and never interpreted.   (tests/answers/hover.test.ts)
 */
import { CHECKS } from '../checks/registry.generated.ts';
import { readSmiles } from '../chemistry/smiles.ts';
import { lineAt } from '../route/document.ts';
import { leafAt } from '../route/places.ts';
import type { Amount, Position, Range, Substance } from '../route/plan.ts';
import type { LineTree } from '../route/tree.ts';
import { reagentPage, solventPage } from './completion.ts';
import { drawing } from './drawing.ts';
import { amountOf, figure, oneDecimal, percent } from './figures.ts';
import { lensesOf } from './lenses.ts';
import { code, plain } from './markdown-text.ts';
import { compoundNamed, substanceAt, targetAt } from './names-at.ts';
import { inLine, shiftRange, touches } from './ranges.ts';
import { sitesOf, sitesOfCompound, siteTable } from './site-table.ts';
import { stepAt } from './steps.ts';
import type { Analysed } from './types.ts';
import { KEYWORD_PAGES } from './vocabulary.ts';

export interface Hover {
  readonly range: Range;
  readonly markdown: string;
}

/** The page about what stands at a place; null where nothing can be said. */
export function hoverAt(analysed: Analysed, position: Position): Hover | null {
  const tree = lineAt(analysed.plan.document, position.line);
  if (tree === null) return null;
  const leaf = leafAt(tree, position.character);
  if (leaf === null || leaf.kind === 'blank' || leaf.kind === 'comment') return null;
  const range = inLine(position.line, leaf);
  const word = tree.text.slice(leaf.start, leaf.end);
  switch (leaf.kind) {
    case 'keyword':
      return keywordPage(analysed, word, range);
    case 'check':
      return checkPage(word, range);
    case 'structure':
      return structurePage(analysed, tree, position, range);
    case 'number':
    case 'unit':
      return amountPage(analysed, position) ?? transferPage(analysed, position, range);
    case 'site':
      return transferPage(analysed, position, range);
    default:
      return namePage(analysed, position) ?? amountPage(analysed, position);
  }
}

function keywordPage(analysed: Analysed, word: string, range: Range): Hover | null {
  const page = KEYWORD_PAGES[word];
  if (page === undefined) return null;
  const parts = [`\`\`\`lyate\n${page.form}\n\`\`\``, page.text];
  const found = stepAt(analysed, range.start.line);
  if (word === 'step' && found !== null) parts.push(flaskText(analysed, range.start.line));
  if ((word === 'deprotonate' || word === 'protonate') && found !== null) {
    parts.push(verdictText(analysed, range.start.line));
  }
  return { range, markdown: parts.filter((part) => part !== '').join('\n\n') };
}

function checkPage(name: string, range: Range): Hover | null {
  const check = CHECKS.find((candidate) => candidate.name === name);
  if (check === undefined) return null;
  const { summary, why, remedy } = check;
  return { range, markdown: [`**${plain(name)}**`, summary, why, remedy].join('\n\n') };
}

function structurePage(analysed: Analysed, tree: LineTree, position: Position, range: Range): Hover | null {
  const offset = tree.text[range.start.character] === '<' ? 1 : 0;
  const text = tree.text.slice(range.start.character, range.end.character).replace(/^<|>$/g, '');
  const within = position.character - range.start.character - offset;
  const atom = readSmiles(text).structure?.atoms.find(
    ({ span }) => span.start <= within && within < span.end,
  );
  const name = tree.syntax?.keyword === 'compound' ? tree.syntax.name : text;
  const sites = sitesOfCompound(analysed, name) ?? sitesInStep(analysed, position.line, name);
  const parts: string[] = [];
  if (atom !== undefined) {
    const map = atom.mapNumber === 0 ? '' : `, site :${atom.mapNumber}`;
    const here = sites?.couples.filter(({ couple }) => couple.atom === atom.index) ?? [];
    const values = here.map(
      ({ couple, constant }) =>
        `${plain(couple.groupName)}: pKa ${oneDecimal(constant.value)} ± ${oneDecimal(constant.sd)} (${plain(constant.scale)}, ${constant.origin})`,
    );
    parts.push([`**${atom.element}${atom.index + 1}**${map}`, ...values].join('  \n'));
  }
  parts.push(drawing(text, sites));
  if (sites !== null) parts.push(siteTable(sites));
  const markdown = parts.filter((part) => part !== '').join('\n\n');
  return markdown === '' ? null : { range, markdown };
}

function sitesInStep(analysed: Analysed, line: number, name: string) {
  const found = stepAt(analysed, line);
  return found === null ? null : sitesOf(found.step.facts, name);
}

function namePage(analysed: Analysed, position: Position): Hover | null {
  const found = stepAt(analysed, position.line);
  const substance = substanceAt(analysed, position);
  if (substance !== null && found !== null) {
    const range = shiftRange(substance.range, found.firstLine);
    const markdown = substancePage(analysed, substance, position.line);
    return markdown === '' ? null : { range, markdown };
  }
  const target = targetAt(analysed, position);
  if (target?.kind !== 'compound') return null;
  return { range: target.range, markdown: compoundPage(analysed, target.name) };
}

function substancePage(analysed: Analysed, substance: Substance, line: number): string {
  const { kind, name, reagent, solvent, smiles } = substance;
  const sites = sitesInStep(analysed, line, name);
  if (kind === 'compound') return compoundPage(analysed, name, line);
  const parts: string[] = [];
  if (solvent !== null) parts.push(solventPage(solvent));
  if (reagent !== null) parts.push(reagentPage(reagent));
  if (parts.length === 0 && smiles !== null) parts.push(code(smiles));
  if (smiles !== null) parts.push(drawing(smiles, sites));
  if (sites !== null) parts.push(siteTable(sites));
  return parts.filter((part) => part !== '').join('\n\n');
}

function compoundPage(analysed: Analysed, name: string, line?: number): string {
  const compound = compoundNamed(analysed, name);
  if (compound === null) return '';
  const { smiles, file, measured } = compound;
  const sites =
    (line === undefined ? null : sitesInStep(analysed, line, name)) ?? sitesOfCompound(analysed, name);
  const parts = [`**${plain(name)}** ${code(smiles)}`];
  if (file !== undefined) parts.push(`from ${plain(file)}`);
  parts.push(drawing(smiles, sites));
  for (const { value, sd, scale, source } of measured) {
    const spread = sd === null ? '' : ` ± ${oneDecimal(sd)}`;
    parts.push(
      `measured: pKa ${oneDecimal(value)}${spread} in ${plain(scale)}${source === '' ? '' : `, ${plain(source)}`}`,
    );
  }
  if (sites !== null) parts.push(siteTable(sites));
  return parts.filter((part) => part !== '').join('\n\n');
}

function amountPage(analysed: Analysed, position: Position): Hover | null {
  const found = stepAt(analysed, position.line);
  if (found?.statement == null || !('amount' in found.statement)) return null;
  const { amount } = found.statement;
  if (amount.range === null) return null;
  const range = shiftRange(amount.range, found.firstLine);
  if (!touches(range, position)) return null;
  const text = amountText(amount);
  return text === '' ? null : { range, markdown: text };
}

function amountText({ mol, equiv, mass, volume, portions, assumed }: Amount): string {
  const parts = [
    mol === null ? '' : amountOf(mol),
    equiv === null ? '' : `${figure(equiv)} equiv`,
    mass === null ? '' : `${figure(mass)} g`,
    volume === null ? '' : `${figure(volume * 1000)} mL`,
    portions === 1 ? '' : `${portions} portions`,
    assumed ? 'assumed' : '',
  ];
  return parts.filter((part) => part !== '').join(' · ');
}

function transferPage(analysed: Analysed, position: Position, range: Range): Hover | null {
  const markdown = verdictText(analysed, position.line);
  return markdown === '' ? null : { range, markdown };
}

function verdictText(analysed: Analysed, line: number): string {
  const found = stepAt(analysed, line);
  const fact = found?.step.facts.transfers.find(({ statement }) => statement === found.statement);
  if (fact === undefined) return '';
  return fact.verdicts
    .map(({ answer, logK, sd, extent, kinetics, scale, site, allowances }) => {
      const notes = allowances.length === 0 ? '' : ` (${allowances.join(', ')})`;
      const speed = kinetics === 'instant' ? '' : `, ${kinetics}`;
      return `**${answer}** for ${plain(site.couple.groupName)}: log K ${oneDecimal(logK)} ± ${oneDecimal(sd)} on the ${plain(scale)} scale, ${percent(extent)}${speed}${notes}`;
    })
    .join('\n\n');
}

function flaskText(analysed: Analysed, line: number): string {
  const found = stepAt(analysed, line);
  const last = found?.step.facts.moments.at(-1);
  if (found == null || last === undefined) return '';
  const state = last.state();
  const lens = lensesOf(analysed).find(({ range }) => range.start.line === found.firstLine);
  const facts = [
    state.pH === null ? '' : `pH ${oneDecimal(state.pH)} (${plain(state.medium.scale)} scale)`,
    `${figure(state.medium.volume * 1000)} mL${state.medium.assumedVolume ? ' (assumed)' : ''}`,
    `${figure(state.temperature - 273.15)} °C`,
    state.medium.names.map(plain).join(', '),
  ];
  return [lens?.title ?? '', `At its end: ${facts.filter((fact) => fact !== '').join(' · ')}`].join('\n\n');
}
