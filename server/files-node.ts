import { constants } from 'node:fs';
import { lstat, open, readdir, realpath } from 'node:fs/promises';
import { sep } from 'node:path';
import { fileURLToPath } from 'node:url';
import { diskOf } from '../src-core/disk';
import { type Disk, sandboxedFiles } from '../src-core/sandbox';
import type { FolderEntry, RootFiles } from './files';
import { refusalOf } from './files';

const ordinary = diskOf({ separator: sep, realpath, lstat, open, constants });

/** An editor hands out a text without its byte order mark; so does this. */
const withoutMark = (text: string) => (text.charCodeAt(0) === 0xfeff ? text.slice(1) : text);

export const nodeDisk: Disk = { ...ordinary, readText: async (path) => withoutMark(await ordinary.readText(path)) };

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
