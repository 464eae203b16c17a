import type { ParsedFile } from './parsed';
import { find, rootOf } from './range';
import { endOfLines, lineEndOf } from './set';
import { columnOf } from './syntax';
import type { TextEdit, ValuePath } from './types';

/** The keys of the mapping at `path` in the order in which they are written; what a merge brings in is not among them. */
export function writtenKeys(parsed: ParsedFile, path: ValuePath): readonly string[] {
  const { node, depth } = find(rootOf(parsed), path);
  if (depth < path.length || node.type !== 'map') return [];
  return node.pairs.map(({ key }) => key);
}

/**
 * Moves a pair before all others of its mapping, with the comment behind it; the others stay as they are.
 * @returns undefined where it is first, or where a comment inside braces is in the way
 */
export function firstEdit(parsed: ParsedFile, path: ValuePath): TextEdit | undefined {
  const { file, text } = parsed;
  const { parent, pair } = find(rootOf(parsed), path);
  if (!pair || parent?.type !== 'map') return undefined;
  const index = parent.pairs.indexOf(pair);
  if (index <= 0) return undefined;
  const { start } = parent.pairs[0].range;
  if (parent.flow) {
    const before = parent.pairs[index - 1].range.end;
    if (!/^\s*,\s*$/.test(text.slice(before, pair.range.start))) return undefined;
    const moved = `${text.slice(pair.range.start, pair.range.end)}, ${text.slice(start, before)}`;
    return { file, range: { start, end: pair.range.end }, text: moved };
  }
  const end = endOfLines(text, pair);
  const others = text.slice(start, pair.range.start).trimEnd();
  const moved = `${text.slice(pair.range.start, end)}${lineEndOf(parsed)}${' '.repeat(columnOf(text, start))}${others}`;
  return { file, range: { start, end }, text: moved };
}
