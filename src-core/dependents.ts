import type { Inputs } from './analysis';
import { fileKind, joinPath } from './inputs';
import type { FileContent, FilePath } from './text/types';

/** By the content, which stays the same object while its file does. */
const named = new WeakMap<FileContent, readonly string[]>();

/** Words that may be paths of parts files, without reading the text as YAML: a comment's do no harm. */
function partsNamedIn(content: FileContent): readonly string[] {
  if (content.kind !== 'text' || content.text.length > 1 << 20) return [];
  let paths = named.get(content);
  if (!paths) {
    paths = [...new Set(content.text.match(/[^\s"'{}[\],]{1,999}\.parts\.yaml(?=$|[\s"'{}[\],])/g))];
    named.set(content, paths);
  }
  return paths;
}

/**
 * The inputs of a parts file with the channels and parts files that use it, so that what nobody uses can be told. Where no file at
 * hand uses it, it is a library for others, and the inputs stay as they are.
 * @param others contents of all channels and parts files at hand
 */
export function withDependents(inputs: Inputs, others: ReadonlyMap<FilePath, FileContent>): Inputs {
  if (fileKind(inputs.file) !== 'parts') return inputs;
  const uses = (file: FilePath, content: FileContent) =>
    file !== inputs.file && partsNamedIn(content).some((path) => joinPath(file, path).file === inputs.file);
  const dependents = [...others].filter(([file, content]) => uses(file, content));
  if (dependents.length === 0) return inputs;
  return {
    ...inputs,
    files: new Map([...dependents, ...inputs.files]),
    dependents: dependents.map(([file]) => file),
  };
}
