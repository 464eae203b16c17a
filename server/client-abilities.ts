import type { InitializeParams } from 'vscode-languageserver';

/** What the client said that it can do; each feature asks here. All false before the handshake. */
export interface ClientAbilities {
  readonly pullDiagnostics: boolean;
  readonly relatedDocuments: boolean;
  readonly refreshDiagnostics: boolean;
  readonly refreshHints: boolean;
  readonly refreshLenses: boolean;
  readonly versionedEdits: boolean;
  readonly renameFiles: boolean;
  readonly snippets: boolean;
  readonly itemDefaults: boolean;
  readonly definitionLinks: boolean;
  readonly disabledActions: boolean;
  readonly watchFiles: boolean;
  readonly progress: boolean;
  readonly folderChanges: boolean;
}

export const NO_ABILITIES: ClientAbilities = abilitiesFrom({ processId: null, rootUri: null, capabilities: {} });

export function abilitiesFrom({
  capabilities: { workspace, textDocument, window },
}: InitializeParams): ClientAbilities {
  const completion = textDocument?.completion;
  return {
    pullDiagnostics: textDocument?.diagnostic !== undefined,
    relatedDocuments: textDocument?.diagnostic?.relatedDocumentSupport === true,
    refreshDiagnostics: workspace?.diagnostics?.refreshSupport === true,
    refreshHints: workspace?.inlayHint?.refreshSupport === true,
    refreshLenses: workspace?.codeLens?.refreshSupport === true,
    versionedEdits: workspace?.workspaceEdit?.documentChanges === true,
    renameFiles: workspace?.fileOperations?.willRename === true,
    snippets: completion?.completionItem?.snippetSupport === true,
    itemDefaults: completion?.completionList?.itemDefaults?.includes('editRange') === true,
    definitionLinks: textDocument?.definition?.linkSupport === true,
    disabledActions: textDocument?.codeAction?.disabledSupport === true,
    watchFiles: workspace?.didChangeWatchedFiles?.dynamicRegistration === true,
    progress: window?.workDoneProgress === true,
    folderChanges: workspace?.workspaceFolders === true,
  };
}
