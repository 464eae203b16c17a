import * as vscode from 'vscode';
import type { BaseLanguageClient } from 'vscode-languageclient';
import type { FileContent } from '../../src-core/text/types';
import { listFolderRequest, readFileRequest } from './protocol';

/** Hands files to a server that has no disk: what the editor's own file systems hold, never more than `limit` bytes, never outside an open folder. */
export function serveFiles(client: BaseLanguageClient): vscode.Disposable {
  return vscode.Disposable.from(
    client.onRequest(readFileRequest, async ({ uri, limit }) => readThroughEditor(vscode.Uri.parse(uri, true), limit)),
    client.onRequest(listFolderRequest, async ({ uri }) => {
      const folder = vscode.Uri.parse(uri, true);
      if (!isOpen(folder)) return [];
      const entries = await Promise.resolve(vscode.workspace.fs.readDirectory(folder)).catch(() => []);
      return entries.flatMap(([name, type]): { name: string; kind: 'file' | 'folder' }[] => {
        if (type === vscode.FileType.File) return [{ name, kind: 'file' }];
        return type === vscode.FileType.Directory ? [{ name, kind: 'folder' }] : [];
      });
    }),
  );
}

/** In a folder of the workspace, or beside a file that is open by itself. */
function isOpen(uri: vscode.Uri): boolean {
  if (vscode.workspace.getWorkspaceFolder(uri)) return true;
  return vscode.workspace.textDocuments.some((document) => {
    const folder = vscode.Uri.joinPath(document.uri, '..');
    return (
      folder.scheme === uri.scheme &&
      folder.authority === uri.authority &&
      `${uri.path}/`.startsWith(folder.path.endsWith('/') ? folder.path : `${folder.path}/`)
    );
  });
}

async function readThroughEditor(uri: vscode.Uri, limit: number): Promise<FileContent> {
  if (!isOpen(uri)) return { kind: 'refused', reason: 'it lies outside the folders that are open' };
  try {
    const status = await vscode.workspace.fs.stat(uri);
    if (status.type & vscode.FileType.SymbolicLink)
      return { kind: 'refused', reason: 'it is a link, which is not followed here' };
    if (status.type !== vscode.FileType.File) return { kind: 'refused', reason: 'it is not an ordinary file' };
    if (status.size > limit) return { kind: 'too-large', bytes: status.size, limit };
    return { kind: 'text', text: new TextDecoder().decode(await vscode.workspace.fs.readFile(uri)) };
  } catch (error) {
    if (error instanceof vscode.FileSystemError && error.code === 'FileNotFound') return { kind: 'missing' };
    return { kind: 'refused', reason: 'it could not be read' };
  }
}
