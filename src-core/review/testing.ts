import { analyse } from '../analyse';
import { gatherInputs } from '../inputs';
import { BOARD, CHANNEL, files as sound } from '../rules/testing-base';
import type { FileContent, FilePath } from '../text/types';
import { reviewChannel } from './channel';
import type { ChannelReview } from './types';

export { BOARD, CHANNEL };

const textIn = (files: ReadonlyMap<FilePath, FileContent>, file: FilePath) => {
  const content = files.get(file);
  if (content?.kind !== 'text') throw new Error(`${file} is no text`);
  return content.text;
};

/** Replaces one text in the files; throws where it is not there, so that no test compares a file with itself. */
export function edited(
  edits: readonly (readonly [file: FilePath, from: string, to: string])[],
  files: ReadonlyMap<FilePath, FileContent> = sound,
): ReadonlyMap<FilePath, FileContent> {
  const result = new Map(files);
  for (const [file, from, to] of edits) {
    const text = textIn(result, file);
    if (!text.includes(from)) throw new Error(`\`${from}\` is not in ${file}`);
    result.set(file, { kind: 'text', text: text.replace(from, to) });
  }
  return result;
}

const analysed = async (files: ReadonlyMap<FilePath, FileContent>, file: FilePath) => {
  const read = async (path: FilePath): Promise<FileContent> => files.get(path) ?? { kind: 'missing' };
  return analyse(await gatherInputs({ read }, file, '2027-01-01'), undefined, { until: 'link' });
};

/** The review of the base channel under two sets of files. */
export async function reviewed(
  head: ReadonlyMap<FilePath, FileContent>,
  { base = sound, file = CHANNEL, from = file }: { base?: typeof sound; file?: FilePath; from?: FilePath } = {},
): Promise<ChannelReview> {
  const changedFiles = [...head].filter(([path, content]) => base.get(path) !== content).map(([path]) => path);
  return reviewChannel({
    file,
    ...(from !== file && { renamedFrom: from }),
    base: { analysis: await analysed(base, from) },
    head: { analysis: await analysed(head, file) },
    changedFiles,
  });
}
