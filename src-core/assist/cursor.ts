import type { TextRange, ValuePath } from '../text/types';
import { climb, type Level, MOST_NESTED, withKeysBelow } from './climb';
import { type LineParts, linesBefore, outsideQuotes, withoutComment, wordEnd } from './cursor-lines';
import { inFlow, openBrackets } from './flow-cursor';

export type { Level };

/**
 * Where a cursor stands in a text that need not parse: found from lines, dashes, indentation and open brackets alone,
 * since the very line that is being typed is the one that no parser understands yet.
 */
export interface Cursor {
  /** Of the mapping (`on: 'key'`), the value (`'value'`, its key or index last) or the list (`'item'`) that holds the cursor. */
  readonly path: ValuePath;
  /** `item`: behind a dash, where a mapping or a plain value may begin. */
  readonly on: 'key' | 'value' | 'item';
  /** Level by level, outermost first, the keys of each mapping on the way with their text behind the colon. */
  readonly levels: readonly Level[];
  /** What is replaced, to the end of the word under the cursor. */
  readonly token: TextRange;
  /** From the start of the token (a value: of the whole value) to the cursor. */
  readonly typed: string;
  /** For a key: a colon follows already. */
  readonly hasColon: boolean;
  /** Directly behind `:`, `-` or `,` without the space that YAML needs. */
  readonly needsSpace: boolean;
  readonly flow: boolean;
  /** Where the keys of this mapping, or the dashes of this list, stand. */
  readonly column: number;
}

const LONGEST_LINE = 10_000;

export function cursorAt(text: string, offset: number): Cursor | undefined {
  const lines = linesBefore(text, offset);
  const current = lines.at(-1)!;
  const cursorColumn = offset - current.start;
  // Nobody types at the end of such a line, and what follows looks at it several times.
  if (current.text.length > LONGEST_LINE) return undefined;
  const before = current.text.slice(0, cursorColumn);
  if (/(^|\s)#/.test(outsideQuotes(before))) return undefined;
  const open = openBrackets(lines, cursorColumn);
  if (open.length > MOST_NESTED) return undefined;
  return open.length > 0 ? inFlow(text, offset, lines, open) : inBlock(text, offset, lines, cursorColumn);
}

function inBlock(text: string, offset: number, lines: readonly LineParts[], cursorColumn: number): Cursor | undefined {
  const line = lines.at(-1)!;
  const lineStop = line.start + line.text.length;
  const value = line.key !== undefined && cursorColumn >= line.valueColumn;
  const finish = (
    path: ValuePath,
    levels: readonly Level[],
    on: Cursor['on'],
    token: TextRange,
    column: number,
    more: Partial<Cursor> = {},
  ): Cursor => ({
    path,
    on,
    levels,
    token,
    typed: text.slice(token.start, offset),
    hasColon: false,
    needsSpace: false,
    flow: false,
    column,
    ...more,
  });
  if (value) {
    const climbed = climb(lines, line.column);
    if (!climbed) return undefined;
    const { path, levels } = climbed;
    const last = withKeysBelow(text, offset, line.column, levels.at(-1));
    const keys = new Map(last?.keys);
    keys.delete(line.key!);
    const start = line.start + line.valueColumn + /^\s*/.exec(line.text.slice(line.valueColumn))![0].length;
    const token = {
      start: Math.min(start, offset),
      end: Math.max(offset, Math.min(lineStop, line.start + withoutComment(line.text).trimEnd().length)),
    };
    const all = [...levels.slice(0, -1), { path, keys }];
    return finish([...path, line.key!], all, 'value', token, line.column, {
      needsSpace: line.text[cursorColumn - 1] === ':',
    });
  }
  const lastDash = line.dashes.at(-1);
  if (lastDash !== undefined && cursorColumn > lastDash) {
    const content = Math.max(line.column, lastDash + 2);
    const climbed = climb(lines, content);
    if (!climbed) return undefined;
    const { path, levels } = climbed;
    const token = { start: line.start + Math.min(line.column, cursorColumn), end: 0 };
    token.end = wordEnd(text, Math.max(offset, token.start), line.key !== undefined ? /[:\s]/ : /[\n\r#]/);
    const last = withKeysBelow(text, offset, content, levels.at(-1));
    return finish(path, last ? [...levels.slice(0, -1), last] : levels, 'item', token, content, {
      hasColon: line.key !== undefined,
      needsSpace: line.text[cursorColumn - 1] === '-' && cursorColumn - 1 === lastDash,
    });
  }
  const column = Math.min(line.blank ? cursorColumn : line.column, cursorColumn);
  const climbed = climb(lines, column);
  if (!climbed) return undefined;
  const { path, levels } = climbed;
  const token = { start: line.start + column, end: wordEnd(text, offset, /[:\s]/) };
  const last = withKeysBelow(text, offset, column, levels.at(-1));
  const keys = new Map(last?.keys);
  if (line.key !== undefined) keys.delete(line.key);
  return finish(path, [...levels.slice(0, -1), { path, keys }], 'key', token, column, {
    hasColon: line.key !== undefined,
  });
}
