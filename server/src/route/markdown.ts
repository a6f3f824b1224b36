/**
 * Finds the plan inside a Markdown page: the fenced blocks whose language is lyate.
 *
 * Knows: fences.  Must not know: the language inside them.
 * Invariants: the text that comes out has as many lines as the page, and each line of a fence stands where it stood,
 * so places in it are places in the page.                                       (tests/route/markdown.test.ts)
 */

/** The page with every line outside the fences emptied; line breaks must be `\n`. */
export function maskMarkdown(page: string): string {
  let fence: { mark: string; length: number; ours: boolean } | null = null;
  return page
    .split('\n')
    .map((line) => {
      const found = fenceOf(line);
      if (fence === null) {
        if (found !== null) fence = { ...found, ours: found.info.split(/[\s{,]/, 1)[0] === 'lyate' };
        return '';
      }
      const closes = found?.mark === fence.mark && fence.length <= found.length && found.info === '';
      if (closes) {
        fence = null;
        return '';
      }
      return fence.ours ? line : '';
    })
    .join('\n');
}

function fenceOf(line: string): { mark: string; length: number; info: string } | null {
  const start = line.length - line.trimStart().length;
  const mark = line[start];
  if (mark !== '`' && mark !== '~') return null;
  let end = start;
  while (line[end] === mark) end++;
  if (end - start < 3) return null;
  const info = line.slice(end).trim();
  if (mark === '`' && info.includes('`')) return null;
  return { mark, length: end - start, info };
}
