import { type Location, type TextEdit as ProtocolTextEdit, Range, type WorkspaceEdit } from 'vscode-languageserver';
import { offsetAt, positionAt } from '../src-core/text/position';
import type { FilePath, TextEdit, TextRange } from '../src-core/text/types';

export { offsetAt, positionAt };

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
