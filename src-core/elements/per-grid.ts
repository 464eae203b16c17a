/**
 * What depends on a list of frequencies and little else (logarithms, a foil's surface) is worked out once a list and shared by
 * all elements on it. Held by the list itself, so that it goes when the grid does; the result must not be changed.
 */
const tables = new WeakMap<Float64Array, Map<string, Float64Array>>();

/** More than any channel's foils and materials; a hundred edits of one do not pile up. */
const MOST = 48;

export function perGrid(frequencies: Float64Array, key: string, compute: () => Float64Array): Float64Array {
  let table = tables.get(frequencies);
  if (!table) tables.set(frequencies, (table = new Map()));
  const found = table.get(key) ?? compute();
  table.delete(key); // and last again: what was not asked for the longest goes first
  if (table.size >= MOST) table.delete(table.keys().next().value as string);
  table.set(key, found);
  return found;
}
