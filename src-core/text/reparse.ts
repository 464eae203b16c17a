import { sameValue } from '../same-value';
import { compose } from './compose';
import type { ParsedFile } from './parsed';
import { type Child, childrenOf, type Step, withEntry } from './splice';
import { lineStart, type Syntax, type SyntaxNode } from './syntax';
import { mendTraps } from './traps';
import { buildValue } from './values';

/**
 * Reads a text that differs from one read before in a single entry: only that entry is parsed, what stands before it is kept
 * as it is and what follows moves. Values of other entries stay the same objects.
 * @param before a text that was read without a fault
 * @returns what a full parse gives; undefined where this cannot tell, and the whole has to be read
 */
export function reparse(before: ParsedFile, text: string): ParsedFile | undefined {
  const syntax = before.syntax as Syntax | undefined;
  if (!syntax?.clean) return undefined;
  const change = changeBetween(before.text, text);
  const units = unitsAround(syntax.root, before.text, change);
  for (let i = units.length - 1; i >= 0; i--) {
    const read = readUnit(units[i], before, text, change);
    if (!read) continue;
    const root = withEntry(units[i].steps, read.oldNode, read.newNode, change.delta);
    if (!root) continue;
    const value = withValue(before.value, units[i].steps, read.value);
    return { ...before, text, value, syntax: { root, lineEnd: lineEndOf(text), clean: true } satisfies Syntax };
  }
  return undefined;
}

export const lineEndOf = (text: string) => (text.includes('\r\n') ? '\r\n' : '\n');

interface Change {
  readonly start: number;
  readonly oldEnd: number;
  readonly delta: number;
}

function changeBetween(before: string, after: string): Change {
  const shorter = Math.min(before.length, after.length);
  let start = 0;
  while (start < shorter && before.charCodeAt(start) === after.charCodeAt(start)) start++;
  let same = 0;
  while (
    same < shorter - start &&
    before.charCodeAt(before.length - 1 - same) === after.charCodeAt(after.length - 1 - same)
  )
    same++;
  return { start, oldEnd: before.length - same, delta: after.length - before.length };
}

/** An entry of block mappings and lists that the change lies in: whole lines of the old text. */
interface Unit {
  readonly from: number;
  readonly end: number;
  readonly column: number;
  /** From the root to the entry. */
  readonly steps: readonly Step[];
}

/** From the outermost to the innermost. */
function unitsAround(root: SyntaxNode, text: string, { start, oldEnd }: Change): Unit[] {
  const units: Unit[] = [];
  const steps: Step[] = [];
  let node = root;
  let end = text.length;
  for (;;) {
    const children = childrenOf(node);
    const index = children.findLastIndex(({ range }) => range.start <= start);
    if (index === -1 || (children[index] as { key?: string }).key === '<<') return units;
    const { range, value }: Child = children[index];
    const next = children[index + 1];
    if (next) end = lineStart(text, next.range.start);
    if (oldEnd > end) return units;
    steps.push({ node, index });
    const from = lineStart(text, range.start);
    const column = range.start - from;
    if (isSpaces(text, from, range.start)) units.push({ from, end, column, steps: [...steps] });
    node = value;
  }
}

function isSpaces(text: string, from: number, end: number): boolean {
  for (let at = from; at < end; at++) if (text[at] !== ' ') return false;
  return true;
}

/**
 * The entry parsed alone, as it was and as it is. That the old lines alone give the old tree shows that nothing around them
 * had a say; the new ones begin at the same column and stand to the right of it, so that nothing around them has one either.
 */
function readUnit({ from, end, column, steps }: Unit, before: ParsedFile, text: string, { delta }: Change) {
  const newEnd = end + delta;
  if (end < before.text.length && text[newEnd - 1] !== '\n') return undefined;
  const piece = text.slice(from, newEnd);
  if (!standsAlone(piece, column)) return undefined;
  const { node: parent, index } = steps[steps.length - 1];
  const oldNode = readAlone(before.text.slice(from, end), from, parent);
  if (!oldNode || !sameValue(childrenOf(oldNode)[0], childrenOf(parent)[index])) return undefined;
  const newNode = readAlone(piece, from, parent);
  if (!newNode) return undefined;
  const [oldChild, newChild] = [childrenOf(oldNode)[0], childrenOf(newNode)[0]];
  if ('key' in oldChild && 'key' in newChild && oldChild.key !== newChild.key) return undefined;
  if (mendTraps(newNode, text, before.file).reports.length > 0) return undefined;
  const { value, reports } = buildValue(newNode, before.file, text);
  if (reports.length > 0) return undefined;
  const inside = Array.isArray(value) ? value[0] : Object.values(value as object)[0];
  return { oldNode, newNode, value: inside as unknown };
}

/** Levels of nesting left for what is around a piece. */
const outerLevels = 40;

/** A mapping or list of one entry of the same kind as the one it was cut from. */
function readAlone(piece: string, from: number, like: SyntaxNode): SyntaxNode | undefined {
  const { node, errors, tooDeep } = compose(piece, from, outerLevels);
  if (errors.length > 0 || tooDeep !== undefined) return undefined;
  const alike = node.type === like.type && 'column' in node && 'column' in like && node.column === like.column;
  return alike && !node.anchor && childrenOf(node).length === 1 ? node : undefined;
}

/** Whether the lines begin with content at a column, and go on to the right of it. Names of values and tags reach further. */
function standsAlone(piece: string, column: number): boolean {
  if (/[&*!%\t\ufeff]/.test(piece)) return false;
  for (let start = 0; start < piece.length; ) {
    let at = start;
    while (piece[at] === ' ') at++;
    const blank = at >= piece.length || piece[at] === '\n' || piece[at] === '\r' || piece[at] === '#';
    if (start === 0 ? blank || at !== column : !blank && at - start <= column) return false;
    const next = piece.indexOf('\n', at);
    if (next === -1) return true;
    start = next + 1;
  }
  return true;
}

/** The value with another one at the end of the steps; all beside the way stays the same objects. */
function withValue(value: unknown, steps: readonly Step[], inside: unknown, depth = 0): unknown {
  if (depth === steps.length) return inside;
  const { node, index } = steps[depth];
  if (node.type === 'list') {
    const items = value as readonly unknown[];
    return items.map((item, i) => (i === index ? withValue(item, steps, inside, depth + 1) : item));
  }
  const { key } = childrenOf(node)[index] as { key: string };
  const copy: Record<string, unknown> = Object.assign(Object.create(null), value);
  copy[key] = withValue(copy[key], steps, inside, depth + 1);
  return copy;
}

/** Whether a tree may be read on in parts: nothing in it is named or refers to a name. */
export function isWithoutNames(node: SyntaxNode): boolean {
  if (node.type === 'alias' || node.anchor !== undefined) return false;
  if (node.type === 'scalar') return true;
  const values = node.type === 'list' ? node.items : node.pairs;
  return values.every(({ value }) => isWithoutNames(value));
}
