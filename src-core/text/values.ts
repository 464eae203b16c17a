import { MAX_ALIAS_NODES, MAX_REPORTS } from './limits';
import { removalRange } from './removal';
import type { TextReport } from './reports';
import type { AliasNode, MapNode, PairNode, SyntaxNode } from './syntax';
import type { FilePath, ValuePath } from './types';

interface Building {
  readonly file: FilePath;
  readonly text: string;
  readonly reports: TextReport[];
  /** Finished nodes by anchor, as of the place reached. */
  readonly anchors: Map<string, SyntaxNode>;
  readonly sizes: Map<SyntaxNode, number>;
  aliasNodes: number;
  aliasLimitReported: boolean;
}

/**
 * The plain value of a tree: null-prototype objects, so that `__proto__` is a key like any other; anchors and merge keys
 * resolved; of a key that is written twice the first counts. Sets `target` of the tree's aliases.
 */
export function buildValue(
  root: SyntaxNode,
  file: FilePath,
  text: string,
): { value: unknown; reports: readonly TextReport[] } {
  const building: Building = {
    file,
    text,
    reports: [],
    anchors: new Map(),
    sizes: new Map(),
    aliasNodes: 0,
    aliasLimitReported: false,
  };
  return { value: valueAt(root, [], building), reports: building.reports };
}

function valueAt(node: SyntaxNode, path: ValuePath, building: Building): unknown {
  const value = builtValue(node, path, building);
  if (node.anchor) building.anchors.set(node.anchor, node);
  return value;
}

function builtValue(node: SyntaxNode, path: ValuePath, building: Building): unknown {
  if (node.type === 'scalar') return node.value;
  if (node.type === 'list') return node.items.map((item, i) => valueAt(item.value, [...path, i], building));
  if (node.type === 'map') return mapValue(node, path, building);
  const target = resolveAlias(node, path, building);
  return target ? copyOf(target) : null;
}

function mapValue(node: MapNode, path: ValuePath, building: Building): Record<string, unknown> {
  const result: Record<string, unknown> = Object.create(null);
  const first = new Map<string, PairNode>();
  const merged: SyntaxNode[] = [];
  for (const pair of node.pairs) {
    const written = first.get(pair.key);
    if (written) {
      reportDuplicate(pair, node.flow, path, building);
      continue;
    }
    first.set(pair.key, pair);
    const value = valueAt(pair.value, [...path, pair.key], building);
    if (pair.key === '<<') merged.push(pair.value);
    else result[pair.key] = value;
  }
  for (const source of merged) {
    for (const map of mergeSources(source)) mergeInto(result, map);
  }
  return result;
}

/** The mappings that a merge key brings in, in order of precedence. */
export function mergeSources(value: SyntaxNode): readonly MapNode[] {
  const nodes = value.type === 'list' ? value.items.map((item) => item.value) : [value];
  const maps: MapNode[] = [];
  for (const node of nodes) {
    const target = node.type === 'alias' ? node.target : node;
    if (target?.type === 'map') maps.push(target);
  }
  return maps;
}

function mergeInto(result: Record<string, unknown>, map: MapNode): void {
  const copy = copyOf(map) as Record<string, unknown>;
  for (const key of Object.keys(copy)) if (!(key in result)) result[key] = copy[key];
}

/** Value of a finished node again, its aliases already resolved. */
function copyOf(node: SyntaxNode): unknown {
  if (node.type === 'scalar') return node.value;
  if (node.type === 'list') return node.items.map((item) => copyOf(item.value));
  if (node.type === 'alias') return node.target ? copyOf(node.target) : null;
  const result: Record<string, unknown> = Object.create(null);
  for (const pair of node.pairs) if (pair.key !== '<<' && !(pair.key in result)) result[pair.key] = copyOf(pair.value);
  for (const pair of node.pairs) {
    if (pair.key === '<<') for (const map of mergeSources(pair.value)) mergeInto(result, map);
  }
  return result;
}

function resolveAlias(node: AliasNode, path: ValuePath, building: Building): SyntaxNode | undefined {
  const target = building.anchors.get(node.name);
  if (!target) {
    if (building.reports.length < MAX_REPORTS)
      building.reports.push({
        rule: 'yaml',
        at: { file: building.file, path },
        range: node.range,
        message: `\`*${node.name}\` refers to nothing: no \`&${node.name}\` stands before it. Name the value with \`&${node.name}\`, or write it out.`,
      });
    return undefined;
  }
  building.aliasNodes += sizeOf(target, building);
  if (building.aliasNodes > MAX_ALIAS_NODES) {
    if (!building.aliasLimitReported) {
      building.aliasLimitReported = true;
      building.reports.push({
        rule: 'limit',
        at: { file: building.file, path },
        range: node.range,
        message: `Aliases make more than ${MAX_ALIAS_NODES} values up to here; this one and those after it are left out. Write the values out, or make them a part.`,
      });
    }
    return undefined;
  }
  node.target = target;
  return target;
}

/** Values that a finished node stands for, aliases counted out. */
function sizeOf(node: SyntaxNode, building: Building): number {
  const known = building.sizes.get(node);
  if (known !== undefined) return known;
  let size = 1;
  if (node.type === 'alias' && node.target) size = sizeOf(node.target, building);
  if (node.type === 'list') for (const item of node.items) size += sizeOf(item.value, building);
  if (node.type === 'map') for (const pair of node.pairs) size += sizeOf(pair.value, building);
  building.sizes.set(node, size);
  return size;
}

function reportDuplicate(pair: PairNode, flow: boolean, path: ValuePath, building: Building): void {
  const at = { file: building.file, path: [...path, pair.key], on: 'key' as const };
  if (building.reports.length >= MAX_REPORTS) return;
  building.reports.push({
    rule: 'duplicate-key',
    at,
    range: pair.keyRange,
    message: `\`${pair.key}\` is written twice in the same mapping; the first one counts. Remove one of them.`,
    related: [{ at, message: `\`${pair.key}\` stands here first.` }],
    fixes: [
      {
        title: `Remove the second \`${pair.key}\``,
        edits: [{ op: 'range', file: building.file, range: removalRange(building.text, pair.range, flow), text: '' }],
      },
    ],
  });
}
