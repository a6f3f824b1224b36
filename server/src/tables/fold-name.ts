/**
 * Brings the ways in which one name is written together.
 *
 * Knows: text.  Must not know: rows.
 */

/** A name without what writers vary: case, blanks, hyphens, dots, and the sign between the parts of a salt. */
export function foldName(text: string): string {
  return text.toLowerCase().replace(/[\s\-‐‑–−.·*•'’′]+/g, '');
}
