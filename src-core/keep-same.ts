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
  const items = next.map((item, i) => kept(item, byName.get(nameOf(item)) ?? before[i], seen));
  const same = next.length === before.length && items.every((item, i) => Object.is(item, before[i]));
  return same ? before : items;
}

function keptFields(next: Plain, before: Plain, seen: Seen): Plain {
  const result: Record<string, unknown> = Object.create(Object.getPrototypeOf(next));
  let same = true;
  for (const key of Object.keys(next)) {
    // Defined, not assigned: a key may be `__proto__`.
    const value = kept(next[key], Object.hasOwn(before, key) ? before[key] : undefined, seen);
    Object.defineProperty(result, key, { value, enumerable: true, configurable: true, writable: true });
    if (!Object.hasOwn(before, key) || !Object.is(value, before[key])) same = false;
  }
  return same && Object.keys(before).length === Object.keys(next).length ? before : result;
}

const nameOf = (item: unknown): string | undefined => {
  const name = typeof item === 'object' && item !== null ? (item as Plain).name : undefined;
  return typeof name === 'string' ? name : undefined;
};

function namesOf(items: readonly unknown[]): ReadonlyMap<string | undefined, unknown> {
  const names = new Map<string | undefined, unknown>();
  for (const item of items) {
    const name = nameOf(item);
    if (name !== undefined) names.set(name, item);
  }
  return names;
}
