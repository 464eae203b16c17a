import type { ElementKindName, EntryListName } from '../../schemas/format/types';
import { entryLists } from '../../schemas/generated/format';
import type { Analysis } from '../analysis';
import { freeName, type KeyInfo, keysAt, likelyKinds, missingKeys } from '../format/index';
import { rules } from '../rules/list';
import type { ParsedFile } from '../text/parsed';
import type { Completion } from './completions';
import type { Cursor } from './cursor';
import { likelyLayer } from './likely';
import { kindOfEntry, LISTS } from './subject';

/** Keys that are not written yet; in a list the kinds of its entries, with what each needs. */
export function completeKeys(
  parsed: ParsedFile,
  analysis: Analysis | undefined,
  cursor: Cursor,
): readonly Completion[] {
  const list = listAt(parsed, cursor);
  if (list !== undefined) return kindSnippets(parsed, analysis, cursor, list);
  const kind = kindOfEntry(cursor.levels);
  const present = cursor.levels.at(-1)?.keys;
  if (parsed.kind === 'config' && cursor.path.length === 1 && cursor.path[0] === 'rules')
    return ruleNames(cursor, present);
  const isPart = cursor.path[0] === 'parts' && cursor.path.length === 2;
  if (isPart && kind === undefined) return [keyCompletion({ key: 'kind', choices: entryLists.parts.kinds }, cursor, 0)];
  const isElement =
    cursor.path[0] === 'path' &&
    cursor.path.length === 2 &&
    kind !== undefined &&
    entryLists.elements.kinds.includes(kind);
  const wanted = isElement
    ? new Set(
        missingKeys(
          kind as ElementKindName,
          Object.fromEntries(present ?? []),
          analysis?.model.signalling === 'single-ended',
        ).flatMap(({ anyOf }) => anyOf),
      )
    : new Set();
  const keys = keysAt(parsed.kind, cursor.path, kind)
    .filter(({ key }) => !present?.has(key))
    .map((info, index) =>
      keyCompletion(info, cursor, info.required || wanted.has(info.key) ? index : index + 100, kind),
    );
  const kinds = missingKinds(cursor);
  return [...kinds, ...keys.filter(({ label }) => !kinds.some((one) => one.label === label))];
}

/** In an entry of `path` or `limits` that does not say what it is: the kinds that know its keys. */
function missingKinds(cursor: Cursor): readonly Completion[] {
  const { path, levels } = cursor;
  const list = path.length === 2 ? LISTS[String(path[0])] : undefined;
  const present = [...(levels.at(-1)?.keys.keys() ?? [])];
  if (!list || present.some((key) => entryLists[list].kinds.includes(key))) return [];
  const { kinds, misspelt } = likelyKinds(list, present);
  return misspelt ? [] : kinds.map((kind, index) => keyCompletion({ key: kind }, cursor, index - kinds.length, kind));
}

/** The list whose entry begins here, if it is one of kinds. */
function listAt(parsed: ParsedFile, { path, on, levels, hasColon }: Cursor): EntryListName | undefined {
  if (hasColon) return undefined;
  const isEntry = on === 'item' && typeof path.at(-1) === 'number';
  const isFirstKey = on === 'key' && typeof path.at(-1) === 'number' && (levels.at(-1)?.keys.size ?? 0) === 0;
  const isBelowKey = on === 'key' && typeof path.at(-1) === 'string';
  const listPath = isEntry || isFirstKey ? path.slice(0, -1) : isBelowKey ? path : undefined;
  if (!listPath) return undefined;
  if (parsed.kind === 'channel' && listPath.length === 1) {
    return ({ path: 'elements', limits: 'limits', waivers: 'waivers' } as const)[String(listPath[0])];
  }
  return parsed.kind === 'parts' && listPath.length === 2 && listPath[0] === 'stackups' ? 'stackup-rows' : undefined;
}

function keyCompletion(
  info: Pick<KeyInfo, 'key'> & Partial<KeyInfo>,
  cursor: Cursor,
  rank: number,
  kind?: string,
): Completion {
  const { key } = info;
  const path = [...cursor.path, key];
  const detail = info.description?.split(/(?<=\.)\s/)[0];
  const { text, isSnippet } = cursor.hasColon ? { text: key, isSnippet: false } : valueTemplate(info, cursor);
  return {
    label: key,
    kind: 'key',
    ...(detail && { detail }),
    insert: text,
    isSnippet,
    range: cursor.token,
    filter: key,
    rank,
    retrigger: !cursor.hasColon && (info.refers !== undefined || (info.choices?.length ?? 0) > 0),
    about: { path, ...(kind !== undefined && { kind }) },
  };
}

/** The key with the place where its value goes: a mapping at the top opens a line, deeper ones and lists their brackets. */
function valueTemplate(
  { key, type }: Pick<KeyInfo, 'key'> & Partial<KeyInfo>,
  cursor: Cursor,
): { text: string; isSnippet: boolean } {
  const indent = ' '.repeat(cursor.column + 2);
  const isTop = cursor.path.length === 0;
  if (isTop && (key === 'path' || key === 'limits' || key === 'waivers'))
    return { text: `${key}:\n${indent}- $0`, isSnippet: true };
  if (isTop && type === 'mapping') return { text: `${key}:\n${indent}$0`, isSnippet: true };
  if (type === 'mapping') return { text: `${key}: { $0 }`, isSnippet: true };
  if (type === 'list') return { text: `${key}: [$0]`, isSnippet: true };
  return { text: `${key}: `, isSnippet: false };
}

function kindSnippets(
  parsed: ParsedFile,
  analysis: Analysis | undefined,
  cursor: Cursor,
  list: EntryListName,
): readonly Completion[] {
  const { kinds, choice } = entryLists[list];
  return kinds.map((kind, index): Completion => {
    const needed = neededKeys(parsed, analysis, cursor, list, kind);
    const lines =
      choice === 'only'
        ? needed
        : [[kind, list === 'stackup-rows' && kind === 'mask' ? 'top' : nameFor(analysis, kind)] as const, ...needed];
    const isBelowKey = cursor.on === 'key' && typeof cursor.path.at(-1) === 'string';
    return {
      label: kind,
      kind: 'element',
      detail: needed.length > 0 ? `with ${needed.map(([key]) => key).join(', ')}` : 'an entry',
      insert: (isBelowKey ? '- ' : '') + snippet(lines, cursor, isBelowKey, list === 'stackup-rows'),
      isSnippet: true,
      range: cursor.token,
      filter: kind,
      rank: index,
      about: { path: [...cursor.path.filter((step) => typeof step === 'string'), 0, kind], kind },
    };
  });
}

const escaped = (text: string) => text.replace(/[\\$}]/g, '\\$&');

function snippet(
  lines: readonly (readonly [key: string, value: string])[],
  cursor: Cursor,
  isBelowKey: boolean,
  isRow: boolean,
): string {
  const pairs = lines.map(([key, value], index) => `${key}: \${${index + 1}:${escaped(value)}}`);
  if (cursor.flow) return pairs.join(', ');
  if (isRow) return `{ ${pairs.join(', ')} }`;
  return pairs.join(`\n${' '.repeat(cursor.column + (isBelowKey ? 2 : 0))}`);
}

function nameFor(analysis: Analysis | undefined, kind: string): string {
  const taken = new Set([
    ...(analysis?.model.elements.map(({ name }) => name) ?? []),
    ...(analysis?.model.limits.map(({ name }) => name) ?? []),
  ]);
  return freeName(kind === 'copper' ? 'L' : kind, taken);
}

/** What an entry of a kind cannot do without, each with an example or the one name that fits. */
function neededKeys(
  parsed: ParsedFile,
  analysis: Analysis | undefined,
  cursor: Cursor,
  list: EntryListName,
  kind: string,
): readonly (readonly [string, string])[] {
  const pathOfEntry = [...(typeof cursor.path.at(-1) === 'number' ? cursor.path.slice(0, -1) : cursor.path), 0];
  const infos = keysAt(parsed.kind, pathOfEntry, list === 'waivers' ? 'waiver' : kind);
  const info = (key: string) => infos.find((one) => one.key === key);
  const required =
    list === 'elements'
      ? missingOf(analysis, kind as ElementKindName)
      : list === 'limits'
        ? ({ 'insertion-loss': ['max'], 'return-loss': ['band', 'min'], eye: ['height', 'width'] }[kind] ?? [])
        : infos.filter((one) => one.required && one.key !== kind).map(({ key }) => key);
  return required.map(
    (key) =>
      [
        key,
        likelyValue(analysis, cursor, key) ??
          info(key)?.examples[0]?.replace(/\s*±.*$/, '') ??
          (info(key)?.choices[0] || '…'),
      ] as const,
  );
}

function missingOf(analysis: Analysis | undefined, kind: ElementKindName): string[] {
  const singleEnded = analysis?.model.signalling === 'single-ended';
  const stackups = analysis?.model.names.stackups.length ?? 0;
  // Without a stackup at hand a trace is a plan: impedance, delay and loss.
  const given =
    kind === 'trace' && stackups > 0 ? ['length', 'width', ...(singleEnded ? [] : ['gap']), 'stackup', 'layer'] : [];
  if (given.length > 0) return ['stackup', 'layer', ...given.filter((key) => key !== 'stackup' && key !== 'layer')];
  return missingKeys(kind, {}, singleEnded)
    .map(({ anyOf }) => (kind === 'trace' && anyOf[0] === 'width' ? 'impedance' : anyOf[0]))
    .concat(kind === 'trace' ? ['delay', 'loss'] : [])
    .filter(
      (key, index, all) => all.indexOf(key) === index && !(kind === 'trace' && (key === 'stackup' || key === 'layer')),
    );
}

function likelyValue(analysis: Analysis | undefined, cursor: Cursor, key: string): string | undefined {
  if (!analysis) return undefined;
  if (key === 'stackup') return analysis.model.names.stackups[0]?.writtenAs[0];
  if (key === 'layer') return likelyLayer(analysis, cursor, undefined, 'layer');
  return undefined;
}

function ruleNames(cursor: Cursor, present: ReadonlyMap<string, string> | undefined): readonly Completion[] {
  return rules
    .filter(({ name }) => !present?.has(name))
    .map((rule, index) => ({
      label: rule.name,
      kind: 'name' as const,
      detail: rule.severity,
      insert: cursor.hasColon ? rule.name : `${rule.name}: `,
      isSnippet: false,
      range: cursor.token,
      filter: rule.name,
      rank: index,
      retrigger: !cursor.hasColon,
    }));
}
