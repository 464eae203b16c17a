import { type Composed, compose } from './compose';
import { explain, type PieceContext, tooDeepReport } from './explain';
import { MAX_NESTING, MAX_REPORTS } from './limits';
import { contentEnd, isDash, type KeySplit, type Line, onlyComment, scanLines, skipSpaces, splitKey } from './lines';
import type { TextReport } from './reports';
import { resolvePlain } from './scalar';
import { emptyScalar, type ItemNode, type PairNode, type SyntaxNode } from './syntax';
import type { FilePath, ValuePath } from './types';

interface Recovery {
  readonly text: string;
  readonly file: FilePath;
  readonly lines: readonly Line[];
  readonly reports: TextReport[];
  /** Characters that may still be parsed in pieces larger than a line; keeps a hostile text linear. */
  readonly budget: { left: number };
}

/** A run of lines that belongs together: from `from` in line `first` up to line `end`, exclusive. */
interface Block {
  readonly from: number;
  readonly column: number;
  readonly first: number;
  readonly end: number;
  readonly path: ValuePath;
  readonly depth: number;
}

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

function add(recovery: Recovery, path: ValuePath, report: Omit<TextReport, 'at'>): void {
  if (recovery.reports.length < MAX_REPORTS) recovery.reports.push({ at: { file: recovery.file, path }, ...report });
}

const endOf = ({ text, lines }: Recovery, line: number) => (line < lines.length ? lines[line].start : text.length);

const pieceOf = (recovery: Recovery, { from, column, end }: Block) =>
  ' '.repeat(column) + recovery.text.slice(from, endOf(recovery, end));

const composeBlock = (recovery: Recovery, it: Block): Composed =>
  compose(pieceOf(recovery, it), it.from - it.column, it.depth);

const isGood = (composed: Composed) => composed.errors.length === 0 && composed.tooDeep === undefined;

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

function spend({ budget, reports }: Recovery, characters: number): boolean {
  if (reports.length >= MAX_REPORTS || budget.left < characters) return false;
  budget.left -= characters;
  return true;
}

const contextOf = ({ file, text }: Recovery, path: ValuePath): PieceContext => ({ file, text, path });

/** A piece that is not cut further: what the library makes of it, and one report. */
function leaf(recovery: Recovery, it: Block): Composed {
  if (recovery.reports.length >= MAX_REPORTS) return { node: emptyScalar(it.from), errors: [] };
  const composed = composeBlock(recovery, it);
  if (composed.tooDeep !== undefined)
    add(recovery, it.path, tooDeepReport(contextOf(recovery, it.path), composed.tooDeep));
  else if (composed.errors.length > 0) {
    const report = explain(contextOf(recovery, it.path), pieceOf(recovery, it), it.from - it.column, composed.errors);
    if (recovery.reports.length < MAX_REPORTS) recovery.reports.push(report);
  }
  return composed;
}

/** First line of content from `line` on, as the beginning of a block. */
function nested(
  { lines }: Recovery,
  line: number,
  end: number,
): Pick<Block, 'from' | 'column' | 'first' | 'end'> | undefined {
  let first = line;
  while (first < end && !lines[first].content) first++;
  if (first >= end) return undefined;
  return { from: lines[first].start + lines[first].indent, column: lines[first].indent, first, end };
}

function list(recovery: Recovery, it: Block): SyntaxNode {
  const { text, lines } = recovery;
  const starts = [it.first];
  for (let i = it.first + 1; i < it.end; i++) {
    const { content, indent, start } = lines[i];
    if (content && indent <= it.column && isDash(text, start + indent)) starts.push(i);
  }
  const items: ItemNode[] = [];
  starts.forEach((line, i) => {
    const end = starts[i + 1] ?? it.end;
    const dash = i === 0 ? it.from : lines[line].start + lines[line].indent;
    const column = dash - lines[line].start;
    const path = [...it.path, i];
    if (column !== it.column) reportIndent(recovery, path, line, it.column);
    const from = skipSpaces(text, dash + 1, lines[line].end);
    const value = onlyComment(text, dash + 1, lines[line].end)
      ? below(recovery, line, end, path, it.depth, dash + 1)
      : block(recovery, { from, column: from - lines[line].start, first: line, end, path, depth: it.depth + 1 });
    items.push({ value, range: { start: dash, end: Math.max(dash + 1, value.range.end) } });
  });
  return {
    type: 'list',
    flow: false,
    column: it.column,
    items,
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
  starts.forEach((line, i) => {
    const end = starts[i + 1] ?? it.end;
    const from = i === 0 ? it.from : lines[line].start + lines[line].indent;
    const column = from - lines[line].start;
    if (column !== it.column) reportIndent(recovery, [...it.path, keyAt(text, from, lines[line].end)], line, it.column);
    const item: Block = { ...it, from, column, first: line, end };
    pairs.push(...pairsOf(recovery, item, i === 0 && starts.length > 1));
  });
  const end = Math.max(it.from, ...pairs.slice(-1).map(({ range }) => range.end));
  return { type: 'map', flow: false, column: it.column, pairs, range: { start: it.from, end } };
}

const keyAt = (text: string, from: number, end: number) =>
  splitKey(text, from, end)?.key ?? text.slice(from, contentEnd(text, from, end));

/** Lines at which the pairs of a mapping begin, as far as its indentation, right or wrong, tells. */
function mapStarts({ text, lines }: Recovery, it: Block): number[] {
  const starts = [it.first];
  let blockIndent = Infinity; // of the block under the last key
  for (let i = it.first + 1; i < it.end; i++) {
    const { content, indent, start, end } = lines[i];
    if (!content) continue;
    const from = start + indent;
    const closing = text[from] === '}' || text[from] === ']';
    const dash = isDash(text, from);
    if (indent <= it.column && !closing && !dash && !belongsBelow(lines, text, i, it, blockIndent)) {
      starts.push(i);
      blockIndent = Infinity;
    } else if (
      indent > it.column &&
      indent < blockIndent &&
      blockIndent !== Infinity &&
      !dash &&
      isKeyOnly(text, from, end)
    ) {
      starts.push(i); // a key that slipped to the right of its neighbours, left of the block before it
      blockIndent = Infinity;
    } else if (blockIndent === Infinity) blockIndent = indent;
  }
  return starts;
}

function isKeyOnly(text: string, from: number, end: number): boolean {
  const split = splitKey(text, from, end);
  return split !== undefined && onlyComment(text, split.colon + 1, end);
}

/** A complete `key: value` at the left with deeper lines after it: it slipped out of the block before it. */
function belongsBelow(lines: readonly Line[], text: string, at: number, it: Block, blockIndent: number): boolean {
  if (blockIndent === Infinity || blockIndent <= it.column) return false;
  const { start, indent, end } = lines[at];
  const split = splitKey(text, start + indent, end);
  if (!split || onlyComment(text, split.colon + 1, end)) return false;
  if ('{["\'|>&*'.includes(text[skipSpaces(text, split.colon + 1, end)])) return false;
  let next = at + 1;
  while (next < it.end && !lines[next].content) next++;
  if (next >= it.end || lines[next].indent <= it.column) return false;
  const from = lines[next].start + lines[next].indent;
  return isDash(text, from) || splitKey(text, from, lines[next].end) !== undefined;
}

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
  if (continued && '{["\'|>'.indexOf(text[from]) === -1) {
    const own: Block = { ...item, end: item.first + 1 };
    const first = composeBlock(recovery, own);
    if (isGood(first) && first.node.type === 'map') {
      reportIndent(recovery, path, continued.first, item.column);
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

const rawScalar = (text: string, start: number, end: number): SyntaxNode =>
  start >= end
    ? emptyScalar(start)
    : { type: 'scalar', style: 'plain', value: text.slice(start, end), range: { start, end } };

/** A plain value on one line that no rule of YAML could read otherwise: spares the library. */
function quickScalar(text: string, from: number, lineEnd: number): SyntaxNode | undefined {
  const end = contentEnd(text, from, lineEnd);
  for (let at = from; at < end; at++) {
    const code = text.charCodeAt(at);
    const plain =
      (code >= 48 && code <= 57) ||
      (code >= 65 && code <= 90) ||
      (code >= 97 && code <= 122) ||
      code > 127 ||
      (at > from &&
        (code === 32 || code === 46 || code === 45 || code === 43 || code === 47 || code === 95 || code === 64));
    if (!plain) return undefined;
  }
  if (end <= from) return undefined;
  return { type: 'scalar', style: 'plain', value: resolvePlain(text.slice(from, end)), range: { start: from, end } };
}

/** A line without `key: `: a word half typed, a colon without its space, or no colon at all. */
function withoutColon(recovery: Recovery, item: Block, isHead: boolean): PairNode[] {
  const { text, lines, file } = recovery;
  const line = lines[item.first];
  const end = contentEnd(text, item.from, line.end);
  const words = text.slice(item.from, Math.min(end, item.from + 200));
  const key = /^[A-Za-z0-9_<$.][A-Za-z0-9_<$.-]*/.exec(words)?.[0] ?? '';
  const keyRange = { start: item.from, end: item.from + key.length };
  const path = [...item.path, key];
  const after = text[keyRange.end];
  const insert = (title: string, at: number, added: string) => [
    { title, edits: [{ op: 'range' as const, file, range: { start: at, end: at }, text: added }] },
  ];
  if (key && after === ':' && keyRange.end + 1 < end) {
    add(recovery, path, {
      rule: 'yaml',
      range: { start: item.from, end },
      message: `A space is missing after the colon of \`${key}:\`; without it YAML reads the line as one word.`,
      fixes: insert('Add the space', keyRange.end + 1, ' ').map((fix) => ({ ...fix, preferred: true, safe: true })),
    });
    const start = keyRange.end + 1;
    const value = leaf({ ...recovery, reports: [] }, { ...item, from: start, column: start - line.start }).node;
    const plain = value.type === 'map' && !value.flow ? rawScalar(text, start, end) : value;
    return [{ key, keyRange, value: plain, range: { start: item.from, end: Math.max(end, plain.range.end) } }];
  }
  if (key && keyRange.end === end) {
    if (!isHead) {
      add(recovery, path, {
        rule: 'yaml',
        range: keyRange,
        message: `\`${key}\` stands alone: a key needs a colon, a space and a value.`,
      });
    }
    return [{ key, keyRange, value: emptyScalar(end), range: keyRange, bare: true }];
  }
  if (key && (after === ' ' || after === '\t')) {
    const start = skipSpaces(text, keyRange.end, end);
    add(recovery, path, {
      rule: 'yaml',
      range: { start: item.from, end },
      message: `A colon is missing after \`${key}\`.`,
      fixes: insert('Add the colon', keyRange.end, ':'),
    });
    return [{ key, keyRange, value: rawScalar(text, start, end), range: { start: item.from, end } }];
  }
  const { node } = leaf(recovery, item);
  if (node.type === 'map' && !node.flow) return [...node.pairs];
  if (node.type === 'scalar') {
    add(recovery, item.path, {
      rule: 'yaml',
      range: { start: item.from, end: Math.max(end, item.from) },
      message: 'A key, a colon and a value are wanted here.',
    });
  }
  return [];
}

function reportIndent(recovery: Recovery, path: ValuePath, line: number, wanted: number): void {
  const { text, lines, file } = recovery;
  const { start, indent, end } = lines[line];
  const from = start + indent;
  const stop = splitKey(text, from, end)?.keyEnd ?? contentEnd(text, from, end);
  add(recovery, path, {
    rule: 'yaml',
    range: { start: from, end: Math.max(from, stop) },
    message: `This line is indented by ${indent}, what it belongs to by ${wanted}.`,
    fixes: [
      {
        title: `Indent it by ${wanted}`,
        edits: [{ op: 'range', file, range: { start, end: from }, text: ' '.repeat(wanted) }],
      },
    ],
  });
}
