/** Small looks at values that came from YAML. */
export const isRecord = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

export const asList = (value: unknown): readonly unknown[] => (Array.isArray(value) ? value : []);
