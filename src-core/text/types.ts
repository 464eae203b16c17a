/** A path from the folder that is open (its root), with `/`, without leading `/` or `..`: `lanes/rx0.channel.yaml`. The host maps it to disk or URI. */
export type FilePath = string;
export type FileKind = 'channel' | 'parts' | 'config' | 'touchstone' | 'other';

/** Half-open, UTF-16 offsets into a text. */
export interface TextRange {
  readonly start: number;
  readonly end: number;
}

/** Keys and list indices from the document's root: `['path', 3, 'length']`. */
export type ValuePath = readonly (string | number)[];

/**
 * Where something stands, without a range: the range is looked up last, in the newest text (`rangeOf`).
 * `on: 'key'` is the pair's key, `'value'` (the default) its value, `'entry'` key and value.
 */
export interface Place {
  readonly file: FilePath;
  readonly path: ValuePath;
  readonly on?: 'key' | 'value' | 'entry';
}

/** What a file holds as far as the host could read it. `refused`: outside the root, a device, a link that leads out: unread. */
export type FileContent =
  | { readonly kind: 'text'; readonly text: string }
  | { readonly kind: 'missing' }
  | { readonly kind: 'refused'; readonly reason: string }
  | { readonly kind: 'too-large'; readonly bytes: number; readonly limit: number };

/** Reads files below one root. Node, browser worker and tests each give their own. */
export interface Files {
  read(file: FilePath): Promise<FileContent>;
}

/** A change of text in terms of places; turned into ranges by `resolveEdits` against the newest text. */
export type PlaceEdit =
  /** Sets or adds `key: text` in the mapping at `at`, flow or block; `after` names the key it is put behind, `first` puts it before all. */
  | {
      readonly op: 'set';
      readonly at: Place;
      readonly key: string;
      readonly text: string;
      readonly after?: string;
      readonly first?: boolean;
    }
  /** Moves the pair at `at` before all others of its mapping. */
  | { readonly op: 'first'; readonly at: Place }
  /** Replaces the value at `at`. */
  | { readonly op: 'value'; readonly at: Place; readonly text: string }
  /** Renames the key of the pair at `at`. */
  | { readonly op: 'key'; readonly at: Place; readonly name: string }
  /** Removes the pair or the list entry at `at`, its line and all. */
  | { readonly op: 'remove'; readonly at: Place }
  /** Adds an entry to the list under `at` (made if it is not there); `lines` are the entry's lines without indentation or dash: `['rule: eye', 'at: main']`. `index`: before which entry; default last. */
  | { readonly op: 'append'; readonly at: Place; readonly lines: readonly string[]; readonly index?: number }
  /** Moves nothing else: plain replacement; only in findings about the text itself, which are always fresh. */
  | { readonly op: 'range'; readonly file: FilePath; readonly range: TextRange; readonly text: string };

export interface TextEdit {
  readonly file: FilePath;
  readonly range: TextRange;
  readonly text: string;
}
