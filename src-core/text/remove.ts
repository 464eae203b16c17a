import type { ParsedFile } from './parsed';
import { find, rootOf } from './range';
import { removalRange } from './removal';
import type { SyntaxNode } from './syntax';
import type { TextEdit, ValuePath } from './types';

/**
 * Removes a pair or entry, lines and all. Where nothing would be left of a block, what holds it goes too: a key without a value
 * would be a fault.
 * @param removed all that the same edit removes, to know what is left
 */
export function removeEdit(
  { file, text, ...rest }: ParsedFile,
  path: ValuePath,
  removed: readonly ValuePath[],
): TextEdit | undefined {
  const root = rootOf({ file, text, ...rest });
  let target = path;
  while (target.length > 1) {
    const parent = find(root, target.slice(0, -1)).node;
    if (!isBlock(parent) || childrenLeft(parent, target.slice(0, -1), [...removed, target]) > 0) break;
    target = target.slice(0, -1);
  }
  const { pair, item, parent } = find(root, target);
  const range = pair?.range ?? item?.range;
  if (!range || !parent) return undefined;
  if (pair && parent.type === 'map' && !parent.flow && parent.pairs[0] === pair && parent.pairs.length > 1) {
    // The first pair may stand behind a dash: the next one takes its place.
    const next = parent.pairs[1].range.start;
    const behindDash = text.slice(text.lastIndexOf('\n', range.start - 1) + 1, range.start).includes('-');
    if (behindDash) return { file, range: { start: range.start, end: next }, text: '' };
  }
  return { file, range: removalRange(text, range, !isBlock(parent)), text: '' };
}

const isBlock = (node: SyntaxNode) => (node.type === 'map' || node.type === 'list') && !node.flow;

function childrenLeft(parent: SyntaxNode, path: ValuePath, removed: readonly ValuePath[]): number {
  const gone = (step: string | number) =>
    removed.some(
      (one) => one.length === path.length + 1 && one[path.length] === step && path.every((s, i) => s === one[i]),
    );
  if (parent.type === 'list') return parent.items.filter((_, i) => !gone(i)).length;
  return parent.type === 'map' ? parent.pairs.filter(({ key }) => !gone(key)).length : 0;
}
