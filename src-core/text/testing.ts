import { parseFile } from './parse';
import type { ParsedFile } from './parsed';
import { rangeOf } from './range';
import type { Place, TextRange, ValuePath } from './types';

export const FILE = 'a.channel.yaml';

/** Each report of a text as `rule «marked text»`. */
export const reportsOf = (text: string): string[] =>
  parseFile(FILE, text).reports.map(({ rule, range, at }) => {
    const { start, end } = range ?? rangeOf(parseFile(FILE, text), at);
    return `${rule} «${text.slice(start, end)}»`;
  });

export const place = (path: ValuePath, on?: Place['on']): Place => ({ file: FILE, path, ...(on && { on }) });

/** Values as ordinary objects, for comparison. */
export const plain = (value: unknown): unknown => (value === undefined ? undefined : JSON.parse(JSON.stringify(value)));

/** Ranges of a parsed text that are not inside it; none is right. */
export function strayRanges(parsed: ParsedFile): TextRange[] {
  const ranges = parsed.reports.flatMap(({ range, at, related = [], fixes = [] }) => [
    ...(range ? [range] : []),
    rangeOf(parsed, at),
    ...related.map((one) => rangeOf(parsed, one.at)),
    ...fixes.flatMap(({ edits }) => edits.flatMap((edit) => (edit.op === 'range' ? [edit.range] : []))),
  ]);
  for (const path of pathsOf(parsed.value, []))
    for (const on of ['value', 'entry'] as const) ranges.push(rangeOf(parsed, { file: parsed.file, path, on }));
  return ranges.filter(({ start, end }) => !(start >= 0 && start <= end && end <= parsed.text.length));
}

export function pathsOf(value: unknown, path: ValuePath): ValuePath[] {
  if (typeof value !== 'object' || value === null) return [path];
  const children = Array.isArray(value) ? value.map((child, i) => [i, child] as const) : Object.entries(value);
  return [path, ...children.flatMap(([step, child]) => pathsOf(child, [...path, step]))];
}
