import type { Inputs } from './analysis';
import { isMapping } from './raw';
import { parseFile } from './text/parse';
import type { ParsedFile } from './text/parsed';
import type { FileContent, FileKind, FilePath, Files } from './text/types';

export const CONFIG_NAME = 'lanewright.config.yaml';
const CHANNEL_END = '.channel.yaml';
const PARTS_END = '.parts.yaml';

/** What a file is, by its name. */
export function fileKind(path: FilePath): FileKind {
  const name = path.slice(path.lastIndexOf('/') + 1);
  if (name === CONFIG_NAME) return 'config';
  if (name.endsWith(CHANNEL_END) && name.length > CHANNEL_END.length) return 'channel';
  if (name.endsWith(PARTS_END) && name.length > PARTS_END.length) return 'parts';
  return /\.s\d{1,2}p$/i.test(name) ? 'touchstone' : 'other';
}

export type Joined =
  | { readonly file: FilePath; readonly problem?: undefined }
  /** Why the path is not followed, as the end of a sentence that begins with the path. */
  | { readonly file?: undefined; readonly problem: string };

const DEVICES = /^(?:con|prn|aux|nul|com\d|lpt\d)(?:\.|$)/i;

/**
 * The file that a path written in a file means. Paths stay below the root and are plain relative ones: what leads elsewhere is
 * refused by its words alone, before anything is read or looked at.
 */
export function joinPath(fromFile: FilePath, relative: string): Joined {
  const refused = refusal(relative);
  if (refused) return { problem: refused };
  const steps = fromFile.split('/').slice(0, -1);
  for (const step of relative.split('/')) {
    if (step === '' || step === '.') continue;
    if (step !== '..') steps.push(step);
    else if (steps.pop() === undefined) return { problem: 'leads out of the folder that is open' };
  }
  if (steps.length === 0) return { problem: 'names a folder, not a file' };
  return { file: steps.join('/') };
}

function refusal(path: string): string | undefined {
  if (path.trim() === '') return 'is empty';
  if (path.length > 1000) return 'is longer than 1,000 characters';
  if (path.startsWith('\\\\') || path.startsWith('//'))
    return 'is on another machine; write a path relative to this file';
  if (path.startsWith('/') || path.startsWith('~') || /^[A-Za-z]:/.test(path))
    return 'is absolute; write a path relative to this file';
  if (/^[a-z][a-z0-9+.-]+:/i.test(path)) return 'is an address; write a path relative to this file';
  if (path.includes('\\')) return 'has a backslash; write `/` between folders';
  for (let i = 0; i < path.length; i++) if (path.charCodeAt(i) < 32) return 'has a control character';
  if (/(?:^|\/)\.{0,2}$/.test(path)) return 'names a folder, not a file';
  if (path.split('/').some((step) => DEVICES.test(step))) return 'is the name of a device';
  return undefined;
}

/** The parts files that a channel or parts file names, as written. */
export function usesOf(parsed: ParsedFile): readonly { readonly name: string; readonly path: string }[] {
  const use = isMapping(parsed.value) ? parsed.value.use : undefined;
  if (!isMapping(use)) return [];
  return Object.entries(use).flatMap(([name, path]) => (typeof path === 'string' ? [{ name, path }] : []));
}

/** The Touchstone files that elements and parts name, as written. */
function touchstonesOf({ value }: ParsedFile): readonly string[] {
  if (!isMapping(value)) return [];
  const holders = [
    ...(Array.isArray(value.path) ? value.path : []),
    ...(isMapping(value.parts) ? Object.values(value.parts) : []),
  ];
  return holders.flatMap((holder) =>
    isMapping(holder) && typeof holder.touchstone === 'string' ? [holder.touchstone] : [],
  );
}

/** More files than this in one channel are a mistake; a cycle of links between them ends here too. */
const MOST_FILES = 500;

/**
 * Reads all that an analysis of `file` depends on: the file, the nearest config upwards, the parts files that it uses (directly
 * or not; cycles end), and the Touchstone files that any of them names. What cannot be read is in the result as such.
 * @param previous the inputs of the analysis before: contents that are the same stay the same objects
 * @param parsedBefore texts already parsed: one that is the same is not parsed again
 */
export async function gatherInputs(
  files: Files,
  file: FilePath,
  today: string,
  previous?: Inputs,
  parsedBefore?: ReadonlyMap<FilePath, ParsedFile>,
): Promise<Inputs> {
  const contents = new Map<FilePath, FileContent>();
  const read = async (path: FilePath): Promise<FileContent> => {
    const known = contents.get(path);
    if (known) return known;
    const content = same(await files.read(path), previous?.files.get(path));
    contents.set(path, content);
    return content;
  };
  const parse = (path: FilePath, text: string): ParsedFile => {
    const before = parsedBefore?.get(path);
    return before?.text === text ? before : parseCached(path, text, before);
  };
  const waiting: FilePath[] = [file];
  const touchstones = new Set<FilePath>();
  for (let at = 0; at < waiting.length && contents.size < MOST_FILES; at++) {
    const content = await read(waiting[at]);
    if (content.kind !== 'text' || !['channel', 'parts'].includes(fileKind(waiting[at]))) continue;
    const parsed = parse(waiting[at], content.text);
    for (const { path } of usesOf(parsed)) {
      const { file: used } = joinPath(waiting[at], path);
      if (used !== undefined && fileKind(used) === 'parts' && !waiting.includes(used)) waiting.push(used);
    }
    for (const path of touchstonesOf(parsed)) {
      const { file: named } = joinPath(waiting[at], path);
      if (named !== undefined && fileKind(named) === 'touchstone') touchstones.add(named);
    }
  }
  for (const path of touchstones) if (contents.size < MOST_FILES) await read(path);
  const configFile = await nearestConfig(file, read, contents);
  return { file, files: contents, ...(configFile !== undefined && { configFile }), today };
}

async function nearestConfig(
  file: FilePath,
  read: (path: FilePath) => Promise<FileContent>,
  contents: Map<FilePath, FileContent>,
): Promise<FilePath | undefined> {
  const folders = file.split('/').slice(0, -1);
  for (let depth = folders.length; depth >= 0; depth--) {
    const path = [...folders.slice(0, depth), CONFIG_NAME].join('/');
    const content = await read(path);
    // one that is there and cannot be read is not passed over: what it says would have counted
    if (content.kind !== 'missing') return path;
    contents.delete(path);
  }
  return undefined;
}

/** The content read before where it says the same, so that stages can compare by identity. */
function same(content: FileContent, before: FileContent | undefined): FileContent {
  if (!before || content.kind !== before.kind) return content;
  if (content.kind === 'text' && before.kind === 'text') return content.text === before.text ? before : content;
  return content.kind === 'missing' ? before : content;
}

/** The last few texts parsed here, so that gathering and the analysis after it parse a text once. */
const recent = new Map<FilePath, ParsedFile>();
const MOST_RECENT = 32;

/**
 * `parseFile`, which keeps the result of a few texts: the same text gives the same object.
 * @param before an earlier state of this file, where it is known
 */
export function parseCached(file: FilePath, text: string, before?: ParsedFile): ParsedFile {
  const kept = recent.get(file);
  if (kept?.text === text) return kept;
  const parsed = parseFile(file, text, fileKind(file), before ?? kept);
  recent.delete(file);
  recent.set(file, parsed);
  if (recent.size > MOST_RECENT) recent.delete(recent.keys().next().value!);
  return parsed;
}
