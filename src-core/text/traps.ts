import type { TextReport } from './reports';
import type { ItemNode, MapNode, PairNode, SyntaxNode } from './syntax';
import type { FilePath, ValuePath } from './types';

/**
 * Valid YAML that says something else than was meant: a comma-decimal between braces (`{ width: 0,11 mm }`), and a colon
 * without its space between braces or in a list's entry. Each gives one report and the value that was meant.
 */
export function mendTraps(
  root: SyntaxNode,
  text: string,
  file: FilePath,
): { root: SyntaxNode; reports: readonly TextReport[] } {
  const reports: TextReport[] = [];
  const mend = (node: SyntaxNode, path: ValuePath): SyntaxNode => {
    if (node.type === 'map') {
      const pairs = node.flow ? mendFlowPairs(node, text, file, path, reports) : node.pairs;
      let changed = pairs !== node.pairs;
      const mended = pairs.map((pair) => {
        const value = mend(pair.value, [...path, pair.key]);
        if (value === pair.value) return pair;
        changed = true;
        return { ...pair, value };
      });
      return changed ? { ...node, pairs: mended } : node;
    }
    if (node.type === 'list') {
      const items = node.flow ? mendFlowItems(node.items, text, file, path, reports) : node.items;
      let changed = items !== node.items;
      const mended = items.map((item, i) => {
        const at = [...path, i];
        const value = mend((!node.flow && headWithoutSpace(item.value, text, file, at, reports)) || item.value, at);
        if (value === item.value) return item;
        changed = true;
        return { ...item, value };
      });
      return changed ? { ...node, items: mended } : node;
    }
    return node;
  };
  return { root: mend(root, []), reports };
}

const isIntegerText = (text: string) => /^[-+±]?\d{1,12}$/.test(text);
const isFraction = (text: string) => text.length < 80 && /^\d+(?:$|[^\d:].*$)/.test(text);

function mendFlowPairs(
  node: MapNode,
  text: string,
  file: FilePath,
  path: ValuePath,
  reports: TextReport[],
): readonly PairNode[] {
  const result: PairNode[] = [];
  let changed = false;
  for (const pair of node.pairs) {
    const before = result[result.length - 1];
    if (before && isCommaDecimal(before, pair, text)) {
      const at = [...path, before.key];
      result[result.length - 1] = joined(before, pair.keyRange.end, text);
      reports.push(commaReport(file, at, before.value.range.start, pair.keyRange.end, text));
      changed = true;
      continue;
    }
    const spaced =
      pair.value.type === 'scalar' && pair.value.style === 'empty'
        ? withoutSpace(pair, text, file, path, reports)
        : undefined;
    changed ||= spaced !== undefined;
    result.push(spaced ?? pair);
  }
  return changed ? result : node.pairs;
}

function isCommaDecimal(before: PairNode, pair: PairNode, text: string): boolean {
  const { value } = before;
  if (
    value.type !== 'scalar' ||
    value.style !== 'plain' ||
    pair.value.type !== 'scalar' ||
    pair.value.style !== 'empty'
  )
    return false;
  if (pair.keyRange.start !== value.range.end + 1 || text[value.range.end] !== ',') return false;
  return isIntegerText(text.slice(value.range.start, value.range.end)) && isFraction(pair.key);
}

function joined(before: PairNode, end: number, text: string): PairNode {
  const { start } = before.value.range;
  const meant = text.slice(start, end).replace(',', '.');
  const value = plainValue(meant);
  return {
    ...before,
    value: { type: 'scalar', style: 'plain', value, range: { start, end } },
    range: { start: before.range.start, end },
  };
}

/** A number where no unit follows, as YAML reads it with a point. */
const plainValue = (text: string) => (/^[-+]?\d+\.\d+$/.test(text) ? Number(text) : text);

function commaReport(file: FilePath, path: ValuePath, start: number, end: number, text: string): TextReport {
  const written = text.slice(start, end);
  const meant = written.replace(',', '.');
  return {
    rule: 'quantity',
    at: { file, path },
    range: { start, end },
    message: `\`${written}\` has a decimal comma, which ends the value in YAML; it is read as \`${meant}\`. Write a point.`,
    fixes: [
      {
        title: `Write \`${meant}\``,
        edits: [{ op: 'range', file, range: { start, end }, text: meant }],
        preferred: true,
        safe: true,
      },
    ],
  };
}

/** `[1,6 dB/m @ 1.5 GHz]`: an integer, a comma without space, digits with a unit; `[-0,12]`, since nobody writes minus zero. */
function mendFlowItems(
  items: readonly ItemNode[],
  text: string,
  file: FilePath,
  path: ValuePath,
  reports: TextReport[],
): readonly ItemNode[] {
  const result: ItemNode[] = [];
  for (const item of items) {
    const before = result[result.length - 1];
    const written = text.slice(item.range.start, item.range.end);
    const beforeText = before ? text.slice(before.range.start, before.range.end) : '';
    if (
      before?.value.type === 'scalar' &&
      before.value.style === 'plain' &&
      item.value.type === 'scalar' &&
      item.value.style === 'plain' &&
      item.range.start === before.range.end + 1 &&
      isIntegerText(beforeText) &&
      isFraction(written) &&
      (!/^\d+$/.test(written) || beforeText === '-0')
    ) {
      const range = { start: before.range.start, end: item.range.end };
      const value = plainValue(text.slice(range.start, range.end).replace(',', '.'));
      result[result.length - 1] = { range, value: { type: 'scalar', style: 'plain', value, range } };
      reports.push(commaReport(file, [...path, result.length - 1], range.start, range.end, text));
    } else result.push(item);
  }
  return result.length === items.length ? items : result;
}

/** `{ width:0.11 mm }` */
function withoutSpace(
  pair: PairNode,
  text: string,
  file: FilePath,
  path: ValuePath,
  reports: TextReport[],
): PairNode | undefined {
  const { start, end } = pair.keyRange;
  const colon = spacelessColon(text, start, end);
  if (colon === undefined) return undefined;
  const key = text.slice(start, colon);
  const range = { start: colon + 1, end };
  reports.push(spaceReport(file, [...path, key], start, colon, end, text));
  return {
    key,
    keyRange: { start, end: colon },
    value: { type: 'scalar', style: 'plain', value: text.slice(colon + 1, end), range },
    range: { start, end },
  };
}

/** `- trace:breakout` */
function headWithoutSpace(
  value: SyntaxNode,
  text: string,
  file: FilePath,
  path: ValuePath,
  reports: TextReport[],
): MapNode | undefined {
  if (value.type !== 'scalar' || value.style !== 'plain') return undefined;
  const { start, end } = value.range;
  const pair = withoutSpace(
    { key: '', keyRange: { start, end }, value, range: value.range },
    text,
    file,
    path,
    reports,
  );
  return pair && { type: 'map', flow: false, column: 0, pairs: [pair], range: value.range };
}

function spacelessColon(text: string, start: number, end: number): number | undefined {
  const match = /^[a-z][a-z0-9-]{0,40}:(?=[^\s/:])/.exec(text.slice(start, Math.min(end, start + 60)));
  return match && start + match[0].length < end ? start + match[0].length - 1 : undefined;
}

function spaceReport(
  file: FilePath,
  path: ValuePath,
  start: number,
  colon: number,
  end: number,
  text: string,
): TextReport {
  return {
    rule: 'yaml',
    at: { file, path },
    range: { start, end },
    message: `A space is missing after the colon of \`${text.slice(start, colon + 1)}\`; without it YAML reads both as one word.`,
    fixes: [
      {
        title: 'Add the space',
        edits: [{ op: 'range', file, range: { start: colon + 1, end: colon + 1 }, text: ' ' }],
        preferred: true,
        safe: true,
      },
    ],
  };
}
