import { existsSync, statSync } from 'node:fs';
import { dirname, isAbsolute, join, relative, resolve, sep } from 'node:path';
import { glob } from 'tinyglobby';
import { sandboxedFiles } from '../../src-core/sandbox';
import type { FileContent, FilePath, Files } from '../../src-core/text/types';
import { type OptionValues, Refusal } from './command';
import { nodeDisk } from './disk';

/** What the command line reads from: everything below one root. */
export interface Workspace {
  readonly root: string;
  readonly files: Files;
  /** @throws Refusal where the path leaves the root */
  toFilePath(path: string): FilePath;
  toDisk(file: FilePath): string;
  /** As a person who stands in the current folder would write it. */
  shown(file: FilePath): string;
}

/** The nearest folder upwards that git keeps, without running git. */
function workTree(from: string): string | undefined {
  for (let folder = from; ; folder = dirname(folder)) {
    if (existsSync(join(folder, '.git'))) return folder;
    if (dirname(folder) === folder) return undefined;
  }
}

export function openWorkspace(
  { root: wanted }: OptionValues,
  overlay: ReadonlyMap<FilePath, FileContent> = new Map(),
): Workspace {
  const root = typeof wanted === 'string' ? resolve(wanted) : (workTree(process.cwd()) ?? process.cwd());
  if (!existsSync(root)) throw new Refusal(`The folder \`${root}\` is not there.`);
  const disk = sandboxedFiles(root, nodeDisk);
  return {
    root,
    files: { read: async (file) => overlay.get(file) ?? disk.read(file) },
    toFilePath(path) {
      const inside = relative(root, resolve(path));
      if (inside.startsWith('..') || isAbsolute(inside))
        throw new Refusal(`\`${path}\` lies outside \`${root}\`; name a wider folder with --root.`);
      return inside.split(sep).join('/');
    },
    toDisk: (file) => join(root, ...file.split('/')),
    shown: (file) =>
      relative(process.cwd(), join(root, ...file.split('/')))
        .split(sep)
        .join('/'),
  };
}

const OURS = ['**/*.channel.yaml', '**/*.parts.yaml', '**/lanewright.config.yaml'];

/**
 * The files that `paths` mean, sorted: files as they are, folders with all of ours below, patterns.
 * @throws Refusal for a path that means nothing
 */
export async function findFiles(workspace: Workspace, paths: readonly string[]): Promise<FilePath[]> {
  const found = new Set<FilePath>();
  for (const path of paths.length ? paths : ['.']) {
    const matches = await matchesOf(path);
    if (matches === undefined)
      throw new Refusal(`\`${path}\` means no file: there is no such file or folder, and no file matches it.`);
    for (const match of matches) found.add(workspace.toFilePath(match));
  }
  return [...found].sort();
}

async function matchesOf(path: string): Promise<string[] | undefined> {
  if (existsSync(path)) {
    if (!statSync(path).isDirectory()) return [path];
    const below = await glob(OURS, {
      cwd: path,
      dot: false,
      ignore: ['**/node_modules/**'],
      followSymbolicLinks: false,
    });
    return below.map((file) => join(path, file));
  }
  const matched = await glob(path.split(sep).join('/'), {
    dot: false,
    ignore: ['**/node_modules/**'],
    followSymbolicLinks: false,
  });
  return matched.length ? matched : undefined;
}
