/**
 * Reads `compound NAME = SMILES`, which follows its own rules: a structure is no word.
 *
 * Knows: characters, tokens.  Must not know: whether the structure can be read.
 */
import type { Span } from '../chemistry/molecule.ts';
import { LineReader } from './line-reader.ts';
import { isBlank, scanLine, stringText } from './scan.ts';
import type { LineTree, Syntax } from './tree.ts';

/** `compound NAME = SMILES`: read by characters, since a structure ends at the first blank outside brackets. */
export function readCompound(line: string, keyword: Span): LineTree {
  let at = skipBlanks(line, keyword.end);
  const nameStart = at;
  const quoted = line[at] === '"' ? scanLine(line.slice(0, line.length), at).tokens[0]! : null;
  if (quoted !== null) at = quoted.end;
  else while (at < line.length && !isBlank(line, at) && line[at] !== '=') at++;
  const nameSpan = { start: nameStart, end: at };
  const name = quoted !== null ? stringText(quoted) : line.slice(nameStart, at);
  const equals = skipBlanks(line, at);
  if (name === '' || line[equals] !== '=') {
    const { tokens, comment } = scanLine(line, keyword.start);
    const reader = new LineReader(line, tokens, keyword);
    reader.take('keyword');
    const first = reader.peek() ?? keyword;
    reader.rest();
    reader.report(
      'unreadable-line',
      'A compound is written as compound NAME = SMILES, a name with blanks in quotes.',
      {
        start: first.start,
        end: reader.end,
      },
    );
    return treeOf(reader, comment, null, keyword);
  }
  const smilesStart = skipBlanks(line, equals + 1);
  const smilesEnd = endOfStructure(line, smilesStart);
  const { tokens, comment } = scanLine(line, smilesEnd);
  const reader = new LineReader(line, tokens, { start: smilesStart, end: Math.max(smilesEnd, equals + 1) });
  reader.mark('keyword', keyword);
  reader.mark('definition', nameSpan);
  reader.mark('operator', { start: equals, end: equals + 1 });
  if (smilesStart === smilesEnd) {
    reader.report('unreadable-line', 'The SMILES is missing behind the sign.', {
      start: equals,
      end: equals + 1,
    });
    reader.rest();
    return treeOf(reader, comment, null, keyword);
  }
  reader.mark('structure', { start: smilesStart, end: smilesEnd });
  const rest = reader.rest();
  if (rest !== null) {
    reader.report('unreadable-line', 'A structure ends at the first blank; put // before a remark.', rest);
  }
  const smiles = line.slice(smilesStart, smilesEnd);
  const smilesSpan = { start: smilesStart, end: smilesEnd };
  return treeOf(reader, comment, { keyword: 'compound', name, nameSpan, smiles, smilesSpan }, keyword);
}

function treeOf(reader: LineReader, comment: Span | null, syntax: Syntax | null, keyword: Span): LineTree {
  return {
    text: reader.line,
    leaves: reader.leaves(comment),
    syntax,
    keyword: syntax === null ? null : keyword,
    span: { start: keyword.start, end: reader.end },
    names: reader.names,
    problems: reader.problems.slice(0, 1),
  };
}

function skipBlanks(line: string, from: number): number {
  let at = from;
  while (at < line.length && isBlank(line, at)) at++;
  return at;
}

/** The first blank outside brackets; a bracket that never closes holds no blanks. */
function endOfStructure(line: string, start: number): number {
  const lastClose = line.lastIndexOf(']');
  let open = false;
  let at = start;
  for (; at < line.length; at++) {
    const character = line[at];
    if (character === '[') open = at < lastClose;
    else if (character === ']') open = false;
    else if (!open && isBlank(line, at)) break;
  }
  // `compound 1 = // later`: a remark is no structure.
  return line.startsWith('//', start) ? start : at;
}
