/**
 * A work of the bibliography as one line.
 *
 * Knows: CSL-JSON.  Must not know: where it is printed.
 */
interface Person {
  readonly family?: string;
  readonly given?: string;
  readonly literal?: string;
}

interface Work {
  readonly id: string;
  readonly title?: string;
  readonly author?: readonly Person[];
  readonly issued?: { readonly 'date-parts'?: readonly (readonly (number | string)[])[] };
  readonly 'container-title'?: string;
  readonly volume?: string;
  readonly page?: string;
  readonly edition?: string;
  readonly publisher?: string;
  readonly 'publisher-place'?: string;
  readonly number?: string;
  readonly DOI?: string;
  readonly note?: string;
}

/** "Family, G.; … Title. Journal year, volume, pages. doi:…"; the key itself for what has neither title nor journal. */
export function citation(work: unknown): string {
  const {
    id,
    title,
    author = [],
    issued,
    volume,
    page,
    edition,
    publisher,
    DOI,
    note,
    ...rest
  } = work as Work;
  if (title === undefined && rest['container-title'] === undefined) return id;
  const people = author.map(
    ({ family, given, literal }) => literal ?? [family, given].filter(Boolean).join(', '),
  );
  const year = issued?.['date-parts']?.[0]?.[0];
  const house = [publisher, rest['publisher-place']].filter(Boolean).join(', ');
  const place = [
    rest['container-title'],
    edition && `edition ${edition}`,
    rest.number,
    house,
    year,
    volume,
    page?.replace('-', '–'),
  ].filter((part) => part !== undefined && part !== '');
  return [people.join('; '), title, place.join(', '), DOI && `doi:${DOI}`, note]
    .filter((part) => part !== undefined && part !== '')
    .map((part) => String(part).replace(/\.$/, ''))
    .join('. ')
    .concat('.');
}
