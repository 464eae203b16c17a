import type * as vscode from 'vscode';
import { LanguageClient, TransportKind } from 'vscode-languageclient/node';
import { start, stop } from './start';

export const activate = (context: vscode.ExtensionContext) =>
  start(context, {
    name: 'node',
    createClient: (extension, options) => {
      const server = { module: extension.asAbsolutePath('dist/server.cjs'), transport: TransportKind.stdio };
      return new LanguageClient('lanewright', 'Lanewright', { run: server, debug: server }, options);
    },
  });

export const deactivate = stop;
