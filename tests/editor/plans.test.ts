/** The packed extension in the real workbench: findings where they belong, and everything that is done with them. */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Locator } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { boxOf, startWorkbench, type Workbench } from './workbench.ts';

const MISTAKE = `plan "Two mistakes"

compound ketone = CC(=O)c1ccccc1

step A "Enolate"
  solvent THF 20 mL
  charge ketone 10 mmol
  base LDDA 1.05 equiv
  temperature -78 °C
  deprotonate ketone
`;
const UPHILL = `plan "Side chain"

compound ketone = O=C([CH3:1])c1ccccc1

step A "Enolate"
  solvent     water 30 mL
  charge      ketone 1.2 g
  base        NaOH 1.1 equiv
  deprotonate ketone at :1
`;
let workbench: Workbench;

beforeAll(async () => {
  workbench = await startWorkbench({
    'mistake.lyate': MISTAKE,
    'uphill.lyate': UPHILL,
    'structure.lyate': 'compound broken = CC(=O\nstep A\n  charge broken 1 mmol\n',
    'shared.lyate': 'compound acid = CC(=O)O\n',
    'uses.lyate':
      'use "shared.lyate"\nstep A\n  solvent water 5 mL\n  charge acid 1 mmol\n  isolate acid as neutral\n',
    'page.md': '# Notes\n\n```lyate\nstep A\n  base NaOOOH 1 mmol\n```\n',
    'type.lyate': 'compound ketone = CC(=O)C\n\nstep A\n  \n',
  });
});
afterAll(() => workbench?.stop());

/** Text of what a hover shows, waited for. */
async function hoverText(): Promise<string> {
  const box = workbench.page.locator('.monaco-hover:not(.hidden) .hover-contents').first();
  await box.waitFor();
  return (await workbench.page.locator('.monaco-hover:not(.hidden)').allInnerTexts()).join('\n');
}

/** Open hovers that hold a text. */
function hovers(text: string): Locator {
  return workbench.page.locator('.monaco-hover:not(.hidden)', { hasText: text }).first();
}

/** Moves the pointer off the text until no hover is left; one that still hangs over a word keeps the pointer from it. */
async function leaveHover(): Promise<void> {
  await workbench.page.mouse.move(640, 700);
  await workbench.page.locator('.monaco-hover:not(.hidden)').first().waitFor({ state: 'hidden' });
}

/**
 * Rests the pointer on a word until what is looked for hangs over it; again where the editor
 * draws the line anew or a code lens that comes late moves it down.
 */
async function hoverUntil(word: Locator, wanted: Locator): Promise<void> {
  for (let attempt = 0; attempt < 4; attempt++) {
    await leaveHover();
    const box = await boxOf(word);
    await workbench.page.mouse.move(box.x + box.width / 2, box.y + box.height / 2, { steps: 4 });
    try {
      await wanted.waitFor({ timeout: 15_000 });
      return;
    } catch {
      // The word has moved: once more.
    }
  }
  const shown = await workbench.page.locator('.monaco-hover:not(.hidden)').allInnerTexts();
  throw new Error(`what is looked for never came; over the word hangs: ${shown.join(' | ')}`);
}

/** Types one word over another that stands at column 15. */
async function replaceInLine(line: number, word: string, other: string): Promise<void> {
  await workbench.goTo(line, 15);
  for (let at = 0; at < word.length; at++) await workbench.page.keyboard.press('Delete');
  await workbench.page.keyboard.type(other);
  await workbench.page.keyboard.press('Escape');
}

/** Everything the editor shows, as text. */
async function editorText(): Promise<string> {
  const lines = await workbench.page.locator('.editor-instance .view-lines .view-line').all();
  const placed = await Promise.all(
    lines.map(async (line) => ({
      y: (await line.boundingBox())?.y ?? 0,
      text: (await line.textContent()) ?? '',
    })),
  );
  return placed
    .sort((a, b) => a.y - b.y)
    .map(({ text }) => text.replaceAll('\u00a0', ' '))
    .join('\n');
}

describe('chemistry', () => {
  it('a transfer that goes uphill is underlined at its site, and the hover gives the figures', async () => {
    await workbench.openFile('uphill.lyate');
    const squiggle = workbench.squiggles('error').first();
    // The first findings wait for the workbench to wake its extensions.
    await squiggle.waitFor({ timeout: 140_000 });
    const box = await boxOf(squiggle);
    const site = await boxOf(
      workbench.page.locator('.view-line', { hasText: 'deprotonate' }).getByText(':1').first(),
    );
    expect(Math.abs(box.x - site.x)).toBeLessThan(3);
    await hoverUntil(squiggle, hovers('transfer-uphill'));
    const text = await hoverText();
    expect(text).toContain('transfer-uphill');
    expect(text).toMatch(/too weak/);
    await workbench.screenshot('uphill');
    await leaveHover();
  });

  it('its compound shows structure and sites', async () => {
    const name = workbench.page.locator('.view-line', { hasText: 'charge' }).getByText('ketone').first();
    const table = workbench.page.locator('.monaco-hover:not(.hidden) table', { hasText: '18.3' }).first();
    await hoverUntil(name, table);
    await workbench.screenshot('hover-sites');
    await leaveHover();
  });

  it('a strong base in an ether clears it', async () => {
    await replaceInLine(6, 'water', 'THF');
    await replaceInLine(8, 'NaOH', 'LDA');
    await expect.poll(() => workbench.squiggles('error').count(), { timeout: 15_000 }).toBe(0);
  });
});

describe('findings', () => {
  it('underline the exact word, and the hover says why', async () => {
    await workbench.openFile('mistake.lyate');
    const squiggle = workbench.squiggles('error').first();
    await squiggle.waitFor();
    const box = await boxOf(squiggle);
    const word = await boxOf(workbench.page.getByText('LDDA', { exact: true }).first());
    expect(Math.abs(box.x - word.x)).toBeLessThan(3);
    expect(Math.abs(box.width - word.width)).toBeLessThan(6);
    await hoverUntil(squiggle, hovers('unknown-name'));
    const text = await hoverText();
    expect(text).toContain('unknown-name');
    expect(text).toContain('LDA');
    await workbench.screenshot('squiggle-and-hover');
    await leaveHover();
  });

  it('stand in the list of problems', async () => {
    await workbench.page.keyboard.press('Control+Shift+M');
    const row = workbench.page.locator('.markers-panel .monaco-list-row', { hasText: 'LDDA' }).first();
    await row.waitFor();
    expect(await row.textContent()).toContain('unknown-name');
    await workbench.page.keyboard.press('Control+Shift+M');
  });

  it('go by a quick fix from the keyboard', async () => {
    await workbench.goTo(8, 8);
    await workbench.page.keyboard.press('Control+.');
    const action = workbench.page
      .locator('.action-widget .monaco-list-row.action', { hasText: 'Write LDA' })
      .first();
    await action.waitFor();
    await workbench.screenshot('quick-fix');
    await action.click();
    await expect.poll(editorText, { timeout: 10_000 }).toContain('base LDA 1.05 equiv');
    await expect.poll(() => workbench.squiggles('error').count(), { timeout: 10_000 }).toBe(0);
  });

  it('come back and go again as the text is edited', async () => {
    await workbench.goTo(8, 11);
    await workbench.page.keyboard.type('x');
    await workbench.squiggles('error').first().waitFor();
    await workbench.page.keyboard.press('Backspace');
    await expect.poll(() => workbench.squiggles('error').count(), { timeout: 10_000 }).toBe(0);
  });

  it('stay right through a storm of undo and redo', async () => {
    await workbench.goTo(8, 11);
    await workbench.page.keyboard.type('abcdefgh', { delay: 15 });
    for (let round = 0; round < 12; round++) await workbench.page.keyboard.press('Control+Z');
    for (let round = 0; round < 12; round++) await workbench.page.keyboard.press('Control+Y');
    await workbench.squiggles('error').first().waitFor();
    for (let round = 0; round < 8; round++) await workbench.page.keyboard.press('Backspace');
    await expect.poll(editorText, { timeout: 10_000 }).toContain('base LDA 1.05 equiv');
    await expect.poll(() => workbench.squiggles('error').count(), { timeout: 10_000 }).toBe(0);
  });

  it('stand in the fences of a page', async () => {
    await workbench.openFile('page.md');
    await workbench.squiggles('error').first().waitFor();
  });
});

describe('answers', () => {
  it('a structure that cannot be read is mended', async () => {
    await workbench.openFile('structure.lyate');
    await workbench.squiggles('error').first().waitFor();
    await workbench.goTo(1, 22);
    await workbench.page.keyboard.press('Control+.');
    const action = workbench.page
      .locator('.action-widget .monaco-list-row.action', { hasText: 'CC(=O)' })
      .first();
    await action.waitFor();
    await action.click();
    await expect.poll(editorText, { timeout: 10_000 }).toContain('CC(=O)');
    await expect.poll(() => workbench.squiggles('error').count(), { timeout: 10_000 }).toBe(0);
  });

  it('a compound shows its structure', async () => {
    await workbench.openFile('mistake.lyate');
    const name = workbench.page
      .locator('.view-line', { hasText: 'charge ketone' })
      .getByText('ketone')
      .first();
    const picture = workbench.page.locator('.monaco-hover:not(.hidden) img[src^="data:image/svg"]').first();
    await hoverUntil(name, picture);
    await workbench.screenshot('hover-structure');
    await leaveHover();
  });

  it('completion offers what fits the place', async () => {
    await workbench.openFile('type.lyate');
    await workbench.goTo(4, 3);
    await workbench.page.keyboard.type('deprotonate ket');
    const row = workbench.page.locator('.suggest-widget .monaco-list-row', { hasText: 'ketone' }).first();
    await row.waitFor();
    await workbench.page.keyboard.press('Tab');
    await expect.poll(editorText).toContain('deprotonate ketone');
  });

  it('a compound is renamed in every file that names it', async () => {
    await workbench.openFile('uses.lyate');
    await workbench.goTo(4, 11);
    await workbench.page.keyboard.press('F2');
    const box = workbench.page.locator('.rename-box input');
    await box.waitFor();
    await box.fill('vinegar');
    await workbench.page.keyboard.press('Enter');
    await expect.poll(editorText, { timeout: 15_000 }).toContain('isolate vinegar as neutral');
    await workbench.openFile('shared.lyate');
    await expect.poll(editorText, { timeout: 15_000 }).toContain('compound vinegar');
  });

  it('F12 goes to the definition in another file', async () => {
    await workbench.openFile('uses.lyate');
    await workbench.goTo(4, 12);
    await workbench.page.keyboard.press('F12');
    await workbench.page.locator('.tab.active[data-resource-name="shared.lyate"]').waitFor();
  });

  it('all plans are checked on command, also those that are not open', async () => {
    await workbench.command('Lyate: Check All Plans in the Workspace');
    await workbench.page
      .locator('.notification-toast', { hasText: /checked \d+ plans/ })
      .first()
      .waitFor();
  });
});

describe('the server', () => {
  it('is started anew when it dies, and the findings come back', async () => {
    await workbench.openFile('page.md');
    await workbench.squiggles('error').first().waitFor();
    const killed = childrenOf(workbench.server.pid!).filter((pid) =>
      commandOf(pid).includes('dist/server.cjs'),
    );
    expect(killed.length).toBe(1);
    process.kill(killed[0]!, 'SIGKILL');
    await expect
      .poll(
        () =>
          childrenOf(workbench.server.pid!).filter(
            (pid) => pid !== killed[0] && commandOf(pid).includes('dist/server.cjs'),
          ).length,
        { timeout: 30_000 },
      )
      .toBe(1);
    await workbench.squiggles('error').first().waitFor();
    await workbench.goTo(5, 14);
    await workbench.page.keyboard.type('x');
    await workbench.squiggles('error').first().waitFor();
  });

  it('comes back with a reload of the window', async () => {
    await workbench.reload();
    await workbench.openFile('structure.lyate');
    await workbench.openFile('page.md');
    await workbench.squiggles('error').first().waitFor({ timeout: 30_000 });
  });
});

/** All processes below one, by the system's own table. */
function childrenOf(pid: number): number[] {
  try {
    const own = readFileSync(join('/proc', String(pid), 'task', String(pid), 'children'), 'utf8')
      .split(' ')
      .filter((text) => text !== '')
      .map(Number);
    return own.flatMap((child) => [child, ...childrenOf(child)]);
  } catch {
    return [];
  }
}

function commandOf(pid: number): string {
  try {
    return readFileSync(join('/proc', String(pid), 'cmdline'), 'utf8');
  } catch {
    return '';
  }
}
