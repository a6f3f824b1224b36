/**
 * Carbon acids of one molecule: once one site has lost its proton, the charge holds the others back.
 *
 * Stepwise constants treat carbon sites one by one; a ketone would lose a proton on either side of its carbonyl group.
 * Knows: graphs, steps.  Must not know: flasks, text.
 * Units: pKa, number of bonds.
 * Basis: derived from practice: 1,3-dicarbonyl compounds give their dianions to alkyllithiums and lithium amides but not to
 * alkoxides (S. N. Huckin, L. Weiler, J. Am. Chem. Soc. 1974, 96, 1082), simple ketones give none to lithium amides.
 */
import type { Couple, Perceived, ProtonStep } from '../chemistry/couple.ts';
import type { Graph } from '../chemistry/graph.ts';

const NEAR_BONDS = 3;
/** Beside an anion whose charge two groups share, beside any other, and further away. */
const STABILISED_PULL = { shift: 6, sd: 3 };
const NEAR_PULL = { shift: 13, sd: 3 };
const FAR_PULL = { shift: 3, sd: 1.5 };
/** A carbon acid below this constant gives an anion whose charge is shared. */
const STABILISED_BELOW = 20;
/** Sites of one molecule closer in acidity than this are chosen by kinetics: base, temperature, order of addition. */
export const KINETIC_SPAN = 4;

/**
 * The steps with later carbon sites moved up, lowest first.
 *
 * @param meant a couple that somebody means to move; its rivals within the kinetic span stay out of its way
 */
export function coupledSteps(
  steps: readonly ProtonStep[],
  { graph }: Perceived,
  meant: Couple | null,
): ProtonStep[] {
  const isCarbon = ({ couple }: ProtonStep) =>
    couple.element === 'C' && couple.kind === 'acid' && couple.holdsProton;
  const first = steps.find(isCarbon);
  if (first === undefined) return [...steps];
  const own = meant === null ? undefined : steps.find((step) => isCarbon(step) && isAt(step.couple, meant));
  const leader = own ?? first;
  const moved = steps.flatMap((step): ProtonStep[] => {
    if (!isCarbon(step)) return [step];
    const ahead = leader.constant.value - step.constant.value;
    if (step === leader)
      return [
        KINETIC_SPAN <= leader.constant.value - first.constant.value ? heldBack(step, first, graph) : step,
      ];
    if (own !== undefined && Math.abs(ahead) < KINETIC_SPAN) return [];
    return [0 < ahead ? step : heldBack(step, leader, graph)];
  });
  return moved.sort((a, b) => a.constant.value - b.constant.value);
}

function isAt(a: Couple, b: Couple): boolean {
  return a.kind === b.kind && (a.atom === b.atom || a.equivalents.includes(b.atom));
}

function heldBack({ couple, constant }: ProtonStep, first: ProtonStep, graph: Graph | null): ProtonStep {
  const { shift, sd } = pullOf(couple, first, graph);
  const value = constant.value + shift;
  const hop = {
    what: 'after another carbon site of the molecule has lost its proton',
    value: shift,
    sd,
    sources: [],
  };
  return {
    couple,
    constant: { ...constant, value, sd: Math.hypot(constant.sd, sd), hops: [...constant.hops, hop] },
  };
}

function pullOf(couple: Couple, first: ProtonStep, graph: Graph | null): { shift: number; sd: number } {
  if (graph !== null && NEAR_BONDS < bondsBetween(graph, couple.atom, first.couple.atom)) return FAR_PULL;
  return first.constant.value < STABILISED_BELOW ? STABILISED_PULL : NEAR_PULL;
}

/** Bonds on the shortest path, counted no further than matters. */
function bondsBetween({ atoms }: Graph, from: number, to: number): number {
  let edge = [from];
  const seen = new Set(edge);
  for (let bonds = 0; bonds <= NEAR_BONDS; bonds++) {
    if (edge.includes(to)) return bonds;
    edge = edge.flatMap((atom) => atoms[atom]?.neighbours ?? []).filter((atom) => !seen.has(atom));
    for (const atom of edge) seen.add(atom);
  }
  return NEAR_BONDS + 1;
}
