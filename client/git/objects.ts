import { type ChildProcessByStdio, spawn, spawnSync } from 'node:child_process';
import type { Readable, Writable } from 'node:stream';

/**
 * The only place that runs a program: git, with arguments that are written here or are hashes that git itself gave. Names of
 * revisions go in by standard input, never as an argument.
 */
const ENVIRONMENT = {
  GIT_OPTIONAL_LOCKS: '0', // nothing is refreshed on disk
  GIT_NO_LAZY_FETCH: '1', // nothing is fetched
  GIT_TERMINAL_PROMPT: '0',
  LC_ALL: 'C',
};
/** A hook of the repository's own configuration is never run. */
const SAFE = ['-c', 'core.fsmonitor=false', '-c', 'core.untrackedCache=false', '--no-pager'];

const environment = (): NodeJS.ProcessEnv => ({ ...process.env, ...ENVIRONMENT });

/** A listing of a repository with a million files is a few hundred MiB. */
const MOST_BYTES = 1 << 29;

const HASH = /^[0-9a-f]{40}(?:[0-9a-f]{24})?$/;

/** What git said, or why it could not. */
export type Answer = { readonly ok: true; readonly bytes: Buffer } | { readonly ok: false; readonly why: string };

function run(folder: string, args: readonly string[]): Answer {
  const result = spawnSync('git', [...SAFE, ...args], { cwd: folder, env: environment(), maxBuffer: MOST_BYTES });
  if (result.error)
    return {
      ok: false,
      why: (result.error as NodeJS.ErrnoException).code === 'ENOENT' ? 'git is not installed' : result.error.message,
    };
  if (result.status === 0) return { ok: true, bytes: result.stdout };
  return { ok: false, why: result.stderr.toString('utf8').trim().split('\n')[0] ?? '' };
}

const hashes = (list: readonly string[]) => {
  for (const hash of list) if (!HASH.test(hash)) throw new Error(`not a hash: ${hash}`);
  return list;
};

export const topLevel = (folder: string) => run(folder, ['rev-parse', '--show-toplevel']);
export const isShallow = (folder: string) => run(folder, ['rev-parse', '--is-shallow-repository']);
/** The folder that the work trees of a repository share, where its large files are kept too. */
export const commonFolder = (folder: string) => run(folder, ['rev-parse', '--git-common-dir']);
export const mergeBase = (folder: string, a: string, b: string) => run(folder, ['merge-base', '--', ...hashes([a, b])]);
/** `MODE TYPE HASH\tPATH\0` of every file of a commit, from the top of the repository. */
export const listTree = (folder: string, commit: string) =>
  run(folder, ['ls-tree', '-r', '-z', '--full-tree', '--', ...hashes([commit])]);
/** Paths of the working tree that git keeps or would keep, from `folder`, each ended by a NUL. */
export const listWorkingTree = (folder: string) =>
  run(folder, ['ls-files', '-z', '--cached', '--others', '--exclude-standard']);

export interface GitObject {
  readonly hash: string;
  readonly type: string;
  readonly bytes: Buffer;
}

/** Objects of a repository by name, one after the other, from one running git. */
export interface Objects {
  /** @param name a hash, `REVISION^{commit}`; undefined where there is none, or it is ambiguous. @throws for a name with a line end */
  read(name: string): Promise<GitObject | undefined>;
  close(): void;
}

interface Waiting {
  resolve(object: GitObject | undefined): void;
  reject(error: Error): void;
}

/** Starts `git cat-file --batch` in a folder; it ends with `close`. */
export function openObjects(folder: string): Objects {
  const child: ChildProcessByStdio<Writable, Readable, null> = spawn('git', [...SAFE, 'cat-file', '--batch'], {
    cwd: folder,
    env: environment(),
    stdio: ['pipe', 'pipe', 'ignore'],
  });
  const waiting: Waiting[] = [];
  const reader = batchReader((object) => waiting.shift()?.resolve(object));
  const fail = (error: Error) => {
    for (const one of waiting.splice(0)) one.reject(error);
  };
  child.on('error', fail);
  child.on('close', () => fail(new Error('git ended before it answered')));
  child.stdin.on('error', fail);
  child.stdout.on('data', reader);
  return {
    read(name) {
      if (name === '' || /[\r\n\0]/.test(name)) throw new Error('not the name of an object');
      return new Promise((resolve, reject) => {
        waiting.push({ resolve, reject });
        child.stdin.write(`${name}\n`);
      });
    },
    close: () => child.stdin.end(),
  };
}

/** Takes apart `HASH TYPE SIZE\nBYTES\n`, or `NAME missing\n`, in whatever pieces it comes. */
export function batchReader(found: (object: GitObject | undefined) => void): (chunk: Buffer) => void {
  let chunks: Buffer[] = [];
  let have = 0;
  let wanted: { hash: string; type: string; size: number } | undefined;
  return (chunk) => {
    chunks.push(chunk);
    have += chunk.length;
    for (;;) {
      if (wanted && have < wanted.size + 1) return;
      const all = chunks.length === 1 ? chunks[0] : Buffer.concat(chunks);
      chunks = [all];
      if (wanted) {
        const { hash, type, size } = wanted;
        const bytes = Buffer.from(all.subarray(0, size));
        chunks = [all.subarray(size + 1)];
        have -= size + 1;
        wanted = undefined;
        found({ hash, type, bytes });
        continue;
      }
      const end = all.indexOf(10);
      if (end < 0) return;
      const head = /^([0-9a-f]{40,64}) (\w+) (\d+)$/.exec(all.subarray(0, end).toString('utf8'));
      chunks = [all.subarray(end + 1)];
      have -= end + 1;
      if (head) wanted = { hash: head[1], type: head[2], size: Number(head[3]) };
      else found(undefined);
    }
  };
}
