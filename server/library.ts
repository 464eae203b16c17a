import type { CancellationToken } from 'vscode-languageserver';
import type { Library } from '../src-core/assist/occurrences';
import type { Analysed } from './handler';
import type { Services } from './services';

/** All files below the root of an analysed file, that file and what it uses as its analysis read them. */
export async function libraryOf(
  services: Services,
  { root, analysis }: Analysed,
  token?: CancellationToken,
): Promise<Library> {
  const library = new Map(await services.workspace.library(root, token));
  for (const [file, parsed] of analysis.parsed) library.set(file, parsed);
  return library;
}
