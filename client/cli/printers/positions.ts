import type { Analysis } from '../../../src-core/analysis';
import { positionAt } from '../../../src-core/text/position';
import { rangeOf } from '../../../src-core/text/range';
import type { Place, TextRange } from '../../../src-core/text/types';

/** Line and column as people count them, from 1; columns in UTF-16 units. */
function fromOne(text: string, offset: number) {
  const { line, character } = positionAt(text, offset);
  return { line: line + 1, column: character + 1 };
}

export const positionsIn = (text: string, { start, end }: TextRange) => ({
  start: fromOne(text, start),
  end: fromOne(text, end),
});

/** Where a finding or a related place stands in the newest text. */
export function locate({ at, range }: { at: Place; range?: TextRange }, { parsed }: Analysis) {
  const file = parsed.get(at.file);
  const found = range ?? (file ? rangeOf(file, at) : { start: 0, end: 0 });
  return { file: at.file, range: positionsIn(file?.text ?? '', found) };
}
