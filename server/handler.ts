import { type CancellationToken, LSPErrorCodes, type Position, ResponseError } from 'vscode-languageserver';
import type { Analysis } from '../src-core/analysis';
import type { FilePath } from '../src-core/text/types';
import type { Until } from './analyses';
import { offsetAt } from './convert';
import type { Root } from './roots';
import type { Services } from './services';

/** One feature: given the services, answers one request. */
export type Handler<Params, Result> = (
  services: Services,
) => (params: Params, token: CancellationToken) => Promise<Result>;

/** A file with the analysis of its newest text. */
export interface Analysed {
  readonly analysis: Analysis;
  readonly root: Root;
  readonly file: FilePath;
  /** The text that the analysis read: the newest. */
  readonly text: string;
  readonly version: number;
  readonly offset: number;
}

/** Waits for the analysis of the newest text of an open file; undefined if there is none. */
export async function located(
  services: Services,
  uri: string,
  token?: CancellationToken,
  position?: Position,
  until?: Until,
): Promise<Analysed | undefined> {
  const { analyses, documents } = services;
  for (;;) {
    const document = documents.get(uri);
    if (!document) return undefined;
    const analysis = await analyses.current(document.located, token, until);
    const text = analysis?.parsed.get(document.located.file)?.text;
    if (!analysis || text === undefined) return undefined;
    const newest = documents.get(uri);
    // What came meanwhile is answered for, too: no answer is older than the text.
    if (newest && newest.text !== text && newest !== document) continue;
    const { root, file } = document.located;
    return {
      analysis,
      root,
      file,
      text,
      version: (newest ?? document).version,
      offset: position ? offsetAt(text, position) : 0,
    };
  }
}

/** Answers a failure as an error, in the log too: one broken request ends nothing else. */
export function guarded<Params, Result>(
  services: Services,
  name: string,
  handler: (params: Params, token: CancellationToken) => Promise<Result>,
) {
  return async (params: Params, token: CancellationToken): Promise<Result> => {
    if (token?.isCancellationRequested) throw new ResponseError(LSPErrorCodes.RequestCancelled, 'cancelled');
    try {
      return await handler(params, token);
    } catch (error) {
      if (error instanceof ResponseError) throw error;
      const message = error instanceof Error ? (error.stack ?? error.message) : String(error);
      services.log.error(`${name}: ${message}`);
      throw new ResponseError(
        LSPErrorCodes.RequestFailed,
        `${name} failed: ${error instanceof Error ? error.message : String(error)}`,
      );
    }
  };
}
