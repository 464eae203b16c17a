import { type Connection, TextDocuments } from 'vscode-languageserver';
import { TextDocument } from 'vscode-languageserver-textdocument';
import { idOf, type Located, type Roots, spelledAlike } from './roots';

/** A text as the editor shows it, saved or not. */
export interface OpenDocument {
  readonly uri: string;
  readonly version: number;
  readonly text: string;
  readonly located: Located;
}

/** The documents that are open in the editor, found by URI in any spelling or by place below a root. */
export interface Documents {
  get(uri: string): OpenDocument | undefined;
  at(located: Located): OpenDocument | undefined;
  all(): readonly OpenDocument[];
  locate(uri: string): Located;
  /** As the client spelt it where the document is open. */
  uriOf(located: Located): string;
  onOpen(listener: (document: OpenDocument) => void): void;
  onChange(listener: (document: OpenDocument) => void): void;
  onClose(listener: (document: OpenDocument) => void): void;
  listen(connection: Connection): void;
}

/** What a document without a telling name is by its language. */
const ENDINGS: Readonly<Record<string, string>> = {
  'lanewright-channel': '.channel.yaml',
  'lanewright-parts': '.parts.yaml',
};

export function followDocuments(roots: Roots): Documents {
  const texts = new TextDocuments(TextDocument);
  const byId = new Map<string, OpenDocument>();
  const byUri = new Map<string, OpenDocument>();
  const openListeners: ((document: OpenDocument) => void)[] = [];
  const changeListeners: ((document: OpenDocument) => void)[] = [];
  const closeListeners: ((document: OpenDocument) => void)[] = [];

  const named = (document: TextDocument): Located => {
    const located = roots.locate(document.uri);
    const ending = ENDINGS[document.languageId];
    return !ending || located.file.endsWith(ending) ? located : { root: located.root, file: located.file + ending };
  };
  const keep = (document: TextDocument): OpenDocument => {
    const open = { uri: document.uri, version: document.version, text: document.getText(), located: named(document) };
    byId.set(idOf(open.located), open);
    byUri.set(spelledAlike(open.uri), open);
    return open;
  };
  const opened = new Set<string>();
  texts.onDidOpen(({ document }) => {
    opened.add(document.uri);
    const open = keep(document);
    for (const listener of openListeners) listener(open);
  });
  texts.onDidChangeContent(({ document }) => {
    // The library reports an open as a change too, right after the open; that one is told by `onOpen`.
    if (opened.delete(document.uri)) return;
    const open = keep(document);
    for (const listener of changeListeners) listener(open);
  });
  texts.onDidClose(({ document }) => {
    const open = byUri.get(spelledAlike(document.uri));
    if (!open) return;
    byId.delete(idOf(open.located));
    byUri.delete(spelledAlike(open.uri));
    for (const listener of closeListeners) listener(open);
  });
  roots.onChange(() => {
    byId.clear();
    byUri.clear();
    texts.all().forEach(keep);
  });

  const get = (uri: string) => byUri.get(spelledAlike(uri));
  return {
    get,
    at: (located) => byId.get(idOf(located)),
    all: () => [...byId.values()],
    locate: (uri) => get(uri)?.located ?? roots.locate(uri),
    uriOf: (located) => byId.get(idOf(located))?.uri ?? roots.uriOf(located),
    onOpen: (listener) => void openListeners.push(listener),
    onChange: (listener) => void changeListeners.push(listener),
    onClose: (listener) => void closeListeners.push(listener),
    listen: (connection) => void texts.listen(connection),
  };
}
