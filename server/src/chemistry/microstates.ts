/**
 * Stepwise constants of a molecule with several sites, from the constant of each site and the pull of charges on each other.
 *
 * Knows: numbers only: sites, distances, charges.  Must not know: structures, groups, tables.
 * Invariants:
 *  1. Equal sites differ by the statistical factor at least.   (tests/chemistry/microstates.test.ts)
 *  2. Up to EXACT sites all microstates are counted; beyond, protons leave one by one from the dominant state.
 * Units: pK; a positive interaction raises the constant of a site beside a negative charge.
 */

/** One place for one proton, with its constant while every other site is neutral. */
export interface MicroSite {
  readonly pK: number;
  /** acid: neutral with its proton; base: neutral without. */
  readonly kind: 'acid' | 'base';
  /** The couple that this place belongs to. */
  readonly couple: number;
  /** Whether the drawing has the proton here; settles which of two equal couples is the first to lose it. */
  readonly held: boolean;
}

export interface MicroStep {
  readonly pK: number;
  readonly couple: number;
}

/** Sites for which all states are counted. */
const EXACT = 10;

/**
 * The constants from the fully protonated form downwards, each with the couple that mainly loses the proton.
 *
 * @param interaction pK units between two unit charges at two sites
 */
export function macroscopicSteps(
  sites: readonly MicroSite[],
  interaction: (first: number, second: number) => number,
): MicroStep[] {
  if (sites.length === 0) return [];
  return sites.length <= EXACT ? exactSteps(sites, interaction) : greedySteps(sites, interaction);
}

function exactSteps(
  sites: readonly MicroSite[],
  interaction: (first: number, second: number) => number,
): MicroStep[] {
  const n = sites.length;
  const weights = sites.map((_, i) => sites.map((_, j) => (i === j ? 0 : interaction(i, j))));
  const charge = (site: number, protonated: boolean) =>
    sites[site]!.kind === 'acid' ? (protonated ? 0 : -1) : protonated ? 1 : 0;
  // Free energies in pK units relative to the neutral form; each state is another one with one more proton.
  const energies = new Float64Array(1 << n);
  const bare = sites.map((_, site) => charge(site, false));
  energies[0] = bare.reduce<number>((sum, q, i) => {
    const pushed = bare.slice(0, i).reduce<number>((push, other, j) => push + weights[i]![j]! * other, 0);
    return sum + q * (pushed - sites[i]!.pK);
  }, 0);
  for (let state = 1; state < 1 << n; state++) {
    const i = 31 - Math.clz32(state & -state);
    const before = state & (state - 1);
    let push = 0;
    for (let j = 0; j < n; j++) if (j !== i) push += weights[i]![j]! * charge(j, (before & (1 << j)) !== 0);
    // Whether an anion is quenched or a cation made, the charge rises by one.
    energies[state] = energies[before]! - sites[i]!.pK + push;
  }
  const lowest = new Array<number>(n + 1).fill(Number.POSITIVE_INFINITY);
  for (let state = 0; state < 1 << n; state++) {
    const protons = bits(state);
    lowest[protons] = Math.min(lowest[protons]!, energies[state]!);
  }
  const totals = new Array<number>(n + 1).fill(0);
  const held = Array.from({ length: n + 1 }, () => new Array<number>(n).fill(0));
  for (let state = 0; state < 1 << n; state++) {
    const protons = bits(state);
    const share = 10 ** (lowest[protons]! - energies[state]!);
    totals[protons]! += share;
    for (let i = 0; i < n; i++) if ((state & (1 << i)) !== 0) held[protons]![i]! += share;
  }
  const free = (protons: number) => lowest[protons]! - Math.log10(totals[protons]!);
  const steps: { readonly pK: number; readonly losses: readonly number[] }[] = [];
  for (let protons = n; 0 < protons; protons--) {
    const losses = sites.map(
      (_, i) => held[protons]![i]! / totals[protons]! - held[protons - 1]![i]! / totals[protons - 1]!,
    );
    steps.push({ pK: free(protons - 1) - free(protons), losses });
  }
  return assign(sites, steps);
}

/** Each step goes to the site that loses most in it, the clearest cases first; of equal sites the held one goes first. */
function assign(
  sites: readonly MicroSite[],
  steps: readonly { readonly pK: number; readonly losses: readonly number[] }[],
): MicroStep[] {
  const pairs = steps.flatMap(({ losses }, step) =>
    losses.map((loss, site) => ({ step, site, loss: Math.round(loss * 1e6) })),
  );
  pairs.sort(
    (a, b) =>
      b.loss - a.loss ||
      a.step - b.step ||
      Number(sites[b.site]!.held) - Number(sites[a.site]!.held) ||
      a.site - b.site,
  );
  const taken = new Set<number>();
  const owners = new Map<number, number>();
  for (const { step, site } of pairs) {
    if (taken.has(site) || owners.has(step)) continue;
    taken.add(site);
    owners.set(step, site);
  }
  return steps.map(({ pK }, step) => ({ pK, couple: sites[owners.get(step)!]!.couple }));
}

/** The dominant state loses one proton after the other from its most acidic site. */
function greedySteps(
  sites: readonly MicroSite[],
  interaction: (first: number, second: number) => number,
): MicroStep[] {
  const protonated = sites.map(() => true);
  const steps: MicroStep[] = [];
  for (let turn = 0; turn < sites.length; turn++) {
    const now = sites.map(({ pK }, i) => {
      if (!protonated[i]) return Number.POSITIVE_INFINITY;
      let value = pK;
      sites.forEach((other, j) => {
        if (i === j) return;
        const q = other.kind === 'acid' ? (protonated[j] ? 0 : -1) : protonated[j] ? 1 : 0;
        if (q !== 0) value -= q * interaction(i, j);
      });
      return value;
    });
    let best = -1;
    now.forEach((value, i) => {
      if (!protonated[i]) return;
      const ahead = best === -1 ? 1 : now[best]! - value;
      if (best === -1 || 1e-9 < ahead || (Math.abs(ahead) <= 1e-9 && sites[best]!.held && !sites[i]!.held))
        best = i;
    });
    const equal = now.filter((value) => Math.abs(value - now[best]!) < 0.05).length;
    steps.push({ pK: now[best]! - Math.log10(equal), couple: sites[best]!.couple });
    protonated[best] = false;
  }
  return steps.sort((a, b) => a.pK - b.pK);
}

function bits(state: number): number {
  let count = 0;
  for (let rest = state; rest !== 0; rest &= rest - 1) count++;
  return count;
}
