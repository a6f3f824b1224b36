/**
 * Makes text from a plan harmless for a terminal or a log: control characters become visible signs.
 *
 * Knows: strings.  Must not know: what they mean.
 * Invariant: the result holds no control character but the line feed and the tab.   (tests/report/plain.test.ts)
 */

/** Signs that reorder or break what a reader sees: line separators, direction marks and overrides. */
const MISLEADING = new Set([
  0x200e, 0x200f, 0x2028, 0x2029, 0x202a, 0x202b, 0x202c, 0x202d, 0x202e, 0x2066, 0x2067, 0x2068, 0x2069,
]);

/** Replaces control characters, among them the escape that begins terminal sequences, and direction overrides. */
export function plain(text: string): string {
  let shown = '';
  for (let place = 0; place < text.length; place++) {
    const code = text.charCodeAt(place);
    if (code === 0x0a || code === 0x09) shown += text[place];
    else if (code < 0x20) shown += String.fromCharCode(0x2400 + code);
    else if ((0x7f <= code && code < 0xa0) || MISLEADING.has(code)) shown += '\ufffd';
    else shown += text[place];
  }
  return shown;
}

/** The same on one line. */
export function plainLine(text: string): string {
  return plain(text.replace(/[\r\n\t]+/g, ' '));
}
