import * as vscode from 'vscode';
import { BrowserMessageReader, BrowserMessageWriter, LanguageClient } from 'vscode-languageclient/browser';
import { start, stop } from './start';

export const activate = (context: vscode.ExtensionContext) =>
  start(context, {
    name: 'browser',
    // A new worker each time: a restart must not talk to the one that died. The host's `Worker` is its own wrapper, which
    // the client does not recognise as one, so that reader and writer are made here.
    createClient: (extension, options) =>
      new LanguageClient(
        'lanewright',
        'Lanewright',
        async () => {
          const worker = new Worker(
            vscode.Uri.joinPath(extension.extensionUri, 'dist/browser-server.js').toString(true),
          );
          return { reader: new BrowserMessageReader(worker), writer: new BrowserMessageWriter(worker) };
        },
        options,
      ),
  });

export const deactivate = stop;
