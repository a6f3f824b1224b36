/** The server judges a plan as the command line does, whatever `lyate.json` says. */
import { rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Diagnostic } from 'vscode-languageserver';
import { bundleProgram, folderOf, start } from '../support/program.ts';
import { startClient, type TestClient } from './client.ts';

const PLAN = `compound 1 = CCOC(=O)[CH2:1]C(=O)OCC
step A
  solvent EtOH 50 mL
  charge 1 10 mmol
  base NaHCO3 1.1 equiv
  deprotonate 1 at :1
step B
  charge 1 10 mmol
  base House base 1.1 equiv
  protonate 1
`;
const CONFIGURATION = {
  severities: { 'transfer-uphill': 'hint', 'missing-amount': 'error' },
  thresholds: { error: 0.99 },
  concentration: 0.05,
  reagents: ['house/reagents.csv'],
  values: ['house/values.csv', 'house/gone.csv'],
  overrides: [{ files: ['drafts/**'], severities: { 'transfer-uphill': 'information' }, concentration: 2 }],
  wrong: true,
};
const FILES = {
  'lyate.json': JSON.stringify(CONFIGURATION, null, 2),
  'house/reagents.csv': 'name,smiles,roles\nHouse base,CCN(CC)CC,amine-base\n',
  'house/values.csv':
    'name,smiles,direction,scale,value\nmalonate,CCOC(=O)[CH2:1]C(=O)OCC,acid,water,12.1\nbad,C,acid,water,1\n',
  'a.lyate': PLAN,
  'drafts/b.lyate': PLAN,
  'plain/.git/HEAD': '',
  'plain/c.lyate': PLAN,
};
const SEVERITY = { error: 1, warning: 2, information: 3, hint: 4 } as const;

describe('the server and the command line', () => {
  let folder = '';
  let program = '';
  let client: TestClient;
  beforeAll(async () => {
    folder = folderOf(FILES);
    program = bundleProgram();
    client = await startClient([program, 'serve', '--stdio'], { folder: pathToFileURL(folder).toString() });
    // What the editor itself says counts only where there is no configuration.
    client.settings = { severities: { 'unknown-name': 'hint' } };
  });
  afterAll(async () => {
    await client.stop();
  });

  const plain = (diagnostics: readonly Diagnostic[]) =>
    diagnostics.map(({ range, code, severity, message }) => ({ range, check: code, severity, message }));
  const fromCommandLine = () => {
    const { stdout } = start(program, ['check', '--format', 'json', '.'], { cwd: folder });
    const { files } = JSON.parse(stdout) as {
      files: {
        file: string;
        findings: {
          range: Diagnostic['range'];
          check: string;
          severity: keyof typeof SEVERITY;
          message: string;
        }[];
      }[];
    };
    return new Map(
      files.map(({ file, findings }) => [
        file,
        findings.map(({ range, check, severity, message }) => ({
          range,
          check,
          severity: SEVERITY[severity],
          message,
        })),
      ]),
    );
  };

  it('find the same in the same places, in plans and in the files behind them', async () => {
    const uriOf = (file: string) => pathToFileURL(join(folder, file)).toString();
    const expected = fromCommandLine();
    for (const file of ['a.lyate', 'drafts/b.lyate']) {
      client.open(uriOf(file), PLAN);
      expect([file, plain(await client.diagnostics(uriOf(file), 1))]).toEqual([file, expected.get(file)]);
    }
    expect(expected.get('a.lyate')).not.toEqual(expected.get('drafts/b.lyate'));
    for (const file of ['lyate.json', 'house/values.csv'])
      expect([file, plain(client.last(uriOf(file))!.diagnostics)]).toEqual([file, expected.get(file)]);
    expect(expected.get('lyate.json')!.map(({ check }) => check)).toEqual([
      'bad-configuration',
      'bad-configuration',
    ]);

    client.open(uriOf('plain/c.lyate'), PLAN);
    const own = plain(await client.diagnostics(uriOf('plain/c.lyate'), 1));
    const unknown = own.find(({ check }) => check === 'unknown-name');
    expect(unknown!.severity).toBe(SEVERITY.hint);
  });

  it('follow a change of the configuration, and take back what was wrong in it', async () => {
    const uri = pathToFileURL(join(folder, 'a.lyate')).toString();
    const configuration = pathToFileURL(join(folder, 'lyate.json')).toString();
    writeFileSync(join(folder, 'lyate.json'), '{"severities":{"transfer-uphill":"off"}}');
    rmSync(join(folder, 'house'), { recursive: true });
    const seen = client.published.length;
    void client.connection.sendNotification('workspace/didChangeWatchedFiles', {
      changes: [{ uri: configuration, type: 2 }],
    });
    await expect
      .poll(() => client.published.slice(seen).filter((each) => each.uri === uri).length, { timeout: 20_000 })
      .toBeGreaterThan(0);
    expect(plain(client.last(uri)!.diagnostics)).toEqual(fromCommandLine().get('a.lyate'));
    expect(client.last(uri)!.diagnostics.some(({ code }) => code === 'transfer-uphill')).toBe(false);
    expect(client.last(configuration)!.diagnostics).toEqual([]);
  });
});
