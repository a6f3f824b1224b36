/** The page for reviewers: whole, escaped, without anything from elsewhere; and the comment. */
import { describe, expect, it } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import { citation } from '../../server/src/report/citation.ts';
import { htmlReview } from '../../server/src/report/html.ts';
import { markdownReview } from '../../server/src/report/markdown.ts';
import { reviewOf } from '../../server/src/report/review.ts';
import { tables } from '../support/tables.ts';

const PLAN = `plan "Review <me>"
compound K = O=C([CH3:1])c1ccccc1
compound E = CCOC(=O)Cl
step A "Too weak & <b>bold</b>"
  solvent water 30 mL
  charge K 10 mmol
  base NaOH 1.1 equiv
  deprotonate K at :1
  note "ask @jane <script>alert(1)</script>"
  note "\`code\` [link](javascript:alert(1))"
step B
  solvent water 30 mL
  charge K 10 mmol
  base NaOH 1.1 equiv
  deprotonate K at :1
  accept transfer-uphill "shown \\"by\\" NMR & trusted"
step C
  solvent water 20 mL
  charge <[Na+].[C-]#N> 10 mmol
  acid HCl 2 equiv
`;

const analyser = createAnalyser(tables);
const review = (text: string) =>
  reviewOf([analyseNow(analyser, { file: 'plans/<x>.lyate', text, language: 'lyate' })], [], '9.9.9');

describe('the page', () => {
  const page = htmlReview(review(PLAN));

  it('is one file: no script, nothing from elsewhere, and a policy that forbids both', () => {
    expect(page).toContain(
      "default-src 'none'; style-src 'unsafe-inline'; img-src data:; base-uri 'none'; form-action 'none'",
    );
    expect(page).not.toMatch(
      /<script|<iframe|<object|<link|<base|\son\w+\s*=|javascript:[^a]|@import|url\(/i,
    );
    for (const [, address] of page.matchAll(/(?:src|href)="([^"]*)"/g))
      expect(address).toMatch(/^(data:image\/|#)/);
  });

  it('shows what a plan says and reads none of it as markup', () => {
    expect(page).toContain('<h1>Review of Review &lt;me&gt;</h1>');
    expect(page).toContain('Too weak &amp; &lt;b&gt;bold&lt;/b&gt;');
    expect(page).toContain('ask @jane &lt;script&gt;alert(1)&lt;/script&gt;');
    expect(page).toContain('plans/&lt;x&gt;.lyate');
    expect(page).not.toContain('<b>');
  });

  it('has steps, structures, flasks, figures, findings with reasons, cautions, sources and versions', () => {
    expect(page.match(/<pre/g)).toHaveLength(3);
    expect(page).toContain('alt="Structure of K with the pKa of its sites"');
    expect(page).toContain('alt="Ladder of step A. On the water scale:');
    expect(page).toContain('alt="Forms over pH:');
    expect(page).toMatch(/<span class="kind">error<\/span> <code>transfer-uphill<\/code>/);
    expect(page).toMatch(/Why it matters: .*What to do: /);
    expect(page).toContain('Accepted: shown &quot;by&quot; NMR &amp; trusted');
    expect(page.slice(page.indexOf('Cautions'))).toContain('toxic-gas');
    expect(page).toMatch(/<code>[a-z-]+-\d{4}<\/code> <span>[^<]+\d{4}/);
    expect(page).toContain(`Lyate 9.9.9, tables ${tables.version}.`);
    expect(page).toContain('judgement of a qualified chemist');
  });

  it('can be read aloud: a language, one title, headings without gaps, heads of columns, words for pictures', () => {
    expect(page).toContain('<html lang="en">');
    const levels = [...page.matchAll(/<h([1-6])/g)].map(([, level]) => Number(level));
    expect(levels.filter((level) => level === 1)).toHaveLength(1);
    levels.forEach((level, place) => {
      expect(level - (levels[place - 1] ?? 0)).toBeLessThanOrEqual(1);
    });
    for (const [image] of page.matchAll(/<img[^>]*>/g)) expect(image).toMatch(/alt="[^"]+"/);
    for (const [head] of page.matchAll(/<th[ >][^>]*>/g)) expect(head).toContain('scope=');
    const ids = [...page.matchAll(/ id="([^"]*)"/g)].map(([, id]) => id);
    expect(new Set(ids).size).toBe(ids.length);
  });

  it('prints, and follows light and dark', () => {
    expect(page).toContain('@media print');
    expect(page).toContain('prefers-color-scheme:dark');
  });

  it('is there for a plan without steps too', () => {
    expect(htmlReview(review(''))).toContain('This plan has no step.');
    expect(htmlReview(reviewOf([], [], '1'))).toContain('0 errors');
  });

  it('says which values are the house’s own', () => {
    const base = review(PLAN);
    const [plan] = base.plans;
    const [step] = plan!.steps;
    const [flask] = step!.flasks;
    const rungs = flask!.picture.rungs.map((rung) => ({ ...rung, origin: 'house' }));
    const own = { ...flask!, picture: { ...flask!.picture, rungs } };
    const changed = { ...base, plans: [{ ...plan!, steps: [{ ...step!, flasks: [own] }] }] };
    expect(htmlReview(changed)).toContain('house file');
  });
});

describe('the comment', () => {
  const comment = markdownReview(review(PLAN));
  it('has the findings first, and calls nobody', () => {
    expect(comment.split('\n')[0]).toMatch(/^### Lyate: \d+ errors?/);
    expect(comment).toContain('- **error** `transfer-uphill`');
    expect(comment).toContain('Accepted: shown');
    expect(comment).not.toContain('@jane');
    expect(comment).toContain('\\<script\\>');
    expect(comment).not.toMatch(/[^\\]\]\(javascript/);
  });
  it('folds the flasks away', () => {
    expect(comment.match(/<details>/g)!.length).toBe(comment.match(/<\/details>/g)!.length);
    expect(comment).toMatch(/\| K \| C\d, C–H/);
  });
});

describe('a citation', () => {
  it('is one line', () => {
    expect(
      citation({
        id: 'x',
        title: 'On acids',
        author: [{ family: 'Ame', given: 'N.' }, { literal: 'A body' }],
        issued: { 'date-parts': [[1984]] },
        'container-title': 'Journal',
        volume: '3',
        page: '1-9',
        DOI: '10.1/x',
      }),
    ).toBe('Ame, N.; A body. On acids. Journal, 1984, 3, 1–9. doi:10.1/x.');
    expect(citation({ id: 'only' })).toBe('only');
  });
  it('is there for every work of the bibliography', () => {
    for (const work of tables.sources) expect(citation(work).length).toBeGreaterThan(20);
  });
});
