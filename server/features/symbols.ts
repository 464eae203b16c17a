import {
  type DocumentSymbol,
  type DocumentSymbolParams,
  SymbolKind,
  type WorkspaceSymbol,
  type WorkspaceSymbolParams,
} from 'vscode-languageserver';
import { rangeOfOccurrence } from '../../src-core/assist/names';
import { occurrencesIn } from '../../src-core/assist/occurrences';
import { type OutlineItem, type OutlineKind, outlineOf } from '../../src-core/assist/outline';
import { toRange } from '../convert';
import { type Handler, located } from '../handler';

const KINDS: Readonly<Record<OutlineKind, SymbolKind>> = {
  section: SymbolKind.Namespace,
  element: SymbolKind.Object,
  limit: SymbolKind.Boolean,
  waiver: SymbolKind.Event,
  name: SymbolKind.Class,
  layer: SymbolKind.Field,
  key: SymbolKind.Property,
  rule: SymbolKind.Function,
};

/** The outline, with figures; breadcrumbs and sticky lines come of it. */
export const documentSymbols: Handler<DocumentSymbolParams, DocumentSymbol[] | null> =
  (services) =>
  async ({ textDocument }, token) => {
    const at = await located(services, textDocument.uri, token);
    const parsed = at?.analysis.parsed.get(at.file);
    if (!at || !parsed) return null;
    const convert = ({ name, detail, kind, range, selection, children }: OutlineItem): DocumentSymbol => ({
      name,
      detail,
      kind: KINDS[kind],
      range: toRange(at.text, range),
      selectionRange: toRange(at.text, selection),
      children: children.map(convert),
    });
    return outlineOf(parsed, at.analysis).map(convert);
  };

const MOST_SYMBOLS = 500;

/** Declared names in every file below the open folders; places are looked up for those that are chosen from. */
export const workspaceSymbols: Handler<WorkspaceSymbolParams, WorkspaceSymbol[]> =
  (services) =>
  async ({ query }, token) => {
    const wanted = query.toLowerCase();
    const found: WorkspaceSymbol[] = [];
    for (const root of services.roots.all()) {
      const library = await services.workspace.library(root, token);
      for (const [file, parsed] of library) {
        if (token.isCancellationRequested || found.length >= MOST_SYMBOLS) return found;
        for (const occurrence of occurrencesIn(library, file)) {
          const { identity, declares } = occurrence;
          if (!declares || !isSubsequence(wanted, identity.name.toLowerCase())) continue;
          const range = rangeOfOccurrence(library, occurrence);
          if (!range) continue;
          const kind =
            identity.role === 'element'
              ? SymbolKind.Object
              : identity.role === 'layer'
                ? SymbolKind.Field
                : SymbolKind.Class;
          found.push({
            name: identity.name,
            kind,
            containerName: `${identity.role} in ${file}`,
            location: { uri: services.documents.uriOf({ root, file }), range: toRange(parsed.text, range) },
          });
        }
      }
    }
    return found;
  };

function isSubsequence(wanted: string, text: string): boolean {
  let at = 0;
  for (const sign of wanted) {
    at = text.indexOf(sign, at) + 1;
    if (at === 0) return false;
  }
  return true;
}
