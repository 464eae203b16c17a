import { readdirSync, readFileSync, readlinkSync } from 'node:fs';
import fc from 'fast-check';
import { afterEach, describe, expect, test } from 'vitest';
import type { Diagnostic } from 'vscode-languageserver-protocol';
import { type Client, type Folder, folderWith, PUSH, type StartOptions, startClient } from './client';
import { LANE, PARTS } from './lane';

const clients: Client[] = [];
const folders: Folder[] = [];
const SPOILT = LANE.replace('length: 60 mm', 'lenght: 60 mm');

async function start(options: StartOptions = {}) {
  const client = await startClient(options);
  clients.push(client);
  return client;
}
async function folderOf(
  files: Readonly<Record<string, string>> = { 'a.channel.yaml': LANE, 'boards/main.parts.yaml': PARTS },
) {
  const folder = await folderWith(files);
  folders.push(folder);
  return folder;
}
afterEach(async () => {
  await Promise.all(clients.splice(0).map((client) => client.stop()));
  await Promise.all(folders.splice(0).map((folder) => folder.remove()));
});

const messages = (items: readonly Diagnostic[] | undefined) => (items ?? []).map(({ message }) => message).join('\n');
/** The newest findings that were pushed for a text. */
const lastPushed = (client: Client, uri: string) => client.pushed.filter((one) => one.uri === uri).at(-1);

describe('a client that cannot ask is told', () => {
  test('findings come by push alone, with the version of the text they belong to; none after the close', async () => {
    const folder = await folderOf();
    const client = await start({ capabilities: PUSH, folders: [folder.uri()] });
    expect(client.result.capabilities.diagnosticProvider).toBeUndefined();
    const uri = folder.uri('a.channel.yaml');
    await client.open(uri, SPOILT);
    await client.until(
      () => (messages(lastPushed(client, uri)?.diagnostics).includes('lenght') ? true : undefined),
      'the finding',
    );
    await client.change(uri, LANE);
    await client.until(
      () =>
        lastPushed(client, uri)?.version === 2 && lastPushed(client, uri)?.diagnostics.length === 0 ? true : undefined,
      'its end',
    );
    await client.change(uri, SPOILT);
    await client.until(() => (lastPushed(client, uri)?.diagnostics.length ? true : undefined), 'its return');
    await client.close(uri);
    await client.until(() => (lastPushed(client, uri)?.diagnostics.length === 0 ? true : undefined), 'an empty list');
    expect(client.received.some(({ method }) => method === 'workspace/diagnostic/refresh')).toBe(false);
  });
  test('versions never run backwards, however fast one types', async () => {
    const folder = await folderOf();
    const client = await start({ capabilities: PUSH, folders: [folder.uri()] });
    const uri = folder.uri('a.channel.yaml');
    await client.open(uri, LANE);
    for (let i = 0; i < 30; i++) await client.change(uri, LANE.replace('60 mm', `${60 + i} mm`));
    await client.until(() => (lastPushed(client, uri)?.version === 31 ? true : undefined), 'the last version');
    const versions = client.pushed.filter((one) => one.uri === uri).map(({ version }) => version ?? 0);
    expect(versions).toEqual([...versions].sort((a, b) => a - b));
  });
});

test('killed three times in a row: each new server has the findings of the unsaved text again', async () => {
  const folder = await folderOf();
  const uri = folder.uri('a.channel.yaml');
  for (let death = 0; death < 3; death++) {
    const client = await start({ folders: [folder.uri()] });
    await client.open(uri, SPOILT);
    const report = await client.pull(uri);
    expect(messages(report.kind === 'full' ? report.items : [])).toContain('lenght');
    const gone = new Promise((resolve) => client.process.once('exit', resolve));
    client.process.kill('SIGKILL');
    await gone;
  }
});

test('what was being analysed is known before it begins; what is to be skipped is opened and says so', async () => {
  const folder = await folderOf();
  const uri = folder.uri('a.channel.yaml');
  const client = await start({ folders: [folder.uri()], initializationOptions: { skip: [uri] } });
  await client.open(uri, SPOILT);
  const report = await client.pull(uri);
  expect(report).toMatchObject({ kind: 'full', items: [{ code: 'not-analysed', severity: 2 }] });
  expect(
    client.received.some(
      ({ method, params }) => method === 'lanewright/analysing' && (params as { uri: string }).uri === uri,
    ),
  ).toBe(false);
  expect(await client.request('lanewright/status', {})).toMatchObject({
    skipped: [expect.stringContaining('a.channel.yaml')],
  });
  await client.connection.sendNotification('lanewright/analyseAgain', { uri });
  expect(messages(await client.findings(uri))).toContain('lenght');
  const told = client.received.filter(({ method }) => method === 'lanewright/analysing').map(({ params }) => params);
  expect(told[0]).toEqual({ uri, running: true });
  expect(told.filter((one) => (one as { running: boolean }).running).length).toBe(
    told.filter((one) => !(one as { running: boolean }).running).length,
  );
});

test('two folders, each read below itself; a file outside both has its own folder', async () => {
  const [one, two] = [await folderOf(), await folderOf({ 'a.channel.yaml': LANE })];
  const lone = await folderOf({ 'x.channel.yaml': LANE.replace('boards/', ''), 'main.parts.yaml': PARTS });
  const client = await start({ folders: [one.uri(), two.uri()] });
  await client.open(one.uri('a.channel.yaml'), LANE);
  await client.open(two.uri('a.channel.yaml'), LANE);
  await client.open(lone.uri('x.channel.yaml'), LANE.replace('boards/', ''));
  expect(await client.findings(one.uri('a.channel.yaml'))).toEqual([]);
  expect(messages(await client.findings(two.uri('a.channel.yaml')))).toContain('main.parts.yaml');
  expect(await client.findings(lone.uri('x.channel.yaml'))).toEqual([]);
  await client.change(lone.uri('x.channel.yaml'), LANE.replace('boards/', '../'));
  expect(messages(await client.findings(lone.uri('x.channel.yaml')))).toContain('leads out');
});

test('a thousand files changed on disk are one analysis', async () => {
  const folder = await folderOf();
  const client = await start({ folders: [folder.uri()] });
  const uri = folder.uri('a.channel.yaml');
  await client.open(uri, LANE);
  expect(await client.findings(uri)).toEqual([]);
  const models = async () =>
    (await client.request<{ computed: { networks?: number } }>('lanewright/status', {})).computed.networks ?? 0;
  const before = await models();
  await folder.write('boards/main.parts.yaml', PARTS.replace('df: 0.004', 'df: 0.05'));
  const changes = Array.from({ length: 1000 }, (_, i) => ({
    uri: i === 500 ? folder.uri('boards/main.parts.yaml') : folder.uri(`lanes/${i}.channel.yaml`),
    type: 2,
  }));
  for (let i = 0; i < 1000; i += 100)
    await client.connection.sendNotification('workspace/didChangeWatchedFiles', { changes: changes.slice(i, i + 100) });
  await client.until(
    () =>
      client.received.filter(({ method }) => method === 'workspace/inlayHint/refresh').length > 0 ? true : undefined,
    'hints anew',
  );
  await client.findings(uri);
  // Of three elements the two traces feel the laminate, and the via.
  expect((await models()) - before).toBeLessThanOrEqual(3);
});

test('edits in any order end in what a new server says of the last text', async () => {
  const folder = await folderOf();
  const uri = folder.uri('a.channel.yaml');
  const edited = await start({ folders: [folder.uri()] });
  const cold = await start({ folders: [folder.uri()] });
  await edited.open(uri, LANE);
  let text = LANE;
  const piece = fc.constantFrom(
    '',
    ' ',
    '\n',
    '  - ',
    'trace',
    ':',
    '6',
    'mm',
    '{',
    '"',
    '😀',
    '# ',
    '\r\n',
    '\t',
    'L3',
    'impedance: 90 ohm\n',
  );
  const step = fc.record({ at: fc.double({ min: 0, max: 1, noNaN: true }), remove: fc.nat(12), insert: piece });
  const seen = async (client: Client) => {
    const hints = await client.request('textDocument/inlayHint', {
      textDocument: { uri },
      range: { start: { line: 0, character: 0 }, end: { line: 9999, character: 0 } },
    });
    const { data } = (await client.request<{ data: unknown } | null>('lanewright/preview', { uri })) ?? {};
    return JSON.stringify({ findings: await client.findings(uri), hints, data });
  };
  await fc.assert(
    fc.asyncProperty(fc.boolean(), fc.array(step, { minLength: 1, maxLength: 15 }), async (isAnew, steps) => {
      if (isAnew) {
        text = LANE;
        await edited.change(uri, text);
      }
      for (const { at, remove, insert } of steps) {
        const start = Math.floor(at * text.length);
        const end = Math.min(text.length, start + remove);
        const range = { start: positionIn(text, start), end: positionIn(text, end) };
        // As an editor sends it: places in UTF-16 units of whole lines.
        const [from, to] = [offsetIn(text, range.start), offsetIn(text, range.end)];
        text = text.slice(0, from) + insert + text.slice(to);
        await edited.change(uri, [{ range, text: insert }]);
      }
      await cold.open(uri, text);
      expect(await seen(edited)).toBe(await seen(cold));
      await cold.close(uri);
    }),
    { numRuns: 25, seed: 20261201 },
  );
}, 60000);

const lineStarts = (text: string) => [
  0,
  ...[...text.matchAll(/\r\n|\n|\r/g)].map((found) => found.index + found[0].length),
];
function positionIn(text: string, offset: number) {
  const starts = lineStarts(text);
  const line = starts.findLastIndex((start) => start <= offset);
  const end = (starts[line + 1] ?? text.length + 1) - 1;
  const lineEnd = text.slice(starts[line], end).replace(/[\r\n]+$/, '').length + starts[line];
  return { line, character: Math.min(offset, Math.max(lineEnd, starts[line])) - starts[line] };
}
const offsetIn = (text: string, { line, character }: { line: number; character: number }) =>
  lineStarts(text)[line] + character;

test('no socket is opened and no other program started', async () => {
  const folder = await folderOf();
  const client = await start({ folders: [folder.uri()] });
  const uri = folder.uri('a.channel.yaml');
  await client.open(uri, LANE);
  await client.findings(uri);
  const pid = client.process.pid;
  const inodes = new Set(
    readdirSync(`/proc/${pid}/fd`).flatMap((descriptor) => {
      try {
        return /^socket:\[(\d+)\]$/.exec(readlinkSync(`/proc/${pid}/fd/${descriptor}`))?.[1] ?? [];
      } catch {
        return [];
      }
    }),
  );
  // The pipes that Node makes for a child are socket pairs without an address: no network table knows them.
  const known = ['tcp', 'tcp6', 'udp', 'udp6', 'raw', 'raw6'].flatMap((table) =>
    readFileSync(`/proc/net/${table}`, 'utf8')
      .split('\n')
      .slice(1)
      .map((line) => line.trim().split(/\s+/)[9]),
  );
  expect(known.filter((inode) => inode !== undefined && inodes.has(inode))).toEqual([]);
  expect(readFileSync(`/proc/${pid}/task/${pid}/children`, 'utf8').trim()).toBe('');
});

test('memory stays flat over edits, and comes back when files are closed', async () => {
  const folder = await folderOf();
  const client = await start({ folders: [folder.uri()], execArgv: ['--expose-gc'] });
  const uri = folder.uri('a.channel.yaml');
  await client.open(uri, LANE);
  const status = () => client.request<{ heapMegabytes: number }>('lanewright/status', {});
  // What lies outside the heap is only freed by the collection after the one that found it dead.
  const heap = async () =>
    Math.min((await status()).heapMegabytes, (await status()).heapMegabytes, (await status()).heapMegabytes);
  const edit = async (count: number) => {
    for (let i = 0; i < count; i++) {
      await client.change(uri, LANE.replace('60 mm', `${60 + (i % 7)}.${i % 100} mm`));
      await client.pull(uri);
    }
  };
  await edit(200);
  const before = await heap();
  await edit(400);
  // The state of one analysis, some MB, differs from text to text; one that was kept for each edit would be hundreds.
  expect((await heap()) - before).toBeLessThan(5);
  const others = Array.from({ length: 20 }, (_, i) => folder.uri(`lanes/${i}.channel.yaml`));
  for (const other of others) {
    await client.open(other, LANE.replace('boards/', '../boards/'));
    await client.findings(other);
  }
  const open = await heap();
  for (const other of others) await client.close(other);
  await client.findings(uri);
  expect(open - before).toBeGreaterThan(10);
  expect((await heap()) - before).toBeLessThan(5);
}, 60000);
