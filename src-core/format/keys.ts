import type { EntryListName, NameRole, NodeSchema, QuantitySpec, SchemaName } from '../../schemas/format/types';
import { entryLists, schemas } from '../../schemas/generated/format';
import type { FileKind, ValuePath } from '../text/types';
import { childOf, choicesOf, mappingOf } from './node-at';

/** A key, for hover and completion. */
export interface KeyInfo {
  readonly key: string;
  readonly description: string;
  /** As written in a file. */
  readonly examples: readonly string[];
  /** What holds where it is not written, in words or as written in a file. */
  readonly default?: string;
  readonly quantity?: QuantitySpec;
  readonly choices: readonly string[];
  readonly refers?: NameRole;
  readonly declares?: NameRole;
  /** The schema demands it; what else a kind needs, `missingKeys` says. */
  readonly required: boolean;
  readonly type:
    | 'quantity'
    | 'quantities'
    | 'band'
    | 'mapping'
    | 'list'
    | 'text'
    | 'number'
    | 'yes-no'
    | 'choice'
    | 'any';
  /** Keys of a mapping. */
  readonly children: readonly KeyInfo[];
}

const kept = new Map<SchemaName, readonly KeyInfo[]>();

/** The keys of a kind in the order of the format reference; of an unknown kind none. */
export function keysOf(name: SchemaName): readonly KeyInfo[] {
  let keys = kept.get(name);
  if (!keys) {
    keys = Object.hasOwn(schemas, name) ? keysOfNode(schemas[name]) : [];
    kept.set(name, keys);
  }
  return keys;
}

function keysOfNode(node: NodeSchema): KeyInfo[] {
  const properties = mappingOf(node)?.properties ?? {};
  return Object.entries(properties).map(([key, child]) =>
    keyInfo(key, child, mappingOf(node)?.required?.includes(key) ?? false),
  );
}

function keyInfo(key: string, node: NodeSchema, required: boolean): KeyInfo {
  const byDefault = node['x-default'];
  const refers = node['x-refers'] ?? node.items?.['x-refers'];
  return {
    key,
    description: node.description ?? '',
    examples: (node.examples ?? []).map(written),
    ...(byDefault !== undefined && { default: byDefault }),
    ...(quantityOf(node) && { quantity: quantityOf(node) }),
    choices: choicesOf(node),
    ...(refers && { refers }),
    ...(node['x-declares'] && { declares: node['x-declares'] }),
    required,
    type: typeOf(node),
    children: keysOfNode(node),
  };
}

const quantityOf = (node: NodeSchema): QuantitySpec | undefined =>
  node['x-quantity'] ?? node.anyOf?.map((branch) => branch['x-quantity']).find((spec) => spec !== undefined);

const written = (example: unknown): string =>
  Array.isArray(example) ? `[${example.map(written).join(', ')}]` : String(example);

function typeOf(node: NodeSchema): KeyInfo['type'] {
  const spec = node['x-quantity'];
  if (spec) return spec.band ? 'band' : spec.list ? 'quantities' : 'quantity';
  if (node.type === 'array') return 'list';
  if (node.type === 'boolean') return 'yes-no';
  if (choicesOf(node).length > 0) return 'choice';
  if (quantityOf(node)) return 'quantity';
  if (node.type === 'object' || node.patternProperties) return 'mapping';
  if (node.type === 'string') return 'text';
  return node.type === 'number' || node.type === 'integer' ? 'number' : 'any';
}

/** One step down; undefined where the schema ends. An entry of a list of kinds needs `kindOfEntry`. */
function stepDown(node: NodeSchema, step: string | number, kindOfEntry: string | undefined): NodeSchema | undefined {
  const list = node['x-entries'] as EntryListName | undefined;
  if (list !== undefined && Object.hasOwn(entryLists, list)) {
    const { kinds, prefix } = entryLists[list];
    const kind = kinds.length === 1 ? kinds[0] : kindOfEntry;
    return kind !== undefined && kinds.includes(kind) ? schemas[`${prefix}${kind}` as SchemaName] : undefined;
  }
  return childOf(node, step);
}

function nodeOfFile(fileKind: FileKind, path: ValuePath, kindOfEntry?: string): NodeSchema | undefined {
  let node: NodeSchema | undefined =
    fileKind === 'channel' || fileKind === 'parts' || fileKind === 'config' ? schemas[fileKind] : undefined;
  for (const step of path) node = node && stepDown(node, step, kindOfEntry);
  return node;
}

/**
 * The key at a path of a file.
 * @param path from the document's root: `['path', 3, 'length']`
 * @param kindOfEntry the kind of the entry on the way: `trace`, `eye`, `copper`, a part's kind
 */
export function keySchemaAt(fileKind: FileKind, path: ValuePath, kindOfEntry?: string): KeyInfo | undefined {
  const node = nodeOfFile(fileKind, path, kindOfEntry);
  const holder = nodeOfFile(fileKind, path.slice(0, -1), kindOfEntry);
  const key = String(path.at(-1) ?? '');
  return node && keyInfo(key, node, (holder && mappingOf(holder)?.required?.includes(key)) ?? false);
}

/** The keys that the mapping at a path may have. */
export function keysAt(fileKind: FileKind, path: ValuePath, kindOfEntry?: string): readonly KeyInfo[] {
  const node = nodeOfFile(fileKind, path, kindOfEntry);
  return node ? keysOfNode(node) : [];
}
