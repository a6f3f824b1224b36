/**
 * Where things go in the pictures of a flask, as plain numbers.
 *
 * Knows: pictures' numbers.  Must not know: the page, colours.
 * Units: pixels, y downwards.
 */

/**
 * Places labels near where they want to be, in order and at least `gap` apart, inside `low … high` where they fit.
 *
 * Labels that would meet are moved as one, so that none drifts further than its neighbours push it.
 */
export function spread(wanted: readonly number[], gap: number, low: number, high: number): number[] {
  const order = wanted.map((_, index) => index).sort((a, b) => wanted[a]! - wanted[b]! || a - b);
  const groups: { members: number[]; sum: number; top: number }[] = [];
  for (const index of order) {
    let group = { members: [index], sum: wanted[index]!, top: wanted[index]! };
    for (let last = groups.at(-1); last !== undefined; last = groups.at(-1)) {
      if (last.top + last.members.length * gap <= group.top) break;
      groups.pop();
      const members = [...last.members, ...group.members];
      const sum = members.reduce((total, member, at) => total + wanted[member]! - at * gap, 0);
      group = { members, sum, top: sum / members.length };
    }
    groups.push(group);
  }
  const places = new Array<number>(wanted.length).fill(0);
  let floor = low;
  for (const { members, top } of groups) {
    let at = Math.max(floor, top);
    for (const member of members) {
      places[member] = at;
      at += gap;
    }
    floor = at;
  }
  let ceiling = high;
  for (const index of [...order].reverse()) {
    places[index] = Math.min(places[index]!, ceiling);
    ceiling = places[index]! - gap;
  }
  return places;
}

/** A table as text with tabs between the cells; tabs and line breaks inside a cell become blanks. */
export function toTsv(rows: readonly (readonly string[])[]): string {
  return rows.map((cells) => cells.map((cell) => cell.replace(/[\t\r\n]+/g, ' ')).join('\t')).join('\n');
}

/** Three digits, with a real minus sign. */
export function figure(value: number): string {
  if (value === 0) return '0';
  const size = Math.abs(value);
  const text = size < 1e-3 || 1e5 <= size ? value.toExponential(1) : String(Number(value.toPrecision(3)));
  return text.replaceAll('-', '−');
}

export function oneDecimal(value: number): string {
  const text = value.toFixed(1);
  return (Number(text) === 0 ? '0.0' : text).replace('-', '−');
}

export function percent(share: number): string {
  if (share <= 0) return '0 %';
  if (share < 1e-4) return '< 0.01 %';
  if (0.999 < share && share < 1) return '> 99.9 %';
  return `${Number((100 * share).toPrecision(3))} %`;
}
