import type { Analysis } from '../analysis';
import type { ParsedFile } from '../text/parsed';
import type { FilePath, TextEdit, TextRange } from '../text/types';
import { completeKeys } from './complete-keys';
import { completePaths } from './complete-paths';
import { completeValues } from './complete-values';
import { type Cursor, cursorAt } from './cursor';
import type { Library } from './occurrences';

/** One thing that may be written at the cursor. */
export interface Completion {
  readonly label: string;
  readonly kind: 'key' | 'element' | 'name' | 'unit' | 'value' | 'file' | 'folder';
  /** Beside the label, short. */
  readonly detail?: string;
  /** In place of `range`; with `$1`, `${2:…}` and `$0` where `isSnippet`. Lines have their full indentation. */
  readonly insert: string;
  readonly isSnippet: boolean;
  readonly range: TextRange;
  /** What is typed is compared with this. */
  readonly filter: string;
  /** Order among the others. */
  readonly rank: number;
  readonly preselect?: boolean;
  /** More is to be completed behind it: a folder's entries. */
  readonly retrigger?: boolean;
  /** Elsewhere in the file: the `use` entry that a name needs. */
  readonly also?: readonly TextEdit[];
  /** For the explanation: a key's place and the kind of its entry. */
  readonly about?: { readonly path: readonly (string | number)[]; readonly kind?: string };
}

/** What completion may look at beside the text. */
export interface Surroundings {
  /** Entries of a folder below the root; none if it is not there. */
  readonly list: (folder: FilePath) => Promise<readonly { readonly name: string; readonly kind: 'file' | 'folder' }[]>;
  /** Parts files below the root, also those that this file does not use. */
  readonly library?: () => Promise<Library>;
}

/**
 * What may be written at an offset of a text that need not parse.
 * @param analysis of this text or of one before: names come from it
 */
export async function completionsAt(
  parsed: ParsedFile,
  analysis: Analysis | undefined,
  offset: number,
  around: Surroundings,
): Promise<readonly Completion[]> {
  const cursor = cursorAt(parsed.text, offset);
  if (!cursor || !['channel', 'parts', 'config'].includes(parsed.kind)) return [];
  const found =
    cursor.on === 'value'
      ? await valuesAt(parsed, analysis, cursor, around)
      : [...completeKeys(parsed, analysis, cursor), ...(await listValues(parsed, analysis, cursor, around))];
  return found.map((one) => (cursor.needsSpace ? { ...one, insert: ` ${one.insert}`, filter: `${one.filter}` } : one));
}

async function valuesAt(
  parsed: ParsedFile,
  analysis: Analysis | undefined,
  cursor: Cursor,
  around: Surroundings,
): Promise<readonly Completion[]> {
  const paths = await completePaths(parsed, cursor, around);
  return paths ?? completeValues(parsed, analysis, cursor, around);
}

/** A plain value of a block list: `includes:` with one name a line. */
async function listValues(
  parsed: ParsedFile,
  analysis: Analysis | undefined,
  cursor: Cursor,
  around: Surroundings,
): Promise<readonly Completion[]> {
  return cursor.on === 'item' && cursor.path.length > 2 ? completeValues(parsed, analysis, cursor, around) : [];
}
