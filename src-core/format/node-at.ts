import type { NodeSchema, SchemaName } from '../../schemas/format/types';
import { schemas } from '../../schemas/generated/format';
import type { ValuePath } from '../text/types';

/** The alternative with keys of its own, where a node has alternatives. */
export const mappingOf = (node: NodeSchema | undefined): NodeSchema | undefined =>
  node?.properties ? node : node?.anyOf?.find((branch) => branch.properties);

/** What a mapping with names of one's own (materials, owners) holds under each name. */
export const underAnyName = (node: NodeSchema): NodeSchema | undefined =>
  mappingOf(node) ? undefined : Object.values(node.patternProperties ?? {})[0];

/** One step down a schema; undefined where it ends. */
export function childOf(node: NodeSchema, step: string | number): NodeSchema | undefined {
  if (typeof step === 'number') return node.items ?? node.anyOf?.find((branch) => branch.items)?.items;
  const properties = mappingOf(node)?.properties;
  if (properties) return Object.hasOwn(properties, step) ? properties[step] : undefined;
  return underAnyName(node);
}

/** The schema's node at a path of a value of this kind. */
export function nodeAt(name: SchemaName, path: ValuePath): NodeSchema | undefined {
  let node: NodeSchema | undefined = schemas[name];
  for (const step of path) node = node && childOf(node, step);
  return node;
}

/** A JSON Pointer as a path of this value: list indices as numbers. */
export function pathOf(pointer: string, value: unknown): (string | number)[] {
  const path: (string | number)[] = [];
  let here = value;
  for (const step of pointer.split('/').slice(1)) {
    const key = step.replaceAll('~1', '/').replaceAll('~0', '~');
    const index = Array.isArray(here) ? Number(key) : key;
    path.push(index);
    here = valueAt(here, [index]);
  }
  return path;
}

/** The value at a path; undefined where there is none. Own keys only. */
export function valueAt(value: unknown, path: ValuePath): unknown {
  let here = value;
  for (const step of path) {
    if (typeof here !== 'object' || here === null || !Object.hasOwn(here, step)) return undefined;
    here = (here as Record<string | number, unknown>)[step];
  }
  return here;
}

/** What may be written where only certain words may; none where other things may be written too, or anything. */
export function choicesOf(node: NodeSchema): string[] {
  if (node.enum) return node.enum.map(String);
  if (node.type === 'boolean') return ['true', 'false'];
  return (node.anyOf ?? [node]).filter((branch) => branch.const !== undefined).map((branch) => String(branch.const));
}
