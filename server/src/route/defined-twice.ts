/**
 * Reports names that stand for two different things: at the first place once, and at every other place.
 *
 * Knows: places.  Must not know: files' text, tables.
 */
import type { Compound, Range, TextProblem } from './plan.ts';
import { sameStructure } from './structures.ts';

interface Place {
  readonly range: Range;
  /** The file it stands in; the plan's own where undefined. */
  readonly file: string | undefined;
}

/** Compounds of one name with different structures; those of other files are reported where they clash. */
export function compoundsDefinedTwice(
  own: readonly Compound[],
  brought: readonly { readonly compound: Compound; readonly by: Range }[],
): TextProblem[] {
  const first = new Map<
    string,
    { compound: Compound; at: Range; others: { place: Place; at: Range | null }[] }
  >();
  const add = (compound: Compound, at: Range, isOwn: boolean) => {
    const known = first.get(compound.name);
    if (known === undefined) first.set(compound.name, { compound, at, others: [] });
    else if (!sameStructure(known.compound.smiles, compound.smiles)) {
      const place = { range: compound.nameRange, file: compound.file };
      known.others.push({ place, at: isOwn ? at : null });
    }
  };
  for (const compound of own) add(compound, compound.nameRange, true);
  for (const { compound, by } of brought) add(compound, by, false);
  return [...first.values()].flatMap(({ compound, at, others }) => {
    const other = others[0];
    if (other === undefined) return [];
    const where = other.place.file === undefined ? 'below' : `in ${other.place.file}`;
    const counts = compound.file === undefined ? 'this one' : `the one in ${compound.file}`;
    const message = `Compound ${compound.name} has another structure ${where}; ${counts} counts.`;
    return [
      problem(message, at, other.place, 'the other one'),
      ...others.flatMap((each) =>
        each.at === null
          ? []
          : [
              problem(
                `Compound ${compound.name} has another structure above, and that one counts.`,
                each.at,
                { range: at, file: undefined },
                'the first one',
              ),
            ],
      ),
    ];
  });
}

/** Steps of one label; the ranges are absolute and in the order of the text. */
export function labelsUsedTwice(label: string, places: readonly Range[]): TextProblem[] {
  const [first, second] = places;
  if (first === undefined || second === undefined) return [];
  const here = (range: Range): Place => ({ range, file: undefined });
  return [
    problem(
      `Another step below is called ${label} too; this one counts.`,
      first,
      here(second),
      'the other one',
    ),
    ...places
      .slice(1)
      .map((place) =>
        problem(
          `A step above is called ${label} too, and that one counts.`,
          place,
          here(first),
          'the first one',
        ),
      ),
  ];
}

function problem(message: string, range: Range, { range: other, file }: Place, says: string): TextProblem {
  const place = { range: other, message: says, ...(file === undefined ? {} : { file }) };
  return { check: 'defined-twice', message, range, related: [place] };
}
