import type { ParsedFile } from './parsed';
import { type ItemNode, lineEnd, type PairNode, type Syntax, type SyntaxNode } from './syntax';
import type { Place, TextRange, ValuePath } from './types';
import { mergeSources } from './values';

export const rootOf = (parsed: ParsedFile): SyntaxNode => (parsed.syntax as Syntax).root;

export interface Found {
  /** The node at the end of the steps that exist. */
  readonly node: SyntaxNode;
  /** The pair or entry whose value it is; undefined for the root. */
  readonly pair?: PairNode;
  readonly item?: ItemNode;
  readonly parent?: SyntaxNode;
  /** How many steps of the path exist. */
  readonly depth: number;
}

/** Follows a path through the tree, aliases and merge keys included, as far as it exists. */
export function find(root: SyntaxNode, path: ValuePath): Found {
  let found: Found = { node: root, depth: 0 };
  for (const step of path) {
    const parent = found.node.type === 'alias' ? found.node.target : found.node;
    if (!parent) break;
    const next = stepInto(parent, step);
    if (!next) break;
    found = { ...next, parent, depth: found.depth + 1 };
  }
  return found;
}

function stepInto(parent: SyntaxNode, step: string | number): Pick<Found, 'node' | 'pair' | 'item'> | undefined {
  if (parent.type === 'list') {
    const item = typeof step === 'number' ? parent.items[step] : undefined;
    return item && { node: item.value, item };
  }
  if (parent.type !== 'map') return undefined;
  const pair = pairIn(parent, String(step));
  return pair && { node: pair.value, pair };
}

function pairIn(map: SyntaxNode & { type: 'map' }, key: string): PairNode | undefined {
  const own = map.pairs.find((pair) => pair.key === key);
  if (own) return own;
  for (const merge of map.pairs) {
    if (merge.key !== '<<') continue;
    for (const source of mergeSources(merge.value)) {
      const pair = pairIn(source, key);
      if (pair) return pair;
    }
  }
  return undefined;
}

/**
 * Where a place stands in this text; always inside it. A value that is not written gives its key, a path that does not
 * exist what comes nearest. A block of lines gives its first line (its key's, if it has one), since a mark under twenty
 * lines hides what is meant; `on: 'entry'` gives them all.
 */
export function rangeOf(parsed: ParsedFile, place: Place): TextRange {
  const found = find(rootOf(parsed), place.path);
  const range = found.depth < place.path.length ? headRange(found, parsed.text) : rangeOn(found, place, parsed.text);
  return clamp(range, parsed.text.length);
}

function rangeOn(found: Found, { on = 'value' }: Place, text: string): TextRange {
  const { node, pair, item } = found;
  if (on === 'key' && pair) return pair.keyRange;
  if (on === 'entry') return trimmed(pair?.range ?? item?.range ?? node.range, text);
  if (isBlock(node) || node.range.end === node.range.start) return headRange(found, text);
  return trimmed(node.range, text);
}

const isBlock = (node: SyntaxNode) => (node.type === 'map' || node.type === 'list') && !node.flow;

/** The short range that stands for the whole: key of a pair, first pair of a mapping, first line of the rest. */
function headRange({ node, pair, item }: Found, text: string): TextRange {
  if (pair) return pair.keyRange;
  if (node.type === 'map' && node.pairs.length > 0) {
    const [first] = node.pairs;
    const end = isBlock(first.value) ? first.keyRange.end : first.range.end;
    return firstLine({ start: first.range.start, end: Math.max(first.keyRange.end, end) }, text);
  }
  const range = item?.range ?? node.range;
  return range.end > range.start
    ? firstLine(range, text)
    : { start: range.start, end: Math.min(text.length, range.start + 1) };
}

const firstLine = ({ start, end }: TextRange, text: string): TextRange => ({
  start,
  end: Math.max(start, Math.min(end, lineEnd(text, start))),
});

function trimmed({ start, end }: TextRange, text: string): TextRange {
  let last = end;
  while (last > start && /\s/.test(text[last - 1])) last--;
  return { start, end: last };
}

const clamp = ({ start, end }: TextRange, length: number): TextRange => {
  const first = Math.max(0, Math.min(start, length));
  return { start: first, end: Math.max(first, Math.min(end, length)) };
};
