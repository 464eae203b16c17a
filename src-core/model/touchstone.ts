import { fileKind, joinPath } from '../inputs';
import type { FilePath } from '../text/types';
import { quoted } from './reports';
import { type Sources, unreadable } from './sources';

export type NamedFile =
  | { readonly file: FilePath; readonly rule?: undefined }
  | { readonly file?: undefined; readonly rule: string; readonly message: string };

/** The Touchstone file that a path written in a file names, or the rule and message of what is wrong with it. */
export function touchstoneFile(sources: Sources, fromFile: FilePath, written: string): NamedFile {
  const joined = joinPath(fromFile, written);
  if (joined.problem !== undefined) {
    return { rule: 'refused-file', message: `The path ${quoted(written)} ${joined.problem}.` };
  }
  if (fileKind(joined.file) !== 'touchstone') {
    const message = `${quoted(written)} is no Touchstone file: its name ends with \`.s1p\` to \`.s4p\`.`;
    return { rule: 'refused-file', message };
  }
  if (sources.inputs.files.get(joined.file)?.kind === 'text') return { file: joined.file };
  const [rule, message] = unreadable(sources.inputs, joined.file, written);
  return { rule, message };
}
