/** Whether two plain values hold the same: numbers, texts, lists, mappings. A part that both share, or share twice, is looked at once. */
export function sameValue(a: unknown, b: unknown): boolean {
  return same(a, b, new Map());
}

type Plain = Readonly<Record<string, unknown>>;

function same(a: unknown, b: unknown, found: Map<object, object>): boolean {
  if (Object.is(a, b)) return true;
  if (typeof a !== 'object' || typeof b !== 'object' || a === null || b === null) return false;
  if (found.get(a) === b) return true;
  if (Array.isArray(a) !== Array.isArray(b)) return false;
  if (!(Array.isArray(a) ? sameItems(a, b as unknown[], found) : sameFields(a as Plain, b as Plain, found)))
    return false;
  found.set(a, b);
  return true;
}

function sameItems(a: readonly unknown[], b: readonly unknown[], found: Map<object, object>): boolean {
  return a.length === b.length && a.every((item, i) => same(item, b[i], found));
}

function sameFields(a: Plain, b: Plain, found: Map<object, object>): boolean {
  let left = 0;
  for (const key in b) if (Object.hasOwn(b, key)) left++;
  for (const key in a) {
    if (!Object.hasOwn(a, key)) continue;
    if (!Object.hasOwn(b, key) || !same(a[key], b[key], found)) return false;
    left--;
  }
  return left === 0;
}
