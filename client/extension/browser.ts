import * as vscode from 'vscode';
import { BrowserMessageReader, BrowserMessageWriter, LanguageClient } from 'vscode-languageclient/browser';
import { start, stop } from './start';

export function activate(context: vscode.ExtensionContext) {
  let worker: Worker | undefined;
  context.subscriptions.push({ dispose: () => worker?.terminate() });
  return start(context, {
    name: 'browser',
    // A new worker each time, and the old one ended: it may hang and would go on computing. The host's `Worker` is its
    // own wrapper, which the client does not recognise as one, so that reader and writer are made here.
    createClient: (extension, options) =>
      new LanguageClient(
        'lanewright',
        'Lanewright',
        async () => {
          worker?.terminate();
          worker = new Worker(vscode.Uri.joinPath(extension.extensionUri, 'dist/browser-server.js').toString(true));
          return { reader: new BrowserMessageReader(worker), writer: new BrowserMessageWriter(worker) };
        },
        options,
      ),
  });
}

export const deactivate = stop;
