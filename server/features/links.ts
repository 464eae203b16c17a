import type { DocumentLink, DocumentLinkParams } from 'vscode-languageserver';
import { linksOf } from '../../src-core/assist/links';
import { toRange } from '../convert';
import { type Handler, located } from '../handler';

/** The paths of parts and Touchstone files; where they lead is worked out on a click. */
export const documentLinks: Handler<DocumentLinkParams, DocumentLink[] | null> =
  (services) =>
  async ({ textDocument }, token) => {
    const at = await located(services, textDocument.uri, token, undefined, 'model');
    return at
      ? linksOf(at.analysis.parsed, at.file).map(({ range, target }) => ({
          range: toRange(at.text, range),
          data: { uri: textDocument.uri, target },
        }))
      : null;
  };

export const resolveLink: Handler<DocumentLink, DocumentLink> = (services) => async (link) => {
  const { uri, target } = (link.data ?? {}) as { uri?: string; target?: string };
  if (uri === undefined || target === undefined) return link;
  return { ...link, target: services.documents.uriOf({ root: services.documents.locate(uri).root, file: target }) };
};
