/**
 * Starts a real workbench with the packed extension and a workspace of its own, and drives it like a person would.
 *
 * Every run has a fresh data folder, because unsaved edits come back otherwise.
 */
import { type ChildProcess, execFileSync, spawn } from 'node:child_process';
import { mkdirSync, mkdtempSync, writeFileSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { dirname, join, resolve } from 'node:path';
import { type Browser, chromium, type Frame, type Locator, type Page } from 'playwright-core';
import { BROWSER, NODE, WORKBENCH } from './fetch.ts';

const SETTINGS = {
  'security.workspace.trust.enabled': false,
  'workbench.startupEditor': 'none',
  'files.autoSave': 'off',
  'telemetry.telemetryLevel': 'off',
  'chat.disableAIFeatures': true,
  'workbench.secondarySideBar.defaultVisibility': 'hidden',
  'extensions.autoUpdate': false,
  'extensions.autoCheckUpdates': false,
  'editor.minimap.enabled': false,
};
const ARGUMENTS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

export interface Workbench {
  readonly page: Page;
  /** Folder on disk that is open. */
  readonly folder: string;
  readonly server: ChildProcess;
  openFile(name: string): Promise<void>;
  /** Runs a command by its title, as the command palette lists it. */
  command(title: string): Promise<void>;
  /** Puts the cursor somewhere, lines and columns from 1. */
  goTo(line: number, column: number): Promise<void>;
  /** Squiggles of a severity that can be seen. */
  squiggles(severity: 'error' | 'warning' | 'info'): Locator;
  screenshot(name: string): Promise<void>;
  /** Chooses a colour theme by its name in the list of themes. */
  theme(name: string): Promise<void>;
  /** The page inside the webview that is shown. */
  webview(): Promise<Frame>;
  reload(): Promise<void>;
  stop(): Promise<void>;
}

/** Opens a workspace of these files. */
export async function startWorkbench(
  files: Readonly<Record<string, string>>,
  settings: Readonly<Record<string, unknown>> = {},
): Promise<Workbench> {
  const place = mkdtempSync(join(tmpdir(), 'lyate-workbench-'));
  const [folder, data] = [join(place, 'plans'), join(place, 'data')];
  for (const [name, text] of Object.entries({ '.git/HEAD': 'ref: refs/heads/main\n', ...files })) {
    write(join(folder, name), text);
  }
  write(join(data, 'data/User/settings.json'), JSON.stringify({ ...SETTINGS, ...settings }));
  const program = [
    join(WORKBENCH, 'out/server-main.js'),
    '--accept-server-license-terms',
    '--server-data-dir',
    data,
    '--telemetry-level',
    'off',
  ];
  execFileSync(NODE, [...program, '--install-extension', resolve('.cache/lyate.vsix')], { stdio: 'ignore' });
  const port = await freePort();
  const server = spawn(
    NODE,
    [...program, '--host', '127.0.0.1', '--port', String(port), '--without-connection-token'],
    { stdio: 'ignore', detached: true },
  );
  const address = `http://127.0.0.1:${port}`;
  await answers(`${address}/version`);
  const browser = await chromium.launch({ executablePath: BROWSER, args: ARGUMENTS });
  const page = await browser.newPage({ viewport: { width: 1280, height: 800 } });
  // Generous, because the machine that runs this may be busy with much else.
  page.setDefaultTimeout(60_000);
  await page.goto(`${address}/?folder=${folder}`);
  await ready(page);
  return driver(page, browser, server, folder);
}

function driver(page: Page, browser: Browser, server: ChildProcess, folder: string): Workbench {
  const quickInput = page.locator('.quick-input-widget .quick-input-box input');
  /** Opens quick open, which the workbench swallows while it is still busy. */
  const quickOpen = async (text: string) => {
    for (let attempt = 0; attempt < 20; attempt++) {
      await page.keyboard.press('Control+P');
      try {
        await quickInput.waitFor({ state: 'visible', timeout: 1000 });
        break;
      } catch {
        await page.keyboard.press('Escape');
      }
    }
    await quickInput.fill(text);
  };
  return {
    page,
    folder,
    server,
    async theme(name) {
      await this.command('Preferences: Color Theme');
      await page.locator('.quick-input-list .monaco-list-row', { hasText: 'Modern' }).first().waitFor();
      await quickInput.fill(name);
      await page.locator('.quick-input-list .monaco-list-row', { hasText: name }).first().click();
      await quickInput.waitFor({ state: 'hidden' });
    },
    async webview() {
      const inner = page.frameLocator('iframe.webview').frameLocator('#active-frame').locator('body');
      await inner.waitFor();
      return (await (await inner.elementHandle())?.ownerFrame())!;
    },
    async openFile(name) {
      // From the tree, because a search for files needs a program that the registry does not bring.
      await page.locator('.explorer-folders-view .monaco-list-row', { hasText: name }).first().dblclick();
      await page.locator(`.tab.active[data-resource-name="${name}"]`).waitFor();
      await page.locator('.editor-instance .view-lines .view-line').first().waitFor();
    },
    async command(title) {
      await quickOpen(`>${title}`);
      await page.locator('.quick-input-list .monaco-list-row', { hasText: title }).first().click();
    },
    async goTo(line, column) {
      await quickOpen(`:${line}:${column}`);
      await page.keyboard.press('Enter');
      await quickInput.waitFor({ state: 'hidden' });
    },
    squiggles: (severity) => page.locator(`.editor-instance .squiggly-${severity}`),
    async screenshot(name) {
      mkdirSync('.cache/screens', { recursive: true });
      await page.screenshot({ path: `.cache/screens/${name}.png` });
    },
    async reload() {
      await page.reload();
      await ready(page);
    },
    async stop() {
      await browser.close();
      // The process leads a group of its own, so that its children end with it.
      if (server.pid !== undefined && server.exitCode === null) process.kill(-server.pid, 'SIGTERM');
    },
  };
}

/** Where something stands, waited for: the editor may just be drawing its line anew. */
export async function boxOf(
  locator: Locator,
): Promise<{ x: number; y: number; width: number; height: number }> {
  for (let attempt = 0; attempt < 50; attempt++) {
    const box = await locator.boundingBox();
    if (box !== null) return box;
    await new Promise((later) => setTimeout(later, 100));
  }
  throw new Error('it is never drawn');
}

async function ready(page: Page): Promise<void> {
  await page
    .locator('.monaco-workbench .part.statusbar .statusbar-item')
    .first()
    .waitFor({ timeout: 60_000 });
}

function write(path: string, text: string): void {
  mkdirSync(dirname(path), { recursive: true });
  writeFileSync(path, text);
}

function freePort(): Promise<number> {
  return new Promise((found) => {
    const probe = createServer();
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address();
      probe.close(() => found(typeof address === 'object' && address !== null ? address.port : 0));
    });
  });
}

async function answers(address: string): Promise<void> {
  for (let attempt = 0; attempt < 300; attempt++) {
    try {
      if ((await fetch(address)).ok) return;
    } catch {
      // Not up yet.
    }
    await new Promise((later) => setTimeout(later, 100));
  }
  throw new Error(`${address} never answered`);
}
