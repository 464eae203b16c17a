/** What YAML gave, looked into without trusting it. */
export type RawMapping = Readonly<Record<string, unknown>>;

export const isMapping = (value: unknown): value is RawMapping =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

export const asList = (value: unknown): readonly unknown[] => (Array.isArray(value) ? value : []);

export const mappingAt = (value: unknown, key: string): RawMapping => {
  const found = isMapping(value) && Object.hasOwn(value, key) ? value[key] : undefined;
  return isMapping(found) ? found : {};
};

export const listAt = (value: unknown, key: string): readonly unknown[] => {
  const found = isMapping(value) && Object.hasOwn(value, key) ? value[key] : undefined;
  return asList(found);
};
