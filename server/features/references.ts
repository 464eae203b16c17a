import {
  type DocumentHighlight,
  DocumentHighlightKind,
  type DocumentHighlightParams,
  type Location,
  type ReferenceParams,
} from 'vscode-languageserver';
import { highlightsAt, referencesOf } from '../../src-core/assist/names';
import { toLocation, toRange } from '../convert';
import { type Handler, located } from '../handler';
import { libraryOf } from '../library';

/** Every place that names what stands here, in closed files too. */
export const references: Handler<ReferenceParams, Location[] | null> =
  (services) =>
  async ({ textDocument, position, context }, token) => {
    const at = await located(services, textDocument.uri, token, position, 'model');
    if (!at) return null;
    const library = await libraryOf(services, at, token);
    return referencesOf(library, at.file, at.offset, context.includeDeclaration).map(({ file, range }) =>
      toLocation(services.documents.uriOf({ root: at.root, file }), library.get(file)!.text, range),
    );
  };

export const highlights: Handler<DocumentHighlightParams, DocumentHighlight[] | null> =
  (services) =>
  async ({ textDocument, position }, token) => {
    const at = await located(services, textDocument.uri, token, position, 'model');
    if (!at) return null;
    return highlightsAt(at.analysis.parsed, at.file, at.offset).map(({ range, declares }) => ({
      range: toRange(at.text, range),
      kind: declares ? DocumentHighlightKind.Write : DocumentHighlightKind.Read,
    }));
  };
