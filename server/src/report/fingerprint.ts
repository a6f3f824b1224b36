/**
 * A short name for a finding that stays the same when lines are added elsewhere.
 *
 * Knows: findings and the text of their line.  Must not know: line numbers, files.
 * Sources: FNV-1a, 64 bit (Fowler, Noll, Vo).
 */
import type { Finding } from '../checks/finding.ts';

const OFFSET = 0xcbf29ce484222325n;
const PRIME = 0x100000001b3n;
const MASK = 0xffffffffffffffffn;

/** Sixteen hexadecimal digits made of the check, the step and the line's text without its margins. */
export function fingerprint({ check, step, range }: Finding, lines: readonly string[]): string {
  const content = [check, step ?? '', (lines[range.start.line] ?? '').trim()].join('\0');
  let hash = OFFSET;
  for (const byte of new TextEncoder().encode(content)) hash = ((hash ^ BigInt(byte)) * PRIME) & MASK;
  return hash.toString(16).padStart(16, '0');
}
