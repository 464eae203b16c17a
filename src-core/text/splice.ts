import type { ItemNode, PairNode, SyntaxNode } from './syntax';
import type { TextRange } from './types';

export type Child = PairNode | ItemNode;

/** A mapping or list in block style, and which of its entries is meant. */
export interface Step {
  readonly node: SyntaxNode;
  readonly index: number;
}

/** Entries of a mapping or list that has one on each line; none of others. */
export function childrenOf(node: SyntaxNode): readonly Child[] {
  if (node.type === 'map') return node.flow ? [] : node.pairs;
  if (node.type === 'list') return node.flow ? [] : node.items;
  return [];
}

/**
 * The tree with another entry at the end of the steps; what follows it is moved.
 * @param oldNode the entry that stood there, alone in its mapping or list, as `newNode` is
 * @returns undefined where a range around it does not end with the entry though nothing follows
 */
export function withEntry(
  steps: readonly Step[],
  oldNode: SyntaxNode,
  newNode: SyntaxNode,
  delta: number,
): SyntaxNode | undefined {
  let child: Child = childrenOf(newNode)[0];
  for (let depth = steps.length - 1; depth >= 0; depth--) {
    const { node, index } = steps[depth];
    const children = childrenOf(node);
    const isLast = index === children.length - 1;
    if (isLast && node.range.end !== oldNode.range.end) return undefined;
    const range = { start: node.range.start, end: isLast ? newNode.range.end : node.range.end + delta };
    const changed = children.map((each, i) => (i < index ? each : i === index ? child : movedChild(each, delta)));
    const parent = {
      ...node,
      range,
      ...(node.type === 'list' ? { items: changed } : { pairs: changed }),
    } as SyntaxNode;
    if (depth === 0) return parent;
    const above = childrenOf(steps[depth - 1].node)[steps[depth - 1].index];
    const end = 'keyRange' in above ? Math.max(above.keyRange.end, range.end) : range.end;
    child = { ...above, value: parent, range: { start: above.range.start, end } };
  }
  return undefined;
}

const movedRange = ({ start, end }: TextRange, by: number): TextRange => ({ start: start + by, end: end + by });

function movedChild(child: Child, by: number): Child {
  if (by === 0) return child;
  const range = movedRange(child.range, by);
  const value = moved(child.value, by);
  if (!('keyRange' in child)) return { value, range };
  const { key, bare } = child;
  return { key, keyRange: movedRange(child.keyRange, by), value, range, ...(bare && { bare }) };
}

/** Written out by kinds: a copy by `...` costs several times as much, and this runs over a whole text at each key stroke. */
function moved(node: SyntaxNode, by: number): SyntaxNode {
  const range = movedRange(node.range, by);
  if (node.anchor !== undefined || node.type === 'alias') return { ...node, range }; // never in a text that is read on
  if (node.type === 'scalar') return { type: 'scalar', value: node.value, style: node.style, range };
  const { flow, column } = node;
  if (node.type === 'list') {
    const items = node.items.map((item) => movedChild(item, by) as ItemNode);
    return { type: 'list', flow, column, items, range };
  }
  const pairs = node.pairs.map((pair) => movedChild(pair, by) as PairNode);
  return { type: 'map', flow, column, pairs, range };
}
