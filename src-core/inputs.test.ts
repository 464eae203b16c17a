import { expect, test } from 'vitest';
import { analyse } from './analyse';
import { fileKind, gatherInputs, joinPath } from './inputs';
import type { FileContent, Files } from './text/types';

test.each([
  ['a.channel.yaml', 'channel'],
  ['x/b.parts.yaml', 'parts'],
  ['x/lanewright.config.yaml', 'config'],
  ['m/conn.s4p', 'touchstone'],
  ['m/CONN.S16P', 'touchstone'],
  ['.channel.yaml', 'other'],
  ['README.md', 'other'],
])('%s is of kind %s', (path, kind) => expect(fileKind(path)).toBe(kind));

test.each([
  ['lanes/a.channel.yaml', '../boards/b.parts.yaml', 'boards/b.parts.yaml'],
  ['lanes/a.channel.yaml', './b.parts.yaml', 'lanes/b.parts.yaml'],
  ['a.channel.yaml', 'x//y/../b.parts.yaml', 'x/b.parts.yaml'],
  ['ü x/a.channel.yaml', 'ö b.parts.yaml', 'ü x/ö b.parts.yaml'],
])('%s names %s: %s', (from, path, file) => expect(joinPath(from, path)).toEqual({ file }));

test.each([
  '',
  ' ',
  '/etc/hosts',
  '~/x',
  'C:/x.parts.yaml',
  'c:x',
  '//server/share/x',
  '\\\\server\\share\\x',
  'boards\\x.parts.yaml',
  '../../x.parts.yaml',
  'a/../../../x',
  'file:///x',
  'http://example/x',
  'a\0b',
  'a\nb',
  'x/',
  '..',
  '.',
  'CON',
  'sub/nul.s4p',
  'lpt1',
  'x'.repeat(1001),
])('refused unread: %j', (path) => {
  const { file, problem } = joinPath('lanes/a.channel.yaml', path);
  expect(file).toBeUndefined();
  expect(problem).toMatch(/./);
});

function memory(texts: Record<string, string>): Files & { readonly asked: string[] } {
  const asked: string[] = [];
  return {
    asked,
    async read(file): Promise<FileContent> {
      asked.push(file);
      return Object.hasOwn(texts, file) ? { kind: 'text', text: texts[file] } : { kind: 'missing' };
    },
  };
}

test('all that a channel depends on is read, cycles end, the nearest config counts', async () => {
  const files = memory({
    'm/lanes/a.channel.yaml':
      'use: { b: ../b.parts.yaml, gone: gone.parts.yaml, out: ../../../x.parts.yaml, not: a.channel.yaml }\npath: [{ block: x, touchstone: x.s4p }]\n',
    'm/b.parts.yaml': 'use: { c: c.parts.yaml }\nparts: { p: { kind: block, touchstone: models/p.s2p } }\n',
    'm/c.parts.yaml': 'use: { b: b.parts.yaml }\n',
    'm/models/p.s2p': '# GHz S RI R 50\n',
    'm/lanewright.config.yaml': 'lanewright: 1\n',
    'lanewright.config.yaml': 'lanewright: 1\n',
  });
  const inputs = await gatherInputs(files, 'm/lanes/a.channel.yaml', '2026-12-01');
  expect([...inputs.files.keys()].sort()).toEqual([
    'm/b.parts.yaml',
    'm/c.parts.yaml',
    'm/lanes/a.channel.yaml',
    'm/lanes/gone.parts.yaml',
    'm/lanes/x.s4p',
    'm/lanewright.config.yaml',
    'm/models/p.s2p',
  ]);
  expect(inputs.configFile).toBe('m/lanewright.config.yaml');
  expect(inputs.files.get('m/lanes/x.s4p')).toEqual({ kind: 'missing' });
  expect(files.asked.some((file) => file.includes('..'))).toBe(false);
});

test('contents that say the same stay the same objects', async () => {
  const texts = { 'a.channel.yaml': 'use: { b: b.parts.yaml }\n', 'b.parts.yaml': 'lanewright: 1\n' };
  const before = await gatherInputs(memory(texts), 'a.channel.yaml', '2026-12-01');
  const after = await gatherInputs(
    memory({ ...texts, 'a.channel.yaml': 'use: { b: b.parts.yaml } # edited\n' }),
    'a.channel.yaml',
    '2026-12-01',
    before,
  );
  expect(after.files.get('b.parts.yaml')).toBe(before.files.get('b.parts.yaml'));
  expect(after.files.get('a.channel.yaml')).not.toBe(before.files.get('a.channel.yaml'));
});

test.each<FileContent>([
  { kind: 'too-large', bytes: 2 ** 21, limit: 2 ** 20 },
  { kind: 'refused', reason: 'it is a link that leads out of the folder that is open' },
])('a configuration that is $kind is not passed over, and the channel says so once', async (content) => {
  const { read } = memory({ 'm/a.channel.yaml': 'lanewright: 1\n', 'lanewright.config.yaml': 'lanewright: 1\n' });
  const files = { read: async (file: string) => (file === 'm/lanewright.config.yaml' ? content : read(file)) };
  const inputs = await gatherInputs(files, 'm/a.channel.yaml', '2026-12-01');
  expect(inputs.configFile).toBe('m/lanewright.config.yaml');
  const { findings } = analyse(inputs, undefined, { until: 'model' });
  expect(findings.filter(({ message }) => message.includes('lanewright.config.yaml'))).toMatchObject([
    {
      rule: content.kind === 'refused' ? 'refused-file' : 'limit',
      severity: 'error',
      message: expect.stringMatching(
        /^`m\/lanewright.config.yaml` is not read: it is .*\. The rules’ defaults hold\.$/,
      ),
    },
  ]);
});
