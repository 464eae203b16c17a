import type { ParsedFile } from './parsed';
import { find, rootOf } from './range';
import { endOfLines, lineEndOf, setEdit } from './set';
import { columnOf, lineStart } from './syntax';
import type { Place, TextEdit } from './types';

type Entries = readonly (readonly string[])[];

/** Adds entries to a list, made if it is not there; by default behind the last one. */
export function appendEdit(parsed: ParsedFile, at: Place, entries: Entries, index?: number): TextEdit | undefined {
  const { file, text } = parsed;
  const found = find(rootOf(parsed), at.path);
  const eol = lineEndOf(parsed);
  if (found.depth < at.path.length) {
    const key = at.path[at.path.length - 1];
    if (found.depth < at.path.length - 1 || typeof key === 'number') return undefined;
    const map = found.node;
    const column = map.type === 'map' && map.pairs.length > 0 ? columnOf(text, map.pairs[0].range.start) : 0;
    const lines = map.type === 'map' && map.flow ? ` ${inFlow(entries)}` : `${eol}${inBlock(entries, column + 2, eol)}`;
    const edit = setEdit(parsed, { op: 'set', at: { ...at, path: at.path.slice(0, -1) }, key, text: '' });
    return edit && { ...edit, text: edit.text.replace(/(: )(\s*)$/, (_, _colon, rest) => `:${lines}${rest}`) };
  }
  const { node, pair } = found;
  if (node.type === 'list' && node.flow) {
    const last = node.items[index ?? node.items.length];
    if (last)
      return { file, range: { start: last.range.start, end: last.range.start }, text: `${flowEntries(entries)}, ` };
    const before = node.items[node.items.length - 1];
    if (before)
      return { file, range: { start: before.range.end, end: before.range.end }, text: `, ${flowEntries(entries)}` };
    return { file, range: node.range, text: inFlow(entries) };
  }
  if (node.type === 'list') {
    const next = index === undefined ? undefined : node.items[index];
    const column = columnOf(text, node.items[0].range.start);
    if (next) {
      const start = lineStart(text, next.range.start);
      return { file, range: { start, end: start }, text: `${inBlock(entries, column, eol)}${eol}` };
    }
    const end = endOfLines(text, node.items[node.items.length - 1]);
    return { file, range: { start: end, end }, text: `${eol}${inBlock(entries, column, eol)}` };
  }
  if (node.type !== 'scalar' || node.style !== 'empty' || !pair) return undefined;
  const column = columnOf(text, pair.range.start) + 2;
  const end = endOfLines(text, pair);
  return { file, range: { start: end, end }, text: `${pair.bare ? ':' : ''}${eol}${inBlock(entries, column, eol)}` };
}

const inBlock = (entries: Entries, column: number, eol: string) =>
  entries
    .map((lines) => lines.map((line, i) => `${' '.repeat(column)}${i === 0 ? '- ' : '  '}${line}`).join(eol))
    .join(eol);

const flowEntries = (entries: Entries) =>
  entries
    .map((lines) => (lines.length === 1 && !/: /.test(lines[0]) ? lines[0] : `{ ${lines.join(', ')} }`))
    .join(', ');

const inFlow = (entries: Entries) => `[${flowEntries(entries)}]`;
