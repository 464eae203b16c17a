import { createHash } from 'node:crypto';
import { mkdirSync, mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { largeFile } from './large-file';
import { batchReader, type GitObject } from './objects';
import { checkRevision } from './repository';
import { rowsOf } from './revision';

test('objects are read whole, in whatever pieces they come', () => {
  const hash = 'a'.repeat(40);
  const content = Buffer.from('line\nnobody missing\n\0\u00ff');
  const stream = Buffer.concat([
    Buffer.from(`${hash} blob ${content.length}\n`),
    content,
    Buffer.from(`\nno-such-name missing\n${hash} blob 0\n\n`),
  ]);
  fc.assert(
    fc.property(fc.array(fc.integer({ min: 1, max: 9 }), { minLength: 1 }), (sizes) => {
      const found: (GitObject | undefined)[] = [];
      const read = batchReader((object) => found.push(object));
      for (let at = 0, i = 0; at < stream.length; i++) {
        const size = sizes[i % sizes.length];
        read(stream.subarray(at, at + size));
        at += size;
      }
      expect(found.map((object) => object?.bytes.toString('hex'))).toEqual([content.toString('hex'), undefined, '']);
    }),
  );
});

test('a listing gives each path its mode and hash, line ends and tabs in names included', () => {
  const rows = rowsOf(
    `100644 blob ${'a'.repeat(40)}\tlanes/a\tb\nc.channel.yaml\u0000120000 blob ${'b'.repeat(40)}\tlink\0`,
  );
  expect([...rows]).toEqual([
    ['lanes/a\tb\nc.channel.yaml', { mode: '100644', hash: 'a'.repeat(40) }],
    ['link', { mode: '120000', hash: 'b'.repeat(40) }],
  ]);
});

test.each(['--output=x', '-', '', 'a\nb', 'a..b', 'main...x'])('%j is refused as a revision', (revision) => {
  expect(() => checkRevision(revision)).toThrow(/is (?:not one|therefore no) revision/);
});
test.each(['HEAD~1', 'main', 'v1.2', 'feature/a-b', 'HEAD@{1}'])('%s may be one', (revision) => {
  expect(() => checkRevision(revision)).not.toThrow();
});

describe('a large-file pointer', () => {
  const store = mkdtempSync(join(tmpdir(), 'lanewright-store-'));
  const content = '# Hz S RI R 50\n';
  const id = createHash('sha256').update(content).digest('hex');
  const pointer = (of: string) => `version https://git-lfs.github.com/spec/v1\noid sha256:${of}\nsize 15\n`;
  const put = (name: string, text: string) => {
    const folder = join(store, 'lfs', 'objects', name.slice(0, 2), name.slice(2, 4));
    mkdirSync(folder, { recursive: true });
    writeFileSync(join(folder, name), text);
  };
  test('is read from the local store, with either line end', async () => {
    put(id, content);
    expect(await largeFile(pointer(id), store)).toEqual({ kind: 'text', text: content });
    expect(await largeFile(pointer(id).replace(/\n/g, '\r\n'), store)).toEqual({ kind: 'text', text: content });
  });
  test('is never data: missing, without a store, or where the store holds something else', async () => {
    const other = 'f'.repeat(64);
    expect(await largeFile(pointer(other), store)).toMatchObject({ kind: 'refused' });
    put(other, 'not that content');
    expect(await largeFile(pointer(other), store)).toMatchObject({ kind: 'refused' });
    expect(await largeFile(pointer(id), undefined)).toMatchObject({ kind: 'refused' });
    expect(await largeFile(pointer('../../../etc/passwd'), store)).toMatchObject({ kind: 'refused' });
  });
  test('is told from any other text', async () => expect(await largeFile(content, store)).toBeUndefined());
});
