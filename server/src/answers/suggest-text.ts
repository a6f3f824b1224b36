/**
 * Suggestions as a chemist reads them at a terminal: a table, remarks under it, and why the others are not there.
 *
 * Knows: suggestions.  Must not know: files, colours.
 * Units: °C, equivalents, units of pKa.
 */
import type { Reason } from '../flask/suggest.ts';
import { marginOf } from '../flask/suggest-cost.ts';
import { figure, oneDecimal, percent } from './figures.ts';
import type { Refusal, Suggestion, Suggestions } from './suggest.ts';

const ZERO_CELSIUS = 273.15;
const MOST_NAMED = 8;
const REASONS: readonly (readonly [Refusal['reason']['kind'], string])[] = [
  ['too-weak', 'too weak (units short, in the solvent that suits it best)'],
  ['attacks', 'attacks something else'],
  ['lost-to-solvent', 'eaten by the solvent'],
  ['finding', 'raises an error in this step'],
  ['slow', 'too slow at this site'],
  ['frozen', 'its solvents are frozen at this temperature'],
  ['boils', 'its solvents boil at this temperature'],
  ['not-proposed', 'never proposed'],
  ['no-constant', 'no constant at hand'],
  ['not-used-in', 'not used in any solvent of the tables'],
  ['not-reached', 'rare, and not looked at'],
];

export interface TextLimits {
  /** Rows of the table. */
  readonly rows: number;
  /** Names for each reason before the rest is counted. */
  readonly named: number;
}

/** One transfer with its suggestions; ends with a line feed. */
export function suggestionsText(
  suggestions: Suggestions,
  { rows, named }: TextLimits = { rows: 10, named: MOST_NAMED },
): string {
  const { step, line, direction, compound, site, list } = suggestions;
  const { groupName } = site.couple;
  const { value, sd, scale } = site.constant;
  return [
    `Step ${step}, line ${line + 1}: ${direction} ${compound}`,
    `  site: ${groupName}, pKa ${oneDecimal(value)} ± ${oneDecimal(sd)} on the ${scale} scale of this flask`,
    `  ${asWritten(suggestions)}`,
    '',
    ...(list.length === 0
      ? ['  No reagent of the tables does it in this flask.']
      : table(list.slice(0, rows), direction)),
    '',
    ...refusals(suggestions, named),
    'Decision support only: cautions defer to local rules and to a qualified chemist.',
    '',
  ].join('\n');
}

function asWritten({ asWritten: { acting, solvents, verdict }, direction }: Suggestions): string {
  const what =
    acting.length === 0 ? `no ${direction === 'deprotonate' ? 'base' : 'acid'}` : acting.join(' + ');
  const where = solvents.length === 0 ? '' : ` in ${solvents.join('/')}`;
  const { answer, extent } = verdict;
  const word = { yes: 'goes', undecided: 'undecided', no: 'does not go' }[answer];
  return `as written: ${what}${where} ${word}, ${percent(extent)} reacts, margin ${units(marginOf(verdict))}`;
}

function table(list: readonly Suggestion[], direction: 'deprotonate' | 'protonate'): string[] {
  const head = [
    '',
    direction === 'deprotonate' ? 'base' : 'acid',
    'equiv',
    'in',
    '°C',
    'reacts',
    'margin',
    'next site',
    'usual',
    'also in',
  ];
  const body = list.map(({ option, alsoIn }, index) => {
    const { reagent, solvent, equiv, temperature, verdict, next, usual } = option;
    return [
      String(index + 1),
      reagent.name,
      equiv.toFixed(2),
      solvent?.name ?? 'as written',
      String(Math.round(temperature - ZERO_CELSIUS)).replace('-', '−'),
      percent(verdict.extent),
      `${units(marginOf(verdict))}${verdict.answer === 'undecided' ? ' ?' : ''}`,
      next === null ? '–' : units(next.difference),
      usual,
      alsoIn.join(', '),
    ];
  });
  const widths = head.map((_, column) => Math.max(...[head, ...body].map((row) => row[column]!.length)));
  const toRight = new Set([0, 2, 4, 5, 6, 7]);
  const write = (row: readonly string[]) =>
    `  ${row.map((cell, column) => (toRight.has(column) ? cell.padStart(widths[column]!) : cell.padEnd(widths[column]!))).join('  ')}`.trimEnd();
  return [write(head), ...list.flatMap((one, index) => [write(body[index]!), ...remarks(one)])];
}

/** What a chemist weighs before taking it, one line each. */
function remarks({ option, cautions }: Suggestion): string[] {
  const { verdict, limit, halfLife, notes, ahead } = option;
  const said = [
    ...(ahead.length === 0
      ? []
      : [
          `${ahead.map(({ site }) => site.couple.groupName).join(' and ')} goes first and is covered by the amount`,
        ]),
    ...(verdict.allowances.includes('steady-amount')
      ? ['only a small steady amount forms, which the conversion uses up']
      : []),
    ...(verdict.net !== null
      ? ['goes by the net reaction: the product gives its proton in the end and asks for a full equivalent']
      : []),
    ...(verdict.borrowed ? ['hangs on a scale that the solvent borrows'] : []),
    ...(limit === null
      ? []
      : [`${limit.what}${halfLife === null ? '' : `; half is gone in ${figure(halfLife)} h here`}`]),
    ...notes,
    ...cautions.map(({ check, message }) => `${check}: ${message}`),
  ];
  return said.map((text) => `       ${text}`);
}

function refusals({ refusals: all, namesOf }: Suggestions, named: number): string[] {
  const lines: string[] = [];
  for (const [kind, title] of REASONS) {
    const own = all.filter(({ reason, reagent }) => reason.kind === kind && reagent !== null);
    if (own.length !== 0)
      lines.push(
        ...reasonLine(
          title,
          own.map((one) => refusalWords(one, namesOf)),
          named,
        ),
      );
  }
  const solvents = all.filter(({ reagent }) => reagent === null);
  if (solvents.length !== 0)
    lines.push(
      ...reasonLine(
        'solvents never proposed',
        solvents.map((one) => refusalWords(one, namesOf)),
        named,
      ),
    );
  return lines.length === 0 ? [] : ['  Not suggested', ...lines, ''];
}

function reasonLine(title: string, words: readonly string[], named: number): string[] {
  const rest = words.length - named;
  return [`    ${title}: ${words.slice(0, named).join('; ')}${0 < rest ? `; and ${rest} more` : ''}`];
}

function refusalWords({ reagent, solvent, reason }: Refusal, names: ReadonlyMap<number, string>): string {
  const name = reagent?.name ?? solvent?.name ?? '';
  const words = reasonWords(reason, names);
  const where =
    reagent !== null && solvent !== null && reason.kind === 'lost-to-solvent' ? ` by ${solvent.name}` : '';
  return words === '' ? `${name}${where}` : `${name}${where} (${words})`;
}

/** Why, in a few words; empty where the kind says it all. */
export function reasonWords(reason: Reason | Refusal['reason'], names: ReadonlyMap<number, string>): string {
  switch (reason.kind) {
    case 'too-weak':
      return oneDecimal(reason.short);
    case 'attacks':
      return `${reason.group} of ${names.get(reason.ingredient) ?? 'the flask'}`;
    case 'lost-to-solvent':
      return percent(reason.share);
    case 'frozen':
    case 'boils':
      return `${Math.round(reason.temperature - ZERO_CELSIUS)} °C`.replace('-', '−');
    case 'not-proposed':
      return reason.note;
    case 'finding':
      return `${reason.remark.check}: ${reason.remark.message}`;
    default:
      return '';
  }
}

/** "+5.2", "−4.8"; beyond the reach of the scales without a figure. */
function units(value: number): string {
  if (40 <= Math.abs(value)) return value < 0 ? '< −40' : '> +40';
  return `${0 <= value ? '+' : ''}${oneDecimal(value)}`;
}
