/** A schema as plain JSON: TypeBox's own symbols dropped. */
export const plain = (schema: unknown): Record<string, unknown> => JSON.parse(JSON.stringify(schema));
