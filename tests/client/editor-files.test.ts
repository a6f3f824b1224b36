/** Files made for the editor are those that the code would make today. */
import { readFileSync } from 'node:fs';
import { expect, it } from 'vitest';
import { editorFiles } from '../../server/tools/editor-files.ts';

const read = (path: string) => readFileSync(path, 'utf8');

it.each(editorFiles(read))('$path is up to date; npm run editor-files writes it', ({ path, text }) => {
  expect(JSON.parse(read(path))).toEqual(JSON.parse(text));
});
