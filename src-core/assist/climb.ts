import type { ValuePath } from '../text/types';
import { type LineParts, partsOf } from './cursor-lines';

/** The keys of a mapping on the way to the cursor, with their text behind the colon. Of a list none. */
export interface Level {
  readonly path: ValuePath;
  readonly keys: ReadonlyMap<string, string>;
}

/** A dash, or a key with its value's text. */
interface Mark {
  readonly column: number;
  readonly key?: string;
  readonly value: string;
}

type Holder =
  | { readonly column: number; readonly keys: Map<string, string> }
  | { readonly column: number; index: number };

/** From below to above, from right to left; of the last line only what stands before `column`. */
function* marksUpwards(lines: readonly LineParts[], column: number): Generator<Mark> {
  for (let i = lines.length - 1; i >= 0; i--) {
    const line = lines[i];
    if (line.blank && i < lines.length - 1) continue;
    const marks: Mark[] = line.dashes.map((at) => ({ column: at, value: '' }));
    if (line.key !== undefined) marks.push({ column: line.column, key: line.key, value: line.value });
    for (const mark of marks.reverse()) if (i < lines.length - 1 || mark.column < column) yield mark;
  }
}

/** Deeper than any text that is read (design: 64). */
export const MOST_NESTED = 64;

export interface Climbed {
  readonly path: ValuePath;
  readonly levels: readonly Level[];
}

/**
 * Walks up from a column of the last line by indentation alone.
 * @returns the steps that lead to the mapping whose keys stand in that column, and every level on the way, outermost first;
 * undefined where it nests too deeply
 */
export function climb(lines: readonly LineParts[], column: number): Climbed | undefined {
  const path: (string | number)[] = [];
  const keys: Map<string, string>[] = [];
  let here: Holder = { column, keys: new Map() };
  const leave = () => {
    if ('index' in here) path.unshift(here.index);
    keys.unshift('index' in here ? new Map() : here.keys);
  };
  for (const mark of marksUpwards(lines, column)) {
    if (keys.length > MOST_NESTED) return undefined;
    const isOuter = mark.column < here.column;
    if (mark.key === undefined) {
      if ('index' in here && mark.column === here.column) here.index++;
      else if (isOuter) {
        leave();
        here = { column: mark.column, index: 0 };
      }
    } else if (isOuter || ('index' in here && mark.column === here.column)) {
      // A list may stand in its key's own column.
      leave();
      path.unshift(mark.key);
      here = { column: mark.column, keys: new Map([[mark.key, mark.value]]) };
    } else if ('keys' in here && mark.column === here.column && !here.keys.has(mark.key))
      here.keys.set(mark.key, mark.value);
  }
  leave();
  return { path, levels: keys.map((level, depth) => ({ path: path.slice(0, depth), keys: level })) };
}

/** The innermost level with the keys of its mapping that stand below the cursor, too. */
export function withKeysBelow(
  text: string,
  offset: number,
  column: number,
  level: Level | undefined,
): Level | undefined {
  if (!level) return level;
  const keys = new Map(level.keys);
  let start = text.indexOf('\n', offset);
  while (start !== -1) {
    const end = text.indexOf('\n', start + 1);
    const line = partsOf(start + 1, text.slice(start + 1, end === -1 ? text.length : end).replace(/\r$/, ''));
    start = end;
    if (line.blank) continue;
    if (line.dashes.length > 0 ? line.dashes[0] < column : line.column < column) break;
    if (line.dashes.length === 0 && line.column === column && line.key !== undefined) keys.set(line.key, line.value);
  }
  return { path: level.path, keys };
}
