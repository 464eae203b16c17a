import type { Inputs } from '../src-core/analysis';
import { withDependents } from '../src-core/dependents';
import { fileKind } from '../src-core/inputs';
import type { FileContent, FilePath, Files } from '../src-core/text/types';

/** The inputs of a parts file with the files below its root that use it; of any other file as they are. */
export async function gatherDependents(
  inputs: Inputs,
  files: Files,
  filesBelow: () => Promise<readonly FilePath[]>,
): Promise<Inputs> {
  if (fileKind(inputs.file) !== 'parts') return inputs;
  const others = (await filesBelow()).filter((file) => fileKind(file) !== 'config');
  const contents = await Promise.all(
    others.map(
      async (file): Promise<[FilePath, FileContent]> => [file, inputs.files.get(file) ?? (await files.read(file))],
    ),
  );
  return withDependents(inputs, new Map(contents));
}
