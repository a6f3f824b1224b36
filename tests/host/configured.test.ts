/** Configurations on disk: where they are looked for, and that nothing outside is ever read. */
import { mkdirSync, symlinkSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { createPlanDesk } from '../../server/src/host/configured.ts';
import { workspaceOf } from '../../server/src/host/files.ts';
import { findPlans } from '../../server/src/host/paths.ts';
import { folderOf } from '../support/program.ts';

const ROW = 'name,smiles,direction,scale,value\nphenol,[OH:1]c1ccccc1,acid,water,9.5\n';

describe('the workspace of a file', () => {
  it('is the nearest folder with a configuration or a repository, no higher than the folders that are open', () => {
    const folder = folderOf({ 'lyate.json': '{}', 'a/.git/HEAD': '', 'a/b/c.lyate': '', 'd/e/f.lyate': '' });
    expect(workspaceOf(join(folder, 'a/b/c.lyate'))).toBe(join(folder, 'a'));
    expect(workspaceOf(join(folder, 'd/e/f.lyate'))).toBe(folder);
    expect(workspaceOf(join(folder, 'd/e/f.lyate'), [join(folder, 'd')])).toBe(join(folder, 'd'));
    expect(workspaceOf(join(folder, 'd/e/f.lyate'), [join(folder, 'elsewhere')])).toBe(folder);
  });
});

describe('house files', () => {
  it('are read below the configuration only, not even through a link', () => {
    const outside = folderOf({ 'pka.csv': ROW });
    const folder = folderOf({
      'lyate.json': JSON.stringify({
        values: ['../pka.csv', 'link.csv', `${outside}/pka.csv`, 'own.csv', 'own.csv'],
      }),
      'own.csv': ROW,
    });
    symlinkSync(join(outside, 'pka.csv'), join(folder, 'link.csv'));
    const { configured } = createPlanDesk().surroundings(join(folder, 'a.lyate'));
    const [configuration, own] = configured.files;
    expect(configuration!.findings.map(({ message }) => message)).toEqual([
      '"../pka.csv" leads out of the folder of this file.',
      '"link.csv" is not there or cannot be read.',
      `"${outside}/pka.csv" leads out of the folder of this file.`,
    ]);
    expect(own).toMatchObject({ file: 'own.csv', findings: [] });
    expect(configured.tables.measured[0]).toMatchObject({ name: 'phenol', value: 9.5, house: true });
    expect(configured.tables.measured.filter(({ house }) => house)).toHaveLength(1);
  });

  it('change the version of the tables with their text', () => {
    const version = (text: string) => {
      const folder = folderOf({ 'lyate.json': '{"values":["own.csv"]}', 'own.csv': text });
      return createPlanDesk().surroundings(join(folder, 'a.lyate')).configured.tables.version;
    };
    expect(version(ROW)).toBe(version(ROW));
    expect(version(ROW)).not.toBe(version(ROW.replace('9.5', '9.6')));
  });

  it('that are a folder are named', () => {
    const folder = folderOf({ 'lyate.json': '{"values":["own.csv"]}' });
    mkdirSync(join(folder, 'own.csv'));
    const { configured } = createPlanDesk().surroundings(join(folder, 'a.lyate'));
    expect(configured.files[0]!.findings).toHaveLength(1);
  });
});

describe('ignored plans', () => {
  it('are named by every configuration on the way, and taken when asked for by name', () => {
    const folder = folderOf({
      'lyate.json': '{"ignore":["old/","*.draft.lyate"]}',
      'a.lyate': '',
      'b.draft.lyate': '',
      'old/c.lyate': '',
      'sub/lyate.json': '{"ignore":["/d.lyate"]}',
      'sub/d.lyate': '',
      'sub/e/d.lyate': '',
    });
    const found = (path: string) =>
      findPlans([path])
        .files.map((file) => file.slice(folder.length + 1))
        .sort();
    expect(found(folder)).toEqual(['a.lyate', 'sub/e/d.lyate']);
    expect(found(join(folder, 'old/c.lyate'))).toEqual(['old/c.lyate']);
    writeFileSync(join(folder, 'lyate.json'), '{"ignore":7}');
    expect(found(folder)).toHaveLength(4);
  });
});
