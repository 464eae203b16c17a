import { type Document, isAlias, isMap, isPair, isScalar, isSeq, type ParsedNode, parseDocument, Schema } from 'yaml';
import { MAX_NESTING, tooDeepAt } from './limits';
import { resolvePlain } from './scalar';
import { columnOf, emptyScalar, type ItemNode, type PairNode, type SyntaxNode } from './syntax';

export interface ComposeError {
  readonly code: string;
  readonly start: number;
  readonly end: number;
  readonly message: string;
}

export interface Composed {
  readonly node: SyntaxNode;
  readonly errors: readonly ComposeError[];
  /** Where it nests too deeply; nothing was parsed then. */
  readonly tooDeep?: number;
}

const OPTIONS = {
  uniqueKeys: false, // quadratic in the library; ours is in values.ts
  // Scalars are resolved by scalar.ts, whatever the text's %YAML says. One for all: to make it costs more than a small piece.
  schema: new Schema({ schema: 'failsafe' }),
  prettyErrors: false,
  keepSourceTokens: true,
  logLevel: 'error',
  version: '1.2',
} as const;

/**
 * Parses one piece of a text.
 * @param piece the text, padded in front so that its columns are those of the file
 * @param shift what is added to its offsets
 * @param depth levels that it stands in already
 */
export function compose(piece: string, shift: number, depth = 0): Composed {
  const deep = tooDeepAt(piece, MAX_NESTING - depth);
  if (deep !== undefined) return { node: emptyScalar(shift + deep), errors: [], tooDeep: shift + deep };
  // The library makes an Error for each fault; recording the stack of 100,000 of them costs seconds.
  const limits = Error as { stackTraceLimit?: number };
  const { stackTraceLimit } = limits;
  try {
    limits.stackTraceLimit = 0;
    const document = parseDocument(piece, OPTIONS) as Document.Parsed<ParsedNode>;
    const errors = document.errors.map(({ code, pos, message }) => ({
      code: code as string,
      start: pos[0] + shift,
      end: pos[1] + shift,
      message,
    }));
    return { node: convert(piece, shift, document.contents, 0), errors };
  } catch (error) {
    const message = error instanceof Error ? error.message : String(error);
    return { node: emptyScalar(shift), errors: [{ code: 'IMPOSSIBLE', start: shift, end: shift, message }] };
  } finally {
    limits.stackTraceLimit = stackTraceLimit;
  }
}

type LibraryNode = ParsedNode | null | undefined;

function convert(piece: string, shift: number, node: LibraryNode, fallback: number): SyntaxNode {
  if (!node?.range) return emptyScalar(shift + fallback);
  const range = { start: node.range[0] + shift, end: node.range[1] + shift };
  if (isAlias(node)) return { type: 'alias', name: node.source, range };
  const anchor = node.anchor ? { anchor: node.anchor } : {};
  if (isMap(node)) {
    const pairs: PairNode[] = [];
    for (const pair of node.items) if (isPair(pair)) pairs.push(convertPair(piece, shift, pair));
    const flow = node.flow === true;
    return { type: 'map', flow, column: flow ? 0 : columnOf(piece, node.range[0]), pairs, range, ...anchor };
  }
  if (isSeq(node)) {
    const dashes = node.flow ? [] : dashOffsets(node.srcToken);
    const items = node.items.map((item, i): ItemNode => {
      const start =
        (isPair(item) ? (item.key as LibraryNode)?.range?.[0] : (item as LibraryNode)?.range?.[0]) ?? node.range[0];
      const value = isPair(item)
        ? pairAsMap(convertPair(piece, shift, item as never))
        : convert(piece, shift, item as LibraryNode, start);
      const dash = node.flow ? value.range.start - shift : (dashes[i] ?? start);
      return { value, range: { start: Math.min(dash + shift, value.range.start), end: value.range.end } };
    });
    const flow = node.flow === true;
    return { type: 'list', flow, column: flow ? 0 : columnOf(piece, node.range[0]), items, range, ...anchor };
  }
  if (!isScalar(node)) return emptyScalar(shift + fallback);
  const source = String(node.value ?? '');
  const style = node.type === 'PLAIN' ? 'plain' : node.type?.startsWith('QUOTE') ? 'quoted' : 'block';
  if (style === 'plain' && range.end === range.start) return { ...emptyScalar(range.start), ...anchor };
  const value = style === 'plain' && !node.tag ? resolvePlain(source) : source;
  return { type: 'scalar', value, style, range, ...anchor };
}

interface LibraryPair {
  key: LibraryNode;
  value: LibraryNode;
  srcToken?: { sep?: readonly { type: string; offset: number }[] };
}

function convertPair(piece: string, shift: number, pair: unknown): PairNode {
  const { key, value, srcToken } = pair as LibraryPair;
  const keyStart = key?.range?.[0] ?? value?.range?.[0] ?? 0;
  const keyEnd = key?.range?.[1] ?? keyStart;
  const colon = srcToken?.sep?.find(({ type }) => type === 'map-value-ind')?.offset;
  const valueNode = convert(piece, shift, value, colon === undefined ? keyEnd : colon + 1);
  const name = isScalar(key) ? String(key.value ?? '') : piece.slice(keyStart, Math.min(keyEnd, keyStart + 80));
  return {
    key: name,
    keyRange: { start: keyStart + shift, end: keyEnd + shift },
    value: valueNode,
    range: { start: keyStart + shift, end: Math.max(keyEnd + shift, valueNode.range.end) },
  };
}

const pairAsMap = (pair: PairNode): SyntaxNode => ({
  type: 'map',
  flow: true,
  column: 0,
  pairs: [pair],
  range: pair.range,
});

function dashOffsets(token: unknown): number[] {
  const items = (token as { items?: { start: { type: string; offset: number }[] }[] } | undefined)?.items ?? [];
  const offsets: number[] = [];
  for (const { start } of items) {
    const dash = start.find(({ type }) => type === 'seq-item-ind');
    if (dash) offsets.push(dash.offset);
  }
  return offsets;
}
