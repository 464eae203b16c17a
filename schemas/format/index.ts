import { type TSchema, Type } from '@sinclair/typebox';
import { channel, receiver, transmitter } from './channel';
import { config } from './config';
import { type ElementKindName, elementSchemas } from './elements/index';
import { limitSchemas, waiver } from './limits';
import { drillRules, foil, material, parts, stackupRowSchemas } from './parts';
import { mapping } from './quantity';

/** Keys of a place in the path that a shared part has not. */
const ofThePlaceOnly = new Set(['part', 'includes', 'reversed']);

/** A shared part of a kind: `kind` in place of the kind and own name, and the kind's other keys. */
function partSchema(kind: ElementKindName) {
  const element = elementSchemas[kind];
  const properties: Record<string, TSchema> = { kind: Type.Literal(kind, { description: 'Its kind.' }) };
  for (const [key, schema] of Object.entries(element.properties)) {
    if (key !== kind && !ofThePlaceOnly.has(key)) properties[key] = schema;
  }
  return mapping(kind, `${element.description} Shared by several channels.`, properties, { required: ['kind'] });
}

type PartSchemaName = `part-${ElementKindName}`;
const partSchemas = Object.fromEntries(
  (Object.keys(elementSchemas) as ElementKindName[]).map((kind) => [`part-${kind}`, partSchema(kind)]),
) as Record<PartSchemaName, ReturnType<typeof partSchema>>;

/** Every mapping that is validated for itself, by the name under which `src-core/format` knows it. */
export const formatSchemas = {
  channel,
  parts,
  config,
  transmitter,
  receiver,
  waiver,
  material,
  foil,
  'drill-rules': drillRules,
  ...limitSchemas,
  ...stackupRowSchemas,
  ...elementSchemas,
  ...partSchemas,
};

export type SchemaName = keyof typeof formatSchemas;

/** The lists and mappings whose entries have a schema of their own, and how an entry's schema is found. */
export const entryLists = {
  elements: { choice: 'first-key', kinds: Object.keys(elementSchemas), prefix: '', noun: 'an element' },
  limits: { choice: 'first-key', kinds: Object.keys(limitSchemas), prefix: '', noun: 'a limit' },
  'stackup-rows': {
    choice: 'first-key',
    kinds: Object.keys(stackupRowSchemas),
    prefix: '',
    noun: 'a row of a stackup',
  },
  parts: { choice: 'kind', kinds: Object.keys(elementSchemas), prefix: 'part-', noun: 'a part' },
  waivers: { choice: 'only', kinds: ['waiver'], prefix: '', noun: 'a waiver' },
} as const;
export type EntryListName = keyof typeof entryLists;
