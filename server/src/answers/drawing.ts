/**
 * A structure drawn as a picture that can stand in Markdown, its sites marked with their pKa.
 *
 * Knows: graphs, drawings.  Must not know: plans, the protocol.
 * The picture brings its own light ground, because pictures in Markdown do not see the colours of the editor.
 */
import { draw } from '../chemistry/toolkit.ts';
import { structureOf } from '../route/structures.ts';
import { boundedCache } from '../tables/cache.ts';
import { oneDecimal } from './figures.ts';
import type { SitesInFlask } from './site-table.ts';

const WIDTH = 260;
const HEIGHT = 180;
/** Larger structures take longer to draw than a hover may. */
const LARGEST = 80;
const MOST_LABELS = 4;
const drawings = boundedCache<string, string>(200);

/** Markdown of the drawing; empty for structures that are not drawn. */
export function drawing(smiles: string, sites: SitesInFlask | null): string {
  const labels = (sites?.couples ?? [])
    .filter(({ constant }) => 0 <= constant.value && constant.value <= 40)
    .sort((a, b) => a.constant.value - b.constant.value)
    .slice(0, MOST_LABELS)
    .map(({ couple, constant }) => ({ atom: couple.atom, text: oneDecimal(constant.value) }));
  const key = `${smiles} ${JSON.stringify(labels)}`;
  const known = drawings.get(key);
  if (known !== undefined) return known;
  const fresh = make(smiles, labels);
  drawings.set(key, fresh);
  return fresh;
}

function make(smiles: string, labels: readonly { atom: number; text: string }[]): string {
  const { graph } = structureOf(smiles);
  if (graph === null || LARGEST < graph.atoms.length) return '';
  const drawn = draw(graph, 'm', WIDTH, HEIGHT);
  if (drawn === null) return '';
  const marks = labels.flatMap(({ atom, text }) => {
    const place = drawn.places.get(atom);
    if (place === undefined) return [];
    const [x, y] = [Math.min(WIDTH - 34, place.x + 6), Math.max(12, place.y - 8)];
    return [
      `<rect x="${x - 2}" y="${y - 10}" width="${6 * text.length + 6}" height="13" rx="3" fill="#fff3e6"/>`,
      `<text x="${x}" y="${y}" font-size="10" font-family="sans-serif" fill="#a03c00">${text}</text>`,
    ];
  });
  const ground = `<rect width="${WIDTH}" height="${HEIGHT}" rx="6" fill="#ffffff"/>`;
  const svg = drawn.svg
    .replaceAll('currentColor', '#101010')
    .replace(/<svg[^>]*>/, (open) => `${open}${ground}`)
    .replace(/<\/svg>\s*$/, `${marks.join('')}</svg>`);
  return `![structure](data:image/svg+xml;base64,${base64(svg)})`;
}

function base64(text: string): string {
  let binary = '';
  for (const byte of new TextEncoder().encode(text)) binary += String.fromCharCode(byte);
  return btoa(binary);
}
