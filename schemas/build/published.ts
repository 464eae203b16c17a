import { channel } from '../format/channel';
import { config } from '../format/config';
import { elementSchemas } from '../format/elements/index';
import { type EntryListName, entryLists, formatSchemas, type SchemaName } from '../format/index';
import { parts } from '../format/parts';
import { plain } from './plain';

type Json = Record<string, unknown>;

/** For editors that know JSON Schema: the entries' schemas inlined under `$defs`, chosen by the key that names the kind. */
export function publishedSchemas(): Record<'channel' | 'parts' | 'config', Json> {
  return {
    channel: published('channel', channel),
    parts: published('parts', parts),
    config: published('config', config),
  };
}

function published(name: string, schema: unknown): Json {
  const definitions: Json = {};
  const body = inlineEntries(plain(schema), definitions) as Json;
  return {
    $schema: 'https://json-schema.org/draft/2020-12/schema',
    $id: `urn:lanewright:schema:1:${name}`,
    ...body,
    ...(Object.keys(definitions).length > 0 && { $defs: definitions }),
  };
}

/** Replaces `x-entries` by the choice of the entry's schema. */
function inlineEntries(node: unknown, definitions: Json): unknown {
  if (Array.isArray(node)) return node.map((item) => inlineEntries(item, definitions));
  if (typeof node !== 'object' || node === null) return node;
  const { 'x-entries': list, ...rest } = node as Json;
  const result = Object.fromEntries(
    Object.entries(rest).map(([key, value]) => [key, inlineEntries(value, definitions)]),
  );
  if (typeof list !== 'string' || !Object.hasOwn(entryLists, list)) return result;
  const entry = entryChoice(list as EntryListName, definitions);
  if (result.type === 'array') return { ...result, items: entry };
  const pattern = Object.keys(result.patternProperties as Json)[0];
  return { ...result, patternProperties: { [pattern]: entry } };
}

function entryChoice(list: EntryListName, definitions: Json): Json {
  const { choice, kinds, prefix } = entryLists[list];
  for (const kind of kinds) {
    const name = `${prefix}${kind}`;
    definitions[name] = plain(formatSchemas[name as SchemaName]);
  }
  const reference = (kind: string) => ({ $ref: `#/$defs/${prefix}${kind}` });
  if (choice === 'only') return reference(kinds[0]);
  if (choice === 'kind') {
    return {
      type: 'object',
      required: ['kind'],
      properties: { kind: { enum: Object.keys(elementSchemas), description: 'The kind of element.' } },
      allOf: kinds.map((kind) => ({
        if: { required: ['kind'], properties: { kind: { const: kind } } },
        // biome-ignore lint/suspicious/noThenProperty: the JSON Schema keyword
        then: reference(kind),
      })),
    };
  }
  return {
    type: 'object',
    anyOf: kinds.map((kind) => ({ required: [kind] })),
    // biome-ignore lint/suspicious/noThenProperty: the JSON Schema keyword
    allOf: kinds.map((kind) => ({ if: { required: [kind] }, then: reference(kind) })),
  };
}
