import { isMapping, type RawMapping } from '../raw';
import { sameValue } from '../same-value';
import type { FilePath, ValuePath } from '../text/types';
import { type Entry, entryOf, matchEntries, movedEntries, waiverEntry } from './match';
import { subjectAt } from './subject';

/** The smallest difference that one can have or leave: a value, an entry, an entry's position, a name. */
export interface Leaf {
  readonly id: string;
  readonly file: FilePath;
  /** In head; of what was removed in base. */
  readonly path: ValuePath;
  readonly what: 'value' | 'added' | 'removed' | 'moved' | 'renamed' | 'content';
  readonly subject: string;
  readonly attribute: string;
  readonly from?: unknown;
  readonly to?: unknown;
}

/** Whether head's state of this difference is taken. */
export type Decide = (leaf: Leaf) => boolean;

/**
 * A state of a file between two revisions: base where `decide` says no, head where it says yes. With all answers no it says what base
 * says, with all yes what head says. Each difference is asked about once.
 */
export function blend(base: unknown, head: unknown, file: FilePath, decide: Decide): unknown {
  return blendValue(base, head, { file, decide, head: [], base: [], root: { base, head } });
}

interface Spot {
  readonly file: FilePath;
  readonly decide: Decide;
  readonly head: ValuePath;
  readonly base: ValuePath;
  readonly root: { readonly base: unknown; readonly head: unknown };
}

function ask(spot: Spot, what: Leaf['what'], from: unknown, to: unknown): boolean {
  const gone = what === 'removed';
  const path = gone ? spot.base : spot.head;
  const { subject, attribute } = subjectAt(gone ? spot.root.base : spot.root.head, path, what);
  const id = `${spot.file}\n${what}\n${JSON.stringify(path)}`;
  return spot.decide({ id, file: spot.file, path, what, subject, attribute, from, to });
}

function blendValue(base: unknown, head: unknown, spot: Spot): unknown {
  if (sameValue(base, head)) return head;
  if (isMapping(base) && isMapping(head)) return blendMapping(base, head, spot);
  const entries = Array.isArray(base) && Array.isArray(head) ? readerOf(spot.head) : undefined;
  if (entries) return blendList(base as unknown[], head as unknown[], entries, spot);
  return ask(spot, 'value', base, head) ? head : base;
}

/** How entries of the list at a path tell who they are; undefined for a list that is one value. */
function readerOf(path: ValuePath): ((value: unknown) => Entry) | undefined {
  if (path.length === 1 && (path[0] === 'path' || path[0] === 'limits')) return (value) => entryOf(value);
  if (path.length === 1 && path[0] === 'waivers') return waiverEntry;
  if (path.length === 2 && path[0] === 'stackups') return (value) => entryOf(value, ['copper', 'dielectric', 'mask']);
  return undefined;
}

const NAMED = ['materials', 'foils', 'stackups', 'parts', 'owners'];

/** What stands for entries that a side has none of, so that each of them is a difference of its own. */
function emptyLike(key: string, value: unknown): unknown {
  if (Array.isArray(value)) return readerOf([key]) && [];
  return isMapping(value) && NAMED.includes(key) ? {} : undefined;
}

const isEmpty = (value: unknown) => Object.keys(value as object).length === 0;

function blendMapping(base: RawMapping, head: RawMapping, spot: Spot): RawMapping {
  const result: Record<string, unknown> = Object.create(null);
  const under = (headKey: string, baseKey = headKey): Spot => ({
    ...spot,
    head: [...spot.head, headKey],
    base: [...spot.base, baseKey],
  });
  const gone = new Set(Object.keys(base).filter((key) => !Object.hasOwn(head, key)));
  const top = spot.head.length === 0;
  const renames = spot.head.length === 1 && NAMED.includes(String(spot.head[0]));
  for (const [key, to] of Object.entries(head)) {
    const entries = top && !Object.hasOwn(base, key) ? emptyLike(key, to) : undefined;
    if (entries) {
      const value = blendValue(entries, to, under(key));
      if (!isEmpty(value)) result[key] = value;
      continue;
    }
    if (Object.hasOwn(base, key)) {
      result[key] = blendValue(base[key], to, under(key));
      continue;
    }
    const before = renames ? [...gone].find((name) => sameValue(base[name], to)) : undefined;
    if (before !== undefined) {
      gone.delete(before);
      result[ask(under(key, before), 'renamed', before, key) ? key : before] = to;
    } else if (ask(under(key), 'added', undefined, to)) result[key] = to;
  }
  for (const key of gone) {
    const entries = top ? emptyLike(key, base[key]) : undefined;
    const value = entries ? blendValue(base[key], entries, under(key)) : base[key];
    if (entries ? !isEmpty(value) : !ask(under(key), 'removed', value, undefined)) result[key] = value;
  }
  return result;
}

function blendList(base: readonly unknown[], head: readonly unknown[], read: (value: unknown) => Entry, spot: Spot) {
  const found = matchEntries(base.map(read), head.map(read));
  const moved = movedEntries(found);
  const at = (h: number, b: number): Spot => ({ ...spot, head: [...spot.head, h], base: [...spot.base, b] });
  interface Item {
    readonly value: unknown;
    readonly head?: number;
  }
  const late = new Map<number, Item>();
  const fromBase = new Map<number, Item>();
  head.forEach((to, h) => {
    const b = found[h];
    if (b === undefined) {
      if (ask(at(h, h), 'added', undefined, to)) late.set(h, { value: to, head: h });
      return;
    }
    const kindsDiffer = read(base[b]).kind !== read(to).kind;
    const value = kindsDiffer
      ? ask(at(h, b), 'value', base[b], to)
        ? to
        : base[b]
      : blendValue(base[b], to, at(h, b));
    if (moved.has(h) && ask(at(h, b), 'moved', b + 1, h + 1)) late.set(h, { value, head: h });
    else fromBase.set(b, { value, head: h });
  });
  const matched = new Set(found);
  const items: Item[] = base.flatMap((from, b): Item[] => {
    const kept = fromBase.get(b);
    if (kept) return [kept];
    if (matched.has(b)) return [];
    return ask(at(b, b), 'removed', from, undefined) ? [] : [{ value: from }];
  });
  // What is new or moved stands behind the nearest entry before it in head that is there.
  for (const [h, item] of [...late].sort(([a], [b]) => a - b)) {
    let place = 0;
    for (let before = h - 1; before >= 0 && place === 0; before--)
      place = items.findIndex((one) => one.head === before) + 1;
    items.splice(place, 0, item);
  }
  return items.map(({ value }) => value);
}
