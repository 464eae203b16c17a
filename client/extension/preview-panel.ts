import * as vscode from 'vscode';
import { pageHtml } from '../preview/html';
import { type FromPage, type PageState, readFromPage, type ToPage } from '../preview/messages';
import { elementAtRequest, previewChanged, previewRequest, rangeRequest } from './protocol';
import type { Extension } from './start';

const VIEW_TYPE = 'lanewright.preview';
/** Whether the preview is locked, kept by the workspace so that it survives a reload. */
const LOCKED = 'lanewright.previewLocked';

interface Preview {
  readonly panel: vscode.WebviewPanel;
  uri: vscode.Uri | undefined;
  locked: boolean;
  /** Only the newest answer is shown. */
  generation: number;
  /** Closed: an answer that comes later has nowhere to go. */
  gone: boolean;
}

/** The preview beside the text: one panel that follows the active channel, or is locked to its own. */
export function registerPreview(context: vscode.ExtensionContext, extension: Extension): vscode.Disposable {
  let preview: Preview | undefined;

  const open = async (column: vscode.ViewColumn, uri = activeChannel()?.document.uri) => {
    if (!uri) return;
    if (preview) {
      preview.panel.reveal(undefined, true);
      await show(preview, uri, extension);
      return;
    }
    const panel = vscode.window.createWebviewPanel(
      VIEW_TYPE,
      'Preview',
      { viewColumn: column, preserveFocus: true },
      { enableFindWidget: true },
    );
    preview = adopt(panel, uri, context, extension, () => {
      preview = undefined;
    });
    void context.workspaceState.update(LOCKED, false);
  };

  return vscode.Disposable.from(
    vscode.commands.registerCommand('lanewright.openPreview', (uri?: vscode.Uri) =>
      open(vscode.ViewColumn.Active, asUri(uri)),
    ),
    vscode.commands.registerCommand('lanewright.openPreviewToSide', (uri?: vscode.Uri) =>
      open(vscode.ViewColumn.Beside, asUri(uri)),
    ),
    vscode.commands.registerCommand('lanewright.togglePreviewLock', () => {
      if (!preview) return;
      preview.locked = !preview.locked;
      preview.panel.title = titleOf(preview);
      void context.workspaceState.update(LOCKED, preview.locked);
    }),
    vscode.window.registerWebviewPanelSerializer(VIEW_TYPE, {
      async deserializeWebviewPanel(panel, state: PageState | undefined) {
        const uri = state?.uri ? vscode.Uri.parse(state.uri) : activeChannel()?.document.uri;
        preview = adopt(panel, uri, context, extension, () => {
          preview = undefined;
        });
        preview.locked = context.workspaceState.get(LOCKED, false);
        panel.title = titleOf(preview);
      },
    }),
    extension.client.onNotification(previewChanged, ({ uri, stale }) => {
      if (!preview?.uri || !sameUri(uri, preview.uri)) return;
      if (stale) post(preview, { type: 'stale', what: 'eye' });
      else void refresh(preview, extension);
    }),
    vscode.window.onDidChangeActiveTextEditor((editor) => {
      if (preview && !preview.locked && editor && isChannel(editor.document))
        void show(preview, editor.document.uri, extension);
    }),
    vscode.window.onDidChangeTextEditorSelection(({ textEditor }) => {
      if (preview?.uri && textEditor.document.uri.toString() === preview.uri.toString())
        void followCursor(preview, textEditor, extension);
    }),
  );
}

const isChannel = ({ languageId }: vscode.TextDocument) => languageId === 'lanewright-channel';
const activeChannel = () => {
  const editor = vscode.window.activeTextEditor;
  return editor && isChannel(editor.document) ? editor : undefined;
};
/** Menus hand over a URI, keys and the palette nothing or something else. */
const asUri = (value: unknown) =>
  value instanceof vscode.Uri ? value : typeof value === 'string' ? vscode.Uri.parse(value) : undefined;
const sameUri = (text: string, uri: vscode.Uri) => vscode.Uri.parse(text).toString() === uri.toString();

const nameOf = (uri: vscode.Uri | undefined) => uri?.path.split('/').pop() ?? '';
const titleOf = ({ uri, locked }: Preview) => `${locked ? 'Locked preview' : 'Preview'}: ${nameOf(uri)}`;
const post = ({ panel, gone }: Preview, message: ToPage) => {
  if (!gone) void panel.webview.postMessage(message);
};

function newNonce(): string {
  const bytes = crypto.getRandomValues(new Uint8Array(24));
  return Array.from(bytes, (byte) => byte.toString(16).padStart(2, '0')).join('');
}

function adopt(
  panel: vscode.WebviewPanel,
  uri: vscode.Uri | undefined,
  context: vscode.ExtensionContext,
  extension: Extension,
  gone: () => void,
): Preview {
  const dist = vscode.Uri.joinPath(context.extensionUri, 'dist');
  const { webview } = panel;
  webview.options = { enableScripts: true, localResourceRoots: [dist], enableCommandUris: false };
  const preview: Preview = { panel, uri, locked: false, generation: 0, gone: false };
  panel.title = titleOf(preview);
  const icon = (name: string) => vscode.Uri.joinPath(context.extensionUri, 'client', 'extension', 'icons', name);
  panel.iconPath = { light: icon('light.svg'), dark: icon('dark.svg') };
  panel.onDidDispose(() => {
    preview.gone = true;
    gone();
  });
  webview.onDidReceiveMessage((message: unknown) => {
    const read = readFromPage(message);
    if (read) void answer(preview, read, extension);
  });
  webview.html = pageHtml({
    nonce: newNonce(),
    cspSource: webview.cspSource,
    scriptUri: webview.asWebviewUri(vscode.Uri.joinPath(dist, 'preview.js')).toString(),
    styleUri: webview.asWebviewUri(vscode.Uri.joinPath(dist, 'preview.css')).toString(),
  });
  return preview;
}

async function answer(preview: Preview, message: FromPage, extension: Extension): Promise<void> {
  if (message.type === 'ready') return refresh(preview, extension);
  if (message.type === 'select') return select(preview, message, extension);
  return save(preview, message);
}

async function show(preview: Preview, uri: vscode.Uri, extension: Extension): Promise<void> {
  if (preview.uri?.toString() === uri.toString()) return;
  preview.uri = uri;
  preview.panel.title = titleOf(preview);
  await refresh(preview, extension);
}

async function refresh(preview: Preview, { client }: Extension): Promise<void> {
  const { uri } = preview;
  const generation = ++preview.generation;
  if (!uri) {
    post(preview, { type: 'nothing', reason: 'Open a channel file to see it here.' });
    return;
  }
  // The explorer's menu names files that no editor shows: the server computes what is open.
  await Promise.resolve(vscode.workspace.openTextDocument(uri)).catch(() => undefined);
  const answerOfServer = await client
    .sendRequest(previewRequest, { uri: client.code2ProtocolConverter.asUri(uri) })
    .catch(() => null);
  if (generation !== preview.generation) return;
  if (!answerOfServer) post(preview, { type: 'nothing', reason: `${nameOf(uri)} is not computed yet.` });
  else
    post(preview, {
      type: 'data',
      uri: uri.toString(),
      version: answerOfServer.version,
      data: answerOfServer.data as never,
    });
}

/** Selects the lines of what was pointed at, in the editor that shows the file, or opens one. */
async function select(
  preview: Preview,
  { at }: Extract<FromPage, { type: 'select' }>,
  { client }: Extension,
): Promise<void> {
  if (!preview.uri) return;
  const found = await client
    .sendRequest(rangeRequest, { uri: client.code2ProtocolConverter.asUri(preview.uri), place: at })
    .catch(() => null);
  if (!found) return;
  const range = client.protocol2CodeConverter.asRange(found.range);
  const uri = client.protocol2CodeConverter.asUri(found.uri);
  const visible = vscode.window.visibleTextEditors.find((editor) => editor.document.uri.toString() === uri.toString());
  const editor = await vscode.window.showTextDocument(
    visible?.document ?? (await vscode.workspace.openTextDocument(uri)),
    {
      viewColumn: visible?.viewColumn ?? vscode.ViewColumn.One,
      preserveFocus: true,
    },
  );
  editor.selection = new vscode.Selection(range.start, range.end);
  editor.revealRange(range, vscode.TextEditorRevealType.InCenterIfOutsideViewport);
}

async function followCursor(preview: Preview, editor: vscode.TextEditor, { client }: Extension): Promise<void> {
  if (!vscode.workspace.getConfiguration('lanewright').get('preview.followCursor', true)) return;
  const { document, selection } = editor;
  const params = {
    uri: client.code2ProtocolConverter.asUri(document.uri),
    position: client.code2ProtocolConverter.asPosition(selection.active),
  };
  const found = await client.sendRequest(elementAtRequest, params).catch(() => null);
  // Without an answer the mark stays: a server that starts knows no element yet.
  if (found && editor.selection.active.isEqual(selection.active))
    post(preview, { type: 'cursorElement', element: found.element });
}

async function save({ uri }: Preview, { format, name, content }: Extract<FromPage, { type: 'save' }>): Promise<void> {
  const file = `${nameOf(uri).replace(/\.channel\.yaml$/, '')}-${name}.${format}`;
  const folder = uri ? vscode.Uri.joinPath(uri, '..') : vscode.workspace.workspaceFolders?.[0]?.uri;
  const target = await vscode.window.showSaveDialog({
    defaultUri: folder && vscode.Uri.joinPath(folder, file),
    filters: { [format.toUpperCase()]: [format] },
  });
  if (target) await vscode.workspace.fs.writeFile(target, new TextEncoder().encode(content));
}
