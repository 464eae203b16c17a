import { appendEdit } from './append';
import { firstEdit } from './first';
import type { ParsedFile } from './parsed';
import { find, rootOf } from './range';
import { removeEdit } from './remove';
import { setEdit, valueEdit } from './set';
import type { FilePath, Place, PlaceEdit, TextEdit } from './types';

/**
 * Turns edits of places into edits of the texts as they are now: comments, indentation, style and line endings are kept. What
 * no longer exists is left out.
 * @returns sorted by file and offset, none overlapping another
 */
export function resolveEdits(edits: readonly PlaceEdit[], parsed: ReadonlyMap<FilePath, ParsedFile>): TextEdit[] {
  const resolved: TextEdit[] = [];
  for (const edit of joinAppends(edits)) {
    const file = parsed.get(edit.op === 'range' ? edit.file : edit.at.file);
    const made = file && resolveOne(edit, file, edits);
    if (made) resolved.push(made);
  }
  const sorted = resolved
    .map((edit, order) => ({ edit, order }))
    .sort(
      (a, b) =>
        compare(a.edit.file, b.edit.file) ||
        a.edit.range.start - b.edit.range.start ||
        a.edit.range.end - b.edit.range.end ||
        a.order - b.order,
    )
    .map(({ edit }) => edit);
  const kept: TextEdit[] = [];
  for (const edit of sorted) {
    const before = kept[kept.length - 1];
    // Insertions at one place stand one behind the other; all else that touches the same text would spoil it.
    if (!before || before.file !== edit.file || before.range.end <= edit.range.start) kept.push(edit);
  }
  return kept;
}

const compare = (a: string, b: string) => (a < b ? -1 : a > b ? 1 : 0);

export type JoinedEdit =
  | Exclude<PlaceEdit, { op: 'append' }>
  | { op: 'append'; at: Place; entries: readonly (readonly string[])[]; index?: number };

/** Entries for one list in one edit, so that a list that is not there yet is made once. */
function joinAppends(edits: readonly PlaceEdit[]): JoinedEdit[] {
  const lists = new Map<string, { op: 'append'; at: Place; entries: (readonly string[])[]; index?: number }>();
  const joined: JoinedEdit[] = [];
  for (const edit of edits) {
    if (edit.op !== 'append') {
      joined.push(edit);
      continue;
    }
    const key = JSON.stringify([edit.at.file, edit.at.path, edit.index ?? null]);
    const list = lists.get(key);
    if (list) list.entries.push(edit.lines);
    else {
      const made = { op: 'append' as const, at: edit.at, entries: [edit.lines], index: edit.index };
      lists.set(key, made);
      joined.push(made);
    }
  }
  return joined;
}

function resolveOne(edit: JoinedEdit, parsed: ParsedFile, all: readonly PlaceEdit[]): TextEdit | undefined {
  const { file, text } = parsed;
  if (edit.op === 'range') {
    const start = Math.max(0, Math.min(edit.range.start, text.length));
    return { file, range: { start, end: Math.max(start, Math.min(edit.range.end, text.length)) }, text: edit.text };
  }
  if (edit.op === 'set') return setEdit(parsed, edit);
  if (edit.op === 'first') return firstEdit(parsed, edit.at.path);
  if (edit.op === 'append') return appendEdit(parsed, edit.at, edit.entries, edit.index);
  const found = find(rootOf(parsed), edit.at.path);
  if (found.depth < edit.at.path.length) return undefined;
  if (edit.op === 'value') return valueEdit(parsed, found, edit.text);
  if (edit.op === 'key') return found.pair && { file, range: found.pair.keyRange, text: edit.name };
  const removed = all.flatMap((other) => (other.op === 'remove' && other.at.file === file ? [other.at.path] : []));
  return removeEdit(parsed, edit.at.path, removed);
}

/**
 * A text with edits applied, in any order; of two that overlap the first in the text counts, insertions at one place stay in order.
 */
export function applyEdits(text: string, edits: readonly Pick<TextEdit, 'range' | 'text'>[]): string {
  const sorted = edits
    .map((edit, order) => ({ ...edit, order }))
    .sort((a, b) => a.range.start - b.range.start || a.range.end - b.range.end || a.order - b.order);
  let result = '';
  let at = 0;
  for (const edit of sorted) {
    if (edit.range.start < at || edit.range.end > text.length || edit.range.end < edit.range.start) continue;
    result += text.slice(at, edit.range.start) + edit.text;
    at = edit.range.end;
  }
  return result + text.slice(at);
}
