import type * as vscode from 'vscode';
import type { BaseLanguageClient, LanguageClientOptions } from 'vscode-languageclient';

/** What differs between the desktop's host and the browser's worker: how the server is started. */
export interface Host {
  readonly name: 'node' | 'browser';
  createClient(context: vscode.ExtensionContext, options: LanguageClientOptions): BaseLanguageClient;
}

export const SELECTOR = [
  { language: 'lanewright-channel' },
  { language: 'lanewright-parts' },
  { language: 'lanewright-config' },
];
