import {
  type CompletionItem,
  CompletionItemKind,
  type CompletionList,
  type CompletionParams,
  InsertTextFormat,
  InsertTextMode,
  MarkupKind,
} from 'vscode-languageserver';
import { type Completion, completionsAt } from '../../src-core/assist/completions';
import { describeKeyAt } from '../../src-core/assist/describe-key';
import { parseCached } from '../../src-core/inputs';
import { offsetAt, toRange, toTextEdit } from '../convert';
import type { Handler } from '../handler';

const KINDS: Readonly<Record<Completion['kind'], CompletionItemKind>> = {
  key: CompletionItemKind.Property,
  element: CompletionItemKind.Snippet,
  name: CompletionItemKind.Reference,
  unit: CompletionItemKind.Unit,
  value: CompletionItemKind.Value,
  file: CompletionItemKind.File,
  folder: CompletionItemKind.Folder,
};

interface ItemData {
  readonly fileKind: string;
  readonly about: NonNullable<Completion['about']>;
}

/** What may be written here. The text is read anew; names come from the last analysis, so that no list waits for figures. */
export const completion: Handler<CompletionParams, CompletionList | null> =
  (services) =>
  async ({ textDocument, position }, token) => {
    const document = services.documents.get(textDocument.uri);
    if (!document) return null;
    const { text, located } = document;
    const { root, file } = located;
    const parsed = parseCached(file, text);
    const analysis = services.analyses.last(located) ?? (await services.analyses.current(located, token, 'model'));
    const items = await completionsAt(parsed, analysis, offsetAt(text, position), {
      list: (folder) => services.filesOf(root).list(folder),
      library: () => services.workspace.library(root, token, 'parts'),
    });
    const made = items.map((item) => toItem(item, text, parsed.kind, services.client.snippets));
    const isIncomplete = items.some(({ kind }) => kind === 'unit');
    return services.client.itemDefaults ? withDefaults(made, isIncomplete) : { isIncomplete, items: made };
  };

/** The range that all items share is said once. */
function withDefaults(items: readonly CompletionItem[], isIncomplete: boolean): CompletionList {
  const shared = items[0]?.textEdit && 'range' in items[0].textEdit ? items[0].textEdit.range : undefined;
  const isShared = ({ textEdit }: CompletionItem) =>
    textEdit && 'range' in textEdit && JSON.stringify(textEdit.range) === JSON.stringify(shared);
  return {
    isIncomplete,
    ...(shared && { itemDefaults: { editRange: shared, insertTextMode: InsertTextMode.asIs } }),
    items: items.map((item) => {
      if (!isShared(item)) return item;
      const { textEdit, insertTextMode: _same, ...rest } = item;
      return { ...rest, textEditText: textEdit!.newText };
    }),
  };
}

function toItem(completion: Completion, text: string, fileKind: string, snippets: boolean): CompletionItem {
  const { label, kind, detail, insert, isSnippet, range, filter, rank, preselect, retrigger, also, about } = completion;
  return {
    label,
    kind: KINDS[kind],
    ...(detail && { labelDetails: { description: detail } }),
    filterText: filter,
    sortText: String(rank + 1000).padStart(5, '0') + label,
    textEdit: { range: toRange(text, range), newText: isSnippet && !snippets ? withoutPlaceholders(insert) : insert },
    insertTextFormat: isSnippet && snippets ? InsertTextFormat.Snippet : InsertTextFormat.PlainText,
    insertTextMode: InsertTextMode.asIs,
    ...(preselect && { preselect }),
    ...(kind === 'name' && { commitCharacters: [','] }),
    ...(retrigger && { command: { title: 'Suggest', command: 'editor.action.triggerSuggest' } }),
    ...(also && { additionalTextEdits: also.map((edit) => toTextEdit(text, edit)) }),
    ...(about && { data: { fileKind, about } satisfies ItemData }),
  };
}

const withoutPlaceholders = (snippet: string) =>
  snippet.replace(/\$\{\d+:((?:[^\\}]|\\.)*)\}|\$\d/g, '$1').replace(/\\([\\$}])/g, '$1');

/** The explanation of a key, made for the one that is looked at. */
export const resolveCompletion: Handler<CompletionItem, CompletionItem> = () => async (item) => {
  const { fileKind, about } = (item.data ?? {}) as Partial<ItemData>;
  const value = fileKind !== undefined && about ? describeKeyAt(fileKind, about.path, about.kind) : undefined;
  return value === undefined ? item : { ...item, documentation: { kind: MarkupKind.Markdown, value } };
};
