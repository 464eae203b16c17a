import { joinPath } from '../inputs';
import { rangeOf } from '../text/index';
import type { FilePath, TextEdit, TextRange } from '../text/types';
import { type Identity, type Library, type Occurrence, occurrencesIn, sameIdentity } from './occurrences';

/** A range in a file; where names lead to. */
export interface Target {
  readonly file: FilePath;
  readonly range: TextRange;
}

export interface Definition {
  /** The name under the cursor. */
  readonly origin: TextRange;
  readonly targets: readonly (Target & { /** Key and value together. */ readonly whole: TextRange })[];
}

export interface Reference extends Target {
  readonly declares: boolean;
}

const FILE_ROLES = new Set(['file', 'touchstone']);
const FIXED_ROLES = new Set(['rule', 'file', 'touchstone']);

/** The name at an offset: the innermost piece that holds it. */
export function occurrenceAt(
  library: Library,
  file: FilePath,
  offset: number,
): { occurrence: Occurrence; range: TextRange } | undefined {
  for (const occurrence of occurrencesIn(library, file)) {
    const range = rangeOfOccurrence(library, occurrence);
    if (range && range.start <= offset && offset <= range.end) return { occurrence, range };
  }
  return undefined;
}

/** Where the piece stands in the text: quotes cut off, a prefix apart from its name. Undefined where a merge key brought it in. */
export function rangeOfOccurrence(library: Library, { place, part, identity }: Occurrence): TextRange | undefined {
  const parsed = library.get(place.file);
  if (!parsed) return undefined;
  const whole = rangeOf(parsed, place);
  const quoted = /^['"]/.test(parsed.text.slice(whole.start, whole.start + 1));
  const inner = quoted ? { start: whole.start + 1, end: whole.end - 1 } : whole;
  const written = parsed.text.slice(inner.start, inner.end);
  if (part === 'prefix')
    return written.startsWith(`${identity.name}.`)
      ? { start: inner.start, end: inner.start + identity.name.length }
      : undefined;
  if (part === 'name')
    return written.endsWith(`.${identity.name}`)
      ? { start: inner.end - identity.name.length, end: inner.end }
      : undefined;
  return written === identity.name ? inner : undefined;
}

/** Where the name at an offset is declared; a `use` or `touchstone` path leads to the start of that file. */
export function definitionAt(library: Library, file: FilePath, offset: number): Definition | undefined {
  const found = occurrenceAt(library, file, offset);
  if (!found) return undefined;
  const { identity } = found.occurrence;
  if (FILE_ROLES.has(identity.role)) {
    if (identity.file === '') return undefined;
    const start = { start: 0, end: 0 };
    return { origin: found.range, targets: [{ file: identity.file, range: start, whole: start }] };
  }
  const targets = occurrencesIn(library, identity.file)
    .filter((other) => other.declares && sameIdentity(other.identity, identity))
    .flatMap((other) => {
      const range = rangeOfOccurrence(library, other);
      const parsed = library.get(other.place.file);
      if (!range || !parsed) return [];
      const entry =
        other.place.on === 'key'
          ? { ...other.place, on: 'entry' as const }
          : { file: other.place.file, path: other.place.path.slice(0, -1), on: 'value' as const };
      const whole = rangeOf(parsed, entry);
      return [
        { file: other.place.file, range, whole: whole.start <= range.start && range.end <= whole.end ? whole : range },
      ];
    });
  return targets.length > 0 ? { origin: found.range, targets } : undefined;
}

/** Every place in the library that names what stands at the offset. */
export function referencesOf(
  library: Library,
  file: FilePath,
  offset: number,
  withDeclaration = true,
): readonly Reference[] {
  const found = occurrenceAt(library, file, offset);
  return found
    ? placesOf(library, found.occurrence.identity).filter(({ declares }) => withDeclaration || !declares)
    : [];
}

/** The same within one file: the declaration is written, uses are read. */
export const highlightsAt = (library: Library, file: FilePath, offset: number): readonly Reference[] =>
  referencesOf(library, file, offset).filter((reference) => reference.file === file);

function placesOf(library: Library, identity: Identity): readonly Reference[] {
  const found: Reference[] = [];
  for (const file of library.keys()) {
    if (
      (identity.role === 'element' ||
        identity.role === 'limit' ||
        identity.role === 'use' ||
        identity.role === 'owner') &&
      file !== identity.file
    )
      continue;
    for (const other of occurrencesIn(library, file)) {
      if (!sameIdentity(other.identity, identity)) continue;
      const range = rangeOfOccurrence(library, other);
      if (range) found.push({ file, range, declares: other.declares });
    }
  }
  return found;
}

export type Renaming = { readonly range: TextRange; readonly name: string } | { readonly problem: string };

/** What a rename at the offset would change, or why it cannot. */
export function prepareRename(library: Library, file: FilePath, offset: number): Renaming {
  const found = occurrenceAt(library, file, offset);
  if (!found) return { problem: 'There is no name here that could be renamed.' };
  const { identity } = found.occurrence;
  if (identity.role === 'rule') return { problem: 'The names of rules are fixed.' };
  if (FIXED_ROLES.has(identity.role))
    return { problem: 'This is a path: rename the file itself, and the paths that name it follow.' };
  if (!placesOf(library, identity).some(({ declares }) => declares))
    return { problem: `\`${identity.name}\` is declared nowhere; declare it first.` };
  return { range: found.range, name: identity.name };
}

const NAME = /^(?!(?:true|false|null|yes|no|on|off)$)[a-z][a-z0-9-]*$/;
const LAYER = /^[A-Za-z0-9][A-Za-z0-9_.-]*$/;

/** All edits of a rename, in every file of the library; a problem where the name is taken or breaks the pattern of names. */
export function renameAt(
  library: Library,
  file: FilePath,
  offset: number,
  newName: string,
): { readonly edits: readonly TextEdit[] } | { readonly problem: string } {
  const prepared = prepareRename(library, file, offset);
  if ('problem' in prepared) return prepared;
  const identity = occurrenceAt(library, file, offset)!.occurrence.identity;
  const problem = problemOfName(library, identity, newName);
  if (problem) return { problem };
  if (newName === identity.name) return { edits: [] };
  const text = identity.role === 'owner' || !/^[0-9]/.test(newName) ? newName : `'${newName}'`;
  return {
    edits: placesOf(library, identity).map((reference) => {
      const isQuoted = /['"]/.test(library.get(reference.file)!.text.charAt(reference.range.start - 1));
      return { file: reference.file, range: reference.range, text: isQuoted ? newName : text };
    }),
  };
}

function problemOfName(library: Library, identity: Identity, newName: string): string | undefined {
  if (identity.role === 'owner') {
    if (!/^[^\s:#'"{}[\],&*!|>%@`-][^:#'"{}[\],\n]*$/.test(newName) || newName !== newName.trim())
      return `\`${newName}\` would need quotes as a key; choose plain words.`;
  } else if (identity.role === 'layer') {
    if (!LAYER.test(newName))
      return `A layer's name begins with a letter or digit and goes on with letters, digits, \`_\`, \`.\` and \`-\`; \`${newName}\` does not.`;
  } else if (!NAME.test(newName)) {
    return `A name begins with a small letter and goes on with small letters, digits and \`-\`, and is not \`true\`, \`yes\` or the like; \`${newName}\` is not one.`;
  }
  // Elements and limits share one name space.
  const rivals = identity.role === 'element' || identity.role === 'limit' ? ['element', 'limit'] : [identity.role];
  const taken = occurrencesIn(library, identity.file).some(
    ({ declares, identity: other }) =>
      declares &&
      rivals.includes(other.role) &&
      other.within === identity.within &&
      other.name === newName &&
      newName !== identity.name,
  );
  return taken ? `\`${newName}\` is the name of another one already; choose a different name.` : undefined;
}

/** Paths in `use` and `touchstone` that follow files or folders which are about to be renamed. Pairs of old and new path. */
export function fileRenameEdits(
  library: Library,
  renames: readonly { readonly from: FilePath; readonly to: FilePath }[],
): readonly TextEdit[] {
  const moved = (file: FilePath): FilePath => {
    for (const { from, to } of renames) {
      if (file === from) return to;
      if (file.startsWith(`${from}/`)) return to + file.slice(from.length);
    }
    return file;
  };
  const edits: TextEdit[] = [];
  for (const file of library.keys()) {
    for (const occurrence of occurrencesIn(library, file)) {
      const { identity } = occurrence;
      if (!FILE_ROLES.has(identity.role) || identity.file === '') continue;
      const wanted = relativePath(moved(file), moved(identity.file));
      const range = rangeOfOccurrence(library, occurrence);
      if (!range || joinPath(moved(file), identity.name).file === moved(identity.file)) continue;
      edits.push({ file, range, text: wanted });
    }
  }
  return edits;
}

/** The way from one file to another, as it is written in the first. */
export function relativePath(from: FilePath, to: FilePath): string {
  const start = from.split('/').slice(0, -1);
  const end = to.split('/');
  let common = 0;
  while (common < start.length && common < end.length - 1 && start[common] === end[common]) common++;
  return [...start.slice(common).map(() => '..'), ...end.slice(common)].join('/');
}
