import { TOUCHSTONE_LIMIT_BYTES, YAML_LIMIT_BYTES } from '../../src-core/sandbox';
import type { FileContent, FilePath } from '../../src-core/text/types';
import { largeFile } from './large-file';
import { listTree, type Objects } from './objects';

/** One side of a review: files by path from the root, and who each is without its being read. */
export interface SideFiles {
  /** As the review calls it. */
  readonly name: string;
  /** Every file of ours and every one that may be named, sorted. */
  readonly paths: readonly FilePath[];
  /** The same text for the same content, where that is known without reading: a blob's hash. */
  identity(file: FilePath): string | undefined;
  read(file: FilePath): Promise<FileContent>;
}

interface Row {
  readonly mode: string;
  readonly hash: string;
}

/** The files of a commit, read as git's own objects: nothing is checked out, no link is followed. @throws Error in git's words */
export function openRevision(
  folder: string,
  objects: Objects,
  { commit, name, store }: { commit: string; name: string; store?: string },
): SideFiles {
  const listed = listTree(folder, commit);
  if (!listed.ok) throw new Error(`The files of \`${name}\` cannot be listed: ${listed.why}.`);
  const rows = rowsOf(listed.bytes.toString('utf8'));
  const submodules = [...rows].filter(([, { mode }]) => mode === '160000').map(([path]) => path);
  return {
    name,
    paths: [...rows]
      .filter(([, { mode }]) => mode !== '160000')
      .map(([path]) => path)
      .sort(),
    identity: (file) => rows.get(file)?.hash,
    async read(file) {
      const row = rows.get(file);
      if (!row) {
        const inside = submodules.find((path) => file === path || file.startsWith(`${path}/`));
        if (inside === undefined) return { kind: 'missing' };
        return { kind: 'refused', reason: 'it lies in a submodule, whose files are not part of this revision' };
      }
      if (row.mode === '120000')
        return { kind: 'refused', reason: 'it is a link, and links of a revision are not followed' };
      if (row.mode === '160000') return { kind: 'refused', reason: 'it is a submodule' };
      return blob(objects, row.hash, file, store);
    },
  };
}

async function blob(objects: Objects, hash: string, file: FilePath, store: string | undefined): Promise<FileContent> {
  const object = await objects.read(hash);
  if (object?.type !== 'blob')
    return {
      kind: 'refused',
      reason: 'its content is not in this clone; fetch it first (the clone is shallow or partial)',
    };
  const limit = limitOf(file);
  if (object.bytes.length > limit) return { kind: 'too-large', bytes: object.bytes.length, limit };
  const text = object.bytes.toString('utf8');
  return (await largeFile(text, store)) ?? { kind: 'text', text };
}

export const limitOf = (file: FilePath) => (/\.s\d+p$/i.test(file) ? TOUCHSTONE_LIMIT_BYTES : YAML_LIMIT_BYTES);

/** `MODE TYPE HASH\tPATH\0`; a path that could not be named in a file of ours is left out. */
export function rowsOf(listing: string): Map<FilePath, Row> {
  const rows = new Map<FilePath, Row>();
  for (const row of listing.split('\0')) {
    const match = /^(\d{6}) \w+ ([0-9a-f]+)\t([\s\S]+)$/.exec(row);
    if (match) rows.set(match[3], { mode: match[1], hash: match[2] });
  }
  return rows;
}
