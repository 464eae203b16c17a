import { isDash, type Line, onlyComment, skipSpaces, splitKey } from './lines';
import type { Block } from './pieces';

/** What indentation tells of a text that does not parse, where some of it may be wrong. */
interface Outlined {
  readonly text: string;
  readonly lines: readonly Line[];
}

/** Whether a line is `key:` with its value below. */
export function isKeyOnly(text: string, from: number, end: number): boolean {
  const split = splitKey(text, from, end);
  return split !== undefined && onlyComment(text, split.colon + 1, end);
}

/**
 * Lines at which the entries of a list begin, and the column at which most of their dashes stand. An entry whose dash slipped to
 * the right, up to the content of the one before it, is one too.
 */
export function listStarts({ text, lines }: Outlined, it: Block): { starts: number[]; column: number } {
  const starts = [it.first];
  const columns = new Map<number, number>([[it.column, 1]]);
  let head = headOf({ text, lines }, it.first, it.from);
  let openKey = -1; // column of the last `key:` in this entry, under which a list may stand at the same column
  for (let i = it.first + 1; i < it.end; i++) {
    const { content, indent, start, end } = lines[i];
    if (!content) continue;
    const from = start + indent;
    if (!isDash(text, from)) {
      if (isKeyOnly(text, from, end)) openKey = indent;
      else if (indent <= openKey) openKey = -1;
      continue;
    }
    const slipped = indent < head.column || (indent === head.column && head.isComplete && openKey !== indent);
    if (indent > it.column && indent > head.dash && !slipped) continue;
    starts.push(i);
    columns.set(indent, (columns.get(indent) ?? 0) + 1);
    head = headOf({ text, lines }, i, from);
    openKey = -1;
  }
  let column = it.column;
  for (const [one, count] of columns) if (count > columns.get(column)!) column = one;
  return { starts, column };
}

/** Of an entry's first line: columns of dash and content, and whether that content is more than a `key:`. */
function headOf({ text, lines }: Outlined, line: number, dash: number) {
  const { start, end } = lines[line];
  const from = skipSpaces(text, dash + 1, end);
  const isComplete = !onlyComment(text, dash + 1, end) && !isKeyOnly(text, from, end) && !isDash(text, from);
  return { dash: dash - start, column: from - start, isComplete };
}

/** The first dash left of a block that begins without one: the block's beginning has lost its own. */
export function dashLeftOf({ text, lines }: Outlined, it: Block): number | undefined {
  for (let i = it.first + 1; i < it.end; i++) {
    const { content, indent, start } = lines[i];
    if (content && indent < it.column && isDash(text, start + indent)) return i;
  }
  return undefined;
}

/** Lines at which the pairs of a mapping begin, as far as its indentation, right or wrong, tells. */
export function mapStarts({ text, lines }: Outlined, it: Block): number[] {
  const starts = [it.first];
  let blockIndent = Infinity; // of the block under the last key
  for (let i = it.first + 1; i < it.end; i++) {
    const { content, indent, start, end } = lines[i];
    if (!content) continue;
    const from = start + indent;
    const closing = text[from] === '}' || text[from] === ']';
    const dash = isDash(text, from);
    const begins = indent <= it.column && !closing && !dash && !belongsBelow({ text, lines }, i, it, blockIndent);
    // A key that slipped to the right of its neighbours, left of the block before it.
    const slipped = indent > it.column && indent < blockIndent && blockIndent !== Infinity && !dash;
    if (begins || (slipped && isKeyOnly(text, from, end))) {
      starts.push(i);
      blockIndent = Infinity;
    } else if (blockIndent === Infinity) blockIndent = indent;
  }
  return starts;
}

/** A complete `key: value` at the left with deeper lines after it: it slipped out of the block before it. */
function belongsBelow({ text, lines }: Outlined, at: number, it: Block, blockIndent: number): boolean {
  if (blockIndent === Infinity || blockIndent <= it.column) return false;
  const { start, indent, end } = lines[at];
  const split = splitKey(text, start + indent, end);
  if (!split || onlyComment(text, split.colon + 1, end) || mayContinue(text, split.colon + 1, end)) return false;
  let next = at + 1;
  while (next < it.end && !lines[next].content) next++;
  if (next >= it.end || lines[next].indent <= it.column) return false;
  const from = lines[next].start + lines[next].indent;
  return isDash(text, from) || splitKey(text, from, lines[next].end) !== undefined;
}

/** Whether a value may rightly go on below its line: a block scalar, an anchor, a bracket or quote that is open. */
export function mayContinue(text: string, from: number, end: number): boolean {
  const first = text[skipSpaces(text, from, end)];
  if (first === '|' || first === '>' || first === '&' || first === '*') return true;
  if (first === '"' || first === "'") return text.slice(from, end).split(first).length % 2 === 0;
  if (first !== '{' && first !== '[') return false;
  let open = 0;
  for (let at = from; at < end; at++) {
    if (text[at] === '{' || text[at] === '[') open++;
    else if (text[at] === '}' || text[at] === ']') open--;
  }
  return open > 0;
}
