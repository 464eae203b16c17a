import type { ParsedFile } from './parsed';
import { type Found, find, rootOf } from './range';
import { columnOf, lineEnd, type MapNode, type PairNode, type Syntax } from './syntax';
import type { PlaceEdit, TextEdit } from './types';

type SetEdit = Extract<PlaceEdit, { op: 'set' }>;

export const lineEndOf = (parsed: ParsedFile) => (parsed.syntax as Syntax).lineEnd;

/** Sets or adds a pair in a mapping; mappings on the way that are not there are made, between braces. */
export function setEdit(parsed: ParsedFile, edit: SetEdit): TextEdit | undefined {
  const found = find(rootOf(parsed), edit.at.path);
  const missing = edit.at.path.slice(found.depth);
  if (missing.some((step) => typeof step === 'number')) return undefined;
  const [key, ...inner] = [...(missing as string[]), edit.key];
  const text = inner.reduceRight((value, step) => `{ ${step}: ${value} }`, edit.text);
  const after = missing.length === 0 ? edit.after : undefined;
  const { node } = found;
  if (node.type === 'map') {
    const pair = node.pairs.find((one) => one.key === key);
    if (pair) return valueEdit(parsed, { node: pair.value, pair, depth: 0 }, text);
    const first = edit.first && missing.length === 0 ? node.pairs[0] : undefined;
    if (first) return addBefore(parsed, first, node.flow, `${key}: ${text}`);
    return node.flow ? addToFlow(parsed, node, key, text, after) : addToBlock(parsed, node, key, text, after);
  }
  if (node.type === 'alias') return valueEdit(parsed, found, `{ <<: *${node.name}, ${key}: ${text} }`);
  if (node.type === 'list') return undefined;
  const isRoot = !found.pair && !found.item;
  if (isRoot) {
    const lead = parsed.text === '' || parsed.text.endsWith('\n') ? '' : lineEndOf(parsed);
    const end = parsed.text.length;
    return { file: parsed.file, range: { start: end, end }, text: `${lead}${key}: ${text}${lineEndOf(parsed)}` };
  }
  return valueEdit(parsed, found, `{ ${key}: ${text} }`);
}

function addBefore(parsed: ParsedFile, { range }: PairNode, flow: boolean, pair: string): TextEdit {
  const { file, text } = parsed;
  const joint = flow ? ', ' : `${lineEndOf(parsed)}${' '.repeat(columnOf(text, range.start))}`;
  return { file, range: { start: range.start, end: range.start }, text: `${pair}${joint}` };
}

function addToFlow(
  { file, text: source }: ParsedFile,
  map: MapNode,
  key: string,
  text: string,
  after?: string,
): TextEdit {
  const pair = map.pairs.find((one) => one.key === after) ?? map.pairs[map.pairs.length - 1];
  if (pair) return { file, range: { start: pair.range.end, end: pair.range.end }, text: `, ${key}: ${text}` };
  const closed = source[map.range.end - 1] === '}';
  return {
    file,
    range: map.range,
    text: closed || map.range.end > map.range.start ? `{ ${key}: ${text} }` : `${key}: ${text}`,
  };
}

function addToBlock(parsed: ParsedFile, map: MapNode, key: string, text: string, after?: string): TextEdit | undefined {
  const { file, text: source } = parsed;
  const pair = map.pairs.find((one) => one.key === after) ?? map.pairs[map.pairs.length - 1];
  if (!pair) return undefined;
  const at = endOfLines(source, pair);
  const indent = ' '.repeat(columnOf(source, map.pairs[0].range.start));
  const eol = lineEndOf(parsed);
  const lines = `${key}: ${text}`.split('\n').join(`${eol}${indent}`);
  // A bare word that is still being typed has no colon yet: the line after it would become part of its value.
  return { file, range: { start: at, end: at }, text: `${pair.bare ? ':' : ''}${eol}${indent}${lines}` };
}

/** The end of the last line that belongs to a pair, its trailing comment included. */
export function endOfLines(text: string, { range }: Pick<PairNode, 'range'>): number {
  let end = range.end;
  while (end > range.start && /\s/.test(text[end - 1])) end--;
  return lineEnd(text, end);
}

/** Replaces a value, or writes one where there is none. */
export function valueEdit(parsed: ParsedFile, found: Found, text: string): TextEdit {
  const { file, text: source } = parsed;
  const { node, pair } = found;
  const { start } = node.range;
  if (node.type === 'scalar' && node.style === 'empty') return writeValue(parsed, start, pair, text);
  let { end } = node.range;
  while (end > start && /\s/.test(source[end - 1])) end--;
  const isBlock = (node.type === 'map' || node.type === 'list') && !node.flow;
  if (!isBlock || !pair) return { file, range: { start, end }, text };
  // A block under its key gives way to a value on the key's own line.
  const colon = source.indexOf(':', pair.keyRange.end);
  return { file, range: { start: colon + 1, end }, text: ` ${text}` };
}

const isSpace = (character: string | undefined) => character === ' ' || character === '\t';

/** Writes a value behind its colon or dash, in place of the space that stands there. */
function writeValue(
  { file, text: source }: ParsedFile,
  at: number,
  pair: PairNode | undefined,
  text: string,
): TextEdit {
  if (pair?.bare) return { file, range: { start: pair.keyRange.end, end: pair.keyRange.end }, text: `: ${text}` };
  let start = at;
  while (start > 0 && isSpace(source[start - 1])) start--;
  let end = at;
  while (isSpace(source[end])) end++;
  const next = source[end];
  const after = next === '#' || next === '}' || next === ']' ? ' ' : '';
  const before = start === 0 || source[start - 1] === '\n' ? '' : ' ';
  const colon = pair && start === pair.keyRange.end ? ':' : '';
  return { file, range: { start, end }, text: `${colon}${before}${text}${after}` };
}
