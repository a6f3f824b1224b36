/**
 * Writes what the editor reads as plain files from the one place where it is said in code: colours from the keywords,
 * settings from their table.
 *
 * `node server/tools/run.mjs write-editor-files`; tests/client/ fails where the files lag behind.
 */
import { readFileSync, writeFileSync } from 'node:fs';
import { editorFiles } from './editor-files.ts';

for (const { path, text } of editorFiles((name) => readFileSync(name, 'utf8'))) writeFileSync(path, text);
