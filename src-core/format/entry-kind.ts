import type { EntryListName, SchemaName } from '../../schemas/format/types';
import { entryLists, schemas } from '../../schemas/generated/format';
import { nearest } from '../quantity/nearest';
import { isMapping } from '../raw';
import { freeName } from './free-name';
import type { FormatFix, FormatProblem } from './problem';
import { kindOfValue, listed, quote } from './say';

export type EntryKind =
  | { readonly kind: string; readonly schema: SchemaName; readonly problem?: undefined }
  | { readonly problem: FormatProblem; readonly kind?: undefined; readonly schema?: undefined };

/** The schema of a list's kind: `schemaOfKind('parts', 'via')` is `part-via`; undefined if there is no such kind. */
export function schemaOfKind(list: EntryListName, kind: string): SchemaName | undefined {
  const { kinds, prefix } = entryLists[list];
  return kinds.includes(kind) ? (`${prefix}${kind}` as SchemaName) : undefined;
}

/**
 * Which kind an entry is. In `path`, `limits` and stackups the key says so that is a kind's name, in `parts` the key `kind`.
 * @returns the kind and its schema; or one problem, with a fix, where it is a half-typed word, has no kind, two, or an unknown one
 */
export function entryKind(list: EntryListName, entry: unknown): EntryKind {
  const { choice, kinds } = entryLists[list];
  if (!isMapping(entry)) return { problem: notAMapping(list, entry) };
  if (choice === 'only') return found(list, kinds[0]);
  if (choice === 'kind') return kindByKey(list, entry);
  const keys = Object.keys(entry);
  const named = keys.filter((key) => kinds.includes(key));
  if (named.length === 1) return found(list, named[0]);
  return { problem: named.length > 1 ? twoKinds(list, named) : noKind(list, keys) };
}

/**
 * A kind that is not its entry's first key. A reader looks for it there, and so do differences of two texts.
 * @param written the entry's keys in the order of the text, without what a merge brings in
 */
export function kindProblems(list: EntryListName, kind: string, written: readonly string[]): FormatProblem[] {
  const [first] = written.filter((key) => key !== '<<' && !key.startsWith('x-'));
  if (entryLists[list].choice !== 'first-key' || first === kind || !written.includes(kind)) return [];
  const fix: FormatFix = {
    title: `Move \`${kind}\` before ${quote(first)}`,
    edits: [{ op: 'first', path: [kind] }],
    preferred: true,
    safe: true,
  };
  const message = `\`${kind}\` says what this entry is and stands first in it, before ${quote(first)}.`;
  return [say([kind], 'key', message, [fix])];
}

const found = (list: EntryListName, kind: string): EntryKind => ({ kind, schema: schemaOfKind(list, kind)! });

const say = (
  path: (string | number)[],
  on: FormatProblem['on'],
  message: string,
  fixes: FormatFix[] = [],
): FormatProblem => ({
  rule: 'schema',
  path,
  on,
  message,
  fixes,
});

const capital = (text: string) => `${text.charAt(0).toUpperCase()}${text.slice(1)}`;
const bare = (noun: string) => noun.replace(/^an? /, '');
const inBackquotes = (names: readonly string[]) => names.map((name) => `\`${name}\``);

/** `- tr`, `- trace`, `-` */
function notAMapping(list: EntryListName, entry: unknown): FormatProblem {
  const { kinds, noun, choice } = entryLists[list];
  if (choice !== 'first-key') {
    const keys =
      choice === 'kind' ? ' with `kind` and the keys of that kind' : ' with `rule`, `at`, `until`, `by` and `reason`';
    return say([], 'value', `${capital(noun)} is a mapping${keys}; this is ${kindOfValue(entry)}.`);
  }
  const word = typeof entry === 'string' ? entry.trim() : '';
  const begun = word === '' ? [] : kinds.filter((kind) => kind.startsWith(word.toLowerCase()));
  const near = begun.length > 0 ? begun : [nearest(word, kinds)].filter((kind) => kind !== undefined);
  const offered = near.length > 0 ? near : kinds;
  const fixes = offered.map((kind): FormatFix => {
    const text = `${kind}: ${freeName(kind)}`;
    return {
      title: `Write \`${text}\``,
      edits: [{ op: 'value', path: [], text }],
      ...(near.length === 1 && { preferred: true }),
    };
  });
  const what = word === '' ? `This entry is ${kindOfValue(entry)}` : `${quote(word)} is not ${noun} yet`;
  return say(
    [],
    'value',
    `${what}: write its kind and its own name, as \`${offered[0]}: ${freeName(offered[0])}\`.`,
    fixes,
  );
}

function kindByKey(list: EntryListName, entry: Record<string, unknown>): EntryKind {
  const { kinds, noun } = entryLists[list];
  const { kind } = entry;
  if (typeof kind === 'string' && kinds.includes(kind)) return found(list, kind);
  if (kind === undefined || kind === null) {
    const fixes = kindsWith(list, Object.keys(entry)).map(
      (name): FormatFix => ({
        title: `Add \`kind: ${name}\``,
        edits: [{ op: 'set', path: [], key: 'kind', text: name, first: true }],
      }),
    );
    return {
      problem: say([], 'entry', `${capital(noun)} says its \`kind\`: ${listed(inBackquotes(kinds), 'or')}.`, fixes),
    };
  }
  const near = typeof kind === 'string' ? nearest(kind, kinds) : undefined;
  const fixes: FormatFix[] = near
    ? [{ title: `Change to \`${near}\``, edits: [{ op: 'value', path: ['kind'], text: near }], preferred: true }]
    : [];
  const hint = near ? `did you mean \`${near}\`?` : `there are ${listed(inBackquotes(kinds))}.`;
  return {
    problem: say(['kind'], 'value', `${capital(kindOfValue(kind))} is no kind of ${bare(noun)}; ${hint}`, fixes),
  };
}

/** The kinds that know every one of these keys that any kind knows. */
function kindsWith(list: EntryListName, keys: readonly string[]): string[] {
  const { kinds, prefix } = entryLists[list];
  const knows = (kind: string, key: string) =>
    Object.hasOwn(schemas[`${prefix}${kind}` as SchemaName].properties ?? {}, key);
  const known = keys.filter((key) => kinds.some((kind) => knows(kind, key)));
  return kinds.filter((kind) => known.every((key) => knows(kind, key)));
}

/**
 * What an entry of `path` or `limits` without a readable kind may become: the kind that is misspelt, else those that know its keys.
 * @returns none while nothing tells, `misspelt` where a key is nearly a kind's name
 */
export function likelyKinds(
  list: 'elements' | 'limits',
  keys: readonly string[],
): { readonly kinds: readonly string[]; readonly misspelt: boolean } {
  const { kinds, prefix } = entryLists[list];
  const isKey = (key: string) =>
    kinds.some((kind) => Object.hasOwn(schemas[`${prefix}${kind}` as SchemaName].properties ?? {}, key));
  for (const key of keys.filter((one) => !isKey(one)).slice(0, 20)) {
    const near = nearest(key, kinds);
    if (near !== undefined) return { kinds: [near], misspelt: true };
  }
  const fitting = kindsWith(list, keys);
  return { kinds: fitting.length < kinds.length ? fitting : [], misspelt: false };
}

/** No key is a kind: the first is one misspelt or unknown, or the kind was left out. */
function noKind(list: EntryListName, keys: readonly string[]): FormatProblem {
  const { kinds, noun, prefix } = entryLists[list];
  const first = keys.find((key) => !key.startsWith('x-'));
  const choice = listed(inBackquotes(kinds), 'or');
  if (first === undefined) return say([], 'entry', `This entry is empty: ${noun} begins with its kind, ${choice}.`);
  const near = nearest(first, kinds);
  const attributes = kinds.flatMap((kind) => Object.keys(schemas[`${prefix}${kind}` as SchemaName].properties ?? {}));
  const isAttribute = attributes.includes(first) || (!near && nearest(first, attributes) !== undefined);
  if (isAttribute) {
    const fitting = kindsWith(list, keys);
    const example = fitting[0] ?? kinds[0];
    const fixes = fitting.map(
      (kind): FormatFix => ({
        title: `Add \`${kind}: ${freeName(kind)}\``,
        edits: [{ op: 'set', path: [], key: kind, text: freeName(kind), first: true }],
      }),
    );
    return say(
      [],
      'entry',
      `This entry does not say what it is: ${noun} begins with its kind and own name, as \`${example}: ${freeName(example)}\`.`,
      fixes,
    );
  }
  const offered = near ? [near] : kindsWith(list, keys);
  const fixes = offered.map(
    (kind): FormatFix => ({
      title: `Change to \`${kind}\``,
      edits: [{ op: 'key', path: [first], name: kind }],
      ...(near && { preferred: true }),
    }),
  );
  const hint = near ? `did you mean \`${near}\`?` : `an entry begins with ${choice}.`;
  return say([first], 'key', `${quote(first)} is no kind of ${bare(noun)}; ${hint}`, fixes);
}

function twoKinds(list: EntryListName, named: string[]): FormatProblem {
  const fixes = named.map(
    (kept): FormatFix => ({
      title: `Keep \`${kept}\``,
      edits: named.filter((kind) => kind !== kept).map((kind) => ({ op: 'remove', path: [kind] })),
    }),
  );
  const message = `This entry names ${listed(inBackquotes(named))}; ${entryLists[list].noun} is of one kind. Is a dash missing before \`${named[1]}\`?`;
  return say([named[1]], 'key', message, fixes);
}
