import type { TextRange, ValuePath } from '../text/types';

/**
 * Where a cursor stands in a text that need not parse: found from lines, dashes, indentation and open brackets alone,
 * since the very line that is being typed is the one that no parser understands yet.
 */
export interface Cursor {
  /** Of the mapping (`on: 'key'`), the value (`'value'`, its key or index last) or the list (`'item'`) that holds the cursor. */
  readonly path: ValuePath;
  /** `item`: behind a dash, where a mapping or a plain value may begin. */
  readonly on: 'key' | 'value' | 'item';
  /** Level by level, outermost first, the keys of each mapping on the way with their text behind the colon. */
  readonly levels: readonly Level[];
  /** What is replaced, to the end of the word under the cursor. */
  readonly token: TextRange;
  /** From the start of the token (a value: of the whole value) to the cursor. */
  readonly typed: string;
  /** For a key: a colon follows already. */
  readonly hasColon: boolean;
  /** Directly behind `:`, `-` or `,` without the space that YAML needs. */
  readonly needsSpace: boolean;
  readonly flow: boolean;
  /** Where the keys of this mapping, or the dashes of this list, stand. */
  readonly column: number;
}

export interface Level {
  readonly path: ValuePath;
  readonly keys: ReadonlyMap<string, string>;
}

interface LineParts {
  readonly start: number;
  readonly text: string;
  readonly indent: number;
  readonly blank: boolean;
  /** Columns of the dashes that begin the line. */
  readonly dashes: readonly number[];
  /** Where the content after the dashes begins. */
  readonly column: number;
  readonly key?: string;
  /** Behind the colon. */
  readonly value: string;
  readonly valueColumn: number;
}

const KEY =
  /^((?:"[^"\n]{0,200}"|'[^'\n]{0,200}'|[^\s:#{}[\],&*!|>'"%@`-][^:#{}[\],\n]{0,200}|-[^\s:#{}[\],\n][^:#{}[\],\n]{0,200}))\s*:(?=\s|$)/;

function partsOf(start: number, text: string): LineParts {
  let column = 0;
  while (text[column] === ' ') column++;
  const indent = column;
  const dashes: number[] = [];
  while (text[column] === '-' && (text[column + 1] === undefined || text[column + 1] === ' ')) {
    dashes.push(column++);
    while (text[column] === ' ') column++;
  }
  const rest = text.slice(column);
  const blank = dashes.length === 0 && (rest === '' || rest.startsWith('#'));
  const match = blank ? null : KEY.exec(rest);
  if (!match) return { start, text, indent, blank, dashes, column, value: rest, valueColumn: column };
  const colon = column + match[0].length;
  return {
    start,
    text,
    indent,
    blank,
    dashes,
    column,
    key: bare(match[1]),
    value: withoutComment(text.slice(colon)).trim(),
    valueColumn: colon,
  };
}

const bare = (key: string) => (/^(['"]).*\1$/.test(key) ? key.slice(1, -1) : key).trim();
const withoutComment = (text: string) => {
  const comment = /(^|\s)#/.exec(text);
  return comment ? text.slice(0, comment.index) : text;
};

export function cursorAt(text: string, offset: number): Cursor | undefined {
  const lines = linesBefore(text, offset);
  const current = lines.at(-1)!;
  const cursorColumn = offset - current.start;
  const before = current.text.slice(0, cursorColumn);
  if (/(^|\s)#/.test(outsideQuotes(before))) return undefined;
  const open = openBrackets(lines, cursorColumn);
  return open.length > 0 ? inFlow(text, offset, lines, open) : inBlock(text, offset, lines, cursorColumn);
}

function linesBefore(text: string, offset: number): LineParts[] {
  const lines: LineParts[] = [];
  let start = 0;
  for (;;) {
    const end = text.indexOf('\n', start);
    const stop = end === -1 ? text.length : end;
    lines.push(partsOf(start, text.slice(start, text[stop - 1] === '\r' ? stop - 1 : stop)));
    if (offset <= stop || end === -1) return lines;
    start = end + 1;
  }
}

/** The same length, with quoted text blanked, so that brackets and signs in it count for nothing. An open quote runs to the end. */
function outsideQuotes(text: string): string {
  return text.replace(/"(?:[^"\\]|\\.)*(?:"|$)|(?<=^|[\s[{,:])'[^']*(?:'|$)/g, (quoted) => '_'.repeat(quoted.length));
}

interface Bracket {
  readonly type: '{' | '[';
  readonly line: number;
  readonly column: number;
}

/** Brackets that are open at the cursor. One that a line with the opener's indentation or less follows was forgotten: it counts no more. */
function openBrackets(lines: readonly LineParts[], cursorColumn: number): Bracket[] {
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

/** Walks up from a column of the last line: the steps that lead there, and the keys of each mapping on the way. */
function climb(lines: readonly LineParts[], column: number, isDash: boolean): { path: ValuePath; levels: Level[] } {
  const steps: (string | number)[] = [];
  const keysByDepth: Map<string, string>[] = [];
  let limit = column;
  let dash = isDash;
  let index = 0;
  let keys = new Map<string, string>();
  const closeLevel = () => {
    keysByDepth.push(keys);
    keys = new Map();
  };
  for (let i = lines.length - 1; i >= 0 && (limit > 0 || dash); i--) {
    const line = lines[i];
    if (line.blank && i < lines.length - 1) continue;
    const nodes: { column: number; key?: string; value?: string }[] = line.dashes.map((at) => ({ column: at }));
    if (line.key !== undefined) nodes.push({ column: line.column, key: line.key, value: line.value });
    for (const node of nodes.reverse()) {
      if (i === lines.length - 1 && node.column >= limit) continue;
      if (node.key === undefined) {
        if (dash && node.column === limit) index++;
        else if (node.column < limit) {
          if (dash) steps.unshift(index);
          if (!dash) closeLevel();
          else keysByDepth.push(new Map());
          limit = node.column;
          dash = true;
          index = 0;
        }
      } else if (dash ? node.column <= limit : node.column < limit) {
        if (dash) {
          steps.unshift(index);
          keysByDepth.push(new Map());
        } else closeLevel();
        steps.unshift(node.key);
        limit = node.column;
        dash = false;
        keys.set(node.key, node.value ?? '');
      } else if (!dash && node.column === limit && !keys.has(node.key)) keys.set(node.key, node.value ?? '');
    }
  }
  if (dash) {
    steps.unshift(index);
    keysByDepth.push(new Map());
  }
  // The rest of the outermost mapping, and what was collected last.
  for (let i = lines.length - 2; i >= 0; i--) {
    const line = lines[i];
    if (
      line.key !== undefined &&
      line.dashes.length === 0 &&
      line.column === 0 &&
      limit === 0 &&
      !dash &&
      !keys.has(line.key)
    )
      keys.set(line.key, line.value);
  }
  keysByDepth.push(keys);
  keysByDepth.reverse();
  const levels = keysByDepth.map((level, depth) => ({ path: steps.slice(0, depth), keys: level }));
  return { path: steps, levels };
}

function withKeysBelow(text: string, offset: number, column: number, level: Level | undefined): Level | undefined {
  if (!level) return level;
  const keys = new Map(level.keys);
  let start = text.indexOf('\n', offset);
  while (start !== -1) {
    const end = text.indexOf('\n', start + 1);
    const line = partsOf(start + 1, text.slice(start + 1, end === -1 ? text.length : end).replace(/\r$/, ''));
    start = end;
    if (line.blank) continue;
    if (line.dashes.length > 0 ? line.dashes[0] < column : line.column < column) break;
    if (line.dashes.length === 0 && line.column === column && line.key !== undefined) keys.set(line.key, line.value);
  }
  return { path: level.path, keys };
}

const wordEnd = (text: string, offset: number, stops: RegExp): number => {
  let end = offset;
  while (end < text.length && !stops.test(text[end])) end++;
  return end;
};

function inBlock(text: string, offset: number, lines: readonly LineParts[], cursorColumn: number): Cursor | undefined {
  const line = lines.at(-1)!;
  const lineStop = line.start + line.text.length;
  const value = line.key !== undefined && cursorColumn >= line.valueColumn;
  const finish = (
    path: ValuePath,
    levels: readonly Level[],
    on: Cursor['on'],
    token: TextRange,
    column: number,
    more: Partial<Cursor> = {},
  ): Cursor => ({
    path,
    on,
    levels,
    token,
    typed: text.slice(token.start, offset),
    hasColon: false,
    needsSpace: false,
    flow: false,
    column,
    ...more,
  });
  if (value) {
    const { path, levels } = climb(lines, line.column, false);
    const last = withKeysBelow(text, offset, line.column, levels.at(-1));
    const keys = new Map(last?.keys);
    keys.delete(line.key!);
    const start = line.start + line.valueColumn + /^\s*/.exec(line.text.slice(line.valueColumn))![0].length;
    const token = {
      start: Math.min(start, offset),
      end: Math.max(offset, Math.min(lineStop, line.start + withoutComment(line.text).trimEnd().length)),
    };
    const all = [...levels.slice(0, -1), { path, keys }];
    return finish([...path, line.key!], all, 'value', token, line.column, {
      needsSpace: line.text[cursorColumn - 1] === ':',
    });
  }
  const lastDash = line.dashes.at(-1);
  if (lastDash !== undefined && cursorColumn > lastDash) {
    const content = Math.max(line.column, lastDash + 2);
    const { path, levels } = climb(lines, content, false);
    const token = { start: line.start + Math.min(line.column, cursorColumn), end: 0 };
    token.end = wordEnd(text, Math.max(offset, token.start), line.key !== undefined ? /[:\s]/ : /[\n\r#]/);
    const last = withKeysBelow(text, offset, content, levels.at(-1));
    return finish(path, last ? [...levels.slice(0, -1), last] : levels, 'item', token, content, {
      hasColon: line.key !== undefined,
      needsSpace: line.text[cursorColumn - 1] === '-' && cursorColumn - 1 === lastDash,
    });
  }
  const column = Math.min(line.blank ? cursorColumn : line.column, cursorColumn);
  const { path, levels } = climb(lines, column, false);
  const token = { start: line.start + column, end: wordEnd(text, offset, /[:\s]/) };
  const last = withKeysBelow(text, offset, column, levels.at(-1));
  const keys = new Map(last?.keys);
  if (line.key !== undefined) keys.delete(line.key);
  return finish(path, [...levels.slice(0, -1), { path, keys }], 'key', token, column, {
    hasColon: line.key !== undefined,
  });
}

function inFlow(
  text: string,
  offset: number,
  lines: readonly LineParts[],
  open: readonly Bracket[],
): Cursor | undefined {
  const first = open[0];
  const opener = lines[first.line];
  const upTo = lines.slice(0, first.line + 1);
  const onKey = opener.key !== undefined && first.column >= opener.valueColumn;
  const base = climb(upTo, onKey ? opener.column : Math.max(opener.column, (opener.dashes.at(-1) ?? -2) + 2), false);
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
