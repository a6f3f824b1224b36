/**
 * The form of the statement that is being written, with the part the cursor is in.
 *
 * Knows: lines, the words of the language.  Must not know: plans, the protocol.
 */
import { scanLine } from '../route/scan.ts';
import { KEYWORD_PAGES } from './vocabulary.ts';

export interface Signature {
  readonly form: string;
  readonly text: string;
  /** Parts of the form, as spans in it. */
  readonly parts: readonly (readonly [number, number])[];
  readonly active: number;
}

/** For a line up to the cursor; null before a keyword is written, in remarks, and for unknown keywords. */
export function signatureAt(lineToCursor: string): Signature | null {
  const { tokens, comment } = scanLine(lineToCursor);
  const keyword = tokens[0]?.text;
  if (comment !== null || keyword === undefined || !Object.hasOwn(KEYWORD_PAGES, keyword)) return null;
  const { form, text } = KEYWORD_PAGES[keyword]!;
  const parts = [...form.matchAll(/\S+/g)]
    .slice(1)
    .map(({ index, 0: word }) => [index, index + word.length] as const);
  const ended = /\s$/.test(lineToCursor);
  const written = tokens.length - 1 - (ended ? 0 : 1);
  if (written < 0 || parts.length === 0) return null;
  return { form, text, parts, active: Math.min(written, parts.length - 1) };
}
