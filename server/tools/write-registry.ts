/** Run by the build: brings the generated list of checks up to date. */
import { readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { registryText } from './make-registry.ts';

const folder = join(process.argv[2] ?? '.', 'server/src/checks');
const file = join(folder, 'registry.generated.ts');
const text = registryText(folder);
let old = '';
try {
  old = readFileSync(file, 'utf8');
} catch {
  // The first build has no list yet.
}
if (text !== old) writeFileSync(file, text);
