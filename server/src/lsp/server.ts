/**
 * The language server over any connection: answers to the client's first question, and who answers the others.
 *
 * Knows: the protocol.  Must not know: Node, the browser, chemistry.
 */
import {
  type Connection,
  DidChangeConfigurationNotification,
  DidChangeWatchedFilesNotification,
  type InitializeParams,
  type InitializeResult,
  TextDocumentSyncKind,
  TextDocuments,
} from 'vscode-languageserver';
import { TextDocument } from 'vscode-languageserver-textdocument';
import { createConfigurations } from './configurations.ts';
import type { ClientFiles, Door } from './door.ts';
import { createPlans, type Result } from './plans.ts';
import { CHECK_ALL, createCheckAll } from './requests/check-all.ts';
import { FIX_ALL, registerCodeActions } from './requests/code-actions.ts';
import { registerCompletion, registerSignatureHelp } from './requests/completion.ts';
import { registerDefinition } from './requests/definition.ts';
import { createDiagnostics, pulls } from './requests/diagnostics.ts';
import { registerFlaskAt } from './requests/flask-at.ts';
import { registerFormatting } from './requests/formatting.ts';
import { registerHints, registerLenses } from './requests/hints-and-lenses.ts';
import { registerHover } from './requests/hover.ts';
import { registerPages } from './requests/pages.ts';
import { registerHighlights, registerLinkedEditing, registerReferences } from './requests/references.ts';
import { registerRename } from './requests/rename.ts';
import {
  registerFolding,
  registerLinks,
  registerSelectionRanges,
  registerSemanticTokens,
  TOKEN_MODIFIERS,
  TOKEN_TYPES,
} from './requests/structure-of-text.ts';
import { registerSymbols } from './requests/symbols.ts';
import type { Session } from './session.ts';
import { type EditorSettings, readSettings } from './settings.ts';
import { PAGE_SCHEME, toDiagnostic } from './to-protocol.ts';

/** What a client without a configuration of its own may send with its first question. */
interface FirstOptions {
  readonly settings?: unknown;
  /** The client reads files for the server, which then needs no disk. */
  readonly readsFiles?: boolean;
}

/** Serves one client until the connection ends. */
export function startServer(connection: Connection, door: Door): void {
  const documents = new TextDocuments(TextDocument);
  connection.onInitialize((params) => {
    const options = (params.initializationOptions ?? {}) as FirstOptions;
    start(connection, documents, door, params, options);
    return answerTo(params);
  });
  documents.listen(connection);
  connection.listen();
}

function answerTo(params: InitializeParams): InitializeResult {
  const pull = pulls(params);
  return {
    serverInfo: { name: 'lyate' },
    capabilities: {
      positionEncoding: 'utf-16',
      textDocumentSync: {
        openClose: true,
        change: TextDocumentSyncKind.Incremental,
        save: { includeText: false },
      },
      hoverProvider: true,
      completionProvider: { triggerCharacters: [' ', ':', '"'] },
      signatureHelpProvider: { triggerCharacters: [' '] },
      definitionProvider: true,
      referencesProvider: true,
      documentHighlightProvider: true,
      renameProvider: { prepareProvider: true },
      linkedEditingRangeProvider: true,
      documentSymbolProvider: true,
      workspaceSymbolProvider: true,
      foldingRangeProvider: true,
      selectionRangeProvider: true,
      semanticTokensProvider: {
        legend: { tokenTypes: [...TOKEN_TYPES], tokenModifiers: [...TOKEN_MODIFIERS] },
        full: true,
      },
      documentLinkProvider: {},
      inlayHintProvider: true,
      codeLensProvider: {},
      codeActionProvider: { codeActionKinds: ['quickfix', FIX_ALL] },
      documentFormattingProvider: true,
      documentRangeFormattingProvider: true,
      executeCommandProvider: { commands: [CHECK_ALL] },
      ...(pull
        ? {
            diagnosticProvider: {
              identifier: 'lyate',
              interFileDependencies: true,
              workspaceDiagnostics: false,
            },
          }
        : {}),
      workspace: {
        workspaceFolders: { supported: true, changeNotifications: true },
        ...(params.capabilities.workspace?.textDocumentContent === undefined
          ? {}
          : { textDocumentContent: { schemes: [PAGE_SCHEME] } }),
      },
    },
  };
}

function start(
  connection: Connection,
  documents: TextDocuments<TextDocument>,
  door: Door,
  params: InitializeParams,
  options: FirstOptions,
): void {
  const { capabilities } = params;
  const log = (text: string) => connection.console.info(text);
  let folders = (params.workspaceFolders ?? []).map(({ uri }) => uri);
  const settings = new Map<string, Promise<EditorSettings>>();
  let sent: unknown = options.settings;

  const settingsOf = (uri: string): Promise<EditorSettings> => {
    const known = settings.get(uri);
    if (known !== undefined) return known;
    const asked = ask(uri).then((section) => {
      const read = readSettings(section);
      for (const problem of read.problems) log(`Settings: ${problem}.`);
      return read;
    });
    settings.set(uri, asked);
    return asked;
  };
  const ask = async (uri: string): Promise<unknown> => {
    if (!capabilities.workspace?.configuration) return sent;
    try {
      return await connection.workspace.getConfiguration({ scopeUri: uri, section: 'lyate' });
    } catch {
      return sent;
    }
  };

  const files = door.files(clientFiles(connection, options));
  const shown: { show: (result: Result) => void } = { show: () => {} };
  const configurations = createConfigurations({
    door,
    files,
    show: (uri, file) => {
      const context = { uri, uriOf: () => uri, pages: false };
      const diagnostics = (file?.findings ?? []).map((finding) => toDiagnostic(finding, context));
      void connection.sendDiagnostics({ uri, diagnostics });
    },
  });
  const plans = createPlans({
    door,
    files,
    configurations,
    folders: () => folders,
    document: (uri) => documents.get(uri),
    settingsOf,
    onResult: (result) => shown.show(result),
    onFailure: (uri, error) =>
      connection.console.error(
        `${uri} could not be analysed: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}`,
      ),
  });
  const session: Session = { connection, documents, plans, files, capabilities, folders: () => folders, log };
  const diagnostics = createDiagnostics(session);
  const checkAll = createCheckAll(session);
  shown.show = diagnostics.show;

  documents.onDidOpen(({ document: { uri } }) => {
    checkAll.opened(uri);
    diagnostics.due(uri);
    plans.opened(uri);
  });
  documents.onDidChangeContent(({ document: { uri } }) => plans.changed(uri));
  documents.onDidSave(({ document: { uri } }) => diagnostics.saved(uri));
  documents.onDidClose(({ document: { uri } }) => {
    settings.delete(uri);
    plans.closed(uri);
    diagnostics.closed(uri);
  });
  connection.onDidChangeConfiguration(({ settings: section }) => {
    settings.clear();
    sent = (section as { lyate?: unknown } | null)?.lyate ?? sent;
    plans.refreshAll();
  });
  connection.onDidChangeWatchedFiles(({ changes }) => {
    for (const { uri } of changes) plans.changedOnDisk(uri);
  });
  connection.onExecuteCommand(({ command }) => (command === CHECK_ALL ? checkAll.run() : null));
  connection.onInitialized(() => {
    if (capabilities.workspace?.didChangeConfiguration?.dynamicRegistration) {
      void connection.client.register(DidChangeConfigurationNotification.type, { section: 'lyate' });
    }
    if (capabilities.workspace?.didChangeWatchedFiles?.dynamicRegistration) {
      void connection.client.register(DidChangeWatchedFilesNotification.type, {
        watchers: [{ globPattern: '**/{*.lyate,*.md,*.markdown,*.csv,lyate.json}' }],
      });
    }
    if (capabilities.workspace?.workspaceFolders) {
      connection.workspace.onDidChangeWorkspaceFolders(({ added, removed }) => {
        const gone = new Set(removed.map(({ uri }) => uri));
        folders = [...folders.filter((uri) => !gone.has(uri)), ...added.map(({ uri }) => uri)];
        plans.refreshAll();
      });
    }
  });

  for (const register of [
    registerHover,
    registerCompletion,
    registerSignatureHelp,
    registerDefinition,
    registerReferences,
    registerHighlights,
    registerLinkedEditing,
    registerRename,
    registerSymbols,
    registerFolding,
    registerSelectionRanges,
    registerSemanticTokens,
    registerLinks,
    registerHints,
    registerLenses,
    registerCodeActions,
    registerFormatting,
    registerPages,
    registerFlaskAt,
  ]) {
    register(session);
  }
}

/** Requests that a client answers for a server that has no disk. */
function clientFiles(connection: Connection, { readsFiles }: FirstOptions): ClientFiles {
  if (readsFiles !== true) return { read: null, plans: null };
  return {
    read: (uri) => connection.sendRequest<string | null>('lyate/readFile', { uri }),
    plans: (root) => connection.sendRequest<string[]>('lyate/findPlans', { root }),
  };
}
