import type { Static } from '@sinclair/typebox';
import type { formatSchemas, SchemaName } from './index';

/** The value behind each schema, as read: quantities parsed. */
export type ValuesOf<Name extends SchemaName> = Static<(typeof formatSchemas)[Name]>;
