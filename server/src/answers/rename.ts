/**
 * Says whether a new name can stand where the old one does, and how it has to be written.
 *
 * Knows: the language's rules for names.  Must not know: other plans, the protocol.
 */
import { KEYWORDS } from '../route/parse.ts';
import { compoundNamed, type Target } from './names-at.ts';
import type { Analysed } from './types.ts';
import { LINKS } from './vocabulary.ts';

const RESERVED: ReadonlySet<string> = new Set([...LINKS, '+', 'x', '×', '=']);
/** UTF-16 units; longer names help nobody. */
const LONGEST_NAME = 200;

/** A name as the language writes it: bare where it can stand alone, else in quotes. */
export function written(name: string): string {
  const bare = /^[^\s"<>=/:][^\s"=]*$/.test(name) && !name.includes('/') && !RESERVED.has(name);
  return bare ? name : `"${name.replace(/["\\]/g, '\\$&')}"`;
}

/** Why a target cannot be called by another name; null where it can. */
export function whyNot(analysed: Analysed, target: Target, name: string): string | null {
  if (name.trim() === '') return 'A name needs at least one character.';
  if (LONGEST_NAME < name.length) return `A name has at most ${LONGEST_NAME} characters.`;
  if ([...name].some((character) => character < ' ' || character === '\u007f'))
    return 'A name stays on one line.';
  if (name === target.name) return null;
  if (target.kind === 'compound' && compoundNamed(analysed, name) !== null)
    return `There is a compound called ${name} already.`;
  if (target.kind === 'label' && analysed.plan.steps.some(({ label }) => label === name))
    return `There is a step called ${name} already.`;
  if (target.kind === 'label' && KEYWORDS.includes(name)) return `${name} is a keyword.`;
  return null;
}
