// Keystrokes through the real server over stdio: what an editor waits for.
import { spawn } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { createMessageConnection, StreamMessageReader, StreamMessageWriter } from 'vscode-jsonrpc/node';
import { boardText, channelText } from './channels.mjs';

/** @returns milliseconds from each change to findings and hints, to the preview with the newest eye, and the server's memory */
export async function benchServer(serverFile, { keystrokes, settle }) {
  const folder = mkdtempSync(join(tmpdir(), 'lanewright-bench-'));
  let text = channelText({ elements: 30 });
  const file = join(folder, 'lane.channel.yaml');
  writeFileSync(join(folder, 'board.parts.yaml'), boardText);
  writeFileSync(file, text);
  const uri = pathToFileURL(file).href;
  const server = spawn(process.execPath, [serverFile, '--stdio'], { stdio: ['pipe', 'pipe', 'inherit'] });
  const connection = createMessageConnection(
    new StreamMessageReader(server.stdout),
    new StreamMessageWriter(server.stdin),
  );
  let fresh = () => {};
  connection.onNotification('lanewright/previewChanged', ({ version: at, stale }) => {
    if (!stale && at === version) fresh();
  });
  connection.onRequest('workspace/diagnostic/refresh', () => null);
  connection.onRequest('workspace/inlayHint/refresh', () => null);
  connection.onRequest('workspace/codeLens/refresh', () => null);
  connection.onRequest('workspace/configuration', ({ items }) => items.map(() => ({})));
  connection.onRequest('client/registerCapability', () => null);
  connection.onRequest('window/workDoneProgress/create', () => null);
  connection.listen();
  let version = 1;
  await connection.sendRequest('initialize', {
    processId: process.pid,
    rootUri: pathToFileURL(folder).href,
    workspaceFolders: [{ uri: pathToFileURL(folder).href, name: 'bench' }],
    capabilities: {
      textDocument: { diagnostic: {}, inlayHint: {} },
      workspace: { diagnostics: { refreshSupport: true }, configuration: true, workspaceFolders: true },
    },
  });
  await connection.sendNotification('initialized', {});
  await connection.sendNotification('textDocument/didOpen', {
    textDocument: { uri, languageId: 'lanewright-channel', version, text },
  });
  const findings = () => connection.sendRequest('textDocument/diagnostic', { textDocument: { uri } });
  const hints = () =>
    connection.sendRequest('textDocument/inlayHint', {
      textDocument: { uri },
      range: { start: { line: 0, character: 0 }, end: { line: 60, character: 0 } },
    });
  await findings();

  const type = async (digit) => {
    version++;
    const changed = text.replace(/length: (\d+)\.\d+ mm/, `length: $1.${String(digit).padStart(3, '0')} mm`);
    text = changed;
    await connection.sendNotification('textDocument/didChange', {
      textDocument: { uri, version },
      contentChanges: [{ text }],
    });
  };
  const toFindings = [];
  const toPreview = [];
  for (let i = 0; i < keystrokes; i++) {
    const eye = new Promise((resolve) => {
      fresh = resolve;
    });
    const start = performance.now();
    await type(i % 1000);
    await Promise.all([findings(), hints()]);
    toFindings.push(performance.now() - start);
    await Promise.race([eye, new Promise((resolve) => setTimeout(resolve, 5000))]);
    await connection.sendRequest('lanewright/preview', { uri });
    toPreview.push(performance.now() - start);
  }
  const memory = () =>
    Number(/VmRSS:\s+(\d+)/.exec(readFileSync(`/proc/${server.pid}/status`, 'utf8'))?.[1] ?? 0) / 1024;
  const before = memory();
  for (let i = 0; i < settle; i++) {
    await type(i % 1000);
    await findings();
  }
  const after = memory();
  await connection.sendRequest('shutdown');
  await connection.sendNotification('exit');
  connection.dispose();
  server.kill();
  rmSync(folder, { recursive: true, force: true });
  return { toFindings, toPreview, memoryBeforeMiB: before, memoryAfterMiB: after };
}
