import { createHash } from 'node:crypto';
import { readFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { FileContent } from '../../src-core/text/types';

const HEAD = 'version https://git-lfs.github.com/spec/v1\n';

/**
 * What a large-file pointer stands for, from the repository's own store; undefined for any other text. A pointer is never read as data:
 * where the store has not got the content, that is said.
 * @param store the folder that holds `lfs/objects`
 */
export async function largeFile(text: string, store: string | undefined): Promise<FileContent | undefined> {
  const normal = text.length <= 1024 ? text.replace(/\r\n/g, '\n') : text;
  if (!normal.startsWith(HEAD)) return undefined;
  const id = /^oid sha256:([0-9a-f]{64})$/m.exec(normal)?.[1];
  const missing: FileContent = {
    kind: 'refused',
    reason: 'it is the pointer of a large file whose content is not in the local store; fetch the large files first',
  };
  if (id === undefined || store === undefined) return missing;
  const path = join(store, 'lfs', 'objects', id.slice(0, 2), id.slice(2, 4), id);
  const bytes = await readFile(path).catch(() => undefined);
  if (!bytes || createHash('sha256').update(bytes).digest('hex') !== id) return missing;
  return { kind: 'text', text: bytes.toString('utf8') };
}
