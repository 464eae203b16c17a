import type { Disk } from './sandbox';

/** What of Node's `fs` and `path` a disk is made of: handed in by the server and the command line, since src-core knows no Node. */
export interface NodeCalls {
  readonly separator: string;
  realpath(path: string): Promise<string>;
  lstat(path: string): Promise<{ isFile(): boolean; readonly size: number }>;
  open(path: string, flags: number): Promise<FileHandle>;
  readonly constants: { readonly O_RDONLY: number; readonly O_NONBLOCK?: number; readonly O_NOFOLLOW?: number };
}

interface FileHandle {
  stat(): Promise<{ isFile(): boolean }>;
  readFile(encoding: 'utf8'): Promise<string>;
  close(): Promise<void>;
}

/** What lies here looks like files, and is none that one keeps channels in. */
const SYSTEM_FOLDERS = ['/proc/', '/dev/', '/sys/'];

const absent = (error: unknown): undefined => {
  if (['ENOENT', 'ENOTDIR', 'ELOOP', 'ENAMETOOLONG'].includes((error as { code?: string }).code ?? ''))
    return undefined;
  throw error;
};

/** A disk that waits for no pipe and follows no link that was put there after the look-up. */
export function diskOf({ separator, realpath, lstat, open, constants }: NodeCalls): Disk {
  const flags = constants.O_RDONLY | (constants.O_NONBLOCK ?? 0) | (constants.O_NOFOLLOW ?? 0);
  return {
    separator: separator as Disk['separator'],
    realPath: (path) => realpath(path).catch(absent),
    async status(path) {
      const facts = await lstat(path).catch(absent);
      const isOrdinary = facts?.isFile() && !SYSTEM_FOLDERS.some((folder) => path.startsWith(folder));
      return facts && { kind: isOrdinary ? 'file' : 'other', bytes: facts.size };
    },
    async readText(path) {
      const handle = await open(path, flags);
      try {
        if (!(await handle.stat()).isFile()) throw new Error('not an ordinary file');
        return await handle.readFile('utf8');
      } finally {
        await handle.close();
      }
    },
  };
}
