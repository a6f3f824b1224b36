/**
 * Turns answers into the protocol's shapes.
 *
 * Knows: answers, the protocol.  Must not know: connections, documents.
 */
import {
  type CodeAction,
  CodeActionKind,
  type CompletionItem,
  CompletionItemKind,
  type Diagnostic,
  DiagnosticSeverity,
  DiagnosticTag,
  type DocumentSymbol,
  type FoldingRange,
  FoldingRangeKind,
  type InlayHint,
  MarkupKind,
  SymbolKind,
} from 'vscode-languageserver';
import type { Choice, ChoiceKind } from '../answers/completion.ts';
import type { Fix } from '../answers/fix.ts';
import type { Fold } from '../answers/folding.ts';
import type { Hint } from '../answers/hints.ts';
import type { PlanSymbol } from '../answers/symbols.ts';
import type { Finding, Severity } from '../checks/finding.ts';

const SEVERITY: Readonly<Record<Severity, DiagnosticSeverity>> = {
  error: DiagnosticSeverity.Error,
  warning: DiagnosticSeverity.Warning,
  information: DiagnosticSeverity.Information,
  hint: DiagnosticSeverity.Hint,
};
/** Scheme of the pages that explain checks. */
export const PAGE_SCHEME = 'lyate-check';

export interface DiagnosticContext {
  readonly uri: string;
  /** Address of another file of the same workspace. */
  readonly uriOf: (file: string) => string;
  /** The client can open pages of `PAGE_SCHEME`. */
  readonly pages: boolean;
}

/** A finding as the editor shows it; what is accepted is not shown. */
export function toDiagnostic(finding: Finding, { uri, uriOf, pages }: DiagnosticContext): Diagnostic {
  const { check, severity, range, message, related, confidence, figures, step } = finding;
  return {
    range,
    severity: SEVERITY[severity],
    code: check,
    ...(pages ? { codeDescription: { href: pageAddress(check) } } : {}),
    source: 'lyate',
    message,
    ...(check === 'unused-compound' || check === 'accept-without-effect'
      ? { tags: [DiagnosticTag.Unnecessary] }
      : {}),
    relatedInformation: related.map((place) => ({
      location: { uri: place.file === undefined ? uri : uriOf(place.file), range: place.range },
      message: place.message,
    })),
    data: { confidence, figures, step },
  };
}

/** Address of the page of a check. */
export function pageAddress(check: string): string {
  return `${PAGE_SCHEME}:/${check}.md`;
}

const CHOICE: Readonly<Record<ChoiceKind, CompletionItemKind>> = {
  keyword: CompletionItemKind.Keyword,
  compound: CompletionItemKind.Variable,
  reagent: CompletionItemKind.Constant,
  solvent: CompletionItemKind.Field,
  site: CompletionItemKind.Property,
  unit: CompletionItemKind.Unit,
  value: CompletionItemKind.EnumMember,
  label: CompletionItemKind.Reference,
  check: CompletionItemKind.Function,
};

export function toCompletion({ kind, label, text, range, detail, page, rank }: Choice): CompletionItem {
  return {
    label,
    kind: CHOICE[kind],
    detail,
    textEdit: { range, newText: text },
    filterText: label,
    sortText: `${String(Math.round(rank * 10) + 1000).padStart(6, '0')}${label.toLowerCase()}`,
    ...(page === '' ? {} : { documentation: { kind: MarkupKind.Markdown, value: page } }),
  };
}

const SYMBOL = {
  compound: SymbolKind.Variable,
  step: SymbolKind.Function,
  statement: SymbolKind.Event,
} as const;

export function toSymbol({ kind, name, detail, range, nameRange, children }: PlanSymbol): DocumentSymbol {
  return {
    name: name === '' ? kind : name,
    detail,
    kind: SYMBOL[kind],
    range,
    selectionRange: nameRange,
    children: children.map(toSymbol),
  };
}

export function toFold({ firstLine, lastLine, kind }: Fold): FoldingRange {
  return {
    startLine: firstLine,
    endLine: lastLine,
    ...(kind === 'comment' ? { kind: FoldingRangeKind.Comment } : {}),
    ...(kind === 'compounds' ? { kind: FoldingRangeKind.Region } : {}),
  };
}

export function toHint({ behind, text, tooltip }: Hint): InlayHint {
  return { position: behind.end, label: text, tooltip, paddingLeft: true };
}

export function toAction(
  { title, edits, safe, preferred }: Fix,
  uri: string,
  diagnostic: Diagnostic,
): CodeAction {
  return {
    title: safe ? title : `${title} (needs thought)`,
    kind: CodeActionKind.QuickFix,
    diagnostics: [diagnostic],
    isPreferred: preferred,
    edit: { changes: { [uri]: edits.map(({ range, text }) => ({ range, newText: text })) } },
  };
}
