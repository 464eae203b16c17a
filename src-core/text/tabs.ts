import type { TextReport } from './reports';
import { type ItemNode, lineStart, type PairNode, type SyntaxNode } from './syntax';
import type { FilePath, PlaceEdit, TextRange } from './types';

/** Where nothing beside it tells. */
const TAB_WIDTH = 2;

export interface Expanded {
  readonly text: string;
  /** Offset in the expanded text to offset in the original. */
  readonly original: (offset: number) => number;
  readonly report: TextReport;
}

/** The text with tabs in its indentation written as spaces, and one report with a fix for all; undefined where there is none. */
export function expandTabs(text: string, file: FilePath): Expanded | undefined {
  const runs: TextRange[] = [];
  const pattern = /(?:^|\n)[ ]*(\t[ \t]*)(?=[^\s#])/g;
  for (let match = pattern.exec(text); match; match = pattern.exec(text)) {
    const end = match.index + match[0].length;
    runs.push({ start: end - match[1].length, end });
    pattern.lastIndex = end;
  }
  if (runs.length === 0) return undefined;
  const pieces: string[] = [];
  const starts: number[] = []; // of a run in the expanded text
  const shifts: number[] = []; // expanded minus original, after the run
  let at = 0;
  let shift = 0;
  const edits: PlaceEdit[] = [];
  for (const { start, end } of runs) {
    pieces.push(text.slice(at, start));
    const spaces = ' '.repeat(widthOf(text, start, end));
    starts.push(start + shift);
    pieces.push(spaces);
    shift += spaces.length - (end - start);
    shifts.push(shift);
    edits.push({ op: 'range', file, range: { start, end }, text: spaces });
    at = end;
  }
  pieces.push(text.slice(at));
  const original = (offset: number): number => {
    let low = 0;
    let high = starts.length;
    while (low < high) {
      const middle = (low + high) >> 1;
      if (starts[middle] <= offset) low = middle + 1;
      else high = middle;
    }
    if (low === 0) return offset;
    // Inside a run: its start; after it: moved by what the runs so far added.
    return Math.min(text.length, Math.max(runs[low - 1].start, offset - shifts[low - 1]));
  };
  const lines = runs.length === 1 ? 'This line is' : `This line and ${runs.length - 1} more are`;
  const report: TextReport = {
    rule: 'tab',
    at: { file, path: [] },
    range: runs[0],
    message: `${lines} indented with tabs; YAML allows spaces only.`,
    fixes: [{ title: 'Indent with spaces', edits, preferred: true, safe: true }],
  };
  return { text: pieces.join(''), original, report };
}

/** How many spaces a run of tabs stands for: what the line above asks for if that has spaces, else two a tab. */
function widthOf(text: string, start: number, end: number): number {
  const line = lineStart(text, start);
  const above = lineAbove(text, line);
  let width = 0;
  for (let at = start; at < end; at++) width += text[at] === '\t' ? TAB_WIDTH : 1;
  if (above === undefined || above.includes('\t')) return width;
  const dashes = /^ *((?:- +)*)/.exec(above)!;
  const column = dashes[0].length;
  const waits = /:\s*(?:#.*)?$/.test(above.slice(0, 500));
  if (text[end] === '-' && /\s/.test(text[end + 1] ?? ' ')) return waits ? column + 2 - (start - line) : width;
  return Math.max(0, column + (waits ? 2 : 0) - (start - line));
}

/** The nearest line of content above; not looked for beyond twenty lines of comment. */
function lineAbove(text: string, line: number): string | undefined {
  let end = line - 1;
  for (let i = 0; i < 20 && end > 0; i++) {
    const start = lineStart(text, end);
    const above = text.slice(start, Math.min(end, start + 500)).trimEnd();
    if (above !== '' && !above.trimStart().startsWith('#')) return above;
    end = start - 1;
  }
  return undefined;
}

/** A tree with each offset mapped. */
export function mapOffsets<N extends SyntaxNode>(node: N, map: (offset: number) => number): N {
  const range = mapRange(node.range, map);
  if (node.type === 'map') {
    const pairs = node.pairs.map(
      (pair): PairNode => ({
        ...pair,
        keyRange: mapRange(pair.keyRange, map),
        range: mapRange(pair.range, map),
        value: mapOffsets(pair.value, map),
      }),
    );
    return { ...node, range, pairs };
  }
  if (node.type === 'list') {
    const items = node.items.map(
      (item): ItemNode => ({ range: mapRange(item.range, map), value: mapOffsets(item.value, map) }),
    );
    return { ...node, range, items };
  }
  return { ...node, range };
}

export const mapRange = ({ start, end }: TextRange, map: (offset: number) => number): TextRange => {
  const first = map(start);
  return { start: first, end: Math.max(first, map(end)) };
};

export function mapReport(report: TextReport, map: (offset: number) => number): TextReport {
  const fixes = report.fixes?.map((fix) => ({
    ...fix,
    edits: fix.edits.map((edit) => (edit.op === 'range' ? { ...edit, range: mapRange(edit.range, map) } : edit)),
  }));
  return { ...report, ...(report.range && { range: mapRange(report.range, map) }), ...(fixes && { fixes }) };
}
