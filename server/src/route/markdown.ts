/**
 * Finds the plan inside a Markdown page: the fenced blocks whose language is lyate.
 *
 * Knows: fences.  Must not know: the language inside them.
 * Invariants: the text that comes out has as many lines as the page, and each line of a fence stands where it stood,
 * so places in it are places in the page.                                       (tests/route/markdown.test.ts)
 */

/** The page with every line outside the fences emptied; line breaks must be `\n`. */
export function maskMarkdown(page: string): string {
  const lines = page.split('\n');
  const indents = fenceIndents(lines);
  return lines.map((line, at) => (indents[at] === null ? '' : line)).join('\n');
}

/** For each line inside a fence the indentation of the fence; null for all other lines. */
export function fenceIndents(lines: readonly string[]): (string | null)[] {
  let open: { mark: string; length: number; indent: string; ours: boolean } | null = null;
  return lines.map((line) => {
    const fence = fenceOf(line);
    if (open === null) {
      if (fence !== null) open = { ...fence, ours: fence.info.split(/[\s{,]/, 1)[0] === 'lyate' };
      return null;
    }
    if (fence?.mark === open.mark && open.length <= fence.length && fence.info === '') {
      open = null;
      return null;
    }
    return open.ours ? open.indent : null;
  });
}

function fenceOf(line: string): { mark: string; length: number; indent: string; info: string } | null {
  const start = line.length - line.trimStart().length;
  const mark = line[start];
  if (mark !== '`' && mark !== '~') return null;
  let end = start;
  while (line[end] === mark) end++;
  if (end - start < 3) return null;
  const info = line.slice(end).trim();
  if (mark === '`' && info.includes('`')) return null;
  return { mark, length: end - start, indent: line.slice(0, start), info };
}
