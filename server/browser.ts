import { BrowserMessageReader, BrowserMessageWriter, createConnection } from 'vscode-languageserver/browser';
import { clientFiles } from './files-client';
import { keepRoots } from './roots';
import { startServer } from './server';

/** The server as a worker of a page: `dist/browser-server.js`. It has no disk; files come from the editor. */
declare const self: Worker;
const connection = createConnection(new BrowserMessageReader(self as never), new BrowserMessageWriter(self as never));
const { uriOf } = keepRoots();
startServer(connection, {
  files: (root) => clientFiles(connection, root, (file) => uriOf({ root, file })),
  now: () => performance.now(),
  pause: () => new Promise((resolve) => setTimeout(resolve, 0)),
});
