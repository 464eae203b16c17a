import { describe, expect, test } from 'vitest';
import type { CodeAction, CompletionList, WorkspaceEdit } from 'vscode-languageserver-protocol';
import { LANE, PARTS } from './lane';
import { EVERYWHERE, positionOf, withOpenLane } from './open-lane';

const { open, ask, typed } = withOpenLane();

describe('writing', () => {
  test('completion in half-typed text; the explanation on demand', () => {
    const text = LANE.replace('    impedance: 100 ohm ± 8%\n  - via', '    impe\n  - via');
    return typed(text, async () => {
      const list = await ask<CompletionList>('completion', text, '    impe\n', 8);
      const item = list.items.find(({ label }) => label === 'impedance')!;
      expect(item.textEdit).toMatchObject({ newText: 'impedance: ' });
      expect(item.documentation).toBeUndefined();
      expect(await open.client.request('completionItem/resolve', item)).toHaveProperty(
        'documentation.value',
        expect.stringContaining('Characteristic impedance'),
      );
    });
  });
  test('a quick fix is listed without its edit, which mends the text when it is chosen', () => {
    const text = LANE.replace('length: 60 mm', 'lenght: 60 mm');
    return typed(text, async () => {
      const range = { start: positionOf(text, 'lenght'), end: positionOf(text, 'lenght', 6) };
      const actions = await open.client.request<CodeAction[]>('textDocument/codeAction', {
        textDocument: { uri: open.lane },
        range,
        context: { diagnostics: [] },
      });
      const fix = actions.find(({ isPreferred }) => isPreferred)!;
      expect(fix.edit).toBeUndefined();
      expect(actions.find(({ title }) => title.startsWith('Accept'))?.disabled?.reason).toContain('mended');
      const { edit } = await open.client.request<CodeAction>('codeAction/resolve', fix);
      expect(edit?.documentChanges).toEqual([
        { textDocument: { uri: open.lane, version: expect.any(Number) }, edits: [{ range, newText: 'length' }] },
      ]);
      const all = await open.client.request<CodeAction[]>('textDocument/codeAction', {
        textDocument: { uri: open.lane },
        range: EVERYWHERE,
        context: { diagnostics: [], only: ['source.fixAll'] },
      });
      expect(all).toEqual([expect.objectContaining({ kind: 'source.fixAll.lanewright', edit: expect.anything() })]);
    });
  });
  test('a finding is accepted by a waiver, after which it is not shown', () => {
    const text = LANE.replace('max: 12 dB', 'max: 0.5 dB');
    return typed(text, async () => {
      expect((await open.client.findings(open.lane)).map(({ code }) => code)).toContain('insertion-loss');
      const actions = await open.client.request<CodeAction[]>('textDocument/codeAction', {
        textDocument: { uri: open.lane },
        range: EVERYWHERE,
        context: { diagnostics: [] },
      });
      const accept = actions.find(
        ({ command }) =>
          command?.command === 'lanewright.acceptFinding' && command.arguments?.[0].rule === 'insertion-loss',
      )!;
      const { rule, at, value } = accept.command!.arguments![0];
      const edit = await open.client.request<WorkspaceEdit>('lanewright/waiver', {
        uri: open.lane,
        rule,
        at,
        upTo: value,
        until: '2027-06-30',
        by: 'lane team',
        reason: 'a prototype',
      });
      const [change] = edit.documentChanges as { edits: { newText: string }[] }[];
      expect(change.edits[0].newText).toContain('until: 2027-06-30');
      await open.client.change(
        open.lane,
        `${text}waivers:\n  - rule: ${rule}\n    at: ${at}\n    up-to: ${value}\n    until: 2027-06-30\n    by: lane team\n    reason: a prototype\n`,
      );
      expect((await open.client.findings(open.lane)).map(({ code }) => code)).not.toContain('insertion-loss');
    });
  });
  test('rename across files, closed ones too; refused where the name is taken', async () => {
    const position = positionOf(LANE, 'layer: L3', 8);
    expect(await ask('prepareRename', LANE, 'layer: L3', 8)).toMatchObject({ placeholder: 'L3' });
    const edit = await open.client.request<WorkspaceEdit>('textDocument/rename', {
      textDocument: { uri: open.lane },
      position,
      newName: 'S1',
    });
    const changes = edit.documentChanges as { textDocument: { uri: string; version: number | null } }[];
    expect(new Set(changes.map(({ textDocument }) => textDocument.uri))).toEqual(
      new Set([open.lane, open.parts, open.folder.uri('b.channel.yaml')]),
    );
    expect(changes.find(({ textDocument }) => textDocument.uri === open.parts)?.textDocument.version).toBeNull();
    await expect(
      open.client.request('textDocument/rename', { textDocument: { uri: open.lane }, position, newName: 'L5' }),
    ).rejects.toThrow('another one already');
  });
  test('a renamed parts file takes its `use` paths along', async () => {
    const edit = await open.client.request<WorkspaceEdit>('workspace/willRenameFiles', {
      files: [{ oldUri: open.parts, newUri: open.folder.uri('pcb/main.parts.yaml') }],
    });
    expect(JSON.stringify(edit)).toContain('pcb/main.parts.yaml');
    expect(edit.documentChanges).toHaveLength(2);
  });
  test('formatting', () =>
    typed(LANE.replace('10 Gb/s', '10 Gb/s   '), async () => {
      const edits = await open.client.request<{ newText: string }[]>('textDocument/formatting', {
        textDocument: { uri: open.lane },
        options: { tabSize: 2, insertSpaces: true },
      });
      expect(edits).toEqual([expect.objectContaining({ newText: '' })]);
    }));
});

test('an unsaved edit of a parts file renews the lanes that use it', async () => {
  await open.client.open(open.parts, PARTS);
  const before = await open.client.request<{ data: { verdict: { text: string } } }>('lanewright/preview', {
    uri: open.lane,
  });
  await open.client.change(open.parts, PARTS.replace('df: 0.004', 'df: 0.04'));
  const after = await open.client.request<{ data: { verdict: { text: string } } }>('lanewright/preview', {
    uri: open.lane,
  });
  expect(after.data.verdict.text).not.toBe(before.data.verdict.text);
  await open.client.change(open.parts, PARTS.replace('{ copper: L3,', '{ copper: X3,'));
  const report = await open.client.pull(open.lane);
  expect(report.kind === 'full' && report.items.some(({ message }) => String(message).includes('L3'))).toBe(true);
  await open.client.close(open.parts);
  expect(await open.client.findings(open.lane)).toEqual([]);
});

test('a request that cannot be answered is an error, and the server goes on', async () => {
  await expect(open.client.request('textDocument/rename', { textDocument: { uri: open.lane } })).rejects.toThrow();
  expect(
    await open.client.request('textDocument/hover', {
      textDocument: { uri: 'file:///nowhere/x.channel.yaml' },
      position: { line: 0, character: 0 },
    }),
  ).toBeNull();
  expect(await open.client.findings(open.lane)).toEqual([]);
});

test('a request that is cancelled ends as cancelled', async () => {
  await open.client.change(open.lane, LANE.replace('20 mm', '21 mm'));
  const { CancellationTokenSource } = await import('vscode-languageserver-protocol/node');
  const source = new CancellationTokenSource();
  const asked = open.client.connection.sendRequest('lanewright/preview', { uri: open.lane }, source.token);
  source.cancel();
  await expect(asked).rejects.toMatchObject({ code: -32800 });
  await open.client.change(open.lane, LANE);
  expect(await open.client.findings(open.lane)).toEqual([]);
});
