/**
 * Collects what a block defines: compounds with their measured values, files to use, and what it says about itself.
 *
 * Knows: trees, structures, tables.  Must not know: other blocks, files' text.
 * Lines are relative to the block's first line.
 */
import type { OwnValue } from '../chemistry/couple.ts';
import { boundedCache } from '../tables/cache.ts';
import type { Tables } from '../tables/tables.ts';
import type { Block } from './document.ts';
import { asSolvent, rangeOf, resolveName, type Scope } from './names.ts';
import type { AcceptStatement, Definition, Range, TextProblem } from './plan.ts';
import { structureOf } from './structures.ts';

export interface DefinedCompound {
  readonly definition: Definition;
  readonly nameRange: Range;
  readonly smilesRange: Range;
}

export interface BlockDefinitions {
  readonly title: string | null;
  readonly compounds: readonly DefinedCompound[];
  readonly uses: readonly { readonly path: string; readonly range: Range }[];
  /** Only of a block before the first step. */
  readonly accepts: readonly AcceptStatement[];
  readonly problems: readonly TextProblem[];
}

/** Equal definitions are one object, so that what was worked out from one holds for the other. */
const interned = boundedCache<string, Definition>(20_000);

/** What one block defines. */
export function definitionsOf(block: Block, file: string | undefined, tables: Tables): BlockDefinitions {
  const problems: TextProblem[] = [];
  const compounds: { draft: Definition; measured: OwnValue[]; nameRange: Range; smilesRange: Range }[] = [];
  const uses: { path: string; range: Range }[] = [];
  const accepts: AcceptStatement[] = [];
  let title: string | null = null;
  for (const [line, { syntax, span, keyword, problems: own }] of block.lines.entries()) {
    if (!block.isStep) {
      for (const { check, message, start, end } of own) {
        problems.push({ check, message, range: rangeOf(line, { start, end }) });
      }
    }
    if (syntax === null) continue;
    const range = rangeOf(line, span);
    if (syntax.keyword === 'plan') title ??= syntax.title;
    else if (syntax.keyword === 'use')
      uses.push({ path: syntax.path, range: rangeOf(line, syntax.pathSpan) });
    else if (syntax.keyword === 'compound') {
      const { name, smiles, nameSpan, smilesSpan } = syntax;
      const { problem } = structureOf(smiles);
      if (problem !== null) {
        const { start, end } = problem.span;
        const place = rangeOf(line, { start: smilesSpan.start + start, end: smilesSpan.start + end });
        problems.push({ check: problem.check, message: problem.message, range: place });
      }
      compounds.push({
        draft: { name, smiles, file, measured: [] },
        measured: [],
        nameRange: rangeOf(line, nameSpan),
        smilesRange: rangeOf(line, smilesSpan),
      });
    } else if (syntax.keyword === 'measured') {
      const above = compounds.at(-1);
      if (above === undefined) {
        problems.push({
          check: 'unreadable-line',
          message: 'A measured value belongs below a compound.',
          range,
        });
        continue;
      }
      const scope: Scope = { tables, declared: new Map(), line, problems };
      const value = ownValue(syntax, above.draft.smiles, scope);
      if (value !== null) above.measured.push(value);
    } else if (!block.isStep) {
      if (syntax.keyword === 'accept') {
        const { check, reason, checkSpan } = syntax;
        const keywordRange = rangeOf(line, keyword ?? span);
        accepts.push({
          keyword: 'accept',
          check,
          reason,
          checkRange: rangeOf(line, checkSpan),
          range,
          keywordRange,
        });
      } else if (syntax.keyword !== 'note') {
        problems.push({
          check: 'unreadable-line',
          message: `“${syntax.keyword}” belongs inside a step; write a line such as step A above it.`,
          range: rangeOf(line, keyword ?? span),
        });
      }
    }
  }
  return {
    title,
    compounds: compounds.map(({ draft, measured, nameRange, smilesRange }) => ({
      definition: internDefinition({ ...draft, measured }),
      nameRange,
      smilesRange,
    })),
    uses,
    accepts,
    problems,
  };
}

/** The one object that stands for this definition, whoever asks. */
export function internDefinition(definition: Definition): Definition {
  const key = JSON.stringify(definition);
  const known = interned.get(key);
  if (known !== undefined) return known;
  interned.set(key, definition);
  return definition;
}

function ownValue(
  {
    value,
    sd,
    sites,
    medium,
    source,
  }: Extract<NonNullable<Block['lines'][number]['syntax']>, { keyword: 'measured' }>,
  smiles: string,
  scope: Scope,
): OwnValue | null {
  const { substance } = resolveName(medium, scope, 'error');
  const { solvent } = asSolvent(substance, scope.tables);
  const known = structureOf(smiles);
  const atoms = sites.flatMap(({ map, start, end }) => {
    const found = known.sites.get(map);
    if (found === undefined && known.problem === null) {
      scope.problems.push({
        check: 'site-not-found',
        message: `The compound above has no atom with the number :${map}.`,
        range: rangeOf(scope.line, { start, end }),
      });
    }
    return found ?? [];
  });
  if (solvent === null || (sites.length !== 0 && atoms.length === 0)) {
    if (solvent === null && substance.kind !== 'unknown') {
      scope.problems.push({
        check: 'unknown-name',
        message: `${substance.name} is not among the solvents on whose scale a value can be measured.`,
        severity: 'error',
        range: substance.range,
      });
    }
    return null;
  }
  return { origin: 'plan', value, sd, atoms, scale: solvent.scale, source };
}
