import {
  ErrorCodes,
  type PrepareRenameParams,
  type Range,
  type RenameFilesParams,
  type RenameParams,
  ResponseError,
  type WorkspaceEdit,
} from 'vscode-languageserver';
import { fileRenameEdits, prepareRename, renameAt } from '../../src-core/assist/names';
import type { Library } from '../../src-core/assist/occurrences';
import type { TextEdit } from '../../src-core/text/types';
import { toRange, toWorkspaceEdit } from '../convert';
import { type Handler, located } from '../handler';
import { libraryOf } from '../library';
import type { Root } from '../roots';
import type { Services } from '../services';

export const prepare: Handler<PrepareRenameParams, { range: Range; placeholder: string } | null> =
  (services) =>
  async ({ textDocument, position }, token) => {
    const at = await located(services, textDocument.uri, token, position, 'model');
    if (!at) return null;
    const prepared = prepareRename(at.analysis.parsed, at.file, at.offset);
    if ('problem' in prepared) throw new ResponseError(ErrorCodes.InvalidRequest, prepared.problem);
    return { range: toRange(at.text, prepared.range), placeholder: prepared.name };
  };

/** The name in every file that writes it, or why not. */
export const rename: Handler<RenameParams, WorkspaceEdit | null> =
  (services) =>
  async ({ textDocument, position, newName }, token) => {
    const at = await located(services, textDocument.uri, token, position, 'model');
    if (!at) return null;
    const library = await libraryOf(services, at, token);
    const result = renameAt(library, at.file, at.offset, newName);
    if ('problem' in result) throw new ResponseError(ErrorCodes.InvalidRequest, result.problem);
    return workspaceEdit(services, at.root, library, result.edits);
  };

/** Paths that name files which are about to be renamed. */
export const willRenameFiles: Handler<RenameFilesParams, WorkspaceEdit | null> =
  (services) =>
  async ({ files }, token) => {
    const moves = files.map(({ oldUri, newUri }) => ({
      from: services.roots.locate(oldUri),
      to: services.roots.locate(newUri),
    }));
    const root = moves[0]?.from.root;
    if (!root) return null;
    // A file that moves to another folder of the workspace leaves its root: no relative path leads there.
    const within = moves.filter(({ from, to }) => from.root.key === root.key && to.root.key === root.key);
    const library = await services.workspace.library(root, token);
    return workspaceEdit(
      services,
      root,
      library,
      fileRenameEdits(
        library,
        within.map(({ from, to }) => ({ from: from.file, to: to.file })),
      ),
    );
  };

export function workspaceEdit(
  services: Services,
  root: Root,
  library: Library,
  edits: readonly TextEdit[],
): WorkspaceEdit {
  return toWorkspaceEdit(
    edits,
    (file) => library.get(file)?.text,
    (file) => {
      const document = services.documents.at({ root, file });
      return { uri: services.documents.uriOf({ root, file }), version: document?.version ?? null };
    },
    services.client.versionedEdits,
  );
}
