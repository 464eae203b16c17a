import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { createConnection } from 'vscode-languageserver/node';
import { clientFiles } from './files-client';
import { nodeFiles } from './files-node';
import { keepRoots } from './roots';
import { startServer } from './server';

/** The server as a process of its own: `dist/server.cjs --stdio`. */
const connection = createConnection(process.stdin, process.stdout);
const { uriOf } = keepRoots();

// A fault that nothing caught is told, and costs its own answer only.
process.on('unhandledRejection', (reason) =>
  connection.console.error(`unhandled: ${reason instanceof Error ? reason.stack : String(reason)}`),
);

const reference = join(__dirname, 'rules.md');
startServer(connection, {
  files: (root) =>
    root.uri.startsWith('file:') ? nodeFiles(root.uri) : clientFiles(connection, root, (file) => uriOf({ root, file })),
  now: () => performance.now(),
  pause: () => new Promise((resolve) => setImmediate(resolve)),
  ...(existsSync(reference) && { rulesReference: pathToFileURL(reference).href }),
  heapMegabytes: () => {
    // Only where the process was started for a measurement.
    globalThis.gc?.();
    // Curves are typed arrays, which lie outside the heap.
    const { heapUsed, external } = process.memoryUsage();
    return Math.round((heapUsed + external) / 1e5) / 10;
  },
});
