import type { Disk } from '../../src-core/sandbox';
import { sandboxedFiles } from '../../src-core/sandbox';
import type { FilePath } from '../../src-core/text/types';
import { largeFile } from './large-file';
import { listWorkingTree } from './objects';
import type { SideFiles } from './revision';

/** The files on disk that git keeps or would keep. @throws Error in git's words */
export function openWorkingTree(root: string, disk: Disk, store: string | undefined): SideFiles {
  const listed = listWorkingTree(root);
  if (!listed.ok) throw new Error(`The working tree cannot be listed: ${listed.why}.`);
  const paths = [...new Set(listed.bytes.toString('utf8').split('\0').filter(Boolean))].sort();
  return openFolder(root, disk, paths, 'the working tree', store);
}

/** Files below a folder on disk; nothing above it is read. */
export function openFolder(
  root: string,
  disk: Disk,
  paths: readonly FilePath[],
  name: string,
  store?: string,
): SideFiles {
  const files = sandboxedFiles(root, disk);
  return {
    name,
    paths,
    identity: () => undefined,
    async read(file) {
      const content = await files.read(file);
      return content.kind === 'text' ? ((await largeFile(content.text, store)) ?? content) : content;
    },
  };
}
