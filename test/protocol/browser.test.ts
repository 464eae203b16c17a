import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { createContext, runInContext } from 'node:vm';
import { build } from 'esbuild';
import { expect, test } from 'vitest';
import { LANE, PARTS } from './lane';

const project = fileURLToPath(new URL('../../', import.meta.url));

/** A worker without Node: no `process`, no `require`, no `Function`; messages only. */
async function startWorker() {
  const { outputFiles } = await build({
    absWorkingDir: project,
    entryPoints: ['server/browser.ts'],
    bundle: true,
    write: false,
    platform: 'browser',
    target: 'es2022',
    format: 'iife',
    mainFields: ['browser', 'module', 'main'],
    conditions: ['browser'],
    logLevel: 'error',
  });
  const answers = new Map<number, (message: { result?: unknown; error?: unknown }) => void>();
  const asked: { method: string; params: { uri: string } }[] = [];
  const files: Record<string, string> = { 'web://mount/boards/main.parts.yaml': PARTS };
  const self: Record<string, unknown> = {
    addEventListener: () => undefined,
    postMessage(message: { id?: number; method?: string; params?: { uri: string }; result?: unknown }) {
      if (message.method === undefined) {
        answers.get(message.id!)?.(message);
        return;
      }
      asked.push({ method: message.method, params: message.params! });
      if (message.id === undefined) return;
      const { uri } = (message.params ?? {}) as { uri: string };
      const text = message.method === 'lanewright/readFile' ? files[uri] : undefined;
      const result =
        message.method !== 'lanewright/readFile'
          ? null
          : text === undefined
            ? { kind: 'missing' }
            : { kind: 'text', text };
      send({ id: message.id, result });
    },
  };
  const context = createContext(
    {
      self,
      setTimeout,
      clearTimeout,
      setInterval,
      clearInterval,
      queueMicrotask,
      performance,
      TextDecoder,
      TextEncoder,
      URL,
      crypto,
      console,
    },
    { codeGeneration: { strings: false, wasm: false } },
  );
  runInContext(outputFiles[0].text, context);
  const send = (message: object) =>
    (self.onmessage as (event: object) => void)({ data: { jsonrpc: '2.0', ...message } });
  let last = 1000;
  return {
    asked,
    notify: (method: string, params: object) => send({ method, params }),
    request: (method: string, params: object) =>
      new Promise<unknown>((resolve, reject) => {
        const id = ++last;
        answers.set(id, ({ result, error }) => (error ? reject(new Error(JSON.stringify(error))) : resolve(result)));
        send({ id, method, params });
      }),
  };
}

test('the same server runs in a browser’s worker, without Node and without code from strings; files come from the editor', async () => {
  const worker = await startWorker();
  const uri = 'web://mount/a.channel.yaml';
  await worker.request('initialize', {
    processId: null,
    rootUri: null,
    workspaceFolders: [{ uri: 'web://mount', name: 'mount' }],
    capabilities: { textDocument: { diagnostic: {} } },
    initializationOptions: { today: '2026-12-01' },
  });
  worker.notify('initialized', {});
  worker.notify('textDocument/didOpen', {
    textDocument: { uri, languageId: 'lanewright-channel', version: 1, text: LANE },
  });
  expect(await worker.request('textDocument/diagnostic', { textDocument: { uri } })).toMatchObject({
    kind: 'full',
    items: [],
  });
  expect(await worker.request('lanewright/preview', { uri })).toMatchObject({
    data: { verdict: { text: expect.stringContaining('meets its limits') } },
  });
  expect(
    worker.asked.some(
      ({ method, params }) => method === 'lanewright/readFile' && params.uri.endsWith('boards/main.parts.yaml'),
    ),
  ).toBe(true);
}, 30000);

test('server and extension call their own requests by the same names', () => {
  const namesIn = (file: string) =>
    [...readFileSync(new URL(`../../${file}`, import.meta.url), 'utf8').matchAll(/'(lanewright\/[A-Za-z]+)'/g)]
      .map(([, name]) => name)
      .sort();
  expect(namesIn('client/extension/protocol.ts')).toEqual(namesIn('server/protocol.ts'));
});
