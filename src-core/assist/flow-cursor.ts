import type { ValuePath } from '../text/types';
import { climb, type Level } from './climb';
import type { Cursor } from './cursor';
import { bare, type LineParts, outsideQuotes, withoutComment, wordEnd } from './cursor-lines';

export interface Bracket {
  readonly type: '{' | '[';
  readonly line: number;
  readonly column: number;
}

/** Brackets that are open at the cursor. One that a line with the opener's indentation or less follows was forgotten: it counts no more. */
export function openBrackets(lines: readonly LineParts[], cursorColumn: number): Bracket[] {
  let open: Bracket[] = [];
  lines.forEach((line, number) => {
    if (open.length > 0 && !line.blank && line.indent <= lines[open[0].line].indent && !/^\s*[}\]]/.test(line.text))
      open = [];
    const visible = withoutComment(
      outsideQuotes(number === lines.length - 1 ? line.text.slice(0, cursorColumn) : line.text),
    );
    for (let column = 0; column < visible.length; column++) {
      const sign = visible[column];
      // Inside a plain scalar of a block a bracket is text; it opens only where a value begins.
      const opens = (sign === '{' || sign === '[') && (open.length > 0 || beginsValue(visible, column));
      if (opens) open.push({ type: sign as Bracket['type'], line: number, column });
      else if ((sign === '}' || sign === ']') && open.length > 0) open.pop();
    }
  });
  return open;
}

/** Nothing stands before it, or a colon, dash or comma and a space. */
function beginsValue(line: string, column: number): boolean {
  let before = column - 1;
  while (before >= 0 && line[before] === ' ' && column - before < 200) before--;
  return before < 0 || (before < column - 1 && /[:\-,]/.test(line[before]));
}

/** The cursor between brackets that open in the last of `open`. */
export function inFlow(
  text: string,
  offset: number,
  lines: readonly LineParts[],
  open: readonly Bracket[],
): Cursor | undefined {
  const first = open[0];
  const opener = lines[first.line];
  const upTo = lines.slice(0, first.line + 1);
  const onKey = opener.key !== undefined && first.column >= opener.valueColumn;
  const base = climb(upTo, onKey ? opener.column : Math.max(opener.column, (opener.dashes.at(-1) ?? -2) + 2));
  if (!base) return undefined;
  let path: ValuePath = onKey ? [...base.path, opener.key!] : base.path;
  const levels: Level[] = [...base.levels];
  if (!onKey) levels.pop();
  let result: Cursor | undefined;
  open.forEach((bracket, depth) => {
    const from = lines[bracket.line].start + bracket.column + 1;
    const next = open[depth + 1];
    const to = next ? lines[next.line].start + next.column : offset;
    const entries = splitFlow(text.slice(from, to), from);
    const last = entries.at(-1)!;
    const pair = /^\s*("[^"]*"|'[^']*'|[^\s:,][^:,]*?)\s*:(?=\s|$)/.exec(last.text);
    if (bracket.type === '[') {
      const here = [...path, entries.length - 1];
      const start = last.start + /^\s*/.exec(last.text)![0].length;
      result = flowCursor(text, offset, here, levels, 'value', start, bracket);
      path = here;
      return;
    }
    const keys = new Map<string, string>();
    const rest = text.slice(to, flowEnd(text, to));
    for (const entry of [...entries.slice(0, -1), ...splitFlow(rest, to).slice(1)]) {
      const one = /^\s*("[^"]*"|'[^']*'|[^\s:,][^:,]*?)\s*:(?=\s|$)([\s\S]*)$/.exec(entry.text);
      if (one) keys.set(bare(one[1]), one[2].trim());
    }
    levels.push({ path, keys });
    if (pair) {
      const start = last.start + pair[0].length + /^\s*/.exec(last.text.slice(pair[0].length))![0].length;
      result = flowCursor(text, offset, [...path, bare(pair[1])], levels, 'value', start, bracket);
      path = [...path, bare(pair[1])];
    } else {
      const start = last.start + /^\s*/.exec(last.text)![0].length;
      result = flowCursor(text, offset, path, levels, 'key', start, bracket);
    }
  });
  return result;
}

function flowCursor(
  text: string,
  offset: number,
  path: ValuePath,
  levels: readonly Level[],
  on: Cursor['on'],
  start: number,
  bracket: Bracket,
): Cursor {
  const end = wordEnd(text, offset, on === 'key' ? /[:,}\]\n\r\s]/ : /[,}\]\n\r]/);
  const trimmed = end - (text.slice(offset, end).length - text.slice(offset, end).trimEnd().length);
  const from = Math.min(start, offset);
  return {
    path,
    on,
    levels: [...levels],
    token: { start: from, end: trimmed },
    typed: text.slice(from, offset),
    hasColon: on === 'key' && /^\s*:/.test(text.slice(end, end + 3)),
    needsSpace: on === 'value' && text[offset - 1] === ':',
    flow: true,
    column: bracket.column,
  };
}

/** The entries of a flow collection up to an offset, split at its own commas. */
function splitFlow(text: string, from: number): { text: string; start: number }[] {
  const visible = outsideQuotes(text);
  const entries: { text: string; start: number }[] = [];
  let depth = 0;
  let start = 0;
  for (let i = 0; i < visible.length; i++) {
    if (visible[i] === '{' || visible[i] === '[') depth++;
    else if (visible[i] === '}' || visible[i] === ']') depth--;
    else if (visible[i] === ',' && depth <= 0) {
      entries.push({ text: text.slice(start, i), start: from + start });
      start = i + 1;
    }
  }
  entries.push({ text: text.slice(start), start: from + start });
  return entries;
}

/** Where the flow collection that is open at an offset ends: its bracket, or the end of the line. */
function flowEnd(text: string, offset: number): number {
  let depth = 0;
  for (let i = offset; i < text.length; i++) {
    if (text[i] === '\n') return i;
    if (text[i] === '{' || text[i] === '[') depth++;
    else if (text[i] === '}' || text[i] === ']') if (--depth < 0) return i;
  }
  return text.length;
}
