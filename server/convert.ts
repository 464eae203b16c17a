import {
  type Location,
  Position,
  type TextEdit as ProtocolTextEdit,
  Range,
  type WorkspaceEdit,
} from 'vscode-languageserver';
import type { FilePath, TextEdit, TextRange } from '../src-core/text/types';

/** Line starts of one text, for quick changes between offsets and positions. Lines end with LF, CRLF or CR, as the protocol has it. */
export interface Lines {
  readonly text: string;
  readonly starts: readonly number[];
}

let lastLines: Lines = { text: '', starts: [0] };

export function linesOf(text: string): Lines {
  if (lastLines.text === text) return lastLines;
  const starts = [0];
  for (let i = 0; i < text.length; i++) {
    const code = text.charCodeAt(i);
    if (code === 13 && text.charCodeAt(i + 1) === 10) i++;
    if (code === 10 || code === 13) starts.push(i + 1);
  }
  lastLines = { text, starts };
  return lastLines;
}

export function positionAt(text: string, offset: number): Position {
  const { starts } = linesOf(text);
  const inside = Math.max(0, Math.min(offset, text.length));
  let low = 0;
  let high = starts.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (starts[middle] <= inside) low = middle;
    else high = middle - 1;
  }
  return Position.create(low, inside - starts[low]);
}

export function offsetAt(text: string, { line, character }: Position): number {
  const { starts } = linesOf(text);
  if (line < 0) return 0;
  if (line >= starts.length) return text.length;
  const end = line + 1 < starts.length ? starts[line + 1] : text.length;
  return Math.max(starts[line], Math.min(starts[line] + character, end));
}

export const toRange = (text: string, { start, end }: TextRange): Range =>
  Range.create(positionAt(text, start), positionAt(text, end));
export const fromRange = (text: string, { start, end }: Range): TextRange => ({
  start: offsetAt(text, start),
  end: offsetAt(text, end),
});
export const toLocation = (uri: string, text: string, range: TextRange): Location => ({
  uri,
  range: toRange(text, range),
});
export const toTextEdit = (text: string, edit: { range: TextRange; text: string }): ProtocolTextEdit => ({
  range: toRange(text, edit.range),
  newText: edit.text,
});

/** Edits of several files as one change; with versions of open documents where the client can hold us to them. */
export function toWorkspaceEdit(
  edits: readonly TextEdit[],
  textOf: (file: FilePath) => string | undefined,
  documentOf: (file: FilePath) => { uri: string; version: number | null },
  versioned: boolean,
): WorkspaceEdit {
  const byFile = new Map<FilePath, ProtocolTextEdit[]>();
  for (const edit of edits) {
    const text = textOf(edit.file);
    if (text === undefined) continue;
    const list = byFile.get(edit.file) ?? [];
    list.push(toTextEdit(text, edit));
    byFile.set(edit.file, list);
  }
  if (versioned) {
    return { documentChanges: [...byFile].map(([file, list]) => ({ textDocument: documentOf(file), edits: list })) };
  }
  return { changes: Object.fromEntries([...byFile].map(([file, list]) => [documentOf(file).uri, list])) };
}
