import { type HoverParams, MarkupKind } from 'vscode-languageserver';
import { describeAt } from '../../src-core/assist/describe';
import { toRange } from '../convert';
import { type Handler, located } from '../handler';

/** What stands under the pointer and what it means for this channel. */
export const hover: Handler<HoverParams, unknown> =
  (services) =>
  async ({ textDocument, position }, token) => {
    const at = await located(services, textDocument.uri, token, position);
    const found = at && describeAt(at.analysis, at.file, at.offset);
    return found
      ? { contents: { kind: MarkupKind.Markdown, value: found.markdown }, range: toRange(at.text, found.range) }
      : null;
  };
