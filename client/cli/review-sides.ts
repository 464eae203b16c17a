import { existsSync, statSync } from 'node:fs';
import { basename, dirname, relative, resolve, sep } from 'node:path';
import { glob } from 'tinyglobby';
import { GitProblem, openRepository, type Repository } from '../git/repository';
import type { SideFiles } from '../git/revision';
import { openFolder, openWorkingTree } from '../git/working-tree';
import { Refusal } from './command';
import { nodeDisk } from './disk';

export interface Sides {
  readonly base: SideFiles;
  readonly head: SideFiles;
  /** Two files that are compared with each other, whatever they are called. */
  readonly files?: { readonly base: string; readonly head: string };
  close(): void;
}

/** What the two arguments mean: revisions, two folders or two files. @throws Refusal */
export async function openSides(paths: readonly string[], folder: string): Promise<Sides> {
  if (paths.length > 2) throw new Refusal('`review` compares two: `lanewright review [BASE] [HEAD]`.');
  for (const path of paths)
    if (path.startsWith('-')) throw new Refusal(`\`${path}\` starts with \`-\` and is therefore no revision.`);
  if (
    paths.length === 2 &&
    paths.every((path) => existsSync(resolve(folder, path))) &&
    !(await areRevisions(paths, folder))
  )
    return onDisk(resolve(folder, paths[0]), resolve(folder, paths[1]), paths);
  try {
    return await ofRepository(openRepository(folder), paths);
  } catch (error) {
    throw error instanceof GitProblem ? new Refusal(error.message) : error;
  }
}

/** Names that are both revisions and files would be read as the files unless one says otherwise. */
async function areRevisions(paths: readonly string[], folder: string): Promise<boolean> {
  let repository: Repository;
  try {
    repository = openRepository(folder);
  } catch {
    return false;
  }
  try {
    for (const path of paths) await repository.commitOf(path);
  } catch {
    return false;
  } finally {
    repository.close();
  }
  throw new Refusal(
    `${paths.map((path) => `\`${path}\``).join(' and ')} are revisions and files: write \`./${paths[0]}\` for the files, \`refs/heads/${paths[0]}\` for the revisions.`,
  );
}

async function ofRepository(repository: Repository, [base, head]: readonly string[]): Promise<Sides> {
  try {
    const headCommit = await repository.commitOf(head ?? 'HEAD');
    const from =
      base === undefined
        ? await repository.baseOf(headCommit)
        : { commit: await repository.commitOf(base), name: base };
    const baseName = base === undefined ? `${from.commit.slice(0, 12)} (where this and ${from.name} parted)` : base;
    return {
      base: repository.open(from.commit, baseName),
      head:
        head === undefined
          ? openWorkingTree(repository.root, nodeDisk, repository.store)
          : repository.open(headCommit, head),
      close: () => repository.close(),
    };
  } catch (error) {
    repository.close();
    throw error;
  }
}

const OURS = ['**/*.channel.yaml', '**/*.parts.yaml', '**/lanewright.config.yaml', '**/*.s*p', '**/*.S*P'];

async function folderSide(root: string, name: string): Promise<SideFiles> {
  const found = await glob(OURS, { cwd: root, dot: false, ignore: ['**/node_modules/**'], followSymbolicLinks: false });
  return openFolder(root, nodeDisk, found.map((file) => file.split(sep).join('/')).sort(), name);
}

async function onDisk(base: string, head: string, names: readonly string[]): Promise<Sides> {
  const folders = [base, head].map((path) => statSync(path).isDirectory());
  if (folders[0] !== folders[1]) throw new Refusal('`review` compares two folders or two files, not one of each.');
  const close = () => undefined;
  if (folders[0]) return { base: await folderSide(base, names[0]), head: await folderSide(head, names[1]), close };
  // a file's parts may stand in folders above it: each side is open from the folder that git keeps
  const [from, to] = await Promise.all([fileSide(base, names[0]), fileSide(head, names[1])]);
  return { base: from.side, head: to.side, files: { base: from.file, head: to.file }, close };
}

async function fileSide(path: string, name: string): Promise<{ side: SideFiles; file: string }> {
  let root = dirname(path);
  for (let above = root; ; above = dirname(above)) {
    if (existsSync(resolve(above, '.git'))) {
      root = above;
      break;
    }
    if (dirname(above) === above) break;
  }
  const file = relative(root, path).split(sep).join('/');
  if (basename(file) === '') throw new Refusal(`\`${name}\` is no file.`);
  return { side: openFolder(root, nodeDisk, [file], name), file };
}
