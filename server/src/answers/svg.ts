/**
 * Builds SVG as text, so that a picture can be made without a browser.
 *
 * Knows: elements and attributes.  Must not know: what is drawn.
 * Invariant: text and attributes are escaped; no string of a plan is ever read as markup.   (tests/answers/plots.test.ts)
 */

/** Finished markup, made by `element` or `text` only. */
export interface Markup {
  readonly markup: string;
}

export type Attributes = Readonly<Record<string, string | number>>;

const DECIMALS = 2;

/** An element with its children. */
export function element(name: string, attributes: Attributes, ...children: readonly Markup[]): Markup {
  const written = Object.entries(attributes)
    .map(([key, value]) => ` ${key}="${escaped(typeof value === 'number' ? short(value) : value)}"`)
    .join('');
  if (children.length === 0) return { markup: `<${name}${written}/>` };
  return { markup: `<${name}${written}>${children.map(({ markup }) => markup).join('')}</${name}>` };
}

/** An element that holds text. */
export function text(name: string, attributes: Attributes, content: string): Markup {
  return element(name, attributes, { markup: escaped(content) });
}

function short(value: number): string {
  return String(Number(value.toFixed(DECIMALS)));
}

/** Safe between tags and in quotes; characters that XML does not allow are left out. */
function escaped(content: string): string {
  let safe = '';
  for (const character of content) {
    const code = character.codePointAt(0)!;
    if (ENTITIES[character] !== undefined) safe += ENTITIES[character];
    else if (isAllowed(code)) safe += character;
  }
  return safe;
}

const ENTITIES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

function isAllowed(code: number): boolean {
  if (code < 0x20) return code === 0x09 || code === 0x0a;
  return (
    code < 0x7f || (0xa0 <= code && code < 0xd800) || (0xe000 <= code && code < 0xfffe) || 0x10000 <= code
  );
}
