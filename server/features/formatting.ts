import type { DocumentFormattingParams, TextEdit } from 'vscode-languageserver';
import { formatText } from '../../src-core/assist/format';
import { positionAt } from '../convert';
import type { Handler } from '../handler';

/** One small edit a changed stretch, so that the caret and folds stay where they are. */
export const formatting: Handler<DocumentFormattingParams, TextEdit[] | null> =
  ({ documents }) =>
  async ({ textDocument }) => {
    const document = documents.get(textDocument.uri);
    if (!document) return null;
    const before = document.text;
    const after = formatText(before);
    if (after === before) return [];
    let start = 0;
    while (start < before.length && before[start] === after[start]) start++;
    let end = 0;
    while (
      end < before.length - start &&
      end < after.length - start &&
      before[before.length - 1 - end] === after[after.length - 1 - end]
    )
      end++;
    const range = { start: positionAt(before, start), end: positionAt(before, before.length - end) };
    return [{ range, newText: after.slice(start, after.length - end) }];
  };
