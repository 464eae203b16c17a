import { lstat, readFile, realpath } from 'node:fs/promises';
import { sep } from 'node:path';
import type { Disk } from '../../src-core/sandbox';

const absent = (error: unknown) => {
  if (['ENOENT', 'ENOTDIR', 'ELOOP', 'ENAMETOOLONG'].includes((error as NodeJS.ErrnoException).code ?? ''))
    return undefined;
  throw error;
};

export const nodeDisk: Disk = {
  separator: sep as '/' | '\\',
  realPath: (path) => realpath(path).catch(absent),
  status: (path) =>
    lstat(path)
      .then((found) => ({ kind: found.isFile() ? ('file' as const) : ('other' as const), bytes: found.size }))
      .catch(absent),
  readText: (path) => readFile(path, 'utf8'),
};
