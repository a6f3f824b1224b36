/** The page for reviewers in a real browser: nothing is fetched, nothing runs, it can be used without seeing. */
import { existsSync, readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { chromium } from 'playwright-core';
import { expect, it } from 'vitest';
import { analyseNow, createAnalyser } from '../../server/src/answers/analyse.ts';
import { htmlReview } from '../../server/src/report/html.ts';
import { reviewOf } from '../../server/src/report/review.ts';
import { tables } from '../support/tables.ts';

const BROWSER = ['/usr/bin/chromium', '/usr/bin/google-chrome'].find((path) => existsSync(path));
const PLAN = `plan "<img src=x onerror=document.title='taken'>"
compound K = O=C([CH3:1])c1ccccc1
step A "Hydroxide against a ketone"
  solvent water 30 mL
  charge K 10 mmol
  base NaOH 1.1 equiv
  deprotonate K at :1
step B
  solvent water 30 mL
  charge <[Na+].[C-]#N> 10 mmol
  acid HCl 2 equiv
  accept toxic-gas "scrubber"
`;

it.skipIf(BROWSER === undefined)(
  'stands alone, runs nothing and passes an audit (skipped without Chromium)',
  async () => {
    const source = { file: 'a.lyate', text: PLAN, language: 'lyate' as const };
    const page = htmlReview(reviewOf([analyseNow(createAnalyser(tables), source)], [], '1'));
    const browser = await chromium.launch({ executablePath: BROWSER!, args: ['--no-sandbox'] });
    try {
      const axe = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');
      for (const colorScheme of ['light', 'dark'] as const) {
        const tab = await browser.newPage({ colorScheme, bypassCSP: true });
        const asked: string[] = [];
        tab.on('request', (request) => {
          if (!request.url().startsWith('data:')) asked.push(request.url());
        });
        await tab.setContent(page, { waitUntil: 'load' });
        expect(await tab.title()).toContain('<img src=x');
        expect(
          await tab
            .locator('img')
            .evaluateAll((all) => all.every((each) => 0 < (each as HTMLImageElement).naturalWidth)),
        ).toBe(true);
        await tab.evaluate(axe);
        const violations = await tab.evaluate(async () => {
          const { axe: audit } = globalThis as unknown as {
            axe: { run(): Promise<{ violations: { id: string; nodes: unknown[] }[] }> };
          };
          return (await audit.run()).violations.map(
            ({ id, nodes }) => `${id} ${JSON.stringify(nodes).slice(0, 300)}`,
          );
        });
        expect(violations).toEqual([]);
        expect(asked).toEqual([]);
        await tab.emulateMedia({ media: 'print' });
        if (process.env.LYATE_PICTURES !== undefined)
          await tab.screenshot({
            path: `${process.env.LYATE_PICTURES}/${colorScheme}-print.png`,
            fullPage: true,
          });
        const width = await tab.evaluate(
          () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
        );
        expect(width).toBe(0);
        await tab.close();
      }
    } finally {
      await browser.close();
    }
  },
);
