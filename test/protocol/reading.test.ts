import { describe, expect, test } from 'vitest';
import type { CompletionList, Hover, InlayHint, LocationLink } from 'vscode-languageserver-protocol';
import { LANE, PARTS } from './lane';
import { EVERYWHERE, positionOf, withOpenLane } from './open-lane';

const { open, ask, typed } = withOpenLane();

test('every feature that is promised is offered', () => {
  const { capabilities } = open.client.result;
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
    expect(await open.client.findings(open.lane)).toEqual([]);
    expect(open.client.pushed).toEqual([]);
  });
  test('a fault stands where it was made, with rule, link and severity; the same answer has the same name', () =>
    typed(LANE.replace('length: 60 mm', 'lenght: 60 mm'), async () => {
      const report = await open.client.pull(open.lane);
      if (report.kind !== 'full') throw new Error('full report wanted');
      const finding = report.items.find(({ message }) => String(message).includes('lenght'))!;
      expect(finding).toMatchObject({ code: 'schema', source: 'lanewright', severity: 1 });
      expect(finding.range.start).toEqual(positionOf(LANE, 'length: 60 mm'));
      expect(await open.client.pull(open.lane, report.resultId)).toMatchObject({
        kind: 'unchanged',
        resultId: report.resultId,
      });
    }));
  test('rule and related places: both ends of a name that is taken twice', () =>
    typed(LANE.replace('trace: run', 'trace: start'), async () => {
      const report = await open.client.pull(open.lane);
      const related =
        report.kind === 'full' ? report.items.flatMap(({ relatedInformation }) => relatedInformation ?? []) : [];
      expect(related.map(({ location }) => location.uri)).toContain(open.lane);
    }));
  test('of closed files, when the whole workspace is asked for', async () => {
    await open.folder.write('c.channel.yaml', LANE.replace('length: 60 mm', 'length: 60 furlong'));
    await open.client.connection.sendNotification('workspace/didChangeWatchedFiles', {
      changes: [{ uri: open.folder.uri('c.channel.yaml'), type: 1 }],
    });
    await open.client.until(
      () => open.client.received.find(({ method }) => method === 'workspace/diagnostic/refresh'),
      'a request to ask again',
    );
    const report = await open.client.request<{ items: { uri: string; resultId: string; items: unknown[] }[] }>(
      'workspace/diagnostic',
      { previousResultIds: [] },
    );
    expect(report.items.map(({ uri }) => uri)).toEqual([open.folder.uri('c.channel.yaml')]);
    const [{ uri, resultId }] = report.items;
    const again = await open.client.request<{ items: unknown[] }>('workspace/diagnostic', {
      previousResultIds: [{ uri, value: resultId }],
    });
    expect(again.items).toEqual([expect.objectContaining({ kind: 'unchanged', uri })]);
  });
});

describe('other files', () => {
  test('what a lane finds in a closed parts file is told beside its own', async () => {
    await open.folder.write('boards/bad.parts.yaml', PARTS.replace('thickness: 40 um', 'thickness: 40 ohm'));
    await typed(LANE.replace('main.parts', 'bad.parts'), async () => {
      const report = await open.client.pull(open.lane);
      const related = 'relatedDocuments' in report ? report.relatedDocuments : undefined;
      expect(Object.keys(related ?? {})).toEqual([open.folder.uri('boards/bad.parts.yaml')]);
    });
  });
  test('a parts file and a configuration have findings of their own', async () => {
    const board = open.folder.uri('boards/other.parts.yaml');
    await open.client.open(board, PARTS.replace('thickness: 40 um', 'thickness: 40 ohm'));
    const report = await open.client.pull(board);
    expect(report.kind === 'full' && report.items.map(({ code }) => code)).toContain('quantity');
    await open.client.close(board);
    const config = open.folder.uri('lanewright.config.yaml');
    const text = 'lanewright: 1\nrules:\n  stub-resonanse: error\n  ';
    await open.client.open(config, text, 'lanewright-config');
    const second = await open.client.pull(config);
    expect(second.kind === 'full' && second.items.map(({ message }) => String(message)).join()).toContain(
      'stub-resonance',
    );
    const list = await open.client.request<CompletionList>('textDocument/completion', {
      textDocument: { uri: config },
      position: { line: 3, character: 2 },
    });
    expect(list.items.map(({ label }) => label)).toContain('return-loss');
    await open.client.close(config);
  });
  test('what no lane uses is told in an open parts file, as the lanes stand on screen', async () => {
    const { client, folder } = open;
    const spare = PARTS.replace('materials:\n', 'materials:\n  spare: { dk: 3.1, df: 0.002 }\n');
    const uri = folder.uri('boards/main.parts.yaml');
    const part = 'parts:\n  mate: { kind: connector, delay: 40 ps, impedance: 100 ohm }\n';
    await client.open(uri, spare + part);
    const messages = async () => (await client.findings(uri)).map(({ message }) => message);
    expect(await messages()).toEqual([
      'The material `spare` is not used by any file at hand.',
      'The part `mate` is not used by any file at hand.',
    ]);
    await client.change(open.lane, LANE.replace('limits:', '  - connector: mate\n    part: board.mate\nlimits:'));
    expect(await messages()).toEqual(['The material `spare` is not used by any file at hand.']);
    await client.change(open.lane, LANE);
    await client.close(uri);
  });
  test('an open configuration changes severities at once, unsaved', async () => {
    const config = open.folder.uri('lanewright.config.yaml');
    const text = LANE.replace('max: 12 dB', 'max: 0.5 dB');
    await typed(text, async () => {
      const severity = async () =>
        (await open.client.findings(open.lane)).find(({ code }) => code === 'insertion-loss')?.severity;
      expect(await severity()).toBe(1);
      await open.client.open(config, 'lanewright: 1\nrules:\n  insertion-loss: hint\n', 'lanewright-config');
      expect(await severity()).toBe(4);
      await open.client.close(config);
      expect(await severity()).toBe(1);
    });
  });
  test('a text that is too large to be read says so', async () => {
    const uri = open.folder.uri('large.channel.yaml');
    await open.client.open(uri, `${LANE}# ${'x'.repeat(1024 * 1024)}`);
    const report = await open.client.pull(uri);
    expect(report.kind === 'full' && report.items[0]).toMatchObject({
      code: 'limit',
      range: { start: { line: 0, character: 0 } },
    });
    await open.client.close(uri);
  });
  test('a text without a file is a channel by its language', async () => {
    const uri = 'untitled:Untitled-1';
    await open.client.open(uri, LANE.replace('length: 60 mm', 'lenght: 60 mm'));
    const report = await open.client.pull(uri);
    expect(report.kind === 'full' && report.items.map(({ message }) => String(message)).join()).toContain('lenght');
    await open.client.close(uri);
  });
});

describe('reading', () => {
  test('hover', async () => {
    const hover = await ask<Hover>('hover', LANE, 'trace: run', 8);
    expect(hover.contents).toMatchObject({ kind: 'markdown', value: expect.stringContaining('Own loss at Nyquist') });
    expect(hover.range).toEqual({ start: positionOf(LANE, 'trace: run', 7), end: positionOf(LANE, 'trace: run', 10) });
  });
  test('hints, resolved on demand, with a place to jump to', async () => {
    const hints = await open.client.request<InlayHint[]>('textDocument/inlayHint', {
      textDocument: { uri: open.lane },
      range: EVERYWHERE,
    });
    const labels = hints.map(({ label }) => (label as { value: string }[]).map(({ value }) => value).join(''));
    expect(labels.some((label) => /^≈ stub .* → .* GHz$/.test(label))).toBe(true);
    const layer = hints[labels.indexOf(', to: L3')];
    expect(layer.label).toEqual([
      { value: ', ' },
      { value: 'to: L3', location: { uri: open.parts, range: expect.anything() } },
    ]);
    expect(layer.textEdits).toHaveLength(1);
    expect(layer.tooltip).toBeUndefined();
    expect(await open.client.request('inlayHint/resolve', layer)).toHaveProperty(
      'tooltip.value',
      expect.stringContaining('**dive**'),
    );
  });
  test('lens, outline, folds, links, selection', async () => {
    const document = { textDocument: { uri: open.lane } };
    const [lens] = await open.client.request<object[]>('textDocument/codeLens', document);
    expect(await open.client.request('codeLens/resolve', lens)).toMatchObject({
      command: { command: 'lanewright.openPreviewToSide', title: expect.stringContaining('meets its limits') },
    });
    const outline = await open.client.request<{ name: string; children: { name: string }[] }[]>(
      'textDocument/documentSymbol',
      document,
    );
    expect(outline.find(({ name }) => name === 'path')?.children.map(({ name }) => name)).toEqual([
      'start',
      'dive',
      'run',
    ]);
    expect((await open.client.request<unknown[]>('textDocument/foldingRange', document)).length).toBeGreaterThan(4);
    const [link] = await open.client.request<object[]>('textDocument/documentLink', document);
    expect(await open.client.request('documentLink/resolve', link)).toMatchObject({ target: open.parts });
    const [selection] = await open.client.request<{ range: unknown; parent?: unknown }[]>(
      'textDocument/selectionRange',
      {
        ...document,
        positions: [positionOf(LANE, '60 mm', 1)],
      },
    );
    expect(selection).toMatchObject({
      range: { start: positionOf(LANE, '60 mm'), end: positionOf(LANE, '60 mm', 5) },
      parent: expect.anything(),
    });
  });
  test('definition, references in closed files, symbols of the workspace', async () => {
    const [target] = await ask<LocationLink[]>('definition', LANE, 'layer: L3', 8);
    expect(target).toMatchObject({ targetUri: open.parts, targetSelectionRange: { start: positionOf(PARTS, 'L3,') } });
    const references = await ask<{ uri: string }[]>('references', LANE, 'layer: L3', 8, {
      context: { includeDeclaration: true },
    });
    expect(new Set(references.map(({ uri }) => uri))).toEqual(
      new Set([open.lane, open.parts, open.folder.uri('b.channel.yaml'), open.folder.uri('c.channel.yaml')]),
    );
    const highlights = await ask<{ kind: number }[]>('documentHighlight', LANE, 'trace: run', 8);
    expect(highlights.map(({ kind }) => kind)).toEqual([3]);
    const symbols = await open.client.request<{ name: string }[]>('workspace/symbol', { query: 'div' });
    expect(symbols.map(({ name }) => name)).toContain('dive');
  });
  test('preview: data, the place of an element, the element at a place', async () => {
    const preview = await open.client.request<{ version: number; data: { verdict: { text: string } } }>(
      'lanewright/preview',
      { uri: open.lane },
    );
    expect(preview.data.verdict.text).toContain('meets its limits');
    const range = await open.client.request<{ range: { start: unknown } }>('lanewright/range', {
      uri: open.lane,
      place: { file: 'a.channel.yaml', path: ['path', 1] },
    });
    expect(range.range.start).toEqual(positionOf(LANE, '- via: dive'));
    expect(
      await open.client.request('lanewright/elementAt', { uri: open.lane, position: positionOf(LANE, 'pitch') }),
    ).toEqual({
      element: 'dive',
    });
  });
});

test('settings are followed without a restart, by class', async () => {
  const hints = () =>
    open.client.request<InlayHint[]>('textDocument/inlayHint', { textDocument: { uri: open.lane }, range: EVERYWHERE });
  const before = (await hints()).length;
  open.client.settings = { hints: { loss: false, stub: false, derived: false, defaults: false }, lens: false };
  await open.client.connection.sendNotification('workspace/didChangeConfiguration', { settings: null });
  expect(before).toBeGreaterThan(3);
  expect(await hints()).toEqual([]);
  expect(await open.client.request('textDocument/codeLens', { textDocument: { uri: open.lane } })).toBeNull();
  open.client.settings = null;
  await open.client.connection.sendNotification('workspace/didChangeConfiguration', { settings: null });
  expect((await hints()).length).toBe(before);
});
