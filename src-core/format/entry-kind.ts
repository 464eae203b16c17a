import type { EntryListName, SchemaName } from '../../schemas/format/types';
import { entryLists } from '../../schemas/generated/format';
import { nearest } from '../quantity/nearest';
import type { FormatFix, FormatProblem } from './problem';
import { isMapping, kindOfValue, listed, quote } from './say';

export type EntryKind =
  | { readonly kind: string; readonly schema: SchemaName; readonly problem?: undefined }
  | { readonly problem: FormatProblem; readonly kind?: undefined; readonly schema?: undefined };

/** The schema of a list's kind: `schemaOfKind('parts', 'via')` is `part-via`; undefined if there is no such kind. */
export function schemaOfKind(list: EntryListName, kind: string): SchemaName | undefined {
  const { kinds, prefix } = entryLists[list];
  return kinds.includes(kind) ? (`${prefix}${kind}` as SchemaName) : undefined;
}

/**
 * Which kind an entry is. In `path`, `limits` and stackups its first key says so, in `parts` its key `kind`.
 * No kind, two kinds, an unknown kind or a half-typed word give one problem, with a fix where one can be named.
 */
export function entryKind(list: EntryListName, entry: unknown): EntryKind {
  const { choice, kinds, noun } = entryLists[list];
  if (!isMapping(entry)) return { problem: notAMapping(list, entry) };
  if (choice === 'only') return found(list, kinds[0]);
  if (choice === 'kind') return kindByKey(list, entry);
  const keys = Object.keys(entry);
  const named = keys.filter((key) => kinds.includes(key));
  if (named.length === 1) return named[0] === keys[0] ? found(list, named[0]) : secondPlace(list, keys, named[0]);
  if (named.length > 1) return twoKinds(list, named);
  const first = keys.find((key) => !key.startsWith('x-')) ?? keys[0];
  if (first === undefined)
    return {
      problem: problemAt([], 'entry', `This entry is empty; ${noun} begins with its kind: ${listed(kinds, 'or')}.`),
    };
  const near = keys.map((key) => [key, nearest(key, kinds)] as const).find(([, kind]) => kind !== undefined);
  if (near) return { problem: unknownKind(near[0], near[1]!, noun) };
  const others = kinds.map(
    (kind): FormatFix => ({
      title: `Begin with \`${kind}\``,
      edits: [{ op: 'set', path: [], key: kind, text: freeName(kind) }],
    }),
  );
  const message =
    entry[first] === null || typeof entry[first] === 'string'
      ? `${quote(first)} is no kind of ${noun.replace(/^an? /, '')}; an entry begins with ${listed(kinds, 'or')}.`
      : `This entry does not say what it is: its first key is its kind, ${listed(kinds, 'or')}.`;
  return { problem: problemAt([first], 'key', message, others) };
}

const found = (list: EntryListName, kind: string): EntryKind => ({ kind, schema: schemaOfKind(list, kind)! });

const problemAt = (
  path: (string | number)[],
  on: FormatProblem['on'],
  message: string,
  fixes: FormatFix[] = [],
): FormatProblem => ({ rule: 'schema', path, on, message, fixes });

/** `- trace`, `- tr`, `-` */
function notAMapping(list: EntryListName, entry: unknown): FormatProblem {
  const { kinds, noun, choice } = entryLists[list];
  if (choice === 'kind')
    return problemAt(
      [],
      'value',
      `${noun} is a mapping with \`kind\` and the keys of that kind; this is ${kindOfValue(entry)}.`.replace(
        /^./,
        (c) => c.toUpperCase(),
      ),
    );
  if (choice === 'only')
    return problemAt(
      [],
      'value',
      `${noun} is a mapping; this is ${kindOfValue(entry)}.`.replace(/^./, (c) => c.toUpperCase()),
    );
  const word = typeof entry === 'string' ? entry.trim() : '';
  const meant = word === '' ? [] : kinds.filter((kind) => kind.startsWith(word.toLowerCase()));
  const near = meant.length > 0 ? meant : [nearest(word, kinds)].filter((kind) => kind !== undefined);
  const fixes = (near.length > 0 ? near : kinds).map(
    (kind): FormatFix => ({
      title: `Write \`${kind}: ${freeName(kind)}\``,
      edits: [{ op: 'value', path: [], text: `${kind}: ${freeName(kind)}` }],
      ...(near.length === 1 && { preferred: true }),
    }),
  );
  const what = word === '' ? `This entry is ${kindOfValue(entry)}` : `${quote(word)} is not ${noun} yet`;
  return problemAt(
    [],
    'value',
    `${what}: write its kind and its own name, as \`${near[0] ?? kinds[0]}: ${freeName(near[0] ?? kinds[0])}\`.`,
    fixes,
  );
}

function kindByKey(list: EntryListName, entry: Record<string, unknown>): EntryKind {
  const { kinds, noun } = entryLists[list];
  const { kind } = entry;
  if (typeof kind === 'string' && kinds.includes(kind)) return found(list, kind);
  if (kind === undefined || kind === null) {
    const first = Object.keys(entry).find((key) => kinds.includes(key));
    const fixes = (first ? [first] : kinds).map(
      (name): FormatFix => ({
        title: `Set \`kind: ${name}\``,
        edits: [{ op: 'set', path: [], key: 'kind', text: name }],
      }),
    );
    return {
      problem: problemAt(
        [],
        'entry',
        `${noun[0].toUpperCase()}${noun.slice(1)} says its \`kind\`: ${listed(kinds, 'or')}.`,
        fixes,
      ),
    };
  }
  const near = typeof kind === 'string' ? nearest(kind, kinds) : undefined;
  const fixes: FormatFix[] = near
    ? [{ title: `Change to \`${near}\``, edits: [{ op: 'value', path: ['kind'], text: near }], preferred: true }]
    : [];
  const hint = near ? `did you mean \`${near}\`?` : `there are ${listed(kinds)}.`;
  return { problem: problemAt(['kind'], 'value', `${kindOfValue(kind)} is no kind of part; ${hint}`, fixes) };
}

function unknownKind(key: string, kind: string, noun: string): FormatProblem {
  const fix: FormatFix = {
    title: `Change to \`${kind}\``,
    edits: [{ op: 'key', path: [key], name: kind }],
    preferred: true,
  };
  return problemAt(
    [key],
    'key',
    `${quote(key)} is no kind of ${noun.replace(/^an? /, '')}; did you mean \`${kind}\`?`,
    [fix],
  );
}

function twoKinds(list: EntryListName, named: string[]): EntryKind {
  const fixes = named.map(
    (kept): FormatFix => ({
      title: `Keep \`${kept}\``,
      edits: named.filter((kind) => kind !== kept).map((kind) => ({ op: 'remove', path: [kind] })),
    }),
  );
  const second = named[1];
  const noun = entryLists[list].noun;
  return {
    problem: problemAt(
      [second],
      'key',
      `This entry names ${named.length} kinds, ${listed(named.map((kind) => `\`${kind}\``))}; ${noun} has one. Is a dash missing before \`${second}\`?`,
      fixes,
    ),
  };
}

/** The kind stands behind another key: read all the same, where that key is no reason to doubt it. */
function secondPlace(list: EntryListName, _keys: string[], kind: string): EntryKind {
  return found(list, kind);
}

/** A name for a new thing of a kind, not among `taken`: `trace-1`. */
export function freeName(kind: string, taken: ReadonlySet<string> = new Set()): string {
  for (let n = 1; ; n++) if (!taken.has(`${kind}-${n}`)) return `${kind}-${n}`;
}

/** Not names: what YAML 1.1 readers take for something else. */
const reservedWords = new Set(['true', 'false', 'null', 'yes', 'no', 'on', 'off']);

/** What is wrong with a name of our own, and the nearest right one; undefined if it is right. */
export function nameProblem(name: string): { message: string; suggestion: string } | undefined {
  if (/^[a-z][a-z0-9-]*$/.test(name) && !reservedWords.has(name)) return undefined;
  const suggestion = correctedName(name);
  const message = reservedWords.has(name)
    ? `${quote(name)} cannot be a name: YAML readers take it for a value. Write for example \`${suggestion}\`.`
    : `${quote(name)} cannot be a name: a name is lower-case letters, digits and dashes, beginning with a letter, as \`${suggestion}\`.`;
  return { message, suggestion };
}

function correctedName(name: string): string {
  const plain = name
    .slice(0, 60)
    .normalize('NFD')
    .replace(/[\u0300-\u036f]/g, '')
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, '-')
    .replace(/^[-0-9]+/, '')
    .replace(/-+$/, '');
  if (plain === '') return 'name';
  return reservedWords.has(plain) ? `${plain}-1` : plain;
}
