import { type Composed, compose } from './compose';
import { explain, type PieceContext, tooDeepReport } from './explain';
import { MAX_REPORTS } from './limits';
import { contentEnd, type Line, splitKey } from './lines';
import type { TextReport } from './reports';
import { emptyScalar, type SyntaxNode } from './syntax';
import type { FilePath, ValuePath } from './types';

export interface Recovery {
  readonly text: string;
  readonly file: FilePath;
  readonly lines: readonly Line[];
  readonly reports: TextReport[];
  /** Characters that may still be parsed in pieces larger than a line; keeps a hostile text linear. */
  readonly budget: { left: number };
}

/** A run of lines that belongs together: from `from` in line `first` up to line `end`, exclusive. */
export interface Block {
  readonly from: number;
  readonly column: number;
  readonly first: number;
  readonly end: number;
  readonly path: ValuePath;
  readonly depth: number;
  /** Where its lines stand rightly too: the entry's dash has slipped, its lines have not. */
  readonly alsoColumn?: number;
}

export function add(recovery: Recovery, path: ValuePath, report: Omit<TextReport, 'at'>): void {
  if (recovery.reports.length < MAX_REPORTS) recovery.reports.push({ at: { file: recovery.file, path }, ...report });
}

export const endOf = ({ text, lines }: Recovery, line: number) =>
  line < lines.length ? lines[line].start : text.length;

export const pieceOf = (recovery: Recovery, { from, column, end }: Block) =>
  ' '.repeat(column) + recovery.text.slice(from, endOf(recovery, end));

export const composeBlock = (recovery: Recovery, it: Block): Composed =>
  compose(pieceOf(recovery, it), it.from - it.column, it.depth);

export const isGood = (composed: Composed) => composed.errors.length === 0 && composed.tooDeep === undefined;

export function spend({ budget, reports }: Recovery, characters: number): boolean {
  if (reports.length >= MAX_REPORTS || budget.left < characters) return false;
  budget.left -= characters;
  return true;
}

export const contextOf = ({ file, text }: Recovery, path: ValuePath): PieceContext => ({ file, text, path });

/** A piece that is not cut further: what the library makes of it, and one report. */
export function leaf(recovery: Recovery, it: Block): Composed {
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
export function nested(
  { lines }: Recovery,
  line: number,
  end: number,
): Pick<Block, 'from' | 'column' | 'first' | 'end'> | undefined {
  let first = line;
  while (first < end && !lines[first].content) first++;
  if (first >= end) return undefined;
  return { from: lines[first].start + lines[first].indent, column: lines[first].indent, first, end };
}

export const rawScalar = (text: string, start: number, end: number): SyntaxNode =>
  start >= end
    ? emptyScalar(start)
    : { type: 'scalar', style: 'plain', value: text.slice(start, end), range: { start, end } };

export function reportIndent(recovery: Recovery, path: ValuePath, line: number, wanted: number): void {
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
