import type { CodeLens, CodeLensParams } from 'vscode-languageserver';
import { lensesOf } from '../../src-core/assist/lenses';
import { toRange } from '../convert';
import { type Handler, located } from '../handler';

/** A line above `path:`; what it says is asked for when it is seen. */
export const codeLenses: Handler<CodeLensParams, CodeLens[] | null> =
  (services) =>
  async ({ textDocument }, token) => {
    if (!(await services.settings.of(textDocument.uri)).lens) return null;
    const at = await located(services, textDocument.uri, token);
    return at
      ? lensesOf(at.analysis).map(({ range }) => ({ range: toRange(at.text, range), data: { uri: textDocument.uri } }))
      : null;
  };

export const resolveLens: Handler<CodeLens, CodeLens> = (services) => async (lens, token) => {
  const { uri } = (lens.data ?? {}) as { uri?: string };
  const at = uri === undefined ? undefined : await located(services, uri, token);
  const title = at && lensesOf(at.analysis)[0]?.title;
  return {
    ...lens,
    command: { title: title ?? 'Not computed yet', command: 'lanewright.openPreviewToSide', arguments: [uri] },
  };
};
