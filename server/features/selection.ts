import { Range, type SelectionRange, type SelectionRangeParams } from 'vscode-languageserver';
import { selectionAt } from '../../src-core/assist/selection';
import { offsetAt, toRange } from '../convert';
import { type Handler, located } from '../handler';

/** What a selection grows to: value, pair, element, list, file. */
export const selectionRanges: Handler<SelectionRangeParams, SelectionRange[] | null> =
  (services) =>
  async ({ textDocument, positions }, token) => {
    const at = await located(services, textDocument.uri, token, undefined, 'model');
    const parsed = at?.analysis.parsed.get(at.file);
    if (!at || !parsed) return null;
    return positions.map((position) => {
      const ranges = selectionAt(parsed, offsetAt(at.text, position));
      return (
        ranges.reduceRight<SelectionRange | undefined>(
          (parent, range) => ({ range: toRange(at.text, range), ...(parent && { parent }) }),
          undefined,
        ) ?? { range: Range.create(position, position) }
      );
    });
  };
