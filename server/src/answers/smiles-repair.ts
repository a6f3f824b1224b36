/**
 * Obvious repairs of a structure that cannot be read: a bracket or ring left open or closed once too often.
 *
 * Knows: brackets and ring digits.  Must not know: chemistry; the caller says what can be read.
 * Cost: linear in length for each candidate, and there are only a handful.
 */

/** Longer texts have too many places to be obvious about. */
const LONGEST = 300;

/** Texts one edit away that can be read, where there is exactly one kind of edit that helps. */
export function repairs(text: string, canBeRead: (text: string) => boolean): string[] {
  if (LONGEST < text.length) return [];
  for (const candidates of [closings(text), removals(text), ringEnds(text)]) {
    const good = [...new Set(candidates)].filter(canBeRead);
    if (good.length === 1) return good;
    if (1 < good.length) return [];
  }
  return [];
}

/** What is still open at the end, closed there. */
function closings(text: string): string[] {
  const open: string[] = [];
  for (const character of text) {
    if (character === '(' || character === '[') open.push(character === '(' ? ')' : ']');
    else if (character === ')' || character === ']') {
      if (open.at(-1) !== character) return [];
      open.pop();
    }
  }
  return open.length === 0 ? [] : [text + open.reverse().join('')];
}

/** The one bracket that closes what was never opened, taken out. */
function removals(text: string): string[] {
  let depth = 0;
  for (let at = 0; at < text.length; at++) {
    if (text[at] === '(') depth++;
    if (text[at] === ')' && --depth < 0) return [text.slice(0, at) + text.slice(at + 1)];
  }
  return [];
}

/** The one ring digit without a partner, given one at the end. */
function ringEnds(text: string): string[] {
  const open = new Set<string>();
  let bracket = false;
  for (let at = 0; at < text.length; at++) {
    const character = text[at]!;
    if (character === '[') bracket = true;
    else if (character === ']') bracket = false;
    else if (!bracket && character >= '0' && character <= '9') {
      if (!open.delete(character)) open.add(character);
    }
  }
  const [only] = open;
  return open.size === 1 && /[A-Za-z\])]$/.test(text) ? [text + only] : [];
}
