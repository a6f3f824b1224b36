/** The Flask view in the real workbench: it follows the cursor, can be read without eyes and used without a mouse. */
import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { Frame } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startWorkbench, type Workbench } from './workbench.ts';

const PLAN = `compound ketone = O=C([CH3:1])c1ccccc1
compound acid = OC(=O)c1ccccc1

step A "Enolate"
  solvent     THF 30 mL
  charge      ketone 10 mmol
  base        LDA 1.05 equiv
  deprotonate ketone at :1

step B "Salt"
  solvent     water 20 mL
  charge      acid 5 mmol
  base        NaHCO3 1.2 equiv
`;
const AXE = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');
let workbench: Workbench;
let view: Frame;

beforeAll(async () => {
  workbench = await startWorkbench({ 'plan.lyate': PLAN });
}, 150_000);
afterAll(() => workbench?.stop());

/** Ids of the accessibility rules that the page breaks. */
async function broken(): Promise<string[]> {
  await view.evaluate(AXE);
  return view.evaluate(async () => {
    const { axe } = globalThis as unknown as {
      axe: { run(): Promise<{ violations: { id: string; nodes: { html: string }[] }[] }> };
    };
    const { violations } = await axe.run();
    return violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html.slice(0, 160)}`);
  });
}

describe('the Flask view', () => {
  it('opens from the line above a step and shows its ladder', async () => {
    await workbench.openFile('plan.lyate');
    await workbench.page.locator('.codelens-decoration a').first().waitFor({ timeout: 140_000 });
    await workbench.goTo(8, 5);
    await workbench.page.locator('.codelens-decoration a').first().click();
    view = await workbench.webview();
    await view.getByRole('heading', { name: 'Step A · Enolate' }).waitFor();
    await view.locator('#ladder .rung').first().waitFor();
    const words = await view
      .locator('#ladder .rung')
      .evaluateAll((all) => all.map((each) => each.getAttribute('aria-label')));
    expect(words.some((each) => /^ketone, .*pKa/.test(each ?? ''))).toBe(true);
  });

  it('draws the transfer once the cursor is behind it', async () => {
    await workbench.goTo(8, 5);
    await view.locator('#ladder path.transfer').first().waitFor();
    expect(await view.locator('#ladder path.transfer').first().getAttribute('class')).toContain('yes');
    await workbench.screenshot('flask-light');
  });

  it('follows the cursor into another step, and the text as it is edited', async () => {
    await workbench.goTo(13, 5);
    await view.getByRole('heading', { name: 'Step B · Salt' }).waitFor();
    const before = await view.locator('#facts').textContent();
    expect(before).toMatch(/pH \d/);
    await workbench.goTo(12, 20);
    await workbench.page.keyboard.type('0');
    await expect.poll(() => view.locator('#facts').textContent(), { timeout: 15_000 }).not.toBe(before);
  });

  it('shows curves, balance and windows by the keyboard alone', async () => {
    await view.getByRole('tab', { name: 'Ladder' }).focus();
    for (const [name, what] of [
      ['Speciation', '#speciation path.curve'],
      ['Balance', 'table tbody tr'],
      ['Solvents', '#windows .solvent.mine'],
    ] as const) {
      await workbench.page.keyboard.press('ArrowRight');
      expect(await view.getByRole('tab', { name }).getAttribute('aria-selected')).toBe('true');
      expect(await view.locator(what).count()).toBeGreaterThan(0);
      await workbench.screenshot(`flask-${name.toLowerCase()}`);
    }
  });

  it('gives its table to the clipboard', async () => {
    await view.getByRole('tab', { name: 'Balance' }).click();
    await workbench.page.context().grantPermissions(['clipboard-read', 'clipboard-write']);
    await view.getByRole('button', { name: 'Copy as table' }).click();
    await workbench.page.locator('.statusbar-item', { hasText: 'in the clipboard' }).waitFor();
    const text = await workbench.page.evaluate(() => navigator.clipboard.readText());
    expect(text.split('\n')[0]).toBe('Substance\tAtom\tGroup\tpKa\t±\tmmol\tProtonated\tAs charged\tOrigin');
    expect(text).toContain('acid\t');
  });

  it.each([
    ['Light Modern', 'light'],
    ['Dark Modern', 'dark'],
    ['Dark High Contrast', 'high-contrast'],
  ])('breaks no rule of accessibility in %s', async (theme, name) => {
    await workbench.theme(theme);
    const ground = { light: 'vscode-light', dark: 'vscode-dark', 'high-contrast': 'vscode-high-contrast' }[
      name
    ]!;
    await view.locator(`body.${ground}`).waitFor();
    const found: string[] = [];
    for (const tab of ['Ladder', 'Speciation', 'Balance', 'Solvents']) {
      await view.getByRole('tab', { name: tab }).click();
      found.push(...(await broken()));
    }
    await view.getByRole('tab', { name: 'Ladder' }).click();
    await workbench.screenshot(`flask-ladder-${name}`);
    expect(found).toEqual([]);
  });
});
