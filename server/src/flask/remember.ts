/**
 * Remembers the constants of molecules, since one flask asks for the same ones many times over.
 *
 * Must not know: how constants are found.
 * Invariant: an answer depends on the molecule's text, the scale, the own values and the tables' version alone, so a
 * remembered one and a fresh one are equal.   (tests/flask/remember.test.ts)
 */
import { boundedCache } from '../tables/cache.ts';
import type { ConstantsIn } from './state.ts';

const REMEMBERED = 8000;

/** The same source of constants with a bounded memory. */
export function rememberConstants(constantsIn: ConstantsIn): ConstantsIn {
  const known = boundedCache<string, ReturnType<ConstantsIn>>(REMEMBERED);
  return (molecule, scale, tables, options = {}) => {
    const own = options.own === undefined || options.own.length === 0 ? '' : JSON.stringify(options.own);
    const key = [tables.version, scale, own, molecule.smiles].join('\0');
    const found = known.get(key);
    // Steps point at the couples of one perceived molecule; another perception of the same text has couples of its own.
    if (found !== undefined && belongsTo(found, molecule.couples)) return found;
    const fresh = constantsIn(molecule, scale, tables, options);
    known.set(key, fresh);
    return fresh;
  };
}

function belongsTo({ steps }: ReturnType<ConstantsIn>, couples: readonly object[]): boolean {
  const first = steps.find((list) => list.length !== 0)?.[0];
  return first === undefined || couples.includes(first.couple);
}
