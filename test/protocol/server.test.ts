import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type {
  CodeAction,
  CompletionList,
  Hover,
  InlayHint,
  LocationLink,
  WorkspaceEdit,
} from 'vscode-languageserver-protocol';
import { type Client, type Folder, folderWith, startClient } from './client';
import { LANE, PARTS } from './lane';

let folder: Folder;
let client: Client;
let lane: string;
let parts: string;

beforeAll(async () => {
  // A name as people have them: a letter beyond ASCII and a space.
  folder = await folderWith(
    { 'a.channel.yaml': LANE, 'b.channel.yaml': LANE, 'boards/main.parts.yaml': PARTS },
    'Früh sortiert',
  );
  client = await startClient({ folders: [folder.uri()] });
  lane = folder.uri('a.channel.yaml');
  parts = folder.uri('boards/main.parts.yaml');
  await client.open(lane, LANE);
}, 60000);
afterAll(async () => {
  await client?.stop();
  await folder?.remove();
});

const positionOf = (text: string, needle: string, extra = 0) => {
  const before = text.slice(0, text.indexOf(needle) + extra).split('\n');
  return { line: before.length - 1, character: before[before.length - 1].length };
};
const ask = <R>(method: string, text: string, needle: string, extra = 0, more: object = {}) =>
  client.request<R>(`textDocument/${method}`, {
    textDocument: { uri: lane },
    position: positionOf(text, needle, extra),
    ...more,
  });
const EVERYWHERE = { start: { line: 0, character: 0 }, end: { line: 1000, character: 0 } };

/** Shows another text in the lane for the length of a test. */
async function typed<T>(text: string, during: () => Promise<T>): Promise<T> {
  await client.change(lane, text);
  try {
    return await during();
  } finally {
    await client.change(lane, LANE);
  }
}

test('every feature that is promised is offered', () => {
  const { capabilities } = client.result;
  expect(Object.keys(capabilities).sort()).toEqual(
    [
      'codeActionProvider',
      'codeLensProvider',
      'completionProvider',
      'declarationProvider',
      'definitionProvider',
      'diagnosticProvider',
      'documentFormattingProvider',
      'documentHighlightProvider',
      'documentLinkProvider',
      'documentSymbolProvider',
      'foldingRangeProvider',
      'hoverProvider',
      'inlayHintProvider',
      'positionEncoding',
      'referencesProvider',
      'renameProvider',
      'selectionRangeProvider',
      'textDocumentSync',
      'workspace',
      'workspaceSymbolProvider',
    ].sort(),
  );
  expect(capabilities.diagnosticProvider).toMatchObject({ interFileDependencies: true, workspaceDiagnostics: true });
});

describe('findings', () => {
  test('a good lane has none, and nothing is pushed to a client that pulls', async () => {
    expect(await client.findings(lane)).toEqual([]);
    expect(client.pushed).toEqual([]);
  });
  test('a fault stands where it was made, with rule, link and severity; the same answer has the same name', () =>
    typed(LANE.replace('length: 60 mm', 'lenght: 60 mm'), async () => {
      const report = await client.pull(lane);
      if (report.kind !== 'full') throw new Error('full report wanted');
      const finding = report.items.find(({ message }) => String(message).includes('lenght'))!;
      expect(finding).toMatchObject({ code: 'schema', source: 'lanewright', severity: 1 });
      expect(finding.range.start).toEqual(positionOf(LANE, 'length: 60 mm'));
      expect(await client.pull(lane, report.resultId)).toMatchObject({ kind: 'unchanged', resultId: report.resultId });
    }));
  test('rule and related places: both ends of a name that is taken twice', () =>
    typed(LANE.replace('trace: run', 'trace: start'), async () => {
      const report = await client.pull(lane);
      const related =
        report.kind === 'full' ? report.items.flatMap(({ relatedInformation }) => relatedInformation ?? []) : [];
      expect(related.map(({ location }) => location.uri)).toContain(lane);
    }));
  test('of closed files, when the whole workspace is asked for', async () => {
    await folder.write('c.channel.yaml', LANE.replace('length: 60 mm', 'length: 60 furlong'));
    await client.connection.sendNotification('workspace/didChangeWatchedFiles', {
      changes: [{ uri: folder.uri('c.channel.yaml'), type: 1 }],
    });
    await client.until(
      () => client.received.find(({ method }) => method === 'workspace/diagnostic/refresh'),
      'a request to ask again',
    );
    const report = await client.request<{ items: { uri: string; resultId: string; items: unknown[] }[] }>(
      'workspace/diagnostic',
      { previousResultIds: [] },
    );
    expect(report.items.map(({ uri }) => uri)).toEqual([folder.uri('c.channel.yaml')]);
    const [{ uri, resultId }] = report.items;
    const again = await client.request<{ items: unknown[] }>('workspace/diagnostic', {
      previousResultIds: [{ uri, value: resultId }],
    });
    expect(again.items).toEqual([expect.objectContaining({ kind: 'unchanged', uri })]);
  });
});

describe('other files', () => {
  test('a parts file and a configuration have findings of their own', async () => {
    const board = folder.uri('boards/other.parts.yaml');
    await client.open(board, PARTS.replace('thickness: 40 um', 'thickness: 40 ohm'));
    const report = await client.pull(board);
    expect(report.kind === 'full' && report.items.map(({ code }) => code)).toContain('quantity');
    await client.close(board);
    const config = folder.uri('lanewright.config.yaml');
    const text = 'lanewright: 1\nrules:\n  stub-resonanse: error\n  ';
    await client.open(config, text, 'lanewright-config');
    const second = await client.pull(config);
    expect(second.kind === 'full' && second.items.map(({ message }) => String(message)).join()).toContain(
      'stub-resonance',
    );
    const list = await client.request<CompletionList>('textDocument/completion', {
      textDocument: { uri: config },
      position: { line: 3, character: 2 },
    });
    expect(list.items.map(({ label }) => label)).toContain('return-loss');
    await client.close(config);
  });
  test('an open configuration changes severities at once, unsaved', async () => {
    const config = folder.uri('lanewright.config.yaml');
    const text = LANE.replace('max: 12 dB', 'max: 0.5 dB');
    await typed(text, async () => {
      const severity = async () =>
        (await client.findings(lane)).find(({ code }) => code === 'insertion-loss')?.severity;
      expect(await severity()).toBe(1);
      await client.open(config, 'lanewright: 1\nrules:\n  insertion-loss: hint\n', 'lanewright-config');
      expect(await severity()).toBe(4);
      await client.close(config);
      expect(await severity()).toBe(1);
    });
  });
  test('a text that is too large to be read says so', async () => {
    const uri = folder.uri('large.channel.yaml');
    await client.open(uri, `${LANE}# ${'x'.repeat(1024 * 1024)}`);
    const report = await client.pull(uri);
    expect(report.kind === 'full' && report.items[0]).toMatchObject({
      code: 'limit',
      range: { start: { line: 0, character: 0 } },
    });
    await client.close(uri);
  });
  test('a text without a file is a channel by its language', async () => {
    const uri = 'untitled:Untitled-1';
    await client.open(uri, LANE.replace('length: 60 mm', 'lenght: 60 mm'));
    const report = await client.pull(uri);
    expect(report.kind === 'full' && report.items.map(({ message }) => String(message)).join()).toContain('lenght');
    await client.close(uri);
  });
});

describe('reading', () => {
  test('hover', async () => {
    const hover = await ask<Hover>('hover', LANE, 'trace: run', 8);
    expect(hover.contents).toMatchObject({ kind: 'markdown', value: expect.stringContaining('Own loss at Nyquist') });
    expect(hover.range).toEqual({ start: positionOf(LANE, 'trace: run', 7), end: positionOf(LANE, 'trace: run', 10) });
  });
  test('hints, resolved on demand, with a place to jump to', async () => {
    const hints = await client.request<InlayHint[]>('textDocument/inlayHint', {
      textDocument: { uri: lane },
      range: EVERYWHERE,
    });
    const labels = hints.map(({ label }) => (label as { value: string }[]).map(({ value }) => value).join(''));
    expect(labels.some((label) => /^≈ stub .* → .* GHz$/.test(label))).toBe(true);
    const layer = hints[labels.indexOf('to: L3')];
    expect(layer.label).toEqual([{ value: 'to: L3', location: { uri: parts, range: expect.anything() } }]);
    expect(layer.textEdits).toHaveLength(1);
    expect(layer.tooltip).toBeUndefined();
    expect(await client.request('inlayHint/resolve', layer)).toHaveProperty(
      'tooltip.value',
      expect.stringContaining('**dive**'),
    );
  });
  test('lens, outline, folds, links, selection', async () => {
    const document = { textDocument: { uri: lane } };
    const [lens] = await client.request<object[]>('textDocument/codeLens', document);
    expect(await client.request('codeLens/resolve', lens)).toMatchObject({
      command: { command: 'lanewright.openPreviewToSide', title: expect.stringContaining('meets its limits') },
    });
    const outline = await client.request<{ name: string; children: { name: string }[] }[]>(
      'textDocument/documentSymbol',
      document,
    );
    expect(outline.find(({ name }) => name === 'path')?.children.map(({ name }) => name)).toEqual([
      'start',
      'dive',
      'run',
    ]);
    expect((await client.request<unknown[]>('textDocument/foldingRange', document)).length).toBeGreaterThan(4);
    const [link] = await client.request<object[]>('textDocument/documentLink', document);
    expect(await client.request('documentLink/resolve', link)).toMatchObject({ target: parts });
    const [selection] = await client.request<{ range: unknown; parent?: unknown }[]>('textDocument/selectionRange', {
      ...document,
      positions: [positionOf(LANE, '60 mm', 1)],
    });
    expect(selection).toMatchObject({
      range: { start: positionOf(LANE, '60 mm'), end: positionOf(LANE, '60 mm', 5) },
      parent: expect.anything(),
    });
  });
  test('definition, references in closed files, symbols of the workspace', async () => {
    const [target] = await ask<LocationLink[]>('definition', LANE, 'layer: L3', 8);
    expect(target).toMatchObject({ targetUri: parts, targetSelectionRange: { start: positionOf(PARTS, 'L3,') } });
    const references = await ask<{ uri: string }[]>('references', LANE, 'layer: L3', 8, {
      context: { includeDeclaration: true },
    });
    expect(new Set(references.map(({ uri }) => uri))).toEqual(
      new Set([lane, parts, folder.uri('b.channel.yaml'), folder.uri('c.channel.yaml')]),
    );
    const highlights = await ask<{ kind: number }[]>('documentHighlight', LANE, 'trace: run', 8);
    expect(highlights.map(({ kind }) => kind)).toEqual([3]);
    const symbols = await client.request<{ name: string }[]>('workspace/symbol', { query: 'div' });
    expect(symbols.map(({ name }) => name)).toContain('dive');
  });
  test('preview: data, the place of an element, the element at a place', async () => {
    const preview = await client.request<{ version: number; data: { verdict: { text: string } } }>(
      'lanewright/preview',
      { uri: lane },
    );
    expect(preview.data.verdict.text).toContain('meets its limits');
    const range = await client.request<{ range: { start: unknown } }>('lanewright/range', {
      uri: lane,
      place: { file: 'a.channel.yaml', path: ['path', 1] },
    });
    expect(range.range.start).toEqual(positionOf(LANE, '- via: dive'));
    expect(await client.request('lanewright/elementAt', { uri: lane, position: positionOf(LANE, 'pitch') })).toEqual({
      element: 'dive',
    });
  });
});

describe('writing', () => {
  test('completion in half-typed text; the explanation on demand', () => {
    const text = LANE.replace('    impedance: 100 ohm ± 8%\n  - via', '    impe\n  - via');
    return typed(text, async () => {
      const list = await ask<CompletionList>('completion', text, '    impe\n', 8);
      const item = list.items.find(({ label }) => label === 'impedance')!;
      expect(item.textEdit).toMatchObject({ newText: 'impedance: ' });
      expect(item.documentation).toBeUndefined();
      expect(await client.request('completionItem/resolve', item)).toHaveProperty(
        'documentation.value',
        expect.stringContaining('Characteristic impedance'),
      );
    });
  });
  test('a quick fix is listed without its edit, which mends the text when it is chosen', () => {
    const text = LANE.replace('length: 60 mm', 'lenght: 60 mm');
    return typed(text, async () => {
      const range = { start: positionOf(text, 'lenght'), end: positionOf(text, 'lenght', 6) };
      const actions = await client.request<CodeAction[]>('textDocument/codeAction', {
        textDocument: { uri: lane },
        range,
        context: { diagnostics: [] },
      });
      const fix = actions.find(({ isPreferred }) => isPreferred)!;
      expect(fix.edit).toBeUndefined();
      const { edit } = await client.request<CodeAction>('codeAction/resolve', fix);
      expect(edit?.documentChanges).toEqual([
        { textDocument: { uri: lane, version: expect.any(Number) }, edits: [{ range, newText: 'length' }] },
      ]);
      const all = await client.request<CodeAction[]>('textDocument/codeAction', {
        textDocument: { uri: lane },
        range: EVERYWHERE,
        context: { diagnostics: [], only: ['source.fixAll'] },
      });
      expect(all).toEqual([expect.objectContaining({ kind: 'source.fixAll.lanewright', edit: expect.anything() })]);
    });
  });
  test('a finding is accepted by a waiver, after which it is not shown', () => {
    const text = LANE.replace('max: 12 dB', 'max: 0.5 dB');
    return typed(text, async () => {
      expect((await client.findings(lane)).map(({ code }) => code)).toContain('insertion-loss');
      const actions = await client.request<CodeAction[]>('textDocument/codeAction', {
        textDocument: { uri: lane },
        range: EVERYWHERE,
        context: { diagnostics: [] },
      });
      const accept = actions.find(
        ({ command }) =>
          command?.command === 'lanewright.acceptFinding' && command.arguments?.[0].rule === 'insertion-loss',
      )!;
      const { rule, at, value } = accept.command!.arguments![0];
      const edit = await client.request<WorkspaceEdit>('lanewright/waiver', {
        uri: lane,
        rule,
        at,
        upTo: value,
        until: '2027-06-30',
        by: 'lane team',
        reason: 'a prototype',
      });
      const [change] = edit.documentChanges as { edits: { newText: string }[] }[];
      expect(change.edits[0].newText).toContain('until: 2027-06-30');
      await client.change(
        lane,
        `${text}waivers:\n  - rule: ${rule}\n    at: ${at}\n    up-to: ${value}\n    until: 2027-06-30\n    by: lane team\n    reason: a prototype\n`,
      );
      expect((await client.findings(lane)).map(({ code }) => code)).not.toContain('insertion-loss');
    });
  });
  test('rename across files, closed ones too; refused where the name is taken', async () => {
    const position = positionOf(LANE, 'layer: L3', 8);
    expect(await ask('prepareRename', LANE, 'layer: L3', 8)).toMatchObject({ placeholder: 'L3' });
    const edit = await client.request<WorkspaceEdit>('textDocument/rename', {
      textDocument: { uri: lane },
      position,
      newName: 'S1',
    });
    const changes = edit.documentChanges as { textDocument: { uri: string; version: number | null } }[];
    expect(new Set(changes.map(({ textDocument }) => textDocument.uri))).toEqual(
      new Set([lane, parts, folder.uri('b.channel.yaml'), folder.uri('c.channel.yaml')]),
    );
    expect(changes.find(({ textDocument }) => textDocument.uri === parts)?.textDocument.version).toBeNull();
    await expect(
      client.request('textDocument/rename', { textDocument: { uri: lane }, position, newName: 'L5' }),
    ).rejects.toThrow('another one already');
  });
  test('a renamed parts file takes its `use` paths along', async () => {
    const edit = await client.request<WorkspaceEdit>('workspace/willRenameFiles', {
      files: [{ oldUri: parts, newUri: folder.uri('pcb/main.parts.yaml') }],
    });
    expect(JSON.stringify(edit)).toContain('pcb/main.parts.yaml');
    expect(edit.documentChanges).toHaveLength(3);
  });
  test('formatting', () =>
    typed(LANE.replace('10 Gb/s', '10 Gb/s   '), async () => {
      const edits = await client.request<{ newText: string }[]>('textDocument/formatting', {
        textDocument: { uri: lane },
        options: { tabSize: 2, insertSpaces: true },
      });
      expect(edits).toEqual([expect.objectContaining({ newText: '' })]);
    }));
});

test('an unsaved edit of a parts file renews the lanes that use it', async () => {
  await client.open(parts, PARTS);
  const before = await client.request<{ data: { verdict: { text: string } } }>('lanewright/preview', { uri: lane });
  await client.change(parts, PARTS.replace('df: 0.004', 'df: 0.04'));
  const after = await client.request<{ data: { verdict: { text: string } } }>('lanewright/preview', { uri: lane });
  expect(after.data.verdict.text).not.toBe(before.data.verdict.text);
  await client.change(parts, PARTS.replace('{ copper: L3,', '{ copper: X3,'));
  const report = await client.pull(lane);
  expect(report.kind === 'full' && report.items.some(({ message }) => String(message).includes('L3'))).toBe(true);
  await client.close(parts);
  expect(await client.findings(lane)).toEqual([]);
});

test('a request that cannot be answered is an error, and the server goes on', async () => {
  await expect(client.request('textDocument/rename', { textDocument: { uri: lane } })).rejects.toThrow();
  expect(
    await client.request('textDocument/hover', {
      textDocument: { uri: 'file:///nowhere/x.channel.yaml' },
      position: { line: 0, character: 0 },
    }),
  ).toBeNull();
  expect(await client.findings(lane)).toEqual([]);
});

test('a request that is cancelled ends as cancelled', async () => {
  await client.change(lane, LANE.replace('20 mm', '21 mm'));
  const { CancellationTokenSource } = await import('vscode-languageserver-protocol/node');
  const source = new CancellationTokenSource();
  const asked = client.connection.sendRequest('lanewright/preview', { uri: lane }, source.token);
  source.cancel();
  await expect(asked).rejects.toMatchObject({ code: -32800 });
  await client.change(lane, LANE);
  expect(await client.findings(lane)).toEqual([]);
});

test('settings are followed without a restart, by class', async () => {
  const hints = () =>
    client.request<InlayHint[]>('textDocument/inlayHint', { textDocument: { uri: lane }, range: EVERYWHERE });
  const before = (await hints()).length;
  client.settings = { hints: { loss: false, stub: false, derived: false, defaults: false }, lens: false };
  await client.connection.sendNotification('workspace/didChangeConfiguration', { settings: null });
  expect(before).toBeGreaterThan(3);
  expect(await hints()).toEqual([]);
  expect(await client.request('textDocument/codeLens', { textDocument: { uri: lane } })).toBeNull();
  client.settings = null;
  await client.connection.sendNotification('workspace/didChangeConfiguration', { settings: null });
  expect((await hints()).length).toBe(before);
});
