/** The server as a process: what it tells when, and that nothing takes it down. */
import { mkdirSync, mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type {
  CodeAction,
  CompletionItem,
  Diagnostic,
  DocumentSymbol,
  FoldingRange,
  Hover,
  Location,
  SelectionRange,
  TextEdit,
  WorkspaceEdit,
} from 'vscode-languageserver';
import { TextDocument } from 'vscode-languageserver-textdocument';
import { bundle, PUSH, startClient, type TestClient } from './client.ts';

const folder = mkdtempSync(join(tmpdir(), 'lyate-'));
mkdirSync(join(folder, '.git'));
const at = (name: string) => pathToFileURL(join(folder, name)).toString();
const PLAN = `compound 1 = CC(=O)[CH2:1]C
step A "First"
  solvent THF 20 mL
  charge  1 10 mmol
  base    NaOEt 1.1 equiv
  deprotonate 1 at :1
`;
let entry: string;
let client: TestClient;
let count = 0;
/** An address nobody has used yet. */
const fresh = () => at(`plan-${++count}.lyate`);
const range = (line: number, from: number, to = from): Diagnostic['range'] => ({
  start: { line, character: from },
  end: { line, character: to },
});
const place = (uri: string, line: number, character: number) => ({
  textDocument: { uri },
  position: { line, character },
});
const checks = (diagnostics: readonly Diagnostic[]) => diagnostics.map(({ code }) => code);

beforeAll(async () => {
  entry = await bundle('tests/lsp/stand-in-server.ts', '.cache/tests/stand-in-server.cjs');
  client = await startClient([entry, '--stdio'], { folder: pathToFileURL(folder).toString() });
});
afterAll(() => client?.stop());

describe('diagnostics', () => {
  it('come with the version they belong to, at the exact place', async () => {
    const uri = fresh();
    client.open(uri, PLAN.replace('NaOEt', 'NaOOH'));
    const [found, ...more] = await client.diagnostics(uri, 1);
    expect(more).toEqual([]);
    expect(found).toMatchObject({
      code: 'unknown-name',
      severity: 1,
      source: 'lyate',
      range: range(4, 10, 15),
    });
  });

  it('go when the last mistake goes, and when the document is closed', async () => {
    const uri = fresh();
    client.open(uri, PLAN.replace('NaOEt', 'NaOOH'));
    expect(checks(await client.diagnostics(uri, 1))).toEqual(['unknown-name']);
    const version = client.change(uri, range(4, 10, 15), 'NaOEt');
    expect(await client.diagnostics(uri, version)).toEqual([]);
    client.change(uri, range(4, 10, 15), 'Na');
    client.close(uri);
    await client.request('textDocument/foldingRange', { textDocument: { uri } });
    await expect.poll(() => client.last(uri)?.diagnostics).toEqual([]);
  });

  it('are never those of a version that is no longer there', async () => {
    const uri = fresh();
    client.open(uri, PLAN);
    await client.diagnostics(uri, 1);
    let last = 1;
    for (let round = 0; round < 30; round++) last = client.change(uri, range(4, 10, 10), 'x');
    const before = client.published.length;
    expect(checks(await client.diagnostics(uri, last))).toEqual(['unknown-name']);
    const versions = client.published
      .slice(before - 1)
      .filter((each) => each.uri === uri)
      .map(({ version }) => version!);
    expect(versions).toEqual([...versions].sort((a, b) => a - b));
  });

  it('are the same after many edits as for a fresh document of the same text', async () => {
    const uri = fresh();
    const edits: [Diagnostic['range'], string][] = [
      [range(2, 2, 9), 'slovent'],
      [range(0, 27, 27), '\ncompound 2 = c1ccccc1(\r\n'],
      [range(4, 0, 0), 'step B\n  base µNaH° 1 equiv // 🧪 "\n'],
      [{ start: { line: 1, character: 5 }, end: { line: 3, character: 0 } }, ''],
      [range(0, 0, 0), '\n\n'],
      [range(3, 0, 0), 'use "gone.lyate"\n'],
    ];
    client.open(uri, PLAN);
    let mirror = TextDocument.create(uri, 'lyate', 1, PLAN);
    for (const [where, text] of edits) {
      const version = client.change(uri, where, text);
      mirror = TextDocument.update(mirror, [{ range: where, text }], version);
      const twin = fresh();
      client.open(twin, mirror.getText());
      const now = await client.diagnostics(uri, version);
      expect(now).toEqual(
        JSON.parse(JSON.stringify(await client.diagnostics(twin, 1)).replaceAll(twin, uri)),
      );
      client.close(twin);
    }
    expect(client.last(uri)?.diagnostics.length).toBeGreaterThan(1);
  });

  it('wait for a save, or stay away, where the settings say so', async () => {
    client.settings = { run: 'save' };
    const uri = fresh();
    client.open(uri, PLAN);
    expect(await client.diagnostics(uri, 1)).toEqual([]);
    const version = client.change(uri, range(4, 10, 15), 'NaOOH');
    await client.request('textDocument/hover', place(uri, 4, 11));
    expect(client.published.filter((each) => each.uri === uri && each.version === version)).toEqual([]);
    void client.connection.sendNotification('textDocument/didSave', { textDocument: { uri } });
    expect(checks(await client.diagnostics(uri, version))).toEqual(['unknown-name']);
    client.settings = { run: 'off' };
    void client.connection.sendNotification('workspace/didChangeConfiguration', { settings: null });
    await expect.poll(() => client.last(uri)?.diagnostics).toEqual([]);
    client.settings = { run: 3, severities: { 'unknown-name': 'off', nonsense: 'error' } };
    void client.connection.sendNotification('workspace/didChangeConfiguration', { settings: null });
    await expect.poll(() => client.log.join('\n')).toContain('lyate.run cannot be 3');
    expect(client.log.join('\n')).toContain('nonsense');
    client.settings = {};
    void client.connection.sendNotification('workspace/didChangeConfiguration', { settings: null });
    await expect.poll(() => checks(client.last(uri)?.diagnostics ?? [])).toEqual(['unknown-name']);
    client.close(uri);
  });

  it('of a plan that makes the analysis fail leave the others alone', async () => {
    const [broken, sound] = [fresh(), fresh()];
    client.open(broken, 'note "break"\n');
    client.open(sound, 'base\n');
    expect(checks(await client.diagnostics(sound, 1))).toEqual(['unreadable-line']);
    await expect.poll(() => client.log.join('\n')).toContain('broken on purpose');
    const version = client.change(broken, null, 'base\n');
    expect(checks(await client.diagnostics(broken, version))).toEqual(['unreadable-line']);
  });
});

describe('use', () => {
  it('reads the disk, and an open buffer beats it', async () => {
    writeFileSync(join(folder, 'shared.lyate'), 'compound K = CC(=O)C\n');
    const uri = fresh();
    client.open(uri, 'use "shared.lyate"\nstep A\n  charge K 1 mmol\n');
    expect(await client.diagnostics(uri, 1)).toEqual([]);
    const shared = at('shared.lyate');
    client.open(shared, 'compound L = CC(=O)C\n');
    await expect.poll(() => checks(client.last(uri)!.diagnostics)).toEqual(['unknown-name']);
    client.close(shared);
    await expect.poll(() => client.last(uri)!.diagnostics).toEqual([]);
    writeFileSync(join(folder, 'shared.lyate'), 'compound M = CC(=O)C\n');
    void client.connection.sendNotification('workspace/didChangeWatchedFiles', {
      changes: [{ uri: shared, type: 2 }],
    });
    await expect.poll(() => checks(client.last(uri)!.diagnostics)).toEqual(['unknown-name']);
  });

  it('reads nothing outside the root', async () => {
    const outside = mkdtempSync(join(tmpdir(), 'lyate-outside-'));
    writeFileSync(join(outside, 'secret.lyate'), 'compound K = CC(=O)C\n');
    const uri = fresh();
    client.open(uri, `use "../${outside.split('/').at(-1)}/secret.lyate"\nstep A\n  charge K 1 mmol\n`);
    expect(checks(await client.diagnostics(uri, 1))).toContain('bad-use');
  });

  it('renames across files, open or not, and finds every place', async () => {
    writeFileSync(join(folder, 'common.lyate'), 'compound ester = CCOC(=O)C\n');
    writeFileSync(join(folder, 'closed.lyate'), 'use "common.lyate"\nstep C\n  charge ester 2 mmol\n');
    const uri = fresh();
    client.open(uri, 'use "common.lyate"\nstep A\n  charge ester 1 mmol\n  isolate ester as neutral\n');
    await client.diagnostics(uri, 1);
    const places = await client.request<Location[]>('textDocument/references', {
      ...place(uri, 2, 10),
      context: { includeDeclaration: true },
    });
    expect(places.map((each) => `${each.uri.split('/').at(-1)}:${each.range.start.line}`).sort()).toEqual(
      ['closed.lyate:2', 'common.lyate:0', `${uri.split('/').at(-1)}:2`, `${uri.split('/').at(-1)}:3`].sort(),
    );
    const edit = await client.request<WorkspaceEdit>('textDocument/rename', {
      ...place(uri, 2, 10),
      newName: 'ethyl acetate 2',
    });
    expect(Object.keys(edit.changes!).length).toBe(3);
    expect(edit.changes![at('common.lyate')]).toEqual([
      { range: range(0, 9, 14), newText: '"ethyl acetate 2"' },
    ]);
    const definition = await client.request<Location>('textDocument/definition', place(uri, 3, 11));
    expect(definition).toEqual({ uri: at('common.lyate'), range: range(0, 9, 14) });
  });

  it('refuses a name that is taken', async () => {
    const uri = fresh();
    client.open(uri, 'compound a1 = CC\ncompound b2 = CCC\nstep A\n  charge a1 1 mmol\n  charge b2 1 mmol\n');
    await client.diagnostics(uri, 1);
    await expect(
      client.request('textDocument/rename', { ...place(uri, 0, 10), newName: 'b2' }),
    ).rejects.toThrow(/already/);
  });
});

describe('answers', () => {
  let uri: string;
  beforeAll(async () => {
    uri = fresh();
    client.open(uri, PLAN);
    await client.diagnostics(uri, 1);
  });

  it('hover over a keyword, a compound, an atom, an amount', async () => {
    const hover = async (line: number, character: number) => {
      const found = await client.request<Hover | null>('textDocument/hover', place(uri, line, character));
      return found === null ? null : JSON.stringify(found.contents);
    };
    expect(await hover(4, 3)).toContain('meant to act as a base');
    expect(await hover(3, 10)).toContain('data:image/svg+xml');
    expect(await hover(0, 21)).toContain('C4');
    expect(await hover(4, 16)).toContain('equiv');
    expect(await hover(90, 3)).toBeNull();
  });

  it('definition of a site is its atom', async () => {
    const found = await client.request<Location>('textDocument/definition', place(uri, 5, 20));
    expect(PLAN.split('\n')[0]!.slice(found.range.start.character, found.range.end.character)).toBe(
      '[CH2:1]',
    );
  });

  it('completion goes by the place', async () => {
    const twin = fresh();
    client.open(twin, `${PLAN}  ba\n  base \n  charge 1 5 \n  deprotonate 1 at \n  accept \n  note "ba`);
    const labels = async (line: number, character: number) =>
      (await client.request<CompletionItem[]>('textDocument/completion', place(twin, line, character))).map(
        ({ label }) => label,
      );
    expect(await labels(6, 4)).toContain('base');
    expect(await labels(6, 4)).not.toContain('plan');
    expect(await labels(7, 7)).toEqual(expect.arrayContaining(['1', 'NaOEt']));
    expect(await labels(8, 13)).toEqual(expect.arrayContaining(['mmol', 'equiv']));
    expect(await labels(9, 19)).toEqual([':1']);
    expect(await labels(10, 9)).toContain('unknown-name');
    expect(await labels(11, 10)).toEqual([]);
  });

  it('symbols, folds and selections nest', async () => {
    const symbols = await client.request<DocumentSymbol[]>('textDocument/documentSymbol', {
      textDocument: { uri },
    });
    expect(symbols.map(({ name }) => name)).toEqual(['1', 'A']);
    expect(symbols[1]!.children!.map(({ name }) => name)).toEqual(['deprotonate']);
    const folds = await client.request<FoldingRange[]>('textDocument/foldingRange', {
      textDocument: { uri },
    });
    expect(folds).toEqual([{ startLine: 1, endLine: 5 }]);
    const [selection] = await client.request<SelectionRange[]>('textDocument/selectionRange', {
      textDocument: { uri },
      positions: [{ line: 3, character: 13 }],
    });
    const texts: string[] = [];
    const lines = PLAN.split('\n');
    for (let each: SelectionRange | undefined = selection; each !== undefined; each = each.parent) {
      const { start, end } = each.range;
      texts.push(start.line === end.line ? lines[start.line]!.slice(start.character, end.character) : '…');
    }
    expect(texts).toEqual(['10', '10 mmol', 'charge  1 10 mmol', '  charge  1 10 mmol', '…']);
  });

  it('tokens cover keywords and never overlap', async () => {
    const { data } = await client.request<{ data: number[] }>('textDocument/semanticTokens/full', {
      textDocument: { uri },
    });
    expect(data.length % 5).toBe(0);
    const [line, start, length, type] = data;
    expect([line, start, length, type]).toEqual([0, 0, 8, 0]);
    for (let at = 5; at < data.length; at += 5)
      if (data[at] === 0) expect(data[at + 1]!).toBeGreaterThanOrEqual(data[at - 3]!);
  });

  it('quick fixes mend, and the safe ones together', async () => {
    const twin = fresh();
    const text = 'compound 1 = CC(=O\nstep A\n  BASE NaOEt 1 equiv\n  charge NaOEtt 1 mmol\n';
    client.open(twin, text);
    const diagnostics = await client.diagnostics(twin, 1);
    const actions = await client.request<CodeAction[]>('textDocument/codeAction', {
      textDocument: { uri: twin },
      range: { start: { line: 0, character: 0 }, end: { line: 3, character: 30 } },
      context: { diagnostics },
    });
    expect(actions.map(({ title }) => title)).toEqual(
      expect.arrayContaining(['Write CC(=O) (needs thought)', 'Write base', 'Write NaOEt (needs thought)']),
    );
    const [all] = await client.request<CodeAction[]>('textDocument/codeAction', {
      textDocument: { uri: twin },
      range: range(0, 0),
      context: { diagnostics: [], only: ['source.fixAll'] },
    });
    const fixed = TextDocument.applyEdits(
      TextDocument.create(twin, 'lyate', 1, text),
      all!.edit!.changes![twin]!,
    );
    expect(fixed).toBe(text.replace('BASE', 'base'));
  });

  it('formats whole and in part', async () => {
    const twin = fresh();
    const text = 'step A\n base   NaOEt  1 equiv\n charge   <CC>  1 mmol\n';
    client.open(twin, text);
    const whole = await client.request<TextEdit[]>('textDocument/formatting', {
      textDocument: { uri: twin },
      options: { tabSize: 2, insertSpaces: true },
    });
    const part = await client.request<TextEdit[]>('textDocument/rangeFormatting', {
      textDocument: { uri: twin },
      range: range(1, 0, 3),
      options: { tabSize: 2, insertSpaces: true },
    });
    expect(whole.length).toBe(2);
    expect(part).toEqual([whole[0]]);
  });

  it('plans in the fences of a page get the same', async () => {
    const page = at('page.md');
    client.open(
      page,
      '# Notes\n\n```lyate\nstep A\n  base NaOOH 1 mmol\n```\n\nbase of the hill\n',
      'markdown',
    );
    expect((await client.diagnostics(page, 1)).map((each) => each.range)).toEqual([range(4, 7, 12)]);
    const labels = await client.request<CompletionItem[]>('textDocument/completion', place(page, 7, 2));
    expect(labels).toEqual([]);
  });
});

describe('a client that asks by itself', () => {
  it('gets full and unchanged reports and no pushed ones', async () => {
    const capabilities = {
      ...PUSH,
      textDocument: { ...PUSH.textDocument, diagnostic: {} },
      workspace: { ...PUSH.workspace, diagnostics: { refreshSupport: true }, textDocumentContent: {} },
    };
    const other = await startClient([entry, '--stdio'], {
      folder: pathToFileURL(folder).toString(),
      capabilities,
    });
    const uri = fresh();
    other.open(uri, 'base\n');
    const ask = (previousResultId?: string) =>
      other.request<{ kind: string; resultId: string; items: Diagnostic[] }>('textDocument/diagnostic', {
        textDocument: { uri },
        ...(previousResultId === undefined ? {} : { previousResultId }),
      });
    const first = await ask();
    expect(checks(first.items)).toEqual(['unreadable-line']);
    expect(first.items[0]!.codeDescription).toEqual({ href: 'lyate-check:/unreadable-line.md' });
    expect((await ask(first.resultId)).kind).toBe('unchanged');
    other.change(uri, range(0, 4), ' NaOEt 1 mmol');
    const page = await other.request<{ text: string }>('workspace/textDocumentContent', {
      uri: 'lyate-check:/unreadable-line.md',
    });
    expect(page.text).toContain('# unreadable-line');
    expect((await ask(first.resultId)).kind).toBe('full');
    expect(other.published).toEqual([]);
    await other.stop();
  });
});

describe('nothing takes the server down', () => {
  it('requests it does not know, and parameters that make no sense', async () => {
    await expect(client.request('textDocument/nonsense', {})).rejects.toThrow();
    for (const method of [
      'hover',
      'completion',
      'definition',
      'codeAction',
      'rename',
      'selectionRange',
      'inlayHint',
    ]) {
      await client.request(`textDocument/${method}`, { textDocument: 7 }).catch(() => {});
      await client
        .request(`textDocument/${method}`, { textDocument: { uri: 'file:///nowhere' } })
        .catch(() => {});
      await client.request(`textDocument/${method}`, null).catch(() => {});
    }
    void client.connection.sendNotification('textDocument/didChange', {
      textDocument: { uri: 'file:///never-opened.lyate', version: 3 },
      contentChanges: [{ text: 'x' }],
    });
    void client.connection.sendNotification('textDocument/didClose', {
      textDocument: { uri: 'file:///never-opened.lyate' },
    });
    const uri = fresh();
    client.open(uri, 'base\n');
    expect(checks(await client.diagnostics(uri, 1))).toEqual(['unreadable-line']);
  });

  it('text with marks, tags and control characters is shown as text', async () => {
    const uri = fresh();
    const name = '<img src=x onerror=alert(1)> **b** [l](command:x) \u001b[31m';
    client.open(uri, `compound "${name}" = CC\nstep A\n  charge "${name}" 1 mmol\n`);
    const hover = await client.request<Hover>('textDocument/hover', place(uri, 2, 14));
    const { value } = hover.contents as { value: string };
    expect(value).not.toMatch(/(?<!\\)<img|[^\\]\*\*b|\]\(command/);
    expect(value).not.toContain('\u001b');
    expect(value).toContain('\\<img');
  });

  it('fifty open plans and a storm of edits', async () => {
    const uris = Array.from({ length: 50 }, fresh);
    for (const uri of uris) client.open(uri, PLAN);
    for (const uri of uris) for (let round = 0; round < 5; round++) client.change(uri, range(4, 10, 10), 'x');
    for (const uri of uris) expect(checks(await client.diagnostics(uri, 6))).toEqual(['unknown-name']);
    for (const uri of uris) client.close(uri);
  });
});
