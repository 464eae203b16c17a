import { existsSync, statSync } from 'node:fs';
import type { Inputs } from '../../src-core/analysis';
import { withDependents } from '../../src-core/dependents';
import { fileKind, gatherInputs } from '../../src-core/inputs';
import type { FileContent, FilePath } from '../../src-core/text/types';
import { type OptionValues, Refusal } from './command';
import type { Workspace } from './files';

/** The inputs of one file under `--config`, `--no-config` and `--date`. */
export async function inputsFor(workspace: Workspace, file: FilePath, options: OptionValues): Promise<Inputs> {
  const today = typeof options.date === 'string' ? options.date : new Date().toISOString().slice(0, 10);
  if (!/^\d{4}-\d{2}-\d{2}$/.test(today) || Number.isNaN(Date.parse(today)))
    throw new Refusal(`\`--date ${today}\` is not a day: write YYYY-MM-DD.`);
  const inputs = await gatherInputs(workspace.files, file, today);
  if (options['no-config']) return { ...inputs, configFile: undefined };
  if (typeof options.config !== 'string') return inputs;
  const configFile = workspace.toFilePath(options.config);
  const content = await workspace.files.read(configFile);
  if (content.kind !== 'text')
    throw new Refusal(
      `The config file \`${options.config}\` could not be read${content.kind === 'refused' ? `: ${content.reason}` : ''}.`,
    );
  return { ...inputs, files: new Map([...inputs.files, [configFile, content]]), configFile };
}

/**
 * Adds to the inputs of a parts file which of the run's files use it. Only a run over folders knows them: where single files are
 * named, others may use what these do not.
 */
export function dependentsAmong(
  workspace: Workspace,
  files: readonly FilePath[],
  paths: readonly string[],
): (inputs: Inputs) => Promise<Inputs> {
  const wholeFolders = paths.every((path) => existsSync(path) && statSync(path).isDirectory());
  let contents: Promise<ReadonlyMap<FilePath, FileContent>> | undefined;
  const readAll = async () => {
    const read = new Map<FilePath, FileContent>();
    for (const file of files)
      if (['channel', 'parts'].includes(fileKind(file))) read.set(file, await workspace.files.read(file));
    return read;
  };
  return async (inputs) => {
    if (!wholeFolders || fileKind(inputs.file) !== 'parts') return inputs;
    contents ??= readAll();
    return withDependents(inputs, await contents);
  };
}
