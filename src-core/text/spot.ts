import type { ParsedFile } from './parsed';
import { rootOf } from './range';
import { columnOf, type ListNode, lineEnd, lineStart, type MapNode, type SyntaxNode } from './syntax';
import type { Place, TextRange, ValuePath } from './types';

/** What stands at an offset, and what would be written there. */
export interface Spot {
  /** The pair, entry or value at the offset; on blank ground what `holder` names. */
  readonly place: Place;
  readonly on: 'key' | 'value' | 'entry' | 'blank';
  /** Of the key or value; empty on blank ground. */
  readonly range: TextRange;
  /** What stands from the start of that range to the offset: the word that is half typed. */
  readonly typed: string;
  /** The mapping or list that a new key or entry written here would join. */
  readonly holder: ValuePath;
  readonly holderType: 'map' | 'list' | 'value';
  /** Keys that the holding mapping has. */
  readonly keys: readonly string[];
  readonly flow: boolean;
  /** Column at which that key or entry would begin. */
  readonly column: number;
}

interface Level {
  readonly node: MapNode | ListNode;
  readonly path: ValuePath;
  readonly column: number;
  /** Path and value of its last child that begins before the offset. */
  readonly last?: { readonly path: ValuePath; readonly value: SyntaxNode };
}

/** Where an offset stands in the tree; on blank lines by the column, as the next line typed would be read. */
export function placeAt(parsed: ParsedFile, offset: number): Spot {
  const at = Math.max(0, Math.min(offset, parsed.text.length));
  return within(parsed, rootOf(parsed), [], at, undefined) ?? blank(parsed, at);
}

function within(
  parsed: ParsedFile,
  node: SyntaxNode,
  path: ValuePath,
  at: number,
  holder: Level | undefined,
): Spot | undefined {
  if (node.type === 'map') {
    const level = levelOf(parsed.text, node, path, at);
    for (const pair of [...node.pairs].reverse()) {
      if (at < pair.range.start || at > Math.max(pair.range.end, pair.keyRange.end)) continue;
      const here = [...path, pair.key];
      if (at <= pair.keyRange.end) return spot(parsed, here, 'key', pair.keyRange, at, level);
      const inside = within(parsed, pair.value, here, at, level);
      if (inside) return inside;
      return at <= pair.value.range.start && onSameLine(parsed.text, pair.keyRange.end, at)
        ? spot(parsed, here, 'value', { start: at, end: at }, at, level)
        : undefined;
    }
    return undefined;
  }
  if (node.type === 'list') {
    const level = levelOf(parsed.text, node, path, at);
    for (let i = node.items.length - 1; i >= 0; i--) {
      const item = node.items[i];
      if (at < item.range.start || at > item.range.end) continue;
      const inside = within(parsed, item.value, [...path, i], at, level);
      if (inside) return inside;
      return at <= item.range.start + 2
        ? spot(parsed, [...path, i], 'entry', { start: at, end: at }, at, level)
        : undefined;
    }
    return undefined;
  }
  if (at < node.range.start || at > node.range.end) return undefined;
  return spot(parsed, path, 'value', node.range, at, holder);
}

const onSameLine = (text: string, from: number, to: number) => lineStart(text, to) <= from;

function levelOf(text: string, node: MapNode | ListNode, path: ValuePath, at: number): Level {
  const children = node.type === 'map' ? node.pairs : node.items;
  const column = node.flow || children.length === 0 ? node.column : columnOf(text, children[0].range.start);
  let index = -1;
  children.forEach((child, i) => {
    if (child.range.start <= at) index = i;
  });
  if (index < 0) return { node, path, column };
  const step = node.type === 'map' ? node.pairs[index].key : index;
  return { node, path, column, last: { path: [...path, step], value: children[index].value } };
}

function spot(
  parsed: ParsedFile,
  path: ValuePath,
  on: Spot['on'],
  range: TextRange,
  at: number,
  level: Level | undefined,
): Spot {
  const node = level?.node;
  return {
    place: { file: parsed.file, path, ...(on !== 'blank' && { on }) },
    on,
    range,
    typed: parsed.text.slice(Math.min(range.start, at), at),
    holder: level?.path ?? [],
    holderType: node?.type ?? 'value',
    keys: node?.type === 'map' ? node.pairs.map(({ key }) => key) : [],
    flow: node?.flow ?? false,
    column: level?.column ?? 0,
  };
}

/** Blank ground: the mapping or list whose column the cursor stands at, or the key above that waits for its value. */
function blank(parsed: ParsedFile, at: number): Spot {
  const { text } = parsed;
  const levels: Level[] = [];
  let node = rootOf(parsed);
  let path: ValuePath = [];
  while (node.type === 'map' || node.type === 'list') {
    const level = levelOf(text, node, path, at);
    levels.push(level);
    if (level.node.flow && at > level.node.range.start && at < level.node.range.end) {
      const open = level.last && within(parsed, level.last.value, level.last.path, at, level);
      return open ?? spot(parsed, path, 'blank', { start: at, end: at }, at, level);
    }
    if (!level.last) break;
    ({ path, value: node } = level.last);
  }
  const range = { start: at, end: at };
  const lineIsBlank = text.slice(lineStart(text, at), lineEnd(text, at)).trim() === '';
  const column = lineIsBlank ? columnOf(text, at) : Number.POSITIVE_INFINITY;
  const blocks = levels.filter((level) => !level.node.flow);
  const deepest = blocks[blocks.length - 1];
  if (!deepest) return spot(parsed, [], 'blank', range, at, undefined);
  const waiting = deepest.last?.value.type === 'scalar' && deepest.last.value.style === 'empty';
  if (waiting && column > deepest.column) {
    const own = deepest.last!.path;
    return {
      ...spot(parsed, own, lineIsBlank ? 'blank' : 'value', range, at, deepest),
      ...(lineIsBlank && { holder: own, holderType: 'value' as const, keys: [], column }),
    };
  }
  const fitting = blocks.filter((level) => level.column <= column);
  const level = fitting[fitting.length - 1] ?? blocks[0];
  return spot(parsed, level.path, 'blank', range, at, level);
}
