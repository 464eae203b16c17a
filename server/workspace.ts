import type { CancellationToken } from 'vscode-languageserver';
import { fileKind } from '../src-core/inputs';
import { parseFile } from '../src-core/text/index';
import type { ParsedFile } from '../src-core/text/parsed';
import type { FileKind, FilePath } from '../src-core/text/types';
import type { RootFiles } from './files';
import type { Root } from './roots';

/** Not looked into: they hold copies, not sources. */
const SKIPPED_FOLDERS = /^(\..*|node_modules|dist|out|build)$/;
const MOST_FILES = 5000;
const DEEPEST = 12;
/** Trees of texts kept between two questions. */
const MOST_PARSED = 300;

/** The channels, parts files and configurations below a root, closed ones too; looked up when first asked. */
export interface Workspace {
  files(root: Root, token?: CancellationToken): Promise<readonly FilePath[]>;
  /** Parsed texts of all of them, or of one kind, open ones as the editor shows them. */
  library(root: Root, token?: CancellationToken, kind?: FileKind): Promise<ReadonlyMap<FilePath, ParsedFile>>;
  /** A file came, changed or went. */
  changed(root: Root, file: FilePath): void;
}

interface Kept {
  files?: Promise<readonly FilePath[]>;
  readonly parsed: Map<FilePath, ParsedFile>;
}

export function keepWorkspace(filesOf: (root: Root) => RootFiles): Workspace {
  const roots = new Map<string, Kept>();
  const keptOf = (root: Root): Kept => {
    let kept = roots.get(root.key);
    if (!kept) roots.set(root.key, (kept = { parsed: new Map() }));
    return kept;
  };
  return {
    files(root, token) {
      const kept = keptOf(root);
      if (!kept.files) {
        kept.files = listed(filesOf(root), token).then((files) => {
          if (token?.isCancellationRequested) kept.files = undefined;
          return files;
        });
      }
      return kept.files;
    },
    async library(root, token, kind) {
      const { parsed } = keptOf(root);
      const library = new Map<FilePath, ParsedFile>();
      const files = filesOf(root);
      for (const file of await this.files(root, token)) {
        if (token?.isCancellationRequested) break;
        if (kind !== undefined && fileKind(file) !== kind) continue;
        const content = await files.read(file);
        if (content.kind !== 'text') continue;
        let one = parsed.get(file);
        if (one?.text !== content.text) {
          one = parseFile(file, content.text);
          if (parsed.size < MOST_PARSED || parsed.has(file)) parsed.set(file, one);
        }
        library.set(file, one);
      }
      return library;
    },
    changed(root, file) {
      const kept = keptOf(root);
      kept.parsed.delete(file);
      kept.files = undefined;
    },
  };
}

async function listed(files: RootFiles, token?: CancellationToken): Promise<readonly FilePath[]> {
  const found: FilePath[] = [];
  let folders = [''];
  for (let depth = 0; depth < DEEPEST && folders.length > 0; depth++) {
    const next: string[] = [];
    for (const folder of folders) {
      if (token?.isCancellationRequested || found.length >= MOST_FILES) return found;
      for (const { name, kind } of await files.list(folder)) {
        const path = folder === '' ? name : `${folder}/${name}`;
        if (kind === 'folder') {
          if (!SKIPPED_FOLDERS.test(name)) next.push(path);
        } else if (['channel', 'parts', 'config'].includes(fileKind(path))) found.push(path);
      }
    }
    folders = next;
  }
  return found.sort();
}
