import { execFileSync } from 'node:child_process';
import { mkdir, mkdtemp, rm, symlink, truncate, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type { RootFiles } from './files';
import { nodeFiles } from './files-node';

let outer: string;
let files: RootFiles;

beforeAll(async () => {
  outer = await mkdtemp(join(tmpdir(), 'lanewright-files-'));
  const root = join(outer, 'root');
  await mkdir(join(root, 'boards'), { recursive: true });
  await writeFile(join(root, 'boards/a.parts.yaml'), '\ufefflanewright: 1\n');
  await writeFile(join(outer, 'secret.parts.yaml'), 'secret');
  await symlink(join(outer, 'secret.parts.yaml'), join(root, 'out.parts.yaml'));
  await symlink(outer, join(root, 'up'));
  await symlink(join(root, 'boards/a.parts.yaml'), join(root, 'in.parts.yaml'));
  await symlink('/dev/zero', join(root, 'zero.s2p'));
  execFileSync('mkfifo', [join(root, 'pipe.s2p')]);
  await writeFile(join(root, 'big.s4p'), '');
  await truncate(join(root, 'big.s4p'), 64 * 1024 * 1024 + 1);
  await writeFile(join(root, 'just.parts.yaml'), 'x'.repeat(1024 * 1024));
  await writeFile(join(root, 'over.parts.yaml'), 'x'.repeat(1024 * 1024 + 1));
  files = nodeFiles(pathToFileURL(root).href);
});
afterAll(() => rm(outer, { recursive: true, force: true }));

test('a file below the root is read, without its byte order mark; a missing one is missing', async () => {
  expect(await files.read('boards/a.parts.yaml')).toEqual({ kind: 'text', text: 'lanewright: 1\n' });
  expect(await files.read('in.parts.yaml')).toEqual({ kind: 'text', text: 'lanewright: 1\n' });
  expect(await files.read('boards/none.parts.yaml')).toEqual({ kind: 'missing' });
});

describe('refused unread', () => {
  test.each(['out.parts.yaml', 'up/secret.parts.yaml', 'zero.s2p', 'pipe.s2p', 'boards'])(
    '%s: a link that leads out, a device, a pipe, a folder',
    async (file) => {
      expect(await files.read(file)).toMatchObject({ kind: 'refused' });
    },
  );
  test.each([
    '../secret.parts.yaml',
    'boards/../../secret.parts.yaml',
    '/etc/passwd',
    '//server/share',
    'C:/x.parts.yaml',
    'boards\\a.parts.yaml',
    'a\0b',
  ])('%j: by its words alone', async (file) => {
    expect(await files.read(file)).toMatchObject({ kind: 'refused' });
  });
});

test('sizes: at the limit it is read, beyond it is refused by size alone', async () => {
  expect(await files.read('just.parts.yaml')).toMatchObject({ kind: 'text' });
  expect(await files.read('over.parts.yaml')).toEqual({
    kind: 'too-large',
    bytes: 1024 * 1024 + 1,
    limit: 1024 * 1024,
  });
  expect(await files.read('big.s4p')).toMatchObject({ kind: 'too-large', limit: 64 * 1024 * 1024 });
});

test('a folder is listed without its links; nothing outside the root is', async () => {
  expect((await files.list('')).map(({ name }) => name).sort()).toEqual([
    'big.s4p',
    'boards',
    'just.parts.yaml',
    'over.parts.yaml',
  ]);
  expect(await files.list('up')).toEqual([]);
  expect(await files.list('../')).toEqual([]);
});
