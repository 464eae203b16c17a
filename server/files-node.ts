import { constants } from 'node:fs';
import { lstat, open, readdir, realpath } from 'node:fs/promises';
import { sep } from 'node:path';
import { fileURLToPath } from 'node:url';
import { type Disk, sandboxedFiles } from '../src-core/sandbox';
import type { FolderEntry, RootFiles } from './files';
import { refusalOf } from './files';

const SYSTEM_FOLDERS = ['/proc/', '/dev/', '/sys/'];
/** Opening a pipe must not wait for a writer, and a link put there after the look-up must not be followed. */
const OPEN_FLAGS = constants.O_RDONLY | (constants.O_NONBLOCK ?? 0) | (constants.O_NOFOLLOW ?? 0);

const absent = (error: unknown): undefined => {
  if (['ENOENT', 'ENOTDIR', 'ELOOP', 'ENAMETOOLONG'].includes((error as NodeJS.ErrnoException).code ?? ''))
    return undefined;
  throw error;
};

export const nodeDisk: Disk = {
  separator: sep as '/' | '\\',
  realPath: (path) => realpath(path).catch(absent),
  async status(path) {
    const facts = await lstat(path).catch(absent);
    const isOrdinary = facts?.isFile() && !SYSTEM_FOLDERS.some((folder) => path.startsWith(folder));
    return facts && { kind: isOrdinary ? 'file' : 'other', bytes: facts.size };
  },
  async readText(path) {
    const handle = await open(path, OPEN_FLAGS);
    try {
      if (!(await handle.stat()).isFile()) throw new Error('not an ordinary file');
      return withoutMark(await handle.readFile('utf8'));
    } finally {
      await handle.close();
    }
  },
};

/** An editor hands out a text without its byte order mark; so does this. */
const withoutMark = (text: string) => (text.charCodeAt(0) === 0xfeff ? text.slice(1) : text);

/** Files of a disk below `rootUri` (`file:`). */
export function nodeFiles(rootUri: string): RootFiles {
  const folder = fileURLToPath(`${rootUri}/`).replace(/(?<=.)[\\/]$/, '');
  const sandbox = sandboxedFiles(folder, nodeDisk);
  return {
    async read(file) {
      const reason = refusalOf(file);
      if (reason) return { kind: 'refused', reason };
      return sandbox.read(file).catch(() => ({ kind: 'refused' as const, reason: 'it could not be read' }));
    },
    async list(path): Promise<readonly FolderEntry[]> {
      if (path !== '' && refusalOf(path)) return [];
      try {
        const [root, real] = await Promise.all([
          realpath(folder),
          realpath(path === '' ? folder : `${folder}/${path}`),
        ]);
        if (real !== root && !real.startsWith(root.endsWith(sep) ? root : root + sep)) return [];
        const entries = await readdir(real, { withFileTypes: true });
        return entries
          .filter((entry) => entry.isFile() || entry.isDirectory())
          .map((entry) => ({ name: entry.name, kind: entry.isFile() ? ('file' as const) : ('folder' as const) }));
      } catch {
        return [];
      }
    },
  };
}
