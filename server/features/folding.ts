import { type FoldingRange, FoldingRangeKind, type FoldingRangeParams } from 'vscode-languageserver';
import { foldsOf } from '../../src-core/assist/folds';
import type { Handler } from '../handler';

const KINDS = { comment: FoldingRangeKind.Comment, region: FoldingRangeKind.Region } as const;

/** Read from the text alone: there before any analysis. */
export const foldingRanges: Handler<FoldingRangeParams, FoldingRange[] | null> =
  ({ documents }) =>
  async ({ textDocument }) => {
    const document = documents.get(textDocument.uri);
    return document
      ? foldsOf(document.text).map(({ startLine, endLine, kind }) => ({
          startLine,
          endLine,
          ...(kind && { kind: KINDS[kind] }),
        }))
      : null;
  };
