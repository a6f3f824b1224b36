/** What is shipped stays small: each bundle at most 3 MB. */
import { existsSync, statSync } from 'node:fs';
import { expect, test } from 'vitest';

const MOST_BYTES = 3e6;

test.each(['lyate.cjs', 'server.cjs', 'server-browser.js', 'extension.cjs', 'extension-browser.js'])(
  '%s',
  (name) => {
    const file = `dist/${name}`;
    expect(existsSync(file), 'npm run build makes it').toBe(true);
    expect(statSync(file).size).toBeLessThan(MOST_BYTES);
  },
);
