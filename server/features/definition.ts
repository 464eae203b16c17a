import type { DefinitionLink, DefinitionParams, Location } from 'vscode-languageserver';
import { definitionAt } from '../../src-core/assist/names';
import { toRange } from '../convert';
import { type Handler, located } from '../handler';

/** Where a name is declared; with the whole of the declaration where the client shows it. */
export const definition: Handler<DefinitionParams, DefinitionLink[] | Location[] | null> =
  (services) =>
  async ({ textDocument, position }, token) => {
    const at = await located(services, textDocument.uri, token, position, 'model');
    const found = at && definitionAt(at.analysis.parsed, at.file, at.offset);
    if (!at || !found) return null;
    const links = found.targets.map(({ file, range, whole }): DefinitionLink => {
      const text = at.analysis.parsed.get(file)?.text ?? '';
      return {
        originSelectionRange: toRange(at.text, found.origin),
        targetUri: services.documents.uriOf({ root: at.root, file }),
        targetRange: toRange(text, whole),
        targetSelectionRange: toRange(text, range),
      };
    });
    return services.client.definitionLinks
      ? links
      : links.map(({ targetUri, targetSelectionRange }) => ({ uri: targetUri, range: targetSelectionRange }));
  };
