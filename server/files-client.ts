import type { Connection } from 'vscode-languageserver';
import type { FileContent } from '../src-core/text/types';
import { type FolderEntry, type RootFiles, refusalOf, sizeLimit } from './files';
import { listFolderRequest, readFileRequest } from './protocol';
import type { Root } from './roots';

const liesNowhere = ({ uri }: Root) => uri.startsWith('untitled:');

/** Files through the editor: the only way in a browser, and for schemes that are no disk. */
export function clientFiles(connection: Connection, root: Root, uriOf: (file: string) => string): RootFiles {
  return {
    async read(file): Promise<FileContent> {
      const refusal = refusalOf(file);
      if (refusal) return { kind: 'refused', reason: refusal };
      // A text that was never saved lies in no folder: there is nothing beside it.
      if (liesNowhere(root)) return { kind: 'missing' };
      try {
        const limit = sizeLimit(file);
        const content = await connection.sendRequest(readFileRequest, { uri: uriOf(file), root: root.uri, limit });
        return content.kind === 'text' && content.text.length > limit
          ? { kind: 'too-large', bytes: content.text.length, limit }
          : content;
      } catch {
        return { kind: 'refused', reason: 'the editor did not hand it out' };
      }
    },
    async list(folder): Promise<readonly FolderEntry[]> {
      if (liesNowhere(root) || (folder !== '' && refusalOf(folder))) return [];
      const uri = folder === '' ? root.uri : uriOf(folder);
      return connection.sendRequest(listFolderRequest, { uri }).catch(() => []);
    },
  };
}
