import { type ChildProcess, spawn } from 'node:child_process';
import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { build } from 'esbuild';
import {
  type ClientCapabilities,
  createProtocolConnection,
  type Diagnostic,
  type DocumentDiagnosticReport,
  type InitializeResult,
  type ProtocolConnection,
  type PublishDiagnosticsParams,
  StreamMessageReader,
  StreamMessageWriter,
  type TextDocumentContentChangeEvent,
} from 'vscode-languageserver-protocol/node';

const project = fileURLToPath(new URL('../../', import.meta.url));

/** A folder with files, gone when the test is over. */
export interface Folder {
  readonly path: string;
  uri(file?: string): string;
  write(file: string, text: string): Promise<void>;
  remove(): Promise<void>;
}

export async function folderWith(files: Readonly<Record<string, string>>, name = 'lanes'): Promise<Folder> {
  const outer = await mkdtemp(join(tmpdir(), 'lanewright-'));
  const path = join(outer, name);
  const write = async (file: string, text: string) => {
    await mkdir(dirname(join(path, file)), { recursive: true });
    await writeFile(join(path, file), text);
  };
  await mkdir(path, { recursive: true });
  for (const [file, text] of Object.entries(files)) await write(file, text);
  return {
    path,
    write,
    uri: (file = '') => pathToFileURL(join(path, file)).href.replace(/\/$/, ''),
    remove: () => rm(outer, { recursive: true, force: true }),
  };
}

let bundled: Promise<string> | undefined;

/** The server as it ships, bundled once for all tests of a file. */
export function serverBundle(): Promise<string> {
  bundled ??= (async () => {
    const folder = await mkdtemp(join(tmpdir(), 'lanewright-server-'));
    const outfile = join(folder, 'server.cjs');
    await build({
      absWorkingDir: project,
      entryPoints: ['server/node.ts'],
      outfile,
      bundle: true,
      platform: 'node',
      target: 'node20',
      format: 'cjs',
      mainFields: ['module', 'main'],
      define: { LANEWRIGHT_VERSION: '"0.0.0-test"' },
      logLevel: 'error',
    });
    return outfile;
  })();
  return bundled;
}

export interface Client {
  readonly connection: ProtocolConnection;
  readonly process: ChildProcess;
  readonly result: InitializeResult;
  readonly pushed: PublishDiagnosticsParams[];
  /** Requests and notifications of the server by method, with their parameters. */
  readonly received: { method: string; params: unknown }[];
  settings: unknown;
  open(uri: string, text: string, languageId?: string): Promise<void>;
  change(uri: string, changes: TextDocumentContentChangeEvent[] | string): Promise<void>;
  close(uri: string): Promise<void>;
  pull(uri: string, previousResultId?: string): Promise<DocumentDiagnosticReport>;
  /** Pulled findings, once they are of the link stage too. */
  findings(uri: string): Promise<Diagnostic[]>;
  request<R>(method: string, params: unknown): Promise<R>;
  /** Waits until something that came fulfils the condition. */
  until<T>(condition: () => T | undefined, what: string): Promise<T>;
  stop(): Promise<void>;
}

export const PULL: ClientCapabilities = {
  textDocument: {
    diagnostic: { dynamicRegistration: false, relatedDocumentSupport: true },
    rename: { prepareSupport: true },
    definition: { linkSupport: true },
    completion: { completionItem: { snippetSupport: true } },
    codeAction: {
      resolveSupport: { properties: ['edit'] },
      codeActionLiteralSupport: { codeActionKind: { valueSet: ['quickfix'] } },
      disabledSupport: true,
    },
  },
  workspace: {
    configuration: true,
    workspaceFolders: true,
    workspaceEdit: { documentChanges: true },
    diagnostics: { refreshSupport: true },
    inlayHint: { refreshSupport: true },
    codeLens: { refreshSupport: true },
    didChangeWatchedFiles: { dynamicRegistration: true },
    fileOperations: { willRename: true },
  },
  window: { workDoneProgress: true },
};
export const PUSH: ClientCapabilities = { ...PULL, textDocument: { ...PULL.textDocument, diagnostic: undefined } };

export interface StartOptions {
  readonly capabilities?: ClientCapabilities;
  readonly folders?: readonly string[];
  readonly initializationOptions?: unknown;
  readonly settings?: unknown;
  readonly execArgv?: readonly string[];
}

/** Starts a real server as a process and shakes hands with it. */
export async function startClient({
  capabilities = PULL,
  folders = [],
  initializationOptions = {},
  settings = null,
  execArgv = [],
}: StartOptions = {}): Promise<Client> {
  const bundle = await serverBundle();
  const child = spawn(process.execPath, [...execArgv, bundle, '--stdio'], { stdio: ['pipe', 'pipe', 'pipe'] });
  const connection = createProtocolConnection(
    new StreamMessageReader(child.stdout),
    new StreamMessageWriter(child.stdin),
  );
  const versions = new Map<string, number>();
  const received: Client['received'] = [];
  const pushed: PublishDiagnosticsParams[] = [];
  const waiting = new Set<() => void>();
  const note = (method: string, params: unknown) => {
    received.push({ method, params });
    for (const wake of waiting) wake();
  };
  child.stdin.on('error', () => undefined);
  // Everything the server says, whatever its name.
  const everything = connection as unknown as {
    onNotification(handler: (method: string, params: unknown) => void): void;
    onRequest(handler: (method: string, params: unknown) => unknown): void;
  };
  everything.onNotification((method, params) => {
    if (method === 'textDocument/publishDiagnostics') pushed.push(params as never);
    note(method, params);
  });
  everything.onRequest((method, params) => {
    note(method, params);
    if (method === 'workspace/configuration') return (params as { items: unknown[] }).items.map(() => client.settings);
    return null;
  });
  connection.listen();
  const result = await connection.sendRequest<InitializeResult>('initialize', {
    processId: process.pid,
    rootUri: folders[0] ?? null,
    workspaceFolders: folders.map((uri) => ({ uri, name: uri })),
    capabilities,
    initializationOptions: { today: '2026-12-01', ...(initializationOptions as object) },
  });
  await connection.sendNotification('initialized', {});
  const client: Client = {
    connection,
    process: child,
    result,
    pushed,
    received,
    settings,
    async open(uri, text, languageId = uri.endsWith('.parts.yaml') ? 'lanewright-parts' : 'lanewright-channel') {
      versions.set(uri, 1);
      await connection.sendNotification('textDocument/didOpen', {
        textDocument: { uri, languageId, version: 1, text },
      });
    },
    async change(uri, changes) {
      const version = (versions.get(uri) ?? 1) + 1;
      versions.set(uri, version);
      const contentChanges = typeof changes === 'string' ? [{ text: changes }] : changes;
      await connection.sendNotification('textDocument/didChange', { textDocument: { uri, version }, contentChanges });
    },
    close: (uri) => connection.sendNotification('textDocument/didClose', { textDocument: { uri } }),
    pull: (uri, previousResultId) =>
      connection.sendRequest('textDocument/diagnostic', { textDocument: { uri }, previousResultId }),
    async findings(uri) {
      // The preview waits for the last stage; after it a pull has every rule's findings.
      await connection.sendRequest('lanewright/preview', { uri });
      const report = await client.pull(uri);
      return report.kind === 'full' ? report.items : [];
    },
    request: (method, params) => connection.sendRequest(method, params as never),
    until(condition, what) {
      return new Promise((resolve, reject) => {
        const check = () => {
          const value = condition();
          if (value === undefined) return;
          waiting.delete(check);
          clearTimeout(timer);
          resolve(value);
        };
        const timer = setTimeout(() => {
          waiting.delete(check);
          reject(new Error(`waited in vain for ${what}`));
        }, 8000);
        waiting.add(check);
        check();
      });
    },
    async stop() {
      if (child.exitCode === null && child.signalCode === null) {
        const gone = new Promise((resolve) => child.once('exit', resolve));
        await Promise.race([connection.sendRequest('shutdown').catch(() => undefined), gone]);
        await connection.sendNotification('exit').catch(() => undefined);
        await gone;
      }
      connection.dispose();
    },
  };
  return client;
}
