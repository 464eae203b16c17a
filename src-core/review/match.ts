import { asList, isMapping, type RawMapping } from '../raw';
import { sameValue } from '../same-value';

/** An entry of `path`, `limits`, `waivers` or a stackup as far as it tells which one it is. */
export interface Entry {
  readonly kind: string;
  readonly name?: string;
  /** All but its name. */
  readonly rest: unknown;
}

/** The first of an entry's keys is its kind, and what stands there its name: `via: dive`. */
export function entryOf(value: unknown, kinds?: readonly string[]): Entry {
  if (!isMapping(value)) return { kind: '', rest: value };
  const keys = Object.keys(value);
  const kind = (kinds && keys.find((key) => kinds.includes(key))) ?? keys[0] ?? '';
  const { [kind]: name, ...rest } = value;
  return { kind, ...(typeof name === 'string' && { name }), rest };
}

/** A waiver is known by its rule and the place that it accepts. */
export function waiverEntry(value: unknown): Entry {
  if (!isMapping(value)) return { kind: 'waiver', rest: value };
  const { rule, at, ...rest } = value;
  return { kind: 'waiver', name: `${String(rule)} at ${String(at)}`, rest };
}

/**
 * Which entry of base each entry of head was: by name where that is unique, then by kind and values, the nearest position first,
 * then by kind between the same neighbours.
 * @returns for each entry of head the index in base, or undefined for a new one
 */
export function matchEntries(base: readonly Entry[], head: readonly Entry[]): (number | undefined)[] {
  const found: (number | undefined)[] = head.map(() => undefined);
  const free = new Set(base.keys());
  const take = (headIndex: number, baseIndex: number) => {
    found[headIndex] = baseIndex;
    free.delete(baseIndex);
  };
  const single = (entries: readonly Entry[], name: string) =>
    entries.filter((entry) => entry.name === name).length === 1;
  head.forEach(({ name }, i) => {
    if (name === undefined || !single(head, name) || !single(base, name)) return;
    take(
      i,
      base.findIndex((entry) => entry.name === name),
    );
  });
  const nearest = (i: number, fits: (entry: Entry, index: number) => boolean) =>
    [...free].filter((b) => fits(base[b], b)).sort((a, b) => Math.abs(a - i) - Math.abs(b - i))[0];
  head.forEach(({ kind, rest }, i) => {
    if (found[i] !== undefined) return;
    const at = nearest(i, (entry) => entry.kind === kind && sameValue(entry.rest, rest));
    if (at !== undefined) take(i, at);
  });
  const before = (i: number) => (i === 0 ? -1 : found[i - 1]);
  const after = (i: number) => (i === head.length - 1 ? base.length : found[i + 1]);
  head.forEach(({ kind }, i) => {
    if (found[i] !== undefined) return;
    const at = nearest(i, (entry, b) => entry.kind === kind && before(i) === b - 1 && after(i) === b + 1);
    if (at !== undefined) take(i, at);
  });
  return found;
}

/** Positions in head of the matched entries whose order is not base's: all but a longest run that kept it. */
export function movedEntries(found: readonly (number | undefined)[]): ReadonlySet<number> {
  const matched = found.flatMap((b, h) => (b === undefined ? [] : [{ b, h }]));
  const length: number[] = [];
  const from: number[] = [];
  let best = -1;
  matched.forEach(({ b }, i) => {
    length[i] = 1;
    from[i] = -1;
    for (let j = 0; j < i; j++) {
      if (matched[j].b >= b || length[j] + 1 <= length[i]) continue;
      length[i] = length[j] + 1;
      from[i] = j;
    }
    if (best < 0 || length[i] > length[best]) best = i;
  });
  const kept = new Set<number>();
  for (let i = best; i >= 0; i = from[i]) kept.add(matched[i].h);
  return new Set(matched.map(({ h }) => h).filter((h) => !kept.has(h)));
}

const renamed = (name: unknown, names: ReadonlyMap<string, string>) =>
  typeof name === 'string' ? (names.get(name) ?? name) : name;

/** Base with elements and limits under the names that head gives them, wherever a name is written. */
export function withNames(
  value: RawMapping,
  elements: ReadonlyMap<string, string>,
  limits: ReadonlyMap<string, string>,
): RawMapping {
  if (elements.size === 0 && limits.size === 0) return value;
  const names = new Map([...elements, ...limits]);
  const list = (key: string, change: (entry: RawMapping) => RawMapping) =>
    Array.isArray(value[key])
      ? { [key]: asList(value[key]).map((entry) => (isMapping(entry) ? change(entry) : entry)) }
      : {};
  const own = (entry: RawMapping, of: ReadonlyMap<string, string>) => {
    const { kind, name } = entryOf(entry);
    return name !== undefined && of.has(name) ? { ...entry, [kind]: of.get(name) } : entry;
  };
  const inList = (entry: RawMapping, key: string) =>
    Array.isArray(entry[key]) ? { ...entry, [key]: entry[key].map((name) => renamed(name, elements)) } : entry;
  return {
    ...value,
    ...list('path', (entry) => inList(own(entry, elements), 'includes')),
    ...list('limits', (entry) => inList(own(entry, limits), 'between')),
    ...list('waivers', (entry) => ({ ...entry, at: renamed(entry.at, names) })),
  };
}
