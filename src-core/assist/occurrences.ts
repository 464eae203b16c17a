import type { NameRole } from '../../schemas/format/types';
import { entryLists } from '../../schemas/generated/format';
import { joinPath } from '../inputs';
import { asList, isMapping } from '../raw';
import type { ParsedFile } from '../text/parsed';
import type { FilePath, Place, ValuePath } from '../text/types';

/** What a name stands for, wherever it is written: one key for declaration and uses. */
export interface Identity {
  readonly role: NameRole;
  /** The file that declares it, or would. */
  readonly file: FilePath;
  /** A layer's stackup. */
  readonly within?: string;
  readonly name: string;
}

/** One place where a name is written; `part` says which piece of `prefix.name` it is. */
export interface Occurrence {
  readonly identity: Identity;
  readonly place: Place;
  readonly declares: boolean;
  readonly part: 'whole' | 'prefix' | 'name';
}

/** Files at hand, parsed: all that the search may find. */
export type Library = ReadonlyMap<FilePath, ParsedFile>;

/** Keys of an element or part that refer to a name. */
const REFERRING_KEYS: Readonly<Record<string, NameRole>> = {
  part: 'part',
  stackup: 'stackup',
  layer: 'layer',
  from: 'layer',
  to: 'layer',
  span: 'layer',
  owner: 'owner',
  includes: 'element',
};

export const sameIdentity = (a: Identity, b: Identity) =>
  a.role === b.role && a.file === b.file && a.within === b.within && a.name === b.name;

/** The `use` entries of a file: prefix to file. */
export function usesOf(parsed: ParsedFile): ReadonlyMap<string, FilePath> {
  const uses = new Map<string, FilePath>();
  const written = isMapping(parsed.value) ? parsed.value.use : undefined;
  if (!isMapping(written)) return uses;
  for (const [prefix, path] of Object.entries(written)) {
    const file = typeof path === 'string' ? joinPath(parsed.file, path).file : undefined;
    if (file !== undefined) uses.set(prefix, file);
  }
  return uses;
}

const SECTIONS = { part: 'parts', stackup: 'stackups', material: 'materials', foil: 'foils' } as const;
type SharedRole = keyof typeof SECTIONS;
const isShared = (role: NameRole): role is SharedRole => role in SECTIONS;

/** The value that a shared name is declared with in this very file. */
export function sharedValue(parsed: ParsedFile | undefined, role: SharedRole, name: string): unknown {
  const section = parsed && isMapping(parsed.value) ? parsed.value[SECTIONS[role]] : undefined;
  return isMapping(section) && Object.hasOwn(section, name) ? section[name] : undefined;
}

/**
 * The identity of a shared name as written in `file`: own file first, then by prefix, then in the one used file that has it.
 * A name that nobody declares belongs to the file that its prefix names, else to the file itself.
 */
export function resolveShared(library: Library, file: FilePath, role: SharedRole, written: string): Identity {
  const parsed = library.get(file);
  const dot = written.indexOf('.');
  const uses = parsed ? usesOf(parsed) : new Map<string, FilePath>();
  if (dot >= 0) return { role, file: uses.get(written.slice(0, dot)) ?? file, name: written.slice(dot + 1) };
  if (sharedValue(parsed, role, written) !== undefined) return { role, file, name: written };
  const holders = [...new Set(uses.values())].filter(
    (used) => sharedValue(library.get(used), role, written) !== undefined,
  );
  return { role, file: holders.length === 1 ? holders[0] : file, name: written };
}

/** Every name written in one file, declared or used, in the order of the text. */
export function occurrencesIn(library: Library, file: FilePath): readonly Occurrence[] {
  const parsed = library.get(file);
  if (!parsed || !isMapping(parsed.value)) return [];
  const found: Occurrence[] = [];
  const value = parsed.value;
  const own = (role: NameRole, name: string): Identity => ({ role, file, name });
  const add = (
    identity: Identity,
    path: ValuePath,
    options: { declares?: boolean; on?: Place['on']; part?: Occurrence['part'] } = {},
  ) =>
    found.push({
      identity,
      place: { file, path, on: options.on ?? 'value' },
      declares: options.declares ?? false,
      part: options.part ?? 'whole',
    });

  const shared = (role: SharedRole, written: unknown, path: ValuePath) => {
    if (typeof written !== 'string' || written === '') return undefined;
    const identity = resolveShared(library, file, role, written);
    const dot = written.indexOf('.');
    if (dot >= 0) add(own('use', written.slice(0, dot)), path, { part: 'prefix' });
    add(identity, path, { part: dot >= 0 ? 'name' : 'whole' });
    return identity;
  };
  const refer = (role: NameRole, written: unknown, path: ValuePath, layersOf: Identity | undefined): void => {
    if (Array.isArray(written)) {
      written.forEach((one, index) => void refer(role, one, [...path, index], layersOf));
    } else if (typeof written === 'string') {
      if (isShared(role)) shared(role, written, path);
      else if (role === 'layer')
        layersOf && add({ role, file: layersOf.file, within: layersOf.name, name: written }, path);
      else add(own(role, written), path);
    }
  };
  /** The stackup whose layers an element or part names: its own, else its part's, where that is written. */
  const stackupOf = (keys: Record<string, unknown>): Identity | undefined => {
    if (typeof keys.stackup === 'string') return resolveShared(library, file, 'stackup', keys.stackup);
    if (typeof keys.part === 'string') {
      const part = resolveShared(library, file, 'part', keys.part);
      const partValue = sharedValue(library.get(part.file), 'part', part.name);
      if (isMapping(partValue) && typeof partValue.stackup === 'string')
        return resolveShared(library, part.file, 'stackup', partValue.stackup);
    }
    const all = isMapping(value.stackups)
      ? Object.keys(value.stackups).map((name) => ({ role: 'stackup' as const, file, name }))
      : [];
    for (const used of new Set(usesOf(parsed).values())) {
      const stackups = library.get(used)?.value;
      if (isMapping(stackups) && isMapping(stackups.stackups))
        all.push(...Object.keys(stackups.stackups).map((name) => ({ role: 'stackup' as const, file: used, name })));
    }
    return all.length === 1 ? all[0] : undefined;
  };
  const element = (keys: Record<string, unknown>, path: ValuePath) => {
    const layersOf = stackupOf(keys);
    for (const [key, written] of Object.entries(keys)) {
      const role = Object.hasOwn(REFERRING_KEYS, key) ? REFERRING_KEYS[key] : undefined;
      if (role) refer(role, written, [...path, key], layersOf);
      else if (key === 'touchstone' && typeof written === 'string') {
        add({ role: 'touchstone', file: joinPath(file, written).file ?? '', name: written }, [...path, key]);
      }
    }
  };
  const keysDeclare = (role: NameRole, section: string) => {
    const names = value[section];
    if (!isMapping(names)) return [];
    for (const name of Object.keys(names)) add(own(role, name), [section, name], { declares: true, on: 'key' });
    return Object.entries(names);
  };

  for (const [prefix, path] of keysDeclare('use', 'use')) {
    if (typeof path === 'string')
      add({ role: 'file', file: joinPath(file, path).file ?? '', name: path }, ['use', prefix]);
  }
  keysDeclare('owner', 'owners');
  keysDeclare('material', 'materials');
  keysDeclare('foil', 'foils');
  for (const [name, rows] of keysDeclare('stackup', 'stackups')) {
    if (!Array.isArray(rows)) continue;
    rows.forEach((row, index) => {
      if (!isMapping(row)) return;
      const path = ['stackups', name, index];
      for (const kind of entryLists['stackup-rows'].kinds) {
        if (kind !== 'mask' && typeof row[kind] === 'string')
          add({ role: 'layer', file, within: name, name: row[kind] }, [...path, kind], { declares: true });
      }
      shared('material', row.material, [...path, 'material']);
      shared('foil', row.foil, [...path, 'foil']);
    });
  }
  for (const [name, keys] of keysDeclare('part', 'parts')) if (isMapping(keys)) element(keys, ['parts', name]);

  asList(value.path).forEach((entry, index) => {
    if (!isMapping(entry)) return;
    const kind = entryLists.elements.kinds.find((name) => Object.hasOwn(entry, name));
    if (kind && typeof entry[kind] === 'string')
      add(own('element', entry[kind]), ['path', index, kind], { declares: true });
    element(entry, ['path', index]);
  });
  const limitNames = new Set<string>();
  asList(value.limits).forEach((entry, index) => {
    if (!isMapping(entry)) return;
    const kind = Object.keys(entry)[0];
    if (kind !== undefined && typeof entry[kind] === 'string') {
      limitNames.add(entry[kind]);
      add(own('limit', entry[kind]), ['limits', index, kind], { declares: true });
    }
    refer('element', entry.between, ['limits', index, 'between'], undefined);
  });
  asList(value.waivers).forEach((entry, index) => {
    if (!isMapping(entry)) return;
    if (typeof entry.rule === 'string') add({ role: 'rule', file: '', name: entry.rule }, ['waivers', index, 'rule']);
    if (typeof entry.at === 'string')
      add(own(limitNames.has(entry.at) ? 'limit' : 'element', entry.at), ['waivers', index, 'at']);
  });
  if (parsed.kind === 'config' && isMapping(value.rules)) {
    for (const rule of Object.keys(value.rules))
      add({ role: 'rule', file: '', name: rule }, ['rules', rule], { on: 'key' });
  }
  return found;
}
