import { contentEnd, skipSpaces } from './lines';
import { add, type Block, leaf, type Recovery, rawScalar } from './pieces';
import { resolvePlain } from './scalar';
import { emptyScalar, type PairNode, type SyntaxNode } from './syntax';

/** A plain value on one line that no rule of YAML could read otherwise: spares the library. */
export function quickScalar(text: string, from: number, lineEnd: number): SyntaxNode | undefined {
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
export function withoutColon(recovery: Recovery, item: Block, isHead: boolean): PairNode[] {
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
        fixes: insert('Add the colon', keyRange.end, ':'),
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
