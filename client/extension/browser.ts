import * as vscode from 'vscode';
import { LanguageClient } from 'vscode-languageclient/browser';
import { start, stop } from './start';

export const activate = (context: vscode.ExtensionContext) =>
  start(context, {
    name: 'browser',
    // A new worker each time: a restart must not talk to the one that died.
    createClient: (extension, options) =>
      new LanguageClient('lanewright', 'Lanewright', async () => new Worker(vscode.Uri.joinPath(extension.extensionUri, 'dist/browser-server.js').toString(true)), options),
  });

export const deactivate = stop;
