/**
 * Who gave protons to whom: the difference between what was charged and what came out, settled from the strongest acid and
 * base downwards.
 *
 * Knows: solved flasks.  Must not know: intended transfers, findings.
 * Units: mol.
 * Invariant: what is given equals what is taken, and no entry exceeds what its couple moved.   (tests/flask/fates.test.ts)
 */
import { chargedShare, type Solved } from './solve.ts';
import type { Site } from './state.ts';

export interface Transfer {
  readonly from: Site;
  readonly to: Site;
  readonly mol: number;
  /** Units of pKa downhill, layers and ion pairs counted. */
  readonly gap: number;
  readonly fromSolvent: boolean;
  readonly toSolvent: boolean;
  /** Between the solvent and its own ion that a reagent brought: hydroxide in water. Nothing is lost by it. */
  readonly isIdentity: boolean;
}

interface Account {
  readonly site: Site;
  readonly isSolvent: boolean;
  readonly isSolventIon: boolean;
  /** pKa with the shifts of this flask. */
  readonly strength: number;
  mol: number;
}

/** Transfers of more than this share of the largest are kept. */
const LEAST_SHARE = 1e-9;

/** All transfers of a solved flask, the strongest acid and base first. */
export function ledgerOf({ system, shares }: Solved): Transfer[] {
  const givers: Account[] = [];
  const takers: Account[] = [];
  system.acids.forEach((acid, place) => {
    acid.steps.forEach(({ couple, constant }, step) => {
      const moved = acid.amount * (shares[place]![step]! - chargedShare(acid, step));
      const account: Account = {
        site: { ingredient: acid.ingredient, couple, constant },
        isSolvent: acid.isSolvent,
        isSolventIon: acid.isSolventIon,
        strength: constant.value + acid.shifts[step]!,
        mol: Math.abs(moved),
      };
      if (moved < 0) givers.push(account);
      if (0 < moved) takers.push(account);
    });
  });
  givers.sort((a, b) => a.strength - b.strength);
  takers.sort((a, b) => b.strength - a.strength);
  return settle(givers, takers);
}

function settle(givers: readonly Account[], takers: readonly Account[]): Transfer[] {
  const largest = Math.max(0, ...givers.map(({ mol }) => mol), ...takers.map(({ mol }) => mol));
  const transfers: Transfer[] = [];
  let next = 0;
  for (const giver of givers) {
    while (0 < giver.mol && next < takers.length) {
      const taker = takers[next]!;
      const mol = Math.min(giver.mol, taker.mol);
      if (LEAST_SHARE * largest < mol) {
        transfers.push({
          from: giver.site,
          to: taker.site,
          mol,
          gap: taker.strength - giver.strength,
          fromSolvent: giver.isSolvent,
          toSolvent: taker.isSolvent,
          isIdentity: (giver.isSolvent && taker.isSolventIon) || (giver.isSolventIon && taker.isSolvent),
        });
      }
      giver.mol -= mol;
      taker.mol -= mol;
      if (taker.mol <= 0) next++;
    }
  }
  return transfers;
}
