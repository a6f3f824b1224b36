/** A small client that starts a server as a process of its own and speaks with it over standard input and output. */
import { type ChildProcess, spawn } from 'node:child_process';
import { mkdirSync } from 'node:fs';
import { build } from 'esbuild';
import {
  createMessageConnection,
  type MessageConnection,
  StreamMessageReader,
  StreamMessageWriter,
} from 'vscode-jsonrpc/node';
import type { ClientCapabilities, Diagnostic, InitializeResult } from 'vscode-languageserver';

export interface Published {
  readonly uri: string;
  readonly version?: number;
  readonly diagnostics: Diagnostic[];
}

export interface TestClient {
  readonly connection: MessageConnection;
  readonly process: ChildProcess;
  readonly published: Published[];
  readonly log: string[];
  /** What the server is told when it asks for its settings. */
  settings: unknown;
  readonly answer: InitializeResult;
  open(uri: string, text: string, languageId?: string): void;
  /** Replaces a part of a document; gives it the next version. */
  change(uri: string, range: Diagnostic['range'] | null, text: string): number;
  close(uri: string): void;
  request<Answer>(method: string, params: unknown): Promise<Answer>;
  /** The diagnostics of a version, as soon as they are there. */
  diagnostics(uri: string, version: number): Promise<Diagnostic[]>;
  /** What was last told about a document. */
  last(uri: string): Published | undefined;
  stop(): Promise<void>;
}

/** Bundles an entry the way the build does. */
export async function bundle(entry: string, outfile: string): Promise<string> {
  mkdirSync('.cache/tests', { recursive: true });
  await build({
    bundle: true,
    platform: 'node',
    target: 'node20',
    format: 'cjs',
    logLevel: 'warning',
    define: { 'import.meta.url': 'ownAddress' },
    banner: { js: "const ownAddress=require('node:url').pathToFileURL(__filename).href;" },
    alias: { 'jsonc-parser': 'jsonc-parser/lib/esm/main.js' },
    entryPoints: [entry],
    outfile,
  });
  return outfile;
}

export const PUSH: ClientCapabilities = {
  workspace: {
    configuration: true,
    workspaceFolders: true,
    didChangeConfiguration: { dynamicRegistration: true },
    didChangeWatchedFiles: { dynamicRegistration: true },
  },
  textDocument: {
    publishDiagnostics: { versionSupport: true, relatedInformation: true, codeDescriptionSupport: true },
    hover: { contentFormat: ['markdown', 'plaintext'] },
  },
};

export async function startClient(
  command: readonly string[],
  { folder, capabilities = PUSH }: { folder?: string; capabilities?: ClientCapabilities } = {},
): Promise<TestClient> {
  const child = spawn(process.execPath, command, { stdio: ['pipe', 'pipe', 'inherit'] });
  const connection = createMessageConnection(
    new StreamMessageReader(child.stdout!),
    new StreamMessageWriter(child.stdin!),
  );
  const published: Published[] = [];
  const log: string[] = [];
  const waiting = new Set<() => void>();
  const versions = new Map<string, number>();
  let settings: unknown = {};
  connection.onNotification('textDocument/publishDiagnostics', (params: Published) => {
    published.push(params);
    for (const look of waiting) look();
  });
  connection.onNotification('window/logMessage', ({ message }: { message: string }) => {
    log.push(message);
  });
  connection.onRequest('workspace/configuration', ({ items }: { items: unknown[] }) =>
    items.map(() => settings),
  );
  connection.onRequest('client/registerCapability', () => null);
  connection.onRequest('window/workDoneProgress/create', () => null);
  connection.onRequest('workspace/diagnostic/refresh', () => null);
  connection.listen();
  const answer = await connection.sendRequest<InitializeResult>('initialize', {
    processId: process.pid,
    rootUri: folder ?? null,
    workspaceFolders: folder === undefined ? null : [{ uri: folder, name: 'plans' }],
    capabilities,
  });
  void connection.sendNotification('initialized', {});
  return {
    connection,
    process: child,
    published,
    log,
    answer,
    get settings() {
      return settings;
    },
    set settings(value) {
      settings = value;
    },
    open(uri, text, languageId = 'lyate') {
      versions.set(uri, 1);
      void connection.sendNotification('textDocument/didOpen', {
        textDocument: { uri, languageId, version: 1, text },
      });
    },
    change(uri, range, text) {
      const version = versions.get(uri)! + 1;
      versions.set(uri, version);
      void connection.sendNotification('textDocument/didChange', {
        textDocument: { uri, version },
        contentChanges: [range === null ? { text } : { range, text }],
      });
      return version;
    },
    close(uri) {
      void connection.sendNotification('textDocument/didClose', { textDocument: { uri } });
    },
    request: (method, params) => connection.sendRequest(method, params),
    diagnostics(uri, version) {
      return new Promise((resolve, reject) => {
        const timer = setTimeout(() => {
          waiting.delete(look);
          reject(new Error(`no diagnostics of version ${version} of ${uri}; log: ${log.join('\n')}`));
        }, 10_000);
        const look = () => {
          const found = published.filter((each) => each.uri === uri && each.version === version).at(-1);
          if (found === undefined) return;
          clearTimeout(timer);
          waiting.delete(look);
          resolve(found.diagnostics);
        };
        waiting.add(look);
        look();
      });
    },
    last: (uri) => published.filter((each) => each.uri === uri).at(-1),
    async stop() {
      const ended = new Promise((resolve) => child.once('exit', resolve));
      await connection.sendRequest('shutdown');
      void connection.sendNotification('exit');
      await ended;
      connection.dispose();
    },
  };
}
