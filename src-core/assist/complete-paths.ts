import { fileKind, joinPath } from '../inputs';
import type { ParsedFile } from '../text/parsed';
import type { Completion, Surroundings } from './completions';
import type { Cursor } from './cursor';
import { relativePath } from './names';

const MOST_FOUND = 200;

/** Paths for `use` and `touchstone`, relative to this file, never outside the root; undefined where no path is wanted. */
export async function completePaths(
  parsed: ParsedFile,
  cursor: Cursor,
  { list, library }: Surroundings,
): Promise<readonly Completion[] | undefined> {
  const wanted = wantedKind(cursor);
  if (!wanted) return undefined;
  const quote = /^['"]/.test(cursor.typed) ? 1 : 0;
  const typed = cursor.typed.slice(quote);
  const slash = typed.lastIndexOf('/') + 1;
  const folder = folderOf(parsed.file, typed.slice(0, slash));
  if (folder === undefined) return [];
  const start = cursor.token.start + quote + slash;
  const range = { start, end: Math.max(start, cursor.token.end - quote) };
  const entries = (await list(folder)).slice(0, MOST_FOUND);
  const found = entries.flatMap(({ name, kind }): Completion[] => {
    if (kind === 'folder') {
      return name.startsWith('.') || name === 'node_modules'
        ? []
        : [
            {
              label: `${name}/`,
              kind: 'folder',
              insert: `${name}/`,
              isSnippet: false,
              range,
              filter: name,
              rank: 200,
              retrigger: true,
            },
          ];
    }
    return fileKind(name) === wanted && `${folder}/${name}` !== parsed.file
      ? [{ label: name, kind: 'file', insert: name, isSnippet: false, range, filter: name, rank: 0 }]
      : [];
  });
  const above: Completion[] =
    folder === '' || !/^(\.\.\/)*$/.test(typed.slice(0, slash))
      ? []
      : [
          {
            label: '../',
            kind: 'folder',
            insert: '../',
            isSnippet: false,
            range,
            filter: '../',
            rank: 300,
            retrigger: true,
          },
        ];
  return [...found, ...(slash === 0 && wanted === 'parts' ? await knownParts(parsed, range, library) : []), ...above];
}

const wantedKind = ({ path }: Cursor): 'parts' | 'touchstone' | undefined => {
  if (path[0] === 'use' && path.length === 2) return 'parts';
  return path.at(-1) === 'touchstone' ? 'touchstone' : undefined;
};

/** The folder that a path as typed so far leads to, below the root. */
function folderOf(file: string, written: string): string | undefined {
  const joined = joinPath(file, `${written}x`);
  return joined.file === undefined ? undefined : joined.file.split('/').slice(0, -1).join('/');
}

/** Every parts file of the folder that is open, wherever it lies. */
async function knownParts(
  parsed: ParsedFile,
  range: Completion['range'],
  library: Surroundings['library'],
): Promise<Completion[]> {
  const files = library ? [...(await library()).keys()] : [];
  const own = parsed.file.split('/').slice(0, -1).join('/');
  return files
    .filter(
      (file) => fileKind(file) === 'parts' && file !== parsed.file && file.split('/').slice(0, -1).join('/') !== own,
    )
    .slice(0, MOST_FOUND)
    .map((file): Completion => {
      const path = relativePath(parsed.file, file);
      return { label: path, kind: 'file', insert: path, isSnippet: false, range, filter: path, rank: 100 };
    });
}
