import type { TextRange } from './types';

/** The tree of a text, independent of the library: what ranges, the cursor's place and edits are looked up in. */
export type SyntaxNode = ScalarNode | MapNode | ListNode | AliasNode;

interface NodeBase {
  /** Without anchor and tag; empty for a value that is not written. */
  readonly range: TextRange;
  readonly anchor?: string;
}

export interface ScalarNode extends NodeBase {
  readonly type: 'scalar';
  readonly value: string | number | boolean | null;
  readonly style: 'plain' | 'quoted' | 'block' | 'empty';
}

export interface MapNode extends NodeBase {
  readonly type: 'map';
  readonly flow: boolean;
  /** Column of its keys; 0 for flow. */
  readonly column: number;
  readonly pairs: readonly PairNode[];
}

export interface PairNode {
  readonly key: string;
  readonly keyRange: TextRange;
  readonly value: SyntaxNode;
  /** Key and value. */
  readonly range: TextRange;
  /** A word that stands alone where a pair is wanted, half typed. */
  readonly bare?: boolean;
}

export interface ListNode extends NodeBase {
  readonly type: 'list';
  readonly flow: boolean;
  /** Column of its dashes; 0 for flow. */
  readonly column: number;
  readonly items: readonly ItemNode[];
}

export interface ItemNode {
  readonly value: SyntaxNode;
  /** The dash and the value. */
  readonly range: TextRange;
}

export interface AliasNode extends NodeBase {
  readonly type: 'alias';
  readonly name: string;
  /** What it stands for; set when values are built. */
  target?: SyntaxNode;
}

/** What `ParsedFile.syntax` holds; only this folder reads it. */
export interface Syntax {
  readonly root: SyntaxNode;
  /** Line ending to write in edits. */
  readonly lineEnd: '\n' | '\r\n';
  /** Read as a whole without a report, and nothing in it refers to anything else: an entry can be read again by itself. */
  readonly clean?: boolean;
}

export const emptyScalar = (offset: number): ScalarNode => ({
  type: 'scalar',
  value: null,
  style: 'empty',
  range: { start: offset, end: offset },
});

/** Where the line that holds `offset` begins. */
export const lineStart = (text: string, offset: number) => text.lastIndexOf('\n', offset - 1) + 1;

/** Where the line that holds `offset` ends, before its line ending. */
export function lineEnd(text: string, offset: number): number {
  const end = text.indexOf('\n', offset);
  if (end === -1) return text.length;
  return end > offset && text[end - 1] === '\r' ? end - 1 : end;
}

export const columnOf = (text: string, offset: number) => {
  const start = lineStart(text, offset);
  return offset - start - (start === 0 && text.charCodeAt(0) === 0xfeff ? 1 : 0);
};
