import type { Inputs } from '../analysis';
import { readTouchstone } from '../networks/touchstone';
import type { TouchstoneResult } from '../networks/touchstone-types';
import type { FilePath } from '../text/types';

interface Read {
  readonly text: string;
  readonly result: TouchstoneResult;
}

/** Touchstone files as read, by path, kept while their text is the same. */
export type Touchstones = ReadonlyMap<FilePath, Read>;

/** Reads a Touchstone file when an element first asks for it; `kept` then holds what was asked for. */
export function keepTouchstones({ files }: Inputs, before: Touchstones | undefined) {
  const kept = new Map<FilePath, Read>();
  const of = (file: FilePath): TouchstoneResult | undefined => {
    const content = files.get(file);
    if (content?.kind !== 'text') return undefined;
    const known = kept.get(file) ?? before?.get(file);
    const read =
      known?.text === content.text ? known : { text: content.text, result: readTouchstone(content.text, file) };
    kept.set(file, read);
    return read.result;
  };
  return { of, kept: kept as Touchstones };
}
