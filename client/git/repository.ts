import { isAbsolute, join } from 'node:path';
import { commonFolder, isShallow, mergeBase, type Objects, openObjects, topLevel } from './objects';
import { openRevision, type SideFiles } from './revision';

/** What a person can do about it; printed as it is. */
export class GitProblem extends Error {}

export interface Repository {
  /** The top of the working tree. */
  readonly root: string;
  /** Where large files are kept. */
  readonly store?: string;
  /** @throws GitProblem where there is no such revision */
  commitOf(revision: string): Promise<string>;
  /** The commit where this and the main line parted; `origin/HEAD`, else `main`, else `master`. @throws GitProblem */
  baseOf(head: string): Promise<{ readonly commit: string; readonly name: string }>;
  open(commit: string, name: string): SideFiles;
  close(): void;
}

const MAIN_LINES = ['origin/HEAD', 'main', 'master'];

/** Opens the repository that a folder lies in. @throws GitProblem where there is none */
export function openRepository(folder: string): Repository {
  const top = topLevel(folder);
  if (!top.ok) throw new GitProblem(`\`${folder}\` is in no git working tree: ${top.why}.`);
  const root = top.bytes.toString('utf8').replace(/\r?\n$/, '');
  const objects = openObjects(root);
  const common = commonFolder(root);
  const kept = common.ok ? common.bytes.toString('utf8').trim() : undefined;
  const store = kept === undefined ? undefined : isAbsolute(kept) ? kept : join(root, kept);
  const shallow = () => {
    const answer = isShallow(root);
    return answer.ok && answer.bytes.toString('utf8').trim() === 'true';
  };
  const find = async (revision: string) => (await commit(objects, revision))?.hash;
  return {
    root,
    ...(store !== undefined && { store }),
    async commitOf(revision) {
      checkRevision(revision);
      const hash = await find(revision);
      if (hash !== undefined) return hash;
      const why = shallow() ? ' This clone is shallow: fetch more of the history.' : '';
      throw new GitProblem(`\`${revision}\` is no revision of this repository.${why}`);
    },
    async baseOf(head) {
      for (const name of MAIN_LINES) {
        const main = await find(name);
        if (main === undefined) continue;
        const answer = mergeBase(root, main, head);
        if (answer.ok) return { commit: answer.bytes.toString('utf8').trim().split('\n')[0], name };
        throw new GitProblem(
          `HEAD and \`${name}\` have no common commit here.${shallow() ? ' This clone is shallow: fetch its whole history (`git fetch --unshallow`).' : ''} Or name the base: \`lanewright review BASE\`.`,
        );
      }
      throw new GitProblem(
        `There is none of ${MAIN_LINES.map((name) => `\`${name}\``).join(', ')} to compare with; name the base: \`lanewright review BASE\`.`,
      );
    },
    open: (hash, name) => openRevision(root, objects, { commit: hash, name, store }),
    close: () => objects.close(),
  };
}

const commit = (objects: Objects, revision: string) => objects.read(`${revision}^{commit}`);

/** @throws GitProblem for what git would take for an option, or for more than one revision */
export function checkRevision(revision: string) {
  if (revision.startsWith('-')) throw new GitProblem(`\`${revision}\` starts with \`-\` and is therefore no revision.`);
  if (revision === '' || /[\u0000-\u001f\u007f]/.test(revision) || revision.includes('..'))
    throw new GitProblem(`\`${revision.replace(/[\u0000-\u001f\u007f]/g, '?')}\` is not one revision.`);
}
