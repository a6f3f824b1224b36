/**
 * Salts written as acid and base side by side: `Cl.NCC` is ethylammonium chloride, whatever it looks like.
 *
 * Knows: steps of the components of one ingredient.  Must not know: other ingredients, text.
 * Invariant: protons are moved, never made; an ingredient of one component stays as drawn.   (tests/flask/salts.test.ts)
 */
import type { ProtonStep } from '../chemistry/couple.ts';

export interface DrawnComponent {
  readonly steps: readonly ProtonStep[];
  /** Protons held as drawn. */
  readonly held: number;
}

/** Protons that each component holds once acids and bases of the same ingredient have met. */
export function heldInSalt(components: readonly DrawnComponent[]): number[] {
  const held = components.map((component) => component.held);
  if (components.length < 2) return held;
  const most = components.reduce((sum, { steps }) => sum + steps.length, 0);
  for (let turn = 0; turn < most; turn++) {
    const giver = extreme(components, held, 'gives');
    const taker = extreme(components, held, 'takes');
    if (giver === null || taker === null || giver.place === taker.place) break;
    if (taker.value <= giver.value) break;
    held[giver.place]!--;
    held[taker.place]!++;
  }
  return held;
}

/** The component whose next proton leaves most easily, or the one that holds a further proton most firmly. */
function extreme(
  components: readonly DrawnComponent[],
  held: readonly number[],
  how: 'gives' | 'takes',
): { place: number; value: number } | null {
  let best: { place: number; value: number } | null = null;
  components.forEach(({ steps }, place) => {
    const next = steps[steps.length - held[place]! - (how === 'gives' ? 0 : 1)];
    if (next === undefined) return;
    const { value } = next.constant;
    const isBetter = best === null || (how === 'gives' ? value < best.value : best.value < value);
    if (isBetter) best = { place, value };
  });
  return best;
}
