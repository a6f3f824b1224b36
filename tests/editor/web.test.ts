/** The same extension in a browser without any process behind it. */
import { afterAll, beforeAll, expect, it } from 'vitest';
import { startWebWorkbench, type WebWorkbench } from './web-workbench.ts';
import { boxOf } from './workbench.ts';

const PLAN = `use "shared.lyate"

step A "Enolate"
  solvent     water 30 mL
  charge      ketone 10 mmol
  base        NaOH 1.1 equiv
  deprotonate ketone at :1
`;
let workbench: WebWorkbench;

beforeAll(async () => {
  workbench = await startWebWorkbench({
    'plan.lyate': PLAN,
    'shared.lyate': 'compound ketone = O=C([CH3:1])c1ccccc1\n',
  });
});
afterAll(() => workbench?.stop());

it('a plan in memory is checked by a worker, with the file it uses', async () => {
  const { page } = workbench;
  await page.locator('.explorer-folders-view .monaco-list-row', { hasText: 'plan.lyate' }).first().dblclick();
  await page.locator('.tab.active[data-resource-name="plan.lyate"]').waitFor();
  const squiggle = page.locator('.editor-instance .squiggly-error').first();
  await squiggle.waitFor({ timeout: 120_000 });
  expect(await page.locator('.editor-instance .squiggly-error').count()).toBe(1);
  const box = await boxOf(squiggle);
  await page.mouse.move(box.x + box.width / 2, box.y + 2);
  const hover = page.locator('.monaco-hover:not(.hidden)', { hasText: 'transfer-uphill' });
  await hover.first().waitFor();
  await page.screenshot({ path: '.cache/screens/web.png' });
});
