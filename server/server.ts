import {
  type Connection,
  DidChangeWatchedFilesNotification,
  type InitializeParams,
  type InitializeResult,
  TextDocumentSyncKind,
} from 'vscode-languageserver';
import { analyse } from '../src-core/analyse';
import { fileKind, gatherInputs } from '../src-core/inputs';
import { type AnalysesParts, keepAnalyses } from './analyses';
import { abilitiesFrom, NO_ABILITIES } from './client-abilities';
import { keepClosedFiles } from './closed-files';
import { gatherDependents } from './dependents';
import { keepResultIds } from './diagnostics';
import { followDocuments } from './documents';
import { codeActions, FIX_ALL, resolveAction } from './features/actions';
import { completion, resolveCompletion } from './features/completion';
import { definition } from './features/definition';
import { documentDiagnostics, workspaceDiagnostics } from './features/diagnostics';
import { foldingRanges } from './features/folding';
import { formatting } from './features/formatting';
import { inlayHints, resolveHint } from './features/hints';
import { hover } from './features/hover';
import { codeLenses, resolveLens } from './features/lenses';
import { documentLinks, resolveLink } from './features/links';
import { elementAtPosition, preview, rangeOfPlace } from './features/preview';
import { highlights, references } from './features/references';
import { prepare, rename, willRenameFiles } from './features/rename';
import { selectionRanges } from './features/selection';
import { documentSymbols, workspaceSymbols } from './features/symbols';
import { waiver } from './features/waiver';
import { type FilesFactory, type RootFiles, unsavedFirst } from './files';
import { guarded, type Handler } from './handler';
import { type KeptFiles, keepFiles } from './kept-files';
import { keepProgress } from './progress';
import {
  analyseAgain,
  analysing,
  elementAtRequest,
  type InitializationOptions,
  previewRequest,
  rangeRequest,
  statusRequest,
  waiverRequest,
} from './protocol';
import { publishRenewed } from './publish';
import { idOf, keepRoots, type Root } from './roots';
import type { Services } from './services';
import { followSettings } from './settings';
import { followWatchedFiles } from './watched-files';
import { keepWorkspace } from './workspace';

declare const LANEWRIGHT_VERSION: string | undefined;

/** What only the host knows. */
export interface Host {
  readonly files: FilesFactory;
  readonly now: () => number;
  /** Where rules are explained, unless the client says so. */
  readonly rulesReference?: string;
  readonly heapMegabytes?: () => number;
  /** Lets waiting messages in. */
  readonly pause: () => Promise<void>;
}

/** The composition root: the only place that knows all parts. */
export function startServer(connection: Connection, host: Host): void {
  const { now, pause } = host;
  let options: InitializationOptions = {};
  let client = NO_ABILITIES;
  const roots = keepRoots();
  const documents = followDocuments(roots);
  const settings = followSettings(connection);
  const progress = keepProgress(connection, () => client.progress, now);
  const ids = keepResultIds();
  const today = () => options.today ?? new Date().toISOString().slice(0, 10);
  const log = {
    info: (message: string) => connection.console.info(message),
    error: (message: string) => connection.console.error(message),
  };

  // Clients that cannot watch files: what was read holds for a second.
  const kept = new Map<string, { root: Root; disk: KeptFiles; files: RootFiles }>();
  const keptOf = (root: Root) => {
    let entry = kept.get(root.key);
    if (!entry) {
      const disk = keepFiles(host.files(root), now, () => (client.watchFiles ? Number.POSITIVE_INFINITY : 1000));
      entry = { root, disk, files: unsavedFirst(disk, (file) => documents.at({ root, file })?.text) };
      kept.set(root.key, entry);
    }
    return entry;
  };
  const filesOf = (root: Root) => keptOf(root).files;

  const announce = async (located: Parameters<typeof idOf>[0], running: boolean) => {
    const uri = documents.uriOf(located);
    if (running) await progress.working(located.file);
    await connection.sendNotification(analysing, { uri, running });
    if (!running && !analyses.busy()) progress.idle();
  };
  const gather: AnalysesParts['gather'] = async (files, file, day, previous, parsed) => {
    const inputs = await gatherInputs(files, file, day, previous, parsed);
    const root = [...kept.values()].find((entry) => entry.files === files)?.root;
    return root ? gatherDependents(inputs, files, () => workspace.files(root)) : inputs;
  };
  const analyses = keepAnalyses({
    analyse,
    gather,
    filesOf,
    today,
    now,
    pause,
    announce,
    failed: (located, error) =>
      log.error(`${located.file}: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}`),
  });
  const workspace = keepWorkspace(filesOf);
  const services: Services = {
    connection,
    get client() {
      return client;
    },
    roots,
    documents,
    analyses,
    settings,
    workspace,
    filesOf,
    skipped: new Set(),
    log,
    version: typeof LANEWRIGHT_VERSION === 'string' ? LANEWRIGHT_VERSION : '0',
    rulesReference: () => options.rulesReference ?? host.rulesReference ?? '',
  };
  const closed = keepClosedFiles({
    services,
    ids,
    analyse,
    gather: (files, file, day) => gather(files, file, day, undefined, undefined),
    today,
    now,
    pause,
    announce,
  });
  const publish = publishRenewed(connection, services, ids);
  analyses.onRenewed(publish.renewed);

  connection.onInitialize((params) => {
    options = (params.initializationOptions ?? {}) as InitializationOptions;
    client = abilitiesFrom(params);
    settings.listen(params);
    roots.set(params.workspaceFolders?.map(({ uri }) => uri) ?? (params.rootUri ? [params.rootUri] : []));
    for (const uri of options.skip ?? []) services.skipped.add(idOf(roots.locate(uri)));
    return { capabilities: capabilities(params), serverInfo: { name: 'lanewright', version: services.version } };
  });
  connection.onInitialized(() => {
    settings.register();
    if (client.watchFiles) {
      const watchers = ['**/*.channel.yaml', '**/*.parts.yaml', '**/lanewright.config.yaml', '**/*.s[0-9]*p'].map(
        (globPattern) => ({ globPattern }),
      );
      connection.client.register(DidChangeWatchedFilesNotification.type, { watchers }).catch(() => undefined);
    }
    if (client.folderChanges) {
      connection.workspace.onDidChangeWorkspaceFolders(({ added, removed }) => {
        roots.change(
          added.map(({ uri }) => uri),
          removed.map(({ uri }) => uri),
        );
        for (const { located } of analyses.all()) analyses.close(located);
        closed.clear();
        for (const document of documents.all()) if (isOurs(document.located.file)) analyses.open(document.located);
      });
    }
  });

  const isOurs = (file: string) => ['channel', 'parts', 'config'].includes(fileKind(file));
  const renewUsers = (located: Parameters<typeof idOf>[0], soon?: number) => {
    closed.changed(located);
    if (fileKind(located.file) === 'config') analyses.allChanged(located.root, soon);
    else analyses.changed(located, soon);
  };
  documents.onOpen(({ located }) => {
    if (services.skipped.has(idOf(located))) publish.push(located);
    else if (isOurs(located.file)) analyses.open(located);
    // An unsaved text may have come back after a crash: it counts before what is on disk.
    renewUsers(located);
  });
  documents.onChange(({ located }) => renewUsers(located));
  documents.onClose(({ located, uri }) => {
    analyses.close(located);
    keptOf(located.root).disk.forget(located.file);
    workspace.changed(located.root, located.file);
    publish.closed(located, uri);
    renewUsers(located);
  });
  followWatchedFiles(connection, (changes) => {
    for (const uri of changes) {
      const located = roots.locate(uri);
      keptOf(located.root).disk.forget(located.file);
      workspace.changed(located.root, located.file);
      if (documents.at(located)) continue;
      renewUsers(located, 0);
    }
    publish.ask('diagnostics');
  });
  settings.onChange(() => {
    publish.ask('hints');
    publish.ask('lenses');
    publish.ask('diagnostics');
  });
  connection.onNotification(analyseAgain, ({ uri }) => {
    const { located } = documents.get(uri) ?? { located: roots.locate(uri) };
    services.skipped.delete(idOf(located));
    if (documents.get(uri)) analyses.open(located);
    closed.changed(located);
  });

  const on = <P, R>(name: string, handler: Handler<P, R>) => guarded(services, name, handler(services));
  connection.onHover(on('hover', hover) as never);
  connection.onCompletion(on('completion', completion));
  connection.onCompletionResolve(on('completion resolve', resolveCompletion));
  connection.onDefinition(on('definition', definition) as never);
  connection.onDeclaration(on('declaration', definition) as never);
  connection.onReferences(on('references', references));
  connection.onDocumentHighlight(on('highlight', highlights));
  connection.onDocumentSymbol(on('outline', documentSymbols));
  connection.onWorkspaceSymbol(on('workspace symbols', workspaceSymbols) as never);
  connection.onCodeAction(on('code actions', codeActions));
  connection.onCodeActionResolve(on('code action resolve', resolveAction));
  connection.onCodeLens(on('lens', codeLenses));
  connection.onCodeLensResolve(on('lens resolve', resolveLens));
  connection.onDocumentLinks(on('links', documentLinks));
  connection.onDocumentLinkResolve(on('link resolve', resolveLink));
  connection.onFoldingRanges(on('folding', foldingRanges));
  connection.onSelectionRanges(on('selection', selectionRanges));
  connection.onDocumentFormatting(on('formatting', formatting));
  connection.onPrepareRename(on('prepare rename', prepare));
  connection.onRenameRequest(on('rename', rename));
  connection.workspace.onWillRenameFiles(on('file rename', willRenameFiles));
  connection.languages.inlayHint.on(on('hints', inlayHints) as never);
  connection.languages.inlayHint.resolve(on('hint resolve', resolveHint));
  connection.languages.diagnostics.on(guarded(services, 'diagnostics', documentDiagnostics(services, ids, closed)));
  connection.languages.diagnostics.onWorkspace(workspaceDiagnostics(services, closed));
  connection.onRequest(previewRequest, on('preview', preview));
  connection.onRequest(rangeRequest, on('range', rangeOfPlace));
  connection.onRequest(elementAtRequest, on('element', elementAtPosition));
  connection.onRequest(waiverRequest, on('waiver', waiver));
  connection.onRequest(statusRequest, () => ({
    version: services.version,
    openFiles: documents.all().length,
    keptAnalyses: analyses.all().length,
    busy: analyses.busy(),
    skipped: [...services.skipped],
    computed: analyses.computed(),
    ...(host.heapMegabytes && { heapMegabytes: host.heapMegabytes() }),
  }));

  documents.listen(connection);
  connection.listen();
}

function capabilities({ capabilities: client }: InitializeParams): InitializeResult['capabilities'] {
  const moved = [
    { glob: '**/*.{channel,parts}.yaml', matches: 'file' as const },
    { glob: '**/*.s[0-9]*p', matches: 'file' as const },
    { glob: '**/*', matches: 'folder' as const },
  ];
  return {
    positionEncoding: 'utf-16',
    textDocumentSync: { openClose: true, change: TextDocumentSyncKind.Incremental, save: false },
    hoverProvider: true,
    completionProvider: { triggerCharacters: [':', ' ', '-', '/', '.', '{', '[', '@'], resolveProvider: true },
    definitionProvider: true,
    declarationProvider: true,
    referencesProvider: true,
    documentHighlightProvider: true,
    documentSymbolProvider: true,
    workspaceSymbolProvider: true,
    codeActionProvider: { codeActionKinds: ['quickfix', FIX_ALL], resolveProvider: true },
    codeLensProvider: { resolveProvider: true },
    documentLinkProvider: { resolveProvider: true },
    foldingRangeProvider: true,
    selectionRangeProvider: true,
    documentFormattingProvider: true,
    renameProvider: client.textDocument?.rename?.prepareSupport ? { prepareProvider: true } : true,
    inlayHintProvider: { resolveProvider: true },
    ...(client.textDocument?.diagnostic && {
      diagnosticProvider: { identifier: 'lanewright', interFileDependencies: true, workspaceDiagnostics: true },
    }),
    workspace: {
      workspaceFolders: { supported: true, changeNotifications: true },
      fileOperations: { willRename: { filters: moved.map((pattern) => ({ pattern })) } },
    },
  };
}
