import { execFile } from 'node:child_process';
import { existsSync, mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

const root = process.cwd();
const bundle = join(root, 'dist', 'lanewright.mjs');

export interface Result {
  readonly status: number;
  readonly stdout: string;
  readonly stderr: string;
}

/** Runs the built command line as a shell would, piped. `npm test` and `npm run build` build it. */
export function lanewright(
  args: readonly string[],
  {
    cwd = root,
    input = '',
    environment = {},
  }: { cwd?: string; input?: string; environment?: Record<string, string> } = {},
): Promise<Result> {
  if (!existsSync(bundle)) throw new Error('The command line is not built: `npm run build`.');
  const { NO_COLOR: _no, FORCE_COLOR: _force, ...rest } = process.env;
  return new Promise((resolve) => {
    const child = execFile(
      process.execPath,
      [bundle, ...args],
      { cwd, env: { ...rest, ...environment }, maxBuffer: 1 << 28 },
      (error, stdout, stderr) => resolve({ status: error ? Number(error.code ?? 1) : 0, stdout, stderr }),
    );
    child.stdin?.end(input);
  });
}

export const emptyFolder = () => mkdtempSync(join(tmpdir(), 'lanewright-cli-'));
