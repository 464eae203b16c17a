import type { FileContent, FilePath, Files } from '../src-core/text/types';
import type { Root } from './roots';

export interface FolderEntry {
  readonly name: string;
  readonly kind: 'file' | 'folder';
}

/** What a host gives to read below one root. All paths are relative to it; what leads out is refused. */
export interface RootFiles extends Files {
  /** The entries of a folder, links left out; none if it cannot be read. `''` is the root. */
  list(folder: FilePath): Promise<readonly FolderEntry[]>;
}

export type FilesFactory = (root: Root) => RootFiles;

/** Most bytes read of a file: text is 1 MiB, Touchstone data 64 MiB (design section 8). */
export const sizeLimit = (file: FilePath): number => (/\.s\d+p$/i.test(file) ? 64 : 1) * 1024 * 1024;

/** Why a path must not be looked up at all; undefined if it may. Decided on its text alone, before any disk is asked. */
export function refusalOf(file: FilePath): string | undefined {
  if (file.includes('\0')) return 'the path holds a NUL character';
  if (/^[\\/]/.test(file)) return 'absolute and network paths are not read';
  if (/^[A-Za-z]:/.test(file)) return 'a path with a drive or scheme is not read';
  if (file.includes('\\')) return 'write the path with `/`; `\\` is not read';
  if (file.split('/').includes('..')) return 'it leads out of the folder that is open';
  return undefined;
}

/** Unsaved text of the editor comes before what the disk holds. It is in memory already: whether it is too large, its reader says. */
export function unsavedFirst(files: RootFiles, openText: (file: FilePath) => string | undefined): RootFiles {
  return {
    async read(file): Promise<FileContent> {
      const text = openText(file);
      return text === undefined ? files.read(file) : { kind: 'text', text };
    },
    list: (folder) => files.list(folder),
  };
}
