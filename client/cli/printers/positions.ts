import type { Analysis } from '../../../src-core/analysis';
import { rangeOf } from '../../../src-core/text/range';
import type { Place, TextRange } from '../../../src-core/text/types';

export interface Position {
  readonly line: number;
  readonly column: number;
}

/** Line and column from 1, columns in UTF-16 units; CR LF, LF and CR end a line. */
export function positionAt(text: string, offset: number): Position {
  let line = 1;
  let start = 0;
  for (let i = 0; i < offset && i < text.length; i++) {
    const code = text.charCodeAt(i);
    if (code === 10 || (code === 13 && text.charCodeAt(i + 1) !== 10)) {
      line++;
      start = i + 1;
    }
  }
  return { line, column: Math.max(1, Math.min(offset, text.length) - start + 1) };
}

export const positionsIn = (text: string, { start, end }: TextRange) => ({
  start: positionAt(text, start),
  end: positionAt(text, end),
});

/** Where a finding or a related place stands in the newest text. */
export function locate({ at, range }: { at: Place; range?: TextRange }, { parsed }: Analysis) {
  const file = parsed.get(at.file);
  const found = range ?? (file ? rangeOf(file, at) : { start: 0, end: 0 });
  return { file: at.file, range: positionsIn(file?.text ?? '', found) };
}
