import { tooDeepReport } from './explain';
import { quickScalar, withoutColon } from './half-pair';
import { MAX_NESTING, MAX_REPORTS } from './limits';
import { contentEnd, isDash, type KeySplit, type Line, onlyComment, scanLines, skipSpaces, splitKey } from './lines';
import { dashLeftOf, listStarts, mapStarts, mayContinue } from './outline';
import {
  add,
  type Block,
  composeBlock,
  contextOf,
  endOf,
  isGood,
  leaf,
  nested,
  type Recovery,
  rawScalar,
  reportIndent,
  spend,
} from './pieces';
import type { TextReport } from './reports';
import { emptyScalar, type ItemNode, type PairNode, type SyntaxNode } from './syntax';
import type { FilePath, ValuePath } from './types';

/**
 * Reads a text that does not parse as a whole: cut at its entries by the indentation, each read for itself, so that a fault
 * ends with the entry it stands in. Each fault gives one report, where it begins.
 */
export function recover(text: string, file: FilePath): { root: SyntaxNode; reports: readonly TextReport[] } {
  const lines = scanLines(text);
  const recovery: Recovery = { text, file, lines, reports: [], budget: { left: 6 * text.length + 65536 } };
  let first = 0;
  while (first < lines.length && (!lines[first].content || text[lines[first].start] === '%')) first++;
  if (first < lines.length && isMarker(text, lines[first], '---')) first++;
  let end = first;
  while (end < lines.length && !isMarker(text, lines[end], '---') && !isMarker(text, lines[end], '...')) end++;
  if (end < lines.length && isMarker(text, lines[end], '---')) {
    add(recovery, [], {
      rule: 'yaml',
      range: { start: lines[end].start, end: lines[end].start + 3 },
      message: 'One file holds one document: what follows this `---` is not read.',
    });
  }
  while (first < end && !lines[first].content) first++;
  if (first >= end) return { root: emptyScalar(Math.min(text.length, lines[0].start)), reports: recovery.reports };
  const { start, indent } = lines[first];
  const root = block(recovery, { from: start + indent, column: indent, first, end, path: [], depth: 0 });
  return { root, reports: recovery.reports };
}

const isMarker = (text: string, line: Line, marker: string) =>
  text.startsWith(marker, line.start) && onlyComment(text, line.start + 3, line.end);

function block(recovery: Recovery, it: Block): SyntaxNode {
  const { text, lines } = recovery;
  if (it.depth >= MAX_NESTING) {
    const last = composeBlock(recovery, it);
    if (last.tooDeep !== undefined) add(recovery, it.path, tooDeepReport(contextOf(recovery, it.path), last.tooDeep));
    return last.node;
  }
  const length = endOf(recovery, it.end) - it.from;
  // The whole text has failed already.
  if (it.depth > 0 && spend(recovery, length)) {
    const whole = composeBlock(recovery, it);
    if (isGood(whole)) return whole.node;
  }
  if (isDash(text, it.from)) return list(recovery, it);
  const firstDash = it.depth > 0 ? dashLeftOf(recovery, it) : undefined;
  if (firstDash !== undefined) return listWithoutDash(recovery, it, firstDash);
  if (text[it.from] === '&') {
    const anchorEnd = it.from + (/^[^\s,[\]{}]*/.exec(text.slice(it.from, it.from + 200))?.[0].length ?? 1);
    const from = skipSpaces(text, anchorEnd, lines[it.first].end);
    const anchor = text.slice(it.from + 1, anchorEnd);
    if (from < lines[it.first].end && text[from] !== '#') {
      const node = block(recovery, { ...it, from, column: from - lines[it.first].start });
      return { ...node, anchor };
    }
    const below = nested(recovery, it.first + 1, it.end);
    if (below) return { ...block(recovery, { ...it, ...below }), anchor };
  }
  if (text[it.from] === '{' || text[it.from] === '[') return leaf(recovery, it).node;
  return map(recovery, it);
}

function list(recovery: Recovery, it: Block): SyntaxNode {
  const { lines } = recovery;
  const { starts, column } = listStarts(recovery, it);
  const items = starts.map((line, i): ItemNode => {
    const dash = i === 0 ? it.from : lines[line].start + lines[line].indent;
    return entry(recovery, {
      ...it,
      from: dash,
      column,
      first: line,
      end: starts[i + 1] ?? it.end,
      path: [...it.path, i],
    });
  });
  const range = { start: it.from, end: items[items.length - 1].range.end };
  return { type: 'list', flow: false, column, items, range };
}

/** One entry of a list; `column` is where its dash should stand. */
function entry(recovery: Recovery, { from: dash, column, first, end, path, depth }: Block): ItemNode {
  const { text, lines } = recovery;
  const line = lines[first];
  const slip = dash - line.start - column;
  if (slip !== 0) reportIndent(recovery, path, first, column);
  const from = skipSpaces(text, dash + 1, line.end);
  const content = from - line.start;
  const value = onlyComment(text, dash + 1, line.end)
    ? below(recovery, first, end, path, depth, dash + 1)
    : block(recovery, {
        from,
        column: content,
        first,
        end,
        path,
        depth: depth + 1,
        ...(slip && { alsoColumn: content - slip }),
      });
  return { value, range: { start: dash, end: Math.max(dash + 1, value.range.end) } };
}

/** A list whose first entry has lost its dash. */
function listWithoutDash(recovery: Recovery, it: Block, firstDash: number): SyntaxNode {
  const { text, lines } = recovery;
  const path = [...it.path, 0];
  const { end } = lines[it.first];
  add(recovery, path, {
    rule: 'yaml',
    range: { start: it.from, end: Math.max(it.from, contentEnd(text, it.from, end)) },
    message: 'This entry of the list begins without its dash.',
  });
  const value = block(recovery, { ...it, end: firstDash, path, depth: it.depth + 1 });
  const from = lines[firstDash].start + lines[firstDash].indent;
  const rest = listStarts(recovery, { ...it, from, column: lines[firstDash].indent, first: firstDash });
  const items = rest.starts.map((line, i) =>
    entry(recovery, {
      ...it,
      from: lines[line].start + lines[line].indent,
      column: rest.column,
      first: line,
      end: rest.starts[i + 1] ?? it.end,
      path: [...it.path, i + 1],
    }),
  );
  return {
    type: 'list',
    flow: false,
    column: rest.column,
    items: [{ value, range: value.range }, ...items],
    range: { start: it.from, end: items[items.length - 1].range.end },
  };
}

/** The value of a key or dash whose own line holds nothing more. */
function below(
  recovery: Recovery,
  line: number,
  end: number,
  path: ValuePath,
  depth: number,
  empty: number,
): SyntaxNode {
  const lines = nested(recovery, line + 1, end);
  return lines ? block(recovery, { ...lines, path, depth: depth + 1 }) : emptyScalar(empty);
}

function map(recovery: Recovery, it: Block): SyntaxNode {
  const { text, lines } = recovery;
  const starts = mapStarts(recovery, it);
  const pairs: PairNode[] = [];
  let slipped = it.column;
  starts.forEach((line, i) => {
    const end = starts[i + 1] ?? it.end;
    const from = i === 0 ? it.from : lines[line].start + lines[line].indent;
    const column = from - lines[line].start;
    // Lines that slipped together are one fault.
    if (column !== it.column && column !== it.alsoColumn && column !== slipped) {
      reportIndent(recovery, [...it.path, keyAt(text, from, lines[line].end)], line, it.alsoColumn ?? it.column);
    }
    slipped = column;
    pairs.push(...pairsOf(recovery, { ...it, from, column, first: line, end }, i === 0 && starts.length > 1));
  });
  const end = Math.max(it.from, ...pairs.slice(-1).map(({ range }) => range.end));
  return { type: 'map', flow: false, column: it.column, pairs, range: { start: it.from, end } };
}

const keyAt = (text: string, from: number, end: number) =>
  splitKey(text, from, end)?.key ?? text.slice(from, contentEnd(text, from, end));

/** The pair that begins at a line; more than one where lines after it slipped to the right. */
function pairsOf(recovery: Recovery, item: Block, isHead: boolean): PairNode[] {
  const { text, lines } = recovery;
  const { end } = lines[item.first];
  const split = splitKey(text, item.from, end);
  if (!split) return withoutColon(recovery, item, isHead);
  const path = [...item.path, split.key];
  if (onlyComment(text, split.colon + 1, end)) {
    return [pair(split, below(recovery, item.first, item.end, path, item.depth, split.colon + 1))];
  }
  const continued = nested(recovery, item.first + 1, item.end);
  if (!continued) {
    const quick = quickScalar(text, skipSpaces(text, split.colon + 1, end), end);
    if (quick) return [pair(split, quick)];
  }
  const from = skipSpaces(text, split.colon + 1, end);
  if (text[from] === '&' && continued) {
    const anchorEnd = from + (/^[^\s,[\]{}]*/.exec(text.slice(from, from + 200))?.[0].length ?? 1);
    if (onlyComment(text, anchorEnd, end)) {
      const value = block(recovery, { ...continued, path, depth: item.depth + 1 });
      return [pair(split, { ...value, anchor: text.slice(from + 1, anchorEnd) })];
    }
  }
  const raw = () => [pair(split, rawScalar(text, from, contentEnd(text, from, end)))];
  if (recovery.reports.length >= MAX_REPORTS) return raw();
  if (continued && !spend(recovery, endOf(recovery, item.end) - item.from)) return raw();
  const whole = composeBlock(recovery, item);
  if (isGood(whole) && whole.node.type === 'map') return [...whole.node.pairs];
  if (continued && !mayContinue(text, from, end)) {
    const own: Block = { ...item, end: item.first + 1 };
    const first = composeBlock(recovery, own);
    if (isGood(first) && first.node.type === 'map') {
      if (continued.column !== item.alsoColumn) reportIndent(recovery, path, continued.first, item.column);
      const rest = block({ ...recovery, reports: [] }, { ...continued, path: item.path, depth: item.depth + 1 });
      return [...first.node.pairs, ...(rest.type === 'map' ? rest.pairs : [])];
    }
  }
  const { node } = leaf(recovery, { ...item, path });
  const value = node.type === 'map' && node.pairs[0]?.key === split.key ? node.pairs[0].value : undefined;
  return !value || (value.type === 'map' && !value.flow) ? raw() : [pair(split, value)];
}

const pair = (split: KeySplit, value: SyntaxNode): PairNode => ({
  key: split.key,
  keyRange: { start: split.keyStart, end: split.keyEnd },
  value,
  range: { start: split.keyStart, end: Math.max(split.colon + 1, value.range.end) },
});
