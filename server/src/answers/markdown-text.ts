/**
 * Puts text from a plan into Markdown so that it shows as written and nothing in it is interpreted.
 *
 * Knows: the marks of Markdown and HTML.  Must not know: plans.
 */

/** Text as it is, on one line, without control characters. */
export function plain(text: string): string {
  return withoutControls(text).replace(/[\\`*_{}[\]()#+.!|<>~$&:@-]/g, '\\$&');
}

/** Text as code, on one line. */
export function code(text: string): string {
  const clean = withoutControls(text);
  let fence = '`';
  while (clean.includes(fence)) fence += '`';
  const space = clean.startsWith('`') || clean.endsWith('`') ? ' ' : '';
  return `${fence}${space}${clean}${space}${fence}`;
}

/** Text as a cell of a table. */
export function cell(text: string): string {
  return plain(text);
}

function withoutControls(text: string): string {
  return [...text].map((character) => (character < ' ' || character === '\u007f' ? ' ' : character)).join('');
}
