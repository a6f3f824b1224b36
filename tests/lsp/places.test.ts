/** Addresses and paths. */
import { describe, expect, it } from 'vitest';
import { folderOf, normal, pathOf, uriOf } from '../../server/src/lsp/places.ts';

describe('places', () => {
  it.each([
    ['file:///work', 'a.lyate'],
    ['file:///work/', 'deep/er/a b.lyate'],
    ['vscode-vfs://github/org/repo', 'µ°.lyate'],
    ['memfs:/plans', 'a#b?.lyate'],
  ])('a path below %s and back', (root, path) => {
    expect(pathOf(root, uriOf(root, path))).toBe(path);
  });

  it('two spellings of one file are one', () => {
    expect(normal('file:///c%3A/a%20b.lyate')).toBe(normal('file:///c:/a b.lyate'));
  });

  it('the innermost folder holds a file, its own where none does', () => {
    const folders = ['file:///work', 'file:///work/in', 'file:///work/inside'];
    expect(folderOf('file:///work/in/a.lyate', folders)).toBe('file:///work/in');
    expect(folderOf('file:///elsewhere/a.lyate', folders)).toBe('file:///elsewhere');
  });
});
