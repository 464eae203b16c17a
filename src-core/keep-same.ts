/**
 * The new value with each part of it that says the same as before replaced by the old one: what did not change stays the same object, so
 * that later comparisons end at once. The old value itself where all of it says the same. Entries of lists that have a `name` are
 * compared with that of the same name, so that an entry put in between leaves the others as they are.
 * Plain values alone: numbers, texts, lists, mappings; none is changed.
 */
export function keepSame<T>(next: T, before: unknown): T {
  return kept(next, before, new Map()) as T;
}

type Plain = Readonly<Record<string, unknown>>;
/** Results by new and old part; a part that many share is looked at once. */
type Seen = Map<object, { readonly before: unknown; readonly result: unknown }>;

function kept(next: unknown, before: unknown, seen: Seen): unknown {
  if (Object.is(next, before)) return before;
  if (typeof next !== 'object' || next === null || typeof before !== 'object' || before === null) return next;
  if (Array.isArray(next) !== Array.isArray(before)) return next;
  const known = seen.get(next);
  if (known?.before === before) return known.result;
  const result = Array.isArray(next)
    ? keptList(next, before as unknown[], seen)
    : keptFields(next as Plain, before as Plain, seen);
  seen.set(next, { before, result });
  return result;
}

function keptList(next: readonly unknown[], before: readonly unknown[], seen: Seen): readonly unknown[] {
  const byName = namesOf(before);
  // Two entries may have one name (a part in two files): the one in the same position is asked first.
  const counterpart = (item: unknown, i: number) =>
    nameOf(item) === nameOf(before[i]) ? before[i] : (byName?.get(nameOf(item)) ?? before[i]);
  const items = next.map((item, i) => kept(item, counterpart(item, i), seen));
  const same = next.length === before.length && items.every((item, i) => Object.is(item, before[i]));
  return same ? before : items;
}

function keptFields(next: Plain, before: Plain, seen: Seen): Plain {
  const keys = Object.keys(next);
  const values: unknown[] = new Array(keys.length);
  let same = true;
  let replaced = false;
  for (let i = 0; i < keys.length; i++) {
    const had = Object.hasOwn(before, keys[i]);
    const value = had ? kept(next[keys[i]], before[keys[i]], seen) : next[keys[i]];
    values[i] = value;
    if (!had || !Object.is(value, before[keys[i]])) same = false;
    if (!Object.is(value, next[keys[i]])) replaced = true;
  }
  if (same && Object.keys(before).length === keys.length) return before;
  return replaced ? withValues(next, keys, values) : next;
}

/** A copy with other values. Defined, not assigned: a key may be `__proto__`. */
function withValues(of: Plain, keys: readonly string[], values: readonly unknown[]): Plain {
  const copy: Record<string, unknown> = Object.create(Object.getPrototypeOf(of));
  keys.forEach((key, i) => {
    Object.defineProperty(copy, key, { value: values[i], enumerable: true, configurable: true, writable: true });
  });
  return copy;
}

const nameOf = (item: unknown): string | undefined => {
  const name = typeof item === 'object' && item !== null ? (item as Plain).name : undefined;
  return typeof name === 'string' ? name : undefined;
};

function namesOf(items: readonly unknown[]): ReadonlyMap<string | undefined, unknown> | undefined {
  if (nameOf(items[0]) === undefined) return undefined;
  return new Map(items.map((item) => [nameOf(item), item]));
}
