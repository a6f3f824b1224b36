/** The server as it ships: findings of chemistry, and answers that carry the figures of the flask. */

import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Hover, InlayHint } from 'vscode-languageserver';
import { bundle, startClient, type TestClient } from './client.ts';

const UPHILL = `compound K = O=C([CH3:1])c1ccccc1
step A "Enolate, or so it was meant"
  solvent water 30 mL
  charge K 1.2 g
  base NaOH 1.1 equiv
  deprotonate K at :1
`;
const uri = 'file:///nowhere/plan.lyate';
const place = (line: number, character: number) => ({ textDocument: { uri }, position: { line, character } });

const entries: [string, () => Promise<string[]>][] = [
  ['node.ts', async () => [await bundle('server/src/lsp/node.ts', '.cache/tests/server.cjs'), '--stdio']],
  [
    'lyate serve',
    async () => [await bundle('server/src/cli/main.ts', '.cache/tests/lyate.cjs'), 'serve', '--stdio'],
  ],
];

describe.each(entries)('%s', (_, command) => {
  let client: TestClient;
  beforeAll(async () => {
    client = await startClient(await command());
    client.open(uri, UPHILL);
  }, 60_000);
  afterAll(() => client?.stop());

  it('finds the transfer that goes uphill and points at base, site and solvent', async () => {
    const [found, ...more] = await client.diagnostics(uri, 1);
    expect(more).toEqual([]);
    expect(found).toMatchObject({
      code: 'transfer-uphill',
      severity: 1,
      range: { start: { line: 5, character: 19 }, end: { line: 5, character: 21 } },
    });
    const lines = found!.relatedInformation!.map(({ location }) => location.range.start.line);
    expect(lines.sort()).toEqual([2, 3, 4]);
  });

  it('shows the sites with their constants and sources', async () => {
    const { contents } = await client.request<Hover>('textDocument/hover', place(3, 9));
    const { value } = contents as { value: string };
    expect(value).toMatch(/\| C3 \|[^|]*\| 18\.3 ± \d\.\d \| water \| measured/);
  });

  it('shows amounts and the fate of the transfer between the words', async () => {
    const hints = await client.request<InlayHint[]>('textDocument/inlayHint', {
      textDocument: { uri },
      range: { start: { line: 0, character: 0 }, end: { line: 9, character: 0 } },
    });
    const byLine = new Map(hints.map(({ position, label }) => [position.line, label]));
    expect(byLine.get(3)).toBe('= 9.99 mmol');
    expect(byLine.get(4)).toBe('= 11 mmol');
    expect(byLine.get(5)).toMatch(/^log K −2\.6 ± \d\.\d, < 0\.01 %$/);
  });

  it('falls silent when the base is strong enough', async () => {
    const version = client.change(
      uri,
      null,
      UPHILL.replace('water 30 mL', 'THF 30 mL').replace('NaOH', 'LDA'),
    );
    expect((await client.diagnostics(uri, version)).filter(({ severity }) => severity! < 3)).toEqual([]);
  });
});
