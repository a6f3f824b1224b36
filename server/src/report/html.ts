/**
 * A review as one page: no script, nothing from elsewhere, readable aloud and on paper.
 *
 * Knows: reviews.  Must not know: plans, chemistry, files.
 * Invariants:                                                              (tests/report/review.test.ts)
 *  1. Every string of a plan is escaped; the policy in the head forbids scripts, frames and anything from elsewhere.
 *  2. Pictures have words beside or behind them; nothing is said by colour alone.
 */
import { amountOf, oneDecimal, percent } from '../answers/figures.ts';
import type { FlaskPicture } from '../answers/flask-picture.ts';
import { element, type Markup, text } from '../answers/svg.ts';
import { plain } from './plain.ts';
import type { Review, ReviewFinding, ReviewFlask, ReviewPlan, ReviewStep } from './review.ts';
import { countOpen } from './summary.ts';

const POLICY =
  "default-src 'none'; style-src 'unsafe-inline'; img-src data:; base-uri 'none'; form-action 'none'";
const ZERO_CELSIUS = 273.15;
const MOST_WORDS = 600;
const STYLE = `
:root{color-scheme:light dark;--ink:#1f2328;--faint:#59636e;--line:#d1d9e0;--ground:#fff;--code:#f6f8fa;--error:#b42318;--warning:#8a5a00;--information:#0550ae;--hint:#59636e}
@media (prefers-color-scheme:dark){:root{--ink:#e6edf3;--faint:#9198a1;--line:#3d444d;--ground:#0d1117;--code:#151b23;--error:#ff8a80;--warning:#e3b341;--information:#79c0ff;--hint:#9198a1}}
*{box-sizing:border-box}
body{margin:0 auto;padding:2rem 1.5rem 4rem;max-width:60rem;background:var(--ground);color:var(--ink);font:16px/1.5 system-ui,sans-serif}
h1{font-size:1.7rem;line-height:1.25;margin:0 0 .3rem}h2{font-size:1.35rem;margin:2.5rem 0 .5rem;border-bottom:1px solid var(--line)}
h3{font-size:1.15rem;margin:2rem 0 .4rem}h4{font-size:1rem;margin:1.3rem 0 .3rem}
p{margin:.4rem 0}.faint{color:var(--faint)}a{color:var(--information)}
pre{background:var(--code);border:1px solid var(--line);border-radius:6px;padding:.7rem .9rem;overflow-x:auto;font:13px/1.5 ui-monospace,monospace;margin:.4rem 0}
code{font-family:ui-monospace,monospace;font-size:.9em;overflow-wrap:anywhere}
.scroll{overflow-x:auto}table{border-collapse:collapse;width:100%;font-size:.875rem}caption{text-align:left;color:var(--faint);padding:.2rem 0}
th,td{text-align:left;padding:.25rem .6rem .25rem 0;border-bottom:1px solid var(--line);vertical-align:top}td.n,th.n{text-align:right;white-space:nowrap}
.structures{display:flex;flex-wrap:wrap;gap:1rem}figure{margin:.5rem 0}figcaption{font-size:.875rem;color:var(--faint);max-width:100%}
.structures figure{width:260px}img{max-width:100%;height:auto}
.finding{border-left:4px solid var(--line);padding:.2rem 0 .2rem .9rem;margin:.8rem 0}
.error{border-color:var(--error)}.warning{border-color:var(--warning)}.information{border-color:var(--information)}
.finding .kind{font-weight:600}.error .kind{color:var(--error)}.warning .kind{color:var(--warning)}.information .kind{color:var(--information)}
.why{font-size:.875rem}ul{padding-left:1.2rem}
@media print{:root{color-scheme:light;--ink:#000;--faint:#444;--line:#bbb;--ground:#fff;--code:#f6f6f6}
body{max-width:none;padding:0;font-size:10.5pt}h2{break-before:page}main>section:first-of-type h2{break-before:auto}
h3,h4{break-after:avoid}figure,.finding,tr,pre{break-inside:avoid}a{color:inherit;text-decoration:none}pre{white-space:pre-wrap}nav{display:none}
@page{margin:18mm 16mm}}
`;

/** The whole page. */
export function htmlReview(review: Review): string {
  const titles = review.plans.map(({ title, file }) => title ?? file);
  const title = titles.length === 1 ? titles[0]! : `${titles.length} plans`;
  const head = element(
    'head',
    {},
    { markup: '<meta charset="utf-8">' },
    { markup: `<meta http-equiv="Content-Security-Policy" content="${POLICY}">` },
    { markup: '<meta name="viewport" content="width=device-width,initial-scale=1">' },
    leaf('title', `Review of ${title}`),
    { markup: `<style>${STYLE}</style>` },
  );
  const body = element(
    'body',
    {},
    element('header', {}, leaf('h1', `Review of ${title}`), summary(review)),
    contents(review),
    element(
      'main',
      {},
      ...review.behind.map(({ file, findings }) =>
        section(
          leaf('h2', file),
          ...findings.map((finding) => findingBlock({ ...finding, page: null, excerpt: '' })),
        ),
      ),
      ...review.plans.map(planSection),
      sources(review),
    ),
  );
  return `<!doctype html>\n${element('html', { lang: 'en' }, head, body).markup}\n`;
}

function summary({ all, version, tables }: Review): Markup {
  const counts = countOpen(all);
  const accepted = all.flatMap(({ findings }) => findings.filter((finding) => finding.accepted)).length;
  return element(
    'div',
    {},
    leaf(
      'p',
      `${plural(counts.error, 'error')}, ${plural(counts.warning, 'warning')}, ${counts.information + counts.hint} for information, ${accepted} accepted.`,
    ),
    leaf('p', `Lyate ${version}, tables ${tables}.`, 'faint'),
    leaf(
      'p',
      'This page supports a decision. Local safety rules, local codes and the judgement of a qualified chemist come first.',
      'faint',
    ),
  );
}

function contents({ plans }: Review): Markup {
  const links = plans.flatMap((plan, place) =>
    plan.steps.map(({ label, title, findings, cautions }, index) => {
      const open = findings.length + cautions.length;
      const words = `${plans.length === 1 ? '' : `${plan.file}: `}Step ${label}${title === null ? '' : `, ${title}`}`;
      const after = { markup: open === 0 ? '' : ` (${open})` };
      return element(
        'li',
        {},
        element('a', { href: `#p${place}s${index}` }, { markup: inner(words) }),
        after,
      );
    }),
  );
  return links.length === 0
    ? { markup: '' }
    : element('nav', { 'aria-label': 'Steps' }, element('ul', {}, ...links));
}

function planSection({ file, title, outside, steps }: ReviewPlan, place: number): Markup {
  return section(
    leaf('h2', title ?? file),
    leaf('p', file, 'faint'),
    ...outside.map(findingBlock),
    ...(steps.length === 0 ? [leaf('p', 'This plan has no step.')] : []),
    ...steps.map((step, index) => stepSection(step, `p${place}s${index}`)),
  );
}

function stepSection(step: ReviewStep, id: string): Markup {
  const { label, title, firstLine, lines, notes, structures, flasks, findings, cautions, accepted } = step;
  return element(
    'section',
    { 'aria-labelledby': id },
    element('h3', { id }, { markup: inner(`Step ${label}${title === null ? '' : `: ${title}`}`) }),
    leaf('p', `Line ${firstLine} on.`, 'faint'),
    element('pre', { tabindex: 0, 'aria-label': `Text of step ${label}` }, leaf('code', lines.join('\n'))),
    ...notes.map((note) => leaf('p', `Note: ${note}`)),
    ...group('Findings', findings.map(findingBlock)),
    ...group('Cautions', cautions.map(findingBlock)),
    ...group('Accepted', accepted.map(findingBlock)),
    ...group(
      'Structures',
      structures.length === 0 ? [] : [element('div', { class: 'structures' }, ...structures.map(structure))],
    ),
    ...flasks.flatMap((flask) => flaskBlock(flask)),
  );
}

function group(title: string, blocks: readonly Markup[]): Markup[] {
  return blocks.length === 0 ? [] : [leaf('h4', title), ...blocks];
}

function findingBlock(finding: ReviewFinding): Markup {
  const { check, severity, range, message, confidence, excerpt, page, accepted, reason } = finding;
  const sure = confidence < 1 ? `, ${percent(confidence)} sure` : '';
  const place = `line ${range.start.line + 1}${sure}`;
  const more =
    page === null
      ? []
      : [
          element(
            'div',
            { class: 'why faint' },
            leaf('p', `Why it matters: ${page.why}`),
            leaf('p', `What to do: ${page.remedy}`),
            ...(page.sources.length === 0 ? [] : [leaf('p', `Sources: ${page.sources.join(', ')}`)]),
          ),
        ];
  return element(
    'div',
    { class: `finding ${severity}` },
    element(
      'p',
      {},
      leaf('span', severity, 'kind'),
      { markup: ' ' },
      leaf('code', check),
      { markup: ' ' },
      leaf('span', place, 'faint'),
    ),
    leaf('p', message),
    ...(excerpt === '' ? [] : [element('p', {}, leaf('code', excerpt.slice(0, MOST_WORDS)))]),
    ...(accepted ? [leaf('p', `Accepted: ${reason ?? ''}`)] : []),
    ...more,
  );
}

function structure({ name, smiles, image }: ReviewStep['structures'][number]): Markup {
  const caption = element(
    'figcaption',
    {},
    leaf('strong', name),
    { markup: ' ' },
    leaf('code', smiles.slice(0, MOST_WORDS)),
  );
  const words = `Structure of ${name} with the pKa of its sites`;
  return image === null
    ? element('figure', {}, caption)
    : element(
        'figure',
        {},
        element('img', { src: image, alt: plain(words), width: 260, height: 180 }),
        caption,
      );
}

function flaskBlock({ picture, words, ladder, speciation, forms }: ReviewFlask): Markup[] {
  const { line, step } = picture;
  return [
    leaf('h4', `Flask after line ${line + 1}`),
    leaf('p', conditions(picture)),
    element(
      'div',
      { class: 'scroll', tabindex: 0, role: 'region', 'aria-label': `Sites after line ${line + 1}` },
      table(picture),
    ),
    ...image(
      ladder,
      `Ladder of step ${step}. ${words}`,
      `Acidities of the sites; full where the proton is on, with the intended transfer.`,
    ),
    ...image(speciation, `Forms over pH: ${forms.join(', ')}`, 'Share of each form over pH.'),
  ];
}

/** What the flask is like, in one line. */
export function conditions({
  media,
  temperature,
  volume,
  assumedVolume,
  pH,
  ionicStrength,
  scale,
  gases,
}: FlaskPicture): string {
  const parts = [
    media.join('/'),
    `${(temperature - ZERO_CELSIUS).toFixed(0).replace('-', '−')} °C`,
    `${(1000 * volume).toPrecision(3).replace(/\.?0+$/, '')} mL${assumedVolume ? ' (assumed)' : ''}`,
    pH === null ? `no pH on the ${scale} scale` : `pH ${oneDecimal(pH)} on the ${scale} scale`,
    ...(ionicStrength === null ? [] : [`ionic strength ${ionicStrength.toPrecision(2)} M`]),
    ...gases.map(({ name, mol }) => `${amountOf(mol)} of ${name} leaves`),
  ];
  return `${parts.filter((part) => part !== '').join(', ')}.`;
}

function table({ rungs, scale, leftOut }: FlaskPicture): Markup {
  const heads: [string, string][] = [
    ['Substance', ''],
    ['Site', ''],
    [`pKa (${scale})`, 'n'],
    ['Origin', ''],
    ['Amount', 'n'],
    ['Protonated', 'n'],
  ];
  const more = leftOut === 0 ? '' : ` ${leftOut} more lie outside the range or take no part.`;
  return element(
    'table',
    {},
    leaf('caption', `Sites, most acidic first.${more}`),
    element(
      'thead',
      {},
      element('tr', {}, ...heads.map(([word, kind]) => leaf('th', word, kind, { scope: 'col' }))),
    ),
    element(
      'tbody',
      {},
      ...rungs.map(
        ({
          substance,
          atom,
          element: symbol,
          group: name,
          pKa,
          sd,
          origin,
          sources: cited,
          mol,
          protonated,
        }) =>
          element(
            'tr',
            {},
            leaf('th', substance, '', { scope: 'row' }),
            leaf('td', `${symbol}${atom}, ${name}`),
            leaf('td', `${oneDecimal(pKa)} ± ${oneDecimal(sd)}`, 'n'),
            leaf('td', [origin === 'house' ? 'house file' : origin, ...cited].join(', ')),
            leaf('td', amountOf(mol), 'n'),
            leaf('td', percent(protonated), 'n'),
          ),
      ),
    ),
  );
}

function image(svg: string | null, alt: string, caption: string): Markup[] {
  if (svg === null) return [];
  const src = `data:image/svg+xml,${encodeURIComponent(svg)}`;
  return [element('figure', {}, element('img', { src, alt: plain(alt) }), leaf('figcaption', caption))];
}

function sources({ sources: list }: Review): Markup {
  if (list.length === 0) return { markup: '' };
  return section(
    leaf('h2', 'Sources'),
    element(
      'ul',
      {},
      ...list.map(({ id, text: words }) =>
        element('li', {}, leaf('code', id), { markup: ' ' }, leaf('span', words)),
      ),
    ),
  );
}

function section(...parts: readonly Markup[]): Markup {
  return element('section', {}, ...parts);
}

/** An element that holds text only. */
function leaf(name: string, content: string, kind = '', more: Readonly<Record<string, string>> = {}): Markup {
  return text(name, kind === '' ? more : { ...more, class: kind }, plain(content));
}

/** Escaped text without an element around it. */
function inner(content: string): string {
  const { markup } = text('i', {}, plain(content));
  return markup.slice('<i>'.length, -'</i>'.length);
}

function plural(count: number, word: string): string {
  return `${count} ${word}${count === 1 ? '' : 's'}`;
}
