import { isMapping } from '../raw';
import type { ValuePath } from '../text/types';
import type { Leaf } from './blend';
import { entryOf } from './match';

export interface Subject {
  readonly subject: string;
  readonly attribute: string;
}

const GROUPS: Readonly<Record<string, string>> = {
  materials: 'material',
  foils: 'foil',
  parts: 'part',
  owners: 'owner',
};
const WHOLE: Readonly<Record<Leaf['what'], string>> = {
  value: 'kind',
  added: 'added',
  removed: 'removed',
  moved: 'position',
  renamed: 'name',
  content: 'content',
};

const valueAt = (root: unknown, path: ValuePath) =>
  path.reduce<unknown>((value, step) => (value as Record<string | number, unknown> | undefined)?.[step], root);

/** What a value of a channel or parts file is about, in the words of its reader. */
export function subjectAt(root: unknown, path: ValuePath, what: Leaf['what']): Subject {
  const [top, second, ...rest] = path;
  const named = (subject: string, keys: ValuePath): Subject => ({
    subject,
    attribute: keys.length > 0 ? keys.map(String).join('.') : WHOLE[what],
  });
  if (second === undefined) return { subject: 'channel', attribute: String(top) };
  if (top === 'path' || top === 'limits') {
    const { kind, name } = entryOf(valueAt(root, path.slice(0, 2)));
    return named(name ?? `${kind} ${Number(second) + 1}`, rest);
  }
  if (top === 'waivers') {
    const waiver = valueAt(root, path.slice(0, 2));
    return named(isMapping(waiver) ? `waiver of ${String(waiver.rule)} at ${String(waiver.at)}` : 'waiver', rest);
  }
  if (top === 'stackups') {
    const [row, ...keys] = rest;
    if (row === undefined) return named(`stackup ${String(second)}`, []);
    const { kind, name } = entryOf(valueAt(root, path.slice(0, 3)), ['copper', 'dielectric', 'mask']);
    const layer = kind === 'mask' ? `${name ?? ''} mask` : (name ?? String(Number(row) + 1));
    return named(`stackup ${String(second)}`, [layer, ...(keys.length ? keys : [WHOLE[what]])]);
  }
  if (typeof top === 'string' && Object.hasOwn(GROUPS, top)) return named(`${GROUPS[top]} ${String(second)}`, rest);
  return named(String(top), [second, ...rest]);
}

/** A value of a file on one line, as one would write it. */
export function written(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(written).join(', ')}]`;
  if (!isMapping(value)) return String(value);
  return Object.entries(value)
    .map(([key, inner]) => `${key}: ${isMapping(inner) ? `{ ${written(inner)} }` : written(inner)}`)
    .join(', ');
}
