import type { FilePath } from '../src-core/text/types';

/** A folder that files are read below: a workspace folder, or the own folder of a file outside all of them. */
export interface Root {
  /** As the client wrote it, without a slash at the end. */
  readonly uri: string;
  /** The same in one spelling, whatever the client escapes. */
  readonly key: string;
}

/** A file as the core knows it: a path below a root. */
export interface Located {
  readonly root: Root;
  readonly file: FilePath;
}

export const idOf = ({ root, file }: Located): string => `${root.key}\n${file}`;

export interface Roots {
  set(folderUris: readonly string[]): void;
  change(added: readonly string[], removed: readonly string[]): void;
  all(): readonly Root[];
  /** The innermost folder that holds the file, else the file's own folder. */
  locate(uri: string): Located;
  uriOf(located: Located): string;
  /** Calls back after the folders changed. */
  onChange(listener: () => void): void;
}

/** Maps URIs of any scheme to paths below roots and back, without a look at a disk. */
export function keepRoots(): Roots {
  let roots: Root[] = [];
  const listeners: (() => void)[] = [];
  const sortInnermostFirst = () => roots.sort((a, b) => b.key.length - a.key.length || (a.key < b.key ? -1 : 1));
  const add = (uri: string) => {
    const root = rootOf(uri);
    if (!roots.some(({ key }) => key === root.key)) roots.push(root);
  };
  return {
    set(folderUris) {
      roots = [];
      folderUris.forEach(add);
      sortInnermostFirst();
    },
    change(added, removed) {
      const gone = new Set(removed.map((uri) => rootOf(uri).key));
      roots = roots.filter(({ key }) => !gone.has(key));
      added.forEach(add);
      sortInnermostFirst();
      for (const listener of listeners) listener();
    },
    all: () => roots,
    locate(uri) {
      const key = spelledAlike(uri);
      const root = roots.find((candidate) => key.startsWith(`${candidate.key}/`));
      if (root) return { root, file: key.slice(root.key.length + 1) };
      const slash = key.lastIndexOf('/');
      // `untitled:Untitled-1` lies in no folder at all.
      if (slash === -1)
        return { root: rootOf(key.slice(0, key.indexOf(':') + 1)), file: key.slice(key.indexOf(':') + 1) };
      return { root: rootOf(uri.slice(0, uri.lastIndexOf('/'))), file: key.slice(slash + 1) };
    },
    uriOf: ({ root, file }) => `${root.uri}/${file.split('/').map(encodeURIComponent).join('/')}`,
    onChange: (listener) => void listeners.push(listener),
  };
}

const rootOf = (uri: string): Root => {
  const trimmed = uri.replace(/\/$/, '');
  return { uri: trimmed, key: spelledAlike(trimmed) };
};

/**
 * One spelling of a URI: escapes undone, a drive letter small (`file:///C%3A/x` and `file:///c:/x` are one file).
 * What is not a well-formed escape stays as it is. Query and fragment name no other file here and are cut, unless escaped.
 */
export function spelledAlike(uri: string): string {
  const bare = uri.replace(/[?#].*$/s, '');
  const decoded = bare.replace(/(?:%[0-9a-f]{2})+/gi, (escaped) => {
    try {
      return decodeURIComponent(escaped);
    } catch {
      return escaped;
    }
  });
  return decoded.replace(
    /^(file:\/\/\/)([A-Z]):/,
    (_all, start: string, drive: string) => `${start}${drive.toLowerCase()}:`,
  );
}
