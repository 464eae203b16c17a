import type { Connection } from 'vscode-languageserver';

const PAUSE = 200;

/** Changes on disk, gathered: the checkout of a thousand files is one change. */
export function followWatchedFiles(connection: Connection, changed: (uris: readonly string[]) => void): void {
  const waiting = new Set<string>();
  let timer: ReturnType<typeof setTimeout> | undefined;
  connection.onDidChangeWatchedFiles(({ changes }) => {
    for (const { uri } of changes) waiting.add(uri);
    clearTimeout(timer);
    timer = setTimeout(() => {
      const uris = [...waiting];
      waiting.clear();
      changed(uris);
    }, PAUSE);
  });
}
