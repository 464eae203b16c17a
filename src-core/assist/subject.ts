import { entryLists } from '../../schemas/generated/format';
import { type KeyInfo, keySchemaAt, likelyKinds } from '../format/index';
import type { ParsedFile } from '../text/parsed';
import type { TextRange, ValuePath } from '../text/types';
import { type Cursor, cursorAt, type Level } from './cursor';

/** What stands under the cursor. */
export interface Subject {
  /** The key's path from the document's root; of a list's value, with its index. */
  readonly path: ValuePath;
  readonly on: 'key' | 'value';
  /** The token: what a hover marks. */
  readonly range: TextRange;
  readonly text: string;
  /** The description of the key whose name or value this is. */
  readonly key?: KeyInfo;
  /** The kind of the entry on the way: `trace`, `eye`, `copper`. */
  readonly kind?: string;
}

export const LISTS: Readonly<Record<string, 'elements' | 'limits'>> = { path: 'elements', limits: 'limits' };

/** Which kind the entry is that the cursor stands in, read from the keys around it. */
export function kindOfEntry(levels: readonly Level[]): string | undefined {
  const kinds = [...entryLists.elements.kinds, ...entryLists.limits.kinds, ...entryLists['stackup-rows'].kinds];
  for (const { path, keys } of levels) {
    if (path[0] === 'parts' && path.length === 2) return keys.get('kind');
    if (path[0] === 'waivers' && path.length === 2) return 'waiver';
    const isEntry = typeof path.at(-1) === 'number' && (path.length === 2 || path[0] === 'stackups');
    const kind = isEntry ? kinds.find((name) => keys.has(name)) : undefined;
    if (kind) return kind;
    // misspelt or left out: the rest of the entry keeps its keys
    const list = isEntry ? LISTS[String(path[0])] : undefined;
    const likely = list && likelyKinds(list, [...keys.keys()]).kinds[0];
    if (likely) return likely;
  }
  return undefined;
}

export function subjectAt(parsed: ParsedFile, offset: number): Subject | undefined {
  const { text } = parsed;
  const cursor = cursorAt(text, offset);
  if (!cursor) return undefined;
  const onKey = cursor.on !== 'value' && cursor.hasColon;
  if (cursor.on !== 'value' && !onKey) return undefined;
  const token = onKey ? cursor.token : valueToken(text, cursor, offset);
  const written = text.slice(token.start, token.end);
  if (written === '' || offset < token.start || offset > token.end) return undefined;
  const path = onKey ? [...cursor.path, written] : cursor.path;
  const levels = withOwnKey(cursor, path, onKey);
  const kind = kindOfEntry(levels);
  const key =
    keySchemaAt(parsed.kind, path, kind) ??
    (typeof path.at(-1) === 'number' ? keySchemaAt(parsed.kind, path.slice(0, -1), kind) : undefined);
  return {
    path,
    on: onKey ? 'key' : 'value',
    range: token,
    text: written,
    ...(key && { key }),
    ...(kind !== undefined && { kind }),
  };
}

/** The cursor left out the pair it stands in; the kind may be that very pair. */
function withOwnKey({ levels }: Cursor, path: ValuePath, onKey: boolean): readonly Level[] {
  const name = path.findLast((step) => typeof step === 'string');
  if (name === undefined) return levels;
  const depth = path.lastIndexOf(name);
  const holder = path.slice(0, depth);
  void onKey;
  return levels.map((level) =>
    level.path.length === holder.length
      ? { path: level.path, keys: new Map([...level.keys, [String(name), level.keys.get(String(name)) ?? '']]) }
      : level,
  );
}

/** The value with quotes and neighbours cut off: in a flow list one item, in a block all of the line. */
function valueToken(text: string, { token }: Cursor, offset: number): TextRange {
  let { start, end } = token;
  while (end > start && /\s/.test(text[end - 1])) end--;
  const quote = text[start];
  if ((quote === '"' || quote === "'") && text[end - 1] === quote && end - start >= 2) {
    start++;
    end--;
  }
  return offset > end ? { start, end: Math.max(end, start) } : { start, end };
}
